/** The pages of a plan as the worker draws them: a list first, then each page as SVG text when it is looked at. */
import { type ReadonlySignal, type Signal, signal } from '@preact/signals'
import { useEffect, useMemo } from 'preact/hooks'
import type { PageSummary, Press } from '../../worker'
import type { Planned } from '../state/workshop'
import { useApp } from './context'

export interface Pages {
  readonly list: ReadonlySignal<readonly PageSummary[]>
  readonly error: ReadonlySignal<string | null>
  /** SVG text of a page; the same promise for the same page. */
  svg(index: number): Promise<string>
  /** Address of a page as an image; the same for the same page. */
  image(index: number): Promise<string>
  /** Index of the page that a piece lies on, −1 for none. */
  pageOf(piece: number): number
}

interface Drawn extends Pages {
  readonly list: Signal<readonly PageSummary[]>
  readonly error: Signal<string | null>
  dispose(): void
}

const drawPages = (press: Press, { key, plan, choices }: Planned): Drawn => {
  const list = signal<readonly PageSummary[]>([])
  const error = signal<string | null>(null)
  const svgs = new Map<number, Promise<string>>()
  const images = new Map<number, Promise<string>>()
  const urls: string[] = []
  let ready: Promise<void> | null = null

  const draw = async (): Promise<void> => {
    const answer = await press.pages(key, plan, choices)
    if (answer.ok) list.value = answer.value
    else error.value = `The pages could not be drawn: ${answer.refusal.message}`
  }
  const fetchPage = async (index: number): Promise<string> => {
    await (ready ??= draw())
    for (const isSecond of [false, true]) {
      const answer = await press.page(key, index)
      if (!answer.ok) throw new Error(answer.refusal.message)
      if (answer.value !== null) return answer.value
      if (!isSecond) await draw()
    }
    throw new Error(`there is no page ${index + 1}`)
  }
  const once = <T>(held: Map<number, Promise<T>>, index: number, make: () => Promise<T>): Promise<T> => {
    const known = held.get(index) ?? make()
    held.set(index, known)
    known.catch((reason) => {
      held.delete(index)
      error.value = `Page ${index + 1} could not be drawn: ${reason instanceof Error ? reason.message : reason}`
    })
    return known
  }
  const drawn: Drawn = {
    list,
    error,
    svg: (index) => once(svgs, index, () => fetchPage(index)),
    image: (index) =>
      once(images, index, async () => {
        const url = URL.createObjectURL(new Blob([await drawn.svg(index)], { type: 'image/svg+xml' }))
        urls.push(url)
        return url
      }),
    pageOf: (piece) => list.value.findIndex(({ pieces }) => pieces.includes(piece)),
    dispose: () => {
      for (const url of urls) URL.revokeObjectURL(url)
    },
  }
  ready = draw()
  return drawn
}

/** The pages of the last plan looked at stay drawn from station to station. */
let held: { key: string; drawn: Drawn } | null = null

const holdPages = (press: Press, planned: Planned): Drawn => {
  if (held?.key !== planned.key) {
    held?.drawn.dispose()
    held = { key: planned.key, drawn: drawPages(press, planned) }
  }
  return held.drawn
}

export const usePages = (planned: Planned | null): Pages | null => {
  const { press } = useApp()
  return useMemo(() => (planned ? holdPages(press, planned) : null), [planned?.key])
}

/** Draws a page into `host` once it is there; calls `onDrawn` then. */
export const usePageInto = (
  host: { current: HTMLElement | null },
  pages: Pages | null,
  index: number,
  onDrawn: () => void,
): void => {
  useEffect(() => {
    if (!pages || index < 0) return
    let stale = false
    void pages
      .svg(index)
      .then((text) => {
        const box = host.current
        if (stale || !box) return
        // Text of our own writer, without scripts. Its title would follow the pointer as a hint.
        box.innerHTML = text.slice(text.indexOf('<svg')).replace(/<title>[^<]*<\/title>/, '')
        box.dataset.page = String(index + 1)
        onDrawn()
      })
      .catch(() => {
        // Told by `pages.error`.
      })
    return () => {
      stale = true
    }
  }, [pages, index])
}

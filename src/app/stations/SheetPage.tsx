/** One page large, exactly as it prints, with what to look at marked on it. */
import { useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import type { Planned } from '../state/workshop'
import { nothingPointed, useApp } from '../ui/context'
import { lightPiece, pieceAt } from '../ui/lit-page'
import { type Pages, usePageInto } from '../ui/pages'
import { problemsOn } from '../ui/problems'

/** Steps of the page's zoom; 1 shows the whole page. */
const zooms = [1, 1.5, 2, 3, 4, 6]
/** CSS pixels per mm by definition (96 to the inch). */
const pxPerMm = 96 / 25.4

export const SheetPage = ({
  pages,
  index,
  planned,
  onTurn,
}: {
  pages: Pages
  index: number
  planned: Planned
  onTurn: (by: number) => void
}) => {
  const { pointed, announce } = useApp()
  const frame = useRef<HTMLElement>(null)
  const host = useRef<HTMLDivElement>(null)
  const zoom = useSignal(1)
  const page = pages.list.value[index]
  const light = (): void => lightPiece(host.current, pointed.peek().piece)
  usePageInto(host, pages, index, () => {
    const svg = host.current?.querySelector('svg')
    if (svg && page) svg.insertAdjacentHTML('beforeend', problemsOn(planned.plan, page.pieces, page.heightMm).marks)
    light()
  })
  const { piece } = pointed.value
  useEffect(light, [piece])

  const point = (id: number | null): void => {
    if (id === pointed.peek().piece && pointed.peek().panel === null) return
    pointed.value = id === null ? nothingPointed : { piece: id, panel: null }
    const found = planned.plan.pieces.find((entry) => entry.id === id)
    if (found) announce(`Piece ${found.label} is lit on the sheet and on the model.`)
  }
  const setZoom = (by: number): void => {
    const at = zooms.findIndex((each) => each >= zoom.peek())
    zoom.value = zooms[Math.min(zooms.length - 1, Math.max(0, at + by))]!
  }
  const real = (): void => {
    const box = frame.current!
    const fit = Math.min(box.clientWidth / page!.widthMm, box.clientHeight / page!.heightMm)
    zoom.value = pxPerMm / fit
  }
  const keys: Record<string, () => void> = {
    ArrowLeft: () => onTurn(-1),
    PageUp: () => onTurn(-1),
    ArrowRight: () => onTurn(1),
    PageDown: () => onTurn(1),
    Home: () => onTurn(Number.NEGATIVE_INFINITY),
    End: () => onTurn(Number.POSITIVE_INFINITY),
    '+': () => setZoom(1),
    '=': () => setZoom(1),
    '-': () => setZoom(-1),
    '0': () => {
      zoom.value = 1
    },
  }
  const holdPiece = (event: PointerEvent): void => {
    // A finger lights by tapping; a mouse by passing over.
    if (event.pointerType !== 'touch' || event.type === 'pointerdown') point(pieceAt(event.target))
  }
  return (
    <section class="page-area" aria-label="Page">
      <div class="row page-bar">
        <button type="button" class="quiet" disabled={index === 0} onClick={() => onTurn(-1)}>
          Back
        </button>
        <span class="figures grow middle" role="status">
          Page {index + 1} of {pages.list.value.length}
          {page && <span class="soft">: {page.title}</span>}
        </span>
        <button type="button" class="quiet" disabled={index >= pages.list.value.length - 1} onClick={() => onTurn(1)}>
          Next
        </button>
        <span class="row tight">
          <button type="button" class="quiet square" aria-label="Smaller" onClick={() => setZoom(-1)}>
            −
          </button>
          <button type="button" class="quiet square" aria-label="Larger" onClick={() => setZoom(1)}>
            +
          </button>
          <button
            type="button"
            class="quiet"
            onClick={() => {
              zoom.value = 1
            }}
          >
            All of it
          </button>
          <button type="button" class="quiet" onClick={real}>
            True size
          </button>
        </span>
      </div>
      <section
        class="page-frame"
        ref={frame}
        // biome-ignore lint/a11y/noNoninteractiveTabindex: it scrolls, and takes the keys for paging and zoom
        tabIndex={0}
        aria-label={`Page ${index + 1}: arrows turn pages, plus and minus zoom`}
        onKeyDown={(event) => {
          if (event.ctrlKey || event.metaKey || event.altKey) return
          // A magnified page is scrolled by the arrows first.
          const action = keys[event.key]
          if (!action || (zoom.peek() > 1 && event.key.startsWith('Arrow'))) return
          event.preventDefault()
          action()
        }}
      >
        <div
          class="paper large"
          ref={host}
          data-testid="page"
          style={{
            '--zoom': String(zoom.value),
            '--ratio': page ? String(page.widthMm / page.heightMm) : '0.707',
            aspectRatio: page ? `${page.widthMm} / ${page.heightMm}` : '210 / 297',
          }}
          onPointerMove={holdPiece}
          onPointerDown={holdPiece}
          onPointerLeave={(event) => event.pointerType !== 'touch' && point(null)}
        />
      </section>
    </section>
  )
}

/** A thin line of all pieces in gluing order, filled as far as done. */
import { useEffect, useRef } from 'preact/hooks'
import type { PlanPiece } from '../../plan/types'

interface Props {
  readonly order: readonly PlanPiece[]
  readonly glued: readonly number[]
  /** Piece ids. */
  readonly shown: number
  readonly next: number | null
  readonly onShow: (step: number) => void
}

export const GluingLine = ({ order, glued, shown, next, onShow }: Props) => {
  const ref = useRef<HTMLDivElement>(null)
  const done = new Set(glued)
  const at = order.findIndex(({ id }) => id === shown)
  useEffect(() => {
    const box = ref.current!
    const mark = box.children[at] as HTMLElement | undefined
    if (mark) box.scrollLeft = mark.offsetLeft - box.clientWidth / 2
  }, [at])
  const show = (index: number): void => onShow(order[Math.min(order.length - 1, Math.max(0, index))]!.step)
  const every = order.length <= 24 ? 1 : 10
  const steps: Record<string, number> = { ArrowLeft: -1, ArrowRight: 1, PageUp: -10, PageDown: 10 }
  return (
    <div
      ref={ref}
      class="gluing-line"
      role="listbox"
      tabIndex={0}
      aria-label="All pieces in gluing order"
      aria-orientation="horizontal"
      aria-activedescendant={`step-${order[at]?.step}`}
      onKeyDown={(event) => {
        const by = steps[event.key]
        const to = by !== undefined ? at + by : event.key === 'Home' ? 0 : event.key === 'End' ? order.length - 1 : -1
        if (by === undefined && to < 0) return
        event.preventDefault()
        show(to)
      }}
    >
      {order.map((piece, i) => {
        const state = done.has(piece.id) ? 'glued' : piece.id === next ? 'next' : 'to come'
        return (
          // biome-ignore lint/a11y/useKeyWithClickEvents: the listbox takes the keys
          // biome-ignore lint/a11y/useFocusableInteractive: the listbox has the focus and names the active option
          <div
            key={piece.id}
            id={`step-${piece.step}`}
            role="option"
            aria-selected={piece.id === shown}
            aria-label={`Piece ${piece.label}, ${state}`}
            class={`step ${state.replace(' ', '-')}`}
            title={`Piece ${piece.label}, ${state}`}
            onClick={() => show(i)}
          >
            {(i === 0 || (i + 1) % every === 0) && <span aria-hidden="true">{i + 1}</span>}
          </div>
        )
      })}
    </div>
  )
}

/** The piece goes from the sheet to its place on the model: 300 ms, nothing when less motion is asked for. */
import type { Plan, PlanPiece } from '../../plan/types'
import type { Preview } from '../../preview'

/** Middle of a piece on the screen: mean of its panels' outer corners as the view shows them. */
const target = (view: Preview, plan: Plan, piece: PlanPiece): { x: number; y: number } => {
  const box = view.element.getBoundingClientRect()
  const mine = new Set(piece.panels.map(({ panel }) => panel))
  let x = 0
  let y = 0
  let count = 0
  for (const { id, rings } of plan.panels) {
    if (!mine.has(id)) continue
    for (const corner of rings[0]!) {
      const at = view.project(corner, id)
      x += at.x
      y += at.y
      count++
    }
  }
  return { x: box.left + x / count, y: box.top + y / count }
}

export const travel = (figure: HTMLElement | null, view: Preview | null, plan: Plan, piece: PlanPiece): void => {
  const drawing = figure?.querySelector('svg')
  if (!drawing || !view || matchMedia('(prefers-reduced-motion: reduce)').matches) return
  const from = drawing.getBoundingClientRect()
  const to = target(view, plan, piece)
  const ghost = drawing.cloneNode(true) as SVGSVGElement
  ghost.setAttribute('aria-hidden', 'true')
  ghost.removeAttribute('data-testid')
  ghost.style.cssText = `position:fixed;left:${from.left}px;top:${from.top}px;width:${from.width}px;height:${from.height}px;pointer-events:none;z-index:9`
  document.body.append(ghost)
  const dx = to.x - (from.left + from.width / 2)
  const dy = to.y - (from.top + from.height / 2)
  const flight = ghost.animate(
    [
      { transform: 'none', opacity: 1 },
      { transform: `translate(${dx}px, ${dy}px) scale(0.35)`, opacity: 0.2 },
    ],
    { duration: 300, easing: 'ease-in-out' },
  )
  flight.onfinish = () => ghost.remove()
  flight.oncancel = () => ghost.remove()
}

/** Panels that no sheet can hold: a panel is never cut, so the model must be smaller or the paper larger. */
import { InputError } from '../errors'
import { convexHull, fittingAngle } from '../geometry/hull'
import { norm } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import type { PanelGraph } from './panel-graph'
import type { FitRectangle } from './patch'

/** @throws InputError when a panel does not fit the rectangle at any angle; it names the greatest height that would do */
export const refuseTooLarge = (skin: Skin, graph: PanelGraph, { widthMm, heightMm }: FitRectangle): void => {
  let scale = 1
  let worst = -1
  graph.flat.forEach(({ panel, rings }) => {
    const hull = convexHull(rings[0]!.flat())
    const fits = (k: number): boolean => fittingAngle(hull, widthMm / k, heightMm / k) !== null
    if (fits(scale)) return
    let [low, high] = [0, scale]
    for (let i = 0; i < 40; i++) {
      const middle = (low + high) / 2
      if (fits(middle)) low = middle
      else high = middle
    }
    scale = low
    worst = panel
  })
  if (worst < 0) return
  const height = 2 * graph.edgeMm * Math.max(...skin.points.map(norm))
  const most = Math.floor(height * scale)
  throw new InputError(
    `At ${Math.round(height)} mm panel ${worst} is larger than the printable area of ${widthMm} × ${heightMm} mm. ` +
      `Choose a height of at most ${most} mm or larger paper.`,
    'height',
  )
}

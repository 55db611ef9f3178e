/** From the skin in space (unit edges) to flat panels in mm. */
import { BrokenPromise } from '../errors'
import type { Vec2 } from '../geometry/vec2'
import { dot, planeFrame, sub } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import type { FlatPanel } from './types'

/**
 * Every panel in a frame of its own plane, seen from outside: origin at its first ring point, millimetres, outer rings
 * counter-clockwise. Rings keep their points and their order, so ring edge i still is crease `panel.creases[r][i]`.
 *
 * @param edgeMm length of the solid's edge in mm
 */
export const flattenPanels = (skin: Skin, edgeMm: number): FlatPanel[] =>
  skin.panels.map((panel) => {
    const { u, v } = planeFrame(panel.normal)
    const origin = skin.points[panel.rings[0]?.[0] ?? -1]
    if (!origin) throw new BrokenPromise('A panel has no outer ring.', { panel: panel.id })
    const rings = panel.rings.map((ring) =>
      ring.map((i): Vec2 => {
        const d = sub(skin.points[i]!, origin)
        return [dot(d, u) * edgeMm, dot(d, v) * edgeMm]
      }),
    )
    return { panel: panel.id, rings }
  })

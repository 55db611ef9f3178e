/** How the rotations of a solid permute the panels and creases of its skin. */
import { SnapGrid } from '../geometry/snap'
import { apply, type Mat3, norm } from '../geometry/vec3'
import type { Skin } from '../skin/types'

/** One rotation as it acts on ids. */
export interface Action {
  readonly panels: Int32Array
  readonly creases: Int32Array
}

/**
 * @param rotations of the solid, the identity included
 * @returns by rotation, the identity first; the identity alone where the skin is not carried onto itself (line contacts
 *   paired without symmetry, points that were moved)
 */
export const actionsOn = (skin: Skin, rotations: readonly Mat3[]): Action[] => {
  const identity: Action = {
    panels: Int32Array.from(skin.panels, (_, i) => i),
    creases: Int32Array.from(skin.creases, (_, i) => i),
  }
  const reach = skin.points.reduce((most, p) => Math.max(most, norm(p)), 0)
  const near = 1e-7 * reach + 2 * skin.slack
  const grid = new SnapGrid(near, near, Math.max(1e-3 * reach, 8 * near))
  const numbers = skin.points.map((p) => grid.add(p[0], p[1], p[2]))
  const pointOf = new Map(numbers.map((n, i) => [n, i]))
  const edges = new Map<string, { panel: number; crease: number }[]>()
  for (const p of skin.panels)
    p.rings.forEach((ring, r) => {
      ring.forEach((from, e) => {
        const key = `${from} ${ring[(e + 1) % ring.length]!}`
        const here = { panel: p.id, crease: p.creases[r]![e]! }
        const list = edges.get(key)
        if (list) list.push(here)
        else edges.set(key, [here])
      })
    })
  const actions: Action[] = [identity]
  for (const m of rotations) {
    const image = skin.points.map((p) => {
      const q = apply(m, p)
      return pointOf.get(grid.find(q[0], q[1], q[2])) ?? -1
    })
    if (image.includes(-1)) return [identity]
    const panels = new Int32Array(skin.panels.length).fill(-1)
    const creases = new Int32Array(skin.creases.length).fill(-1)
    for (const p of skin.panels) {
      // The image panel has all image edges, and faces the way the normal is carried.
      const normal = apply(m, p.normal)
      const ring = p.rings[0]!
      const there = edges.get(`${image[ring[0]!]} ${image[ring[1]!]}`) ?? []
      const target = there.find(({ panel }) => {
        const n = skin.panels[panel]!.normal
        return normal[0] * n[0] + normal[1] * n[1] + normal[2] * n[2] > 1 - 1e-6
      })
      if (!target) return [identity]
      panels[p.id] = target.panel
      for (const [r, list] of p.rings.entries())
        for (const [e, from] of list.entries()) {
          const key = `${image[from]} ${image[list[(e + 1) % list.length]!]}`
          const edge = (edges.get(key) ?? []).find((x) => x.panel === target.panel)
          const id = p.creases[r]![e]!
          // Seen from both its panels a crease must become one crease.
          if (!edge || (creases[id]! >= 0 && creases[id] !== edge.crease)) return [identity]
          creases[id] = edge.crease
        }
    }
    if (panels.some((p, i) => p !== i)) actions.push({ panels, creases })
  }
  return actions
}

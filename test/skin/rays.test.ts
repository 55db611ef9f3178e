/**
 * The skin against a second way of looking: rays from outside. Each ray must meet the panels exactly where it meets the
 * raw faces, at the same depth, or miss both.
 */
import { describe, expect, test } from 'vitest'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily } from '../../src/solids'
import type { FillRule } from '../../src/solids/types'
import { randomDirection, seeded } from '../support/random'
import { cast, facesAsPolygons, prepare } from './ray-caster'

const rays = 20_000

const hardest: readonly [string, FillRule][] = [
  ['great-retrosnub-icosidodecahedron', 'nonzero'],
  ['small-retrosnub-icosicosidodecahedron', 'nonzero'],
  ['great-dirhombicosidodecahedron', 'nonzero'],
  ['great-snub-dodecicosidodecahedron', 'nonzero'],
  ['inverted-snub-dodecadodecahedron', 'nonzero'],
  ['great-inverted-snub-icosidodecahedron', 'nonzero'],
  ['snub-icosidodecadodecahedron', 'nonzero'],
  ['great-rhombidodecahedron', 'nonzero'],
  ['great-truncated-icosidodecahedron', 'nonzero'],
  ['truncated-dodecadodecahedron', 'nonzero'],
  ['tetrahemihexahedron', 'nonzero'],
  ['small-dodecahemicosahedron', 'nonzero'],
  ['great-icosahedron', 'nonzero'],
  ['small-stellated-dodecahedron', 'evenodd'],
  ['great-dirhombicosidodecahedron', 'evenodd'],
  ['great-stellated-truncated-dodecahedron', 'evenodd'],
]

/** Rays that hit, and the greatest difference in depth; throws at the first ray on which panels and faces disagree. */
const castAll = (id: string, fill: FillRule, rays: number, seed: number): { hits: number; worst: number } => {
  const solid = buildSolid(id)
  const skin = computeSkin(solid, fill)
  const faces = facesAsPolygons(solid, fill).map(prepare)
  const panels = skin.panels.map((p) =>
    prepare({
      rings: p.rings.map((r) => r.map((i) => skin.points[i] as [number, number, number])),
      rule: 'nonzero',
    }),
  )
  const random = seeded(seed)
  const reach = Math.max(...solid.vertices.map((v) => Math.hypot(...v)))
  let hits = 0
  let worst = 0
  for (let i = 0; i < rays; i++) {
    // From a point on a sphere well outside towards a point within the solid's reach, so that most rays hit.
    const from = randomDirection(random).map((x) => 3 * reach * x) as [number, number, number]
    const aim = randomDirection(random).map((x) => reach * random() * x) as [number, number, number]
    const to = [aim[0] - from[0], aim[1] - from[1], aim[2] - from[2]] as const
    const length = Math.hypot(...to)
    const direction = [to[0] / length, to[1] / length, to[2] / length] as const
    const face = cast(faces, from, direction)
    const panel = cast(panels, from, direction)
    if (!face || !panel) {
      if (face || panel) throw new Error(`ray ${i}: ${face ? 'a face but no panel' : 'a panel but no face'}`)
      continue
    }
    hits++
    const off = Math.abs(face.distance - panel.distance)
    worst = Math.max(worst, off)
    // Where coplanar faces overlap either may be named first; the panel must still lie in that face's plane.
    if (!skin.panels[panel.index]?.faces.includes(face.index) && off > 1e-9)
      throw new Error(`ray ${i}: panel ${panel.index} does not come from face ${face.index}`)
  }
  return { hits, worst }
}

describe('rays from outside', () => {
  hardest.forEach(([id, fill], k) => {
    const seed = 7100 + k
    test(`${id} (${fill}), ${rays} rays, seed ${seed}`, () => {
      const { hits, worst } = castAll(id, fill, rays, seed)
      expect(hits).toBeGreaterThan(rays / 3)
      expect(worst).toBeLessThan(1e-9)
    })
  })

  for (const fill of ['nonzero', 'evenodd'] as const)
    test(`all 75 (${fill}), 500 rays each, seeds from 7500`, () => {
      for (const [k, { id }] of listFamily('uniform').entries()) {
        const { hits, worst } = castAll(id, fill, 500, 7501 + k)
        expect([id, hits > 100, worst < 1e-9]).toEqual([id, true, true])
      }
    })

  for (const [k, { id }] of listFamily('compound').entries())
    test(`${id}, ${rays / 2} rays, seed ${7700 + k}`, () => {
      const { hits, worst } = castAll(id, 'nonzero', rays / 2, 7700 + k)
      expect(hits).toBeGreaterThan(rays / 6)
      expect(worst).toBeLessThan(1e-9)
    })

  for (const family of ['dual', 'antiprism'] as const)
    test(`family ${family}, 200 rays each, seeds from 7800`, () => {
      for (const [k, { id }] of listFamily(family).entries()) {
        const { hits, worst } = castAll(id, 'nonzero', 200, 7800 + k)
        expect([id, hits > 10, worst < 1e-8]).toEqual([id, true, true])
      }
    })
})

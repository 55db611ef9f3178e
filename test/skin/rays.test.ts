/**
 * The skin against a second way of looking: rays from outside. Each ray must meet the panels exactly where it meets the
 * raw faces, at the same depth, or miss both.
 */
import { describe, expect, test } from 'vitest'
import { computeSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
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

describe('rays from outside', () => {
  hardest.forEach(([id, fill], k) => {
    const seed = 7100 + k
    test(`${id} (${fill}), ${rays} rays, seed ${seed}`, () => {
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
        worst = Math.max(worst, Math.abs(face.distance - panel.distance))
        const p = skin.panels[panel.index]
        if (!p?.faces.includes(face.index)) {
          // Where coplanar faces overlap either may be named first; the panel must still lie in that face's plane.
          const same = Math.abs(face.distance - panel.distance) < 1e-9
          if (!same) throw new Error(`ray ${i}: panel ${panel.index} does not come from face ${face.index}`)
        }
      }
      expect(hits).toBeGreaterThan(rays / 3)
      expect(worst).toBeLessThan(1e-9)
    })
  })
})

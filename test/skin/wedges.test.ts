/**
 * Inner angles against rays: from a point a hair off a crease, in the middle of the wedge that the inner angle names, a
 * ray must cross the skin an odd number of times (the point is inside); in the middle of the rest, an even number.
 */
import { describe, expect, test } from 'vitest'
import { add, cross, normalize, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
import { randomDirection, seeded } from '../support/random'
import { crossings, prepare } from './ray-caster'

describe('inner angles and rays cast into the crease', () => {
  const ids = [
    'cube',
    'great-icosahedron',
    'great-stellated-dodecahedron',
    'small-stellated-dodecahedron',
    'octahemioctahedron',
    'great-dirhombicosidodecahedron',
    'great-retrosnub-icosidodecahedron',
    'small-retrosnub-icosicosidodecahedron',
    'great-snub-dodecicosidodecahedron',
    'rhombicosahedron',
    'truncated-dodecadodecahedron',
    'heptagrammic-7-3-antiprism',
  ]
  for (const [k, id] of ids.entries())
    test(`${id}, seed ${8100 + k}`, () => {
      const random = seeded(8100 + k)
      const skin = computeSkin(buildSolid(id))
      const panels = skin.panels.map((p) =>
        prepare({ rings: p.rings.map((r) => r.map((i) => skin.points[i]!)), rule: 'nonzero' }),
      )
      const inside = (p: Vec3): boolean => {
        // Three rays outvote one that grazes an edge.
        const odd = [0, 1, 2].filter(() => crossings(panels, p, randomDirection(random)) % 2 === 1).length
        return odd >= 2
      }
      const some = Math.min(1, 150 / skin.creases.length)
      let looked = 0
      for (const crease of skin.creases) {
        // Paired across the outside, the angle spans two bodies and the air between them.
        if (skin.contacts[crease.stretch]?.pairing === 'outside' || random() > some) continue
        const [a, b] = crease.ends.map((v) => skin.points[v]!) as [Vec3, Vec3]
        const d = normalize(sub(b, a))
        const normal = skin.panels[crease.panels[0]]!.normal
        const into = cross(normal, d)
        // Turning from the first panel's back: angle 0 lies in the panel, positive towards its inside.
        const towards = (degrees: number): Vec3 => {
          const t = (degrees * Math.PI) / 180
          return add(scale(into, Math.cos(t)), scale(normal, -Math.sin(t)))
        }
        const hair = 1e-3 * Math.min(crease.length, Math.max(1e-3, crease.innerAngle / 180))
        const middle = scale(add(a, b), 0.5)
        const off = (degrees: number): Vec3 => add(middle, scale(towards(degrees), hair))
        looked++
        expect([crease.id, inside(off(crease.innerAngle / 2))]).toEqual([crease.id, true])
        // Beside a line contact the rest of the turn holds other wedges; on the surface it is all air.
        if (crease.contact === 'surface')
          expect([crease.id, inside(off((crease.innerAngle + 360) / 2))]).toEqual([crease.id, false])
      }
      expect(looked).toBeGreaterThan(9)
    })
})

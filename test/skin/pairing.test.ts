/** Line contacts paired through the inside or across the outside: the same surface, other partners. */
import { describe, expect, test } from 'vitest'
import { computeSkin, validateSkin, withPairing } from '../../src/skin'
import { buildSolid } from '../../src/solids'

describe('pairing of line contacts', () => {
  // Bodies by hand: eight tetrahedra, six pyramids, the outer body and twelve prisms' worth of it, one, one.
  for (const [id, bodies] of [
    ['octahemioctahedron', 8],
    ['cubohemioctahedron', 6],
    ['small-rhombihexahedron', 13],
    ['great-rhombihexahedron', 1],
    ['great-dirhombicosidodecahedron', 1],
  ] as const)
    test(id, () => {
      const skin = computeSkin(buildSolid(id))
      expect(skin.bodies).toBe(bodies)
      const inside = withPairing(skin, () => 'inside')
      // Every body by itself: as many parts as bodies.
      expect(inside.parts).toBe(bodies)
      const outside = withPairing(skin, () => 'outside')
      expect(outside.parts).toBe(1)
      for (const s of [inside, outside]) {
        expect(validateSkin(s).filter((c) => !c.ok)).toEqual([])
        expect(s.creases.length).toBe(skin.creases.length)
      }
      // Across the outside the skin turns over more than half a turn; the two ways fill the whole turn together.
      skin.contacts.forEach((_, i) => {
        const sum = (s: typeof skin): number =>
          s.creases.filter((c) => c.stretch === i).reduce((total, c) => total + c.innerAngle, 0)
        const sectors = outside.creases.filter((c) => c.stretch === i)
        for (const c of sectors) expect(c.innerAngle).toBeGreaterThan(180)
        const air = sectors.reduce((total, c) => total + 360 - c.innerAngle, 0)
        expect(sum(inside) + air).toBeCloseTo(360, 6)
      })
      expect(withPairing(outside, (i) => skin.contacts[i]!.pairing)).toEqual(skin)
    })
})

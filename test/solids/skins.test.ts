/** The skin of the solids outside the 75 closes, under both fill rules; convex ones show their faces whole. */
import { describe, expect, test } from 'vitest'
import { computeSkin, validateSkin } from '../../src/skin'
import { buildSolid, listFamily, type SolidFamily, solidFacts } from '../../src/solids'
import { signedVolume } from './volumes'

describe.each(['prism', 'antiprism', 'dual', 'compound'] satisfies SolidFamily[])('skins: %s', (family) => {
  for (const fill of ['nonzero', 'evenodd'] as const)
    test(fill, () => {
      for (const [k, { id, vertices }] of listFamily(family).entries()) {
        // Open star centres cut the large antiprisms into thousands of panels: every fourth of those is enough.
        if (family === 'antiprism' && fill === 'evenodd' && vertices > 30 && k % 4 > 0) continue
        const skin = computeSkin(buildSolid(id), fill)
        expect([id, validateSkin(skin).filter((c) => !c.ok)]).toEqual([id, []])
        // Line contacts can be paired so that one skin goes over all bodies.
        expect([id, skin.parts]).toEqual([id, 1])
      }
    })
})

// From memory: these pairs differ only inside.
const sameOutside = [
  ['small-rhombihexacron', 'small-hexacronic-icositetrahedron'],
  ['small-rhombidodecacron', 'small-dodecacronic-hexecontahedron'],
  ['small-dodecicosacron', 'small-ditrigonal-dodecacronic-hexecontahedron'],
  ['great-rhombidodecacron', 'great-deltoidal-hexecontahedron'],
  ['medial-triambic-icosahedron', 'great-triambic-icosahedron'],
] as const
test.each(sameOutside)('%s and %s look the same from outside', (a, b) => {
  const [one, other] = [computeSkin(buildSolid(a)), computeSkin(buildSolid(b))]
  expect(one.panels.length).toBe(other.panels.length)
  expect(Math.abs(one.volume / other.volume - 1)).toBeLessThan(1e-10)
  expect(Math.abs(one.area / other.area - 1)).toBeLessThan(1e-10)
  const circumradius = (id: string): number => solidFacts(id)?.circumradius as number
  expect(circumradius(a)).toBeCloseTo(circumradius(b), 10)
})

test('convex prisms, antiprisms and the thirteen Catalan solids show each face whole', () => {
  let seen = 0
  for (const f of [...listFamily('prism'), ...listFamily('antiprism'), ...listFamily('dual')]) {
    // The great disdyakis dodecahedron has density 1 as its original has (−1 by the usual sign), and is not convex.
    if (f.density !== 1 || f.id === 'great-disdyakis-dodecahedron') continue
    const solid = buildSolid(f.id)
    const skin = computeSkin(solid)
    expect([f.id, skin.panels.length, skin.creases.length, skin.bodies]).toEqual([f.id, f.faces, f.edges, 1])
    expect(Math.abs(skin.volume / signedVolume(solid) - 1)).toBeLessThan(1e-11)
    seen++
  }
  expect(seen).toBe(21 + 21 + 13)
})

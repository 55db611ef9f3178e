/**
 * The skin does not depend on how the solid lies, nor on the order in which its vertices and faces are listed; and it is
 * the same whether rotations are used or every plane is cut up by itself.
 */
import { describe, expect, test } from 'vitest'
import { identity3 } from '../../src/geometry/vec3'
import { computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid, listFamily, transformSolid } from '../../src/solids'
import type { FillRule } from '../../src/solids/types'
import { randomRotation, seeded } from '../support/random'

const counts = (skin: Skin): unknown => ({
  panels: skin.panels.length,
  creases: skin.creases.length,
  bodies: skin.bodies,
  parts: skin.parts,
  contacts: skin.contacts.length,
})

/** Compared as sorted numbers, not as rounded text: a value on a rounding border may fall either way. */
const expectAlike = (a: Skin, b: Skin): void => {
  expect(counts(a)).toEqual(counts(b))
  const worst = (of: (s: Skin) => number[]): number => {
    const ascending = (s: Skin): number[] => of(s).sort((x, y) => x - y)
    const other = ascending(b)
    return Math.max(...ascending(a).map((x, i) => Math.abs(x - (other[i] as number))))
  }
  expect(worst((s) => s.panels.map((p) => p.area))).toBeLessThan(1e-9)
  expect(worst((s) => s.creases.map((c) => c.length))).toBeLessThan(1e-8)
  // At line contacts the angle follows the pairing, and among contacts of equal length either may be crossed.
  const onSurface = (s: Skin): number[] => s.creases.filter((c) => c.contact === 'surface').map((c) => c.innerAngle)
  expect(worst(onSurface)).toBeLessThan(1e-6)
}

describe('the skin of all 75, turned and shuffled', () => {
  for (const [k, facts] of listFamily('uniform').entries())
    for (const fill of ['nonzero', 'evenodd'] as const satisfies readonly FillRule[]) {
      const seed = 100 + k
      test(`${facts.id} (${fill}), seed ${seed}`, () => {
        const solid = buildSolid(facts.id)
        const plain = computeSkin(solid, fill)
        expect(validateSkin(plain).filter((c) => !c.ok)).toEqual([])
        const moved = computeSkin(transformSolid(solid, randomRotation(seeded(seed)), seed), fill)
        expect(validateSkin(moved).filter((c) => !c.ok)).toEqual([])
        expectAlike(moved, plain)
        expect(Math.abs(moved.area / plain.area - 1)).toBeLessThan(1e-9)
        expect(Math.abs(moved.volume / plain.volume - 1)).toBeLessThan(1e-9)
      })
    }
})

describe('symmetry is a short cut only', () => {
  for (const id of [
    'great-icosahedron',
    'tetrahemihexahedron',
    'great-snub-dodecicosidodecahedron',
    'rhombicosahedron',
  ])
    test(id, () => {
      const solid = buildSolid(id)
      const alone = computeSkin({ ...solid, rotations: [identity3] })
      expectAlike(alone, computeSkin(solid))
    })
})

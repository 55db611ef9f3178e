/**
 * The skin does not depend on how the solid lies, nor on the order in which its vertices and faces are listed; and it is
 * the same whether rotations are used or every plane is cut up by itself.
 */
import { describe, expect, test } from 'vitest'
import { identity3 } from '../../src/geometry/vec3'
import { computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid, listSolids, transformSolid } from '../../src/solids'
import type { FillRule } from '../../src/solids/types'
import { randomRotation, seeded } from '../support/random'

const digest = (skin: Skin): unknown => ({
  panels: skin.panels.length,
  creases: skin.creases.length,
  bodies: skin.bodies,
  parts: skin.parts,
  contacts: skin.contacts.length,
  areas: skin.panels.map((p) => p.area.toFixed(8)).sort(),
  angles: skin.creases.map((c) => c.innerAngle.toFixed(5)).sort(),
})

describe('the skin of all 75, turned and shuffled', () => {
  for (const [k, facts] of listSolids().entries())
    for (const fill of ['nonzero', 'evenodd'] as const satisfies readonly FillRule[]) {
      const seed = 100 + k
      test(`${facts.id} (${fill}), seed ${seed}`, () => {
        const solid = buildSolid(facts.id)
        const plain = computeSkin(solid, fill)
        expect(validateSkin(plain).filter((c) => !c.ok)).toEqual([])
        const moved = computeSkin(transformSolid(solid, randomRotation(seeded(seed)), seed), fill)
        expect(validateSkin(moved).filter((c) => !c.ok)).toEqual([])
        expect(digest(moved)).toEqual(digest(plain))
        expect(Math.abs(moved.area / plain.area - 1)).toBeLessThan(1e-9)
        expect(Math.abs(moved.volume / plain.volume - 1)).toBeLessThan(1e-9)
      })
    }
})

describe('symmetry is a short cut only', () => {
  for (const id of ['great-icosahedron', 'tetrahemihexahedron', 'great-snub-dodecicosidodecahedron', 'rhombicosahedron'])
    test(id, () => {
      const solid = buildSolid(id)
      const alone = computeSkin({ ...solid, rotations: [identity3] })
      expect(digest(alone)).toEqual(digest(computeSkin(solid)))
    })
})

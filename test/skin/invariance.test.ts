/**
 * The skin does not depend on how the solid lies, on its size, nor on the order in which its vertices and faces are listed; and it is
 * the same whether rotations are used or every plane is cut up by itself.
 */
import { describe, expect, test } from 'vitest'
import { identity3, scale } from '../../src/geometry/vec3'
import { computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid, listFamily, transformSolid } from '../../src/solids'
import type { FillRule, Solid } from '../../src/solids/types'
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

const resized = (solid: Solid, factor: number): Solid => ({
  ...solid,
  vertices: solid.vertices.map((v) => scale(v, factor)),
})

/** The skin of a solid that is `factor` times too large, told in its old unit. */
const shrunk = (skin: Skin, factor: number): Skin => ({
  ...skin,
  points: skin.points.map((p) => scale(p, 1 / factor)),
  panels: skin.panels.map((p) => ({ ...p, area: p.area / factor ** 2 })),
  creases: skin.creases.map((c) => ({ ...c, length: c.length / factor })),
  area: skin.area / factor ** 2,
  volume: skin.volume / factor ** 3,
})

/** Turned, shuffled, and a thousand times as large or as small. */
const expectInvariant = (id: string, fill: FillRule, seed: number): void => {
  const solid = buildSolid(id)
  const plain = computeSkin(solid, fill)
  expect(validateSkin(plain).filter((c) => !c.ok)).toEqual([])
  const factor = seed % 2 === 0 ? 1000 : 0.001
  const other = computeSkin(resized(transformSolid(solid, randomRotation(seeded(seed)), seed), factor), fill)
  expect(validateSkin(other).filter((c) => !c.ok)).toEqual([])
  const moved = shrunk(other, factor)
  expectAlike(moved, plain)
  expect(Math.abs(moved.area / plain.area - 1)).toBeLessThan(1e-9)
  expect(Math.abs(moved.volume / plain.volume - 1)).toBeLessThan(1e-9)
}

describe('the skin of all 75, turned, shuffled and resized', () => {
  for (const [k, facts] of listFamily('uniform').entries())
    for (const fill of ['nonzero', 'evenodd'] as const satisfies readonly FillRule[]) {
      const seed = 100 + k
      test(`${facts.id} (${fill}), seed ${seed}`, () => {
        expectInvariant(facts.id, fill, seed)
      })
    }
})

describe('the skin of the families, turned, shuffled and resized', () => {
  let seed = 1000
  for (const family of ['prism', 'antiprism', 'dual', 'compound'] as const)
    test(`all of family ${family}, seeds from ${seed}`, () => {
      for (const { id } of listFamily(family)) expectInvariant(id, 'nonzero', seed++)
    }, 120_000)
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

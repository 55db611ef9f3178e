/** Finding solids, hands, copies that lie otherwise, and a validator that is shown to fail. */
import { describe, expect, test } from 'vitest'
import { apply, determinant, distance, type Mat3 } from '../../src/geometry/vec3'
import {
  buildSolid,
  findSolids,
  listFamily,
  mirrorSolid,
  nearestIds,
  transformSolid,
  validateSolid,
} from '../../src/solids'
import { edgesOf } from '../../src/solids/edges'
import { findIsometries } from '../../src/solids/symmetry'
import type { Solid } from '../../src/solids/types'
import { randomRotation, seeded } from '../support/random'

const names = (query: string): string[] => findSolids(query).map((f) => f.name)

describe('finding', () => {
  test('by name, part of it, words in any order, in any spelling of spaces and hyphens', () => {
    expect(names('great icosahedron')[0]).toBe('great icosahedron')
    expect(names('Great-Icosahedron')[0]).toBe('great icosahedron')
    expect(names('retrosnub')).toEqual(['small retrosnub icosicosidodecahedron', 'great retrosnub icosidodecahedron'])
    expect(names('snub great').length).toBeGreaterThan(2)
    expect(names('zzz')).toEqual([])
    expect(names('').length).toBe(341)
  })
  test('by index', () => {
    expect(names('74')).toEqual(['great retrosnub icosidodecahedron'])
    expect(names('U4')).toEqual(['tetrahemihexahedron'])
    expect(names('76')).toEqual([])
  })
  test('by vertex configuration, shifted, reversed, or with every sense turned round', () => {
    expect(names('4.6.8')).toEqual(['truncated cuboctahedron'])
    expect(names('8.4.6')).toEqual(['truncated cuboctahedron'])
    expect(names('(3.3.3.3.3)/2')).toEqual(['great icosahedron'])
    expect(names('3.4.3/2.4')).toEqual(['tetrahemihexahedron'])
    expect(names('4.3/2.4.3')).toEqual(['tetrahemihexahedron'])
  })
  test('by Wythoff symbol, spaces and order on one side of the bar aside', () => {
    expect(names('|2 3 4')).toEqual(['snub cube'])
    expect(names('| 4 3 2')).toEqual(['snub cube'])
    expect(names('| 3/2 5/3 3 5/2')).toEqual(['great dirhombicosidodecahedron'])
    expect(names('2 4 (3/2 4/2) |')).toEqual(['small rhombihexahedron'])
    expect(names('2 3 | 4')).toEqual(['truncated cube'])
  })
  test('every solid is found by each of its four names', () => {
    for (const f of listFamily('uniform'))
      for (const query of [f.name, String(f.index), f.vertexConfiguration, f.wythoff])
        expect([
          query,
          findSolids(query).map((x) => x.id)[0] === f.id || findSolids(query).some((x) => x.id === f.id),
        ]).toEqual([query, true])
  })
  test('nearest ids to a misspelling', () => {
    expect(nearestIds('great-icosahedrn')[0]).toBe('great-icosahedron')
    expect(nearestIds('cubz')[0]).toBe('cube')
    expect(() => buildSolid('dodecahedorn')).toThrow(/Nearest: dodecahedron/)
  })
})

/** Whether a rotation takes a's faces to b's; both lie with the same axes, so a's own rotations are all that need trying. */
const congruent = (a: Solid, b: Solid): boolean => {
  const isometries = findIsometries({ vertices: a.vertices, faces: a.faces })
  const faces = (s: Solid, m: Mat3 | null): string[] =>
    s.faces
      .map((f) =>
        f.cycle
          .map((i) => {
            const p = s.vertices[i] as readonly [number, number, number]
            const q = m ? apply(m, p) : p
            return q.map((x) => Math.round(x * 1e5) + 0).join(',')
          })
          .sort()
          .join(' '),
      )
      .sort()
  const target = faces(b, null).join('|')
  return isometries.rotations.some((m) => faces(a, m).join('|') === target)
}

describe('hands', () => {
  const chiral = listFamily('uniform').filter((f) => f.chiral)
  for (const f of chiral)
    test(`${f.name}: left is the mirror image of right, and not right itself turned`, () => {
      const right = buildSolid(f.id, 'right')
      const left = buildSolid(f.id, 'left')
      expect([right.hand, left.hand]).toEqual(['right', 'left'])
      expect(congruent(mirrorSolid(left), right)).toBe(true)
      expect(congruent(left, right)).toBe(false)
      expect(findIsometries(right).reflections).toEqual([])
    })
  test('solids that are their own mirror image have no hand', () => {
    expect([buildSolid('cube', 'left').hand, buildSolid('great-icosahedron', 'left').hand]).toEqual(['none', 'none'])
  })
})

describe('copies that lie otherwise', () => {
  for (const [k, id] of [
    'tetrahemihexahedron',
    'great-retrosnub-icosidodecahedron',
    'small-rhombihexahedron',
  ].entries()) {
    const seed = 40 + k
    test(`${id}, turned and shuffled, seed ${seed}`, () => {
      const solid = buildSolid(id)
      const moved = transformSolid(solid, randomRotation(seeded(seed)), seed)
      expect(validateSolid(moved).filter((c) => !c.ok)).toEqual([])
      expect(edgesOf(moved).length).toBe(edgesOf(solid).length)
      expect(moved.rotations.length).toBe(solid.rotations.length)
      const image = new Set(moved.vertices.map((p) => p.map((x) => x.toFixed(6)).join(',')))
      for (const g of moved.rotations) {
        expect(determinant(g)).toBeCloseTo(1, 9)
        for (const p of moved.vertices) {
          const q = apply(g, p)
          expect(
            image.has(q.map((x) => x.toFixed(6)).join(',')) || moved.vertices.some((v) => distance(v, q) < 1e-9),
          ).toBe(true)
        }
      }
    })
  }
})

describe('validateSolid is shown to fail', () => {
  const good = buildSolid('great-stellated-dodecahedron')
  type Loose = {
    vertices: [number, number, number][]
    faces: { cycle: number[]; kind: number }[]
    kinds: { count: number }[]
  }
  const broken: readonly [string, string, (s: Loose) => void][] = [
    ['a vertex moved', 'edges have unit length', (s) => void ((s.vertices[0] as number[])[0]! += 1e-6)],
    ['a face left out', 'every edge has two faces', (s) => void s.faces.pop()],
    ['a count off', 'kinds are counted', (s) => void (s.kinds[0]!.count += 1)],
    ['a face of another kind', 'kinds are counted', (s) => void (s.faces[0]!.kind = 5)],
    [
      'two corners swapped',
      'edges have unit length',
      (s) => {
        const c = s.faces[0]!.cycle
        ;[c[0], c[1]] = [c[1]!, c[0]!]
      },
    ],
    ['off the sphere', 'vertices lie on one sphere', (s) => void ((s.vertices[3] as number[])[2]! *= 1.01)],
  ]
  test('and passes the good one', () => {
    expect(validateSolid(good).filter((c) => !c.ok)).toEqual([])
  })
  for (const [fault, name, breakIt] of broken)
    test(fault, () => {
      const copy = structuredClone(good) as unknown as Loose
      breakIt(copy)
      expect(
        validateSolid(copy as unknown as Solid)
          .filter((c) => !c.ok)
          .map((c) => c.name),
      ).toContain(name)
    })
})

/** The catalogue as a whole: order, search over all families, symmetry symbols, shape names, and validators shown to fail. */
import { describe, expect, test } from 'vitest'
import { identity3, type Mat3, rotationAbout, scale, type Vec3 } from '../../src/geometry/vec3'
import {
  buildSolid,
  families,
  findSolids,
  listFamily,
  listNames,
  listSolids,
  type Solid,
  type SolidFamily,
  solidFacts,
  transformSolid,
  validateSolid,
} from '../../src/solids'
import { shapeName } from '../../src/solids/polygon-names'
import { generateGroup } from '../../src/solids/schwarz'
import { schoenflies } from '../../src/solids/symmetry'
import { randomRotation, seeded } from '../support/random'

const names = (query: string): string[] => findSolids(query).map((f) => f.name)

test('order: the 75, prisms, antiprisms, duals, compounds; names and facts agree', () => {
  const all = listSolids()
  expect(all.slice(0, 75).map((f) => f.index)).toEqual(Array.from({ length: 75 }, (_, i) => i + 1))
  expect(all.slice(75).every((f) => f.index === null)).toBe(true)
  expect(listNames()).toEqual(all.map(({ id, name, family, index }) => ({ id, name, family, index })))
  expect(families().flatMap(({ family }) => listFamily(family))).toEqual(all)
  for (const f of all) {
    const solid = buildSolid(f.id)
    expect([solid.id, solid.name, solid.family]).toEqual([f.id, f.name, f.family])
    expect(structuredClone(solid)).toEqual(solid)
  }
})

describe('finding', () => {
  test('every solid is found by its name, Wythoff symbol and configuration, the name first', () => {
    for (const f of listSolids()) {
      expect(findSolids(f.name)[0]?.id).toBe(f.id)
      for (const query of [f.wythoff, f.vertexConfiguration])
        if (query !== '') expect([query, findSolids(query).some((x) => x.id === f.id)]).toEqual([query, true])
    }
  })
  test('by configuration: V asks for a dual', () => {
    expect(names('3.6.6')).toEqual(['truncated tetrahedron'])
    expect(names('V3.6.6')).toEqual(['triakis tetrahedron'])
    expect(names('v 6.6.3')).toEqual(['triakis tetrahedron'])
    expect(names('4.4.7/3')).toEqual(['heptagrammic 7/3 prism'])
    expect(names('3.3.3.7/4')).toEqual(['heptagrammic 7/4 crossed antiprism'])
    expect(names('| 2 2 7/2')).toEqual(['heptagrammic 7/2 antiprism'])
    expect(names('| 2 7/2 2')).toEqual(['heptagrammic 7/2 antiprism'])
  })
  test('by words', () => {
    expect(names('compound').length).toBe(5)
    expect(names('five cubes')).toEqual(['compound of five cubes'])
    expect(names('7/3')).toEqual(['heptagrammic 7/3 prism', 'heptagrammic 7/3 antiprism'])
    expect(names('crossed').length).toBe(29)
    expect(names('antiprism').length).toBe(117)
  })
})

describe('Schoenflies symbols of groups that are put together by hand', () => {
  const about = (axis: Vec3, n: number): Mat3 => rotationAbout(axis, (2 * Math.PI) / n)
  const [x, z]: [Vec3, Vec3] = [
    [1, 0, 0],
    [0, 0, 1],
  ]
  const mirror = (k: number): Mat3 => identity3.map((row, i) => (i === k ? scale(row, -1) : row)) as unknown as Mat3
  const inversion = identity3.map((row) => scale(row, -1)) as unknown as Mat3
  const groups: readonly (readonly [string, readonly Mat3[]])[] = [
    ['C_1', []],
    ['C_s', [mirror(0)]],
    ['C_i', [inversion]],
    ['C_2', [about(z, 2)]],
    ['C_5', [about(z, 5)]],
    ['C_3v', [about(z, 3), mirror(0)]],
    ['C_3h', [about(z, 3), mirror(2)]],
    ['S_6', [about(z, 3), inversion]],
    ['D_2', [about(z, 2), about(x, 2)]],
    ['D_7', [about(z, 7), about(x, 2)]],
    ['D_7h', [about(z, 7), about(x, 2), mirror(2)]],
    ['D_7d', [about(z, 7), about(x, 2), inversion]],
    ['D_6h', [about(z, 6), about(x, 2), mirror(2)]],
    ['D_12', [about(z, 12), about(x, 2)]],
    ['D_2h', [about(z, 2), about(x, 2), inversion]],
    ['T', [about(z, 2), about([1 / Math.sqrt(3), 1 / Math.sqrt(3), 1 / Math.sqrt(3)], 3)]],
    ['T_h', [about(z, 2), about([1 / Math.sqrt(3), 1 / Math.sqrt(3), 1 / Math.sqrt(3)], 3), inversion]],
    ['O', [about(z, 4), about([1 / Math.sqrt(3), 1 / Math.sqrt(3), 1 / Math.sqrt(3)], 3)]],
  ]
  for (const [symbol, generators] of groups)
    test(symbol, () => {
      const all = generateGroup(generators)
      const turning = (m: Mat3): boolean =>
        m[0][0] * (m[1][1] * m[2][2] - m[1][2] * m[2][1]) -
          m[0][1] * (m[1][0] * m[2][2] - m[1][2] * m[2][0]) +
          m[0][2] * (m[1][0] * m[2][1] - m[1][1] * m[2][0]) >
        0
      expect(schoenflies({ rotations: all.filter(turning), reflections: all.filter((m) => !turning(m)) })).toBe(symbol)
    })
})

test('names of shapes', () => {
  const shapes: readonly (readonly [string, readonly (readonly [number, number])[]])[] = [
    [
      'triangle',
      [
        [0, 0],
        [2, 0],
        [1, Math.sqrt(3)],
      ],
    ],
    [
      'isosceles triangle',
      [
        [0, 0],
        [2, 0],
        [1, 5],
      ],
    ],
    [
      'scalene triangle',
      [
        [0, 0],
        [3, 0],
        [1, 5],
      ],
    ],
    [
      'rhombus',
      [
        [2, 0],
        [0, 1],
        [-2, 0],
        [0, -1],
      ],
    ],
    [
      'kite',
      [
        [2, 0],
        [0, 1],
        [-1, 0],
        [0, -1],
      ],
    ],
    [
      'dart',
      [
        [2, 0],
        [-1, 1],
        [0, 0],
        [-1, -1],
      ],
    ],
    [
      'parallelogram',
      [
        [0, 0],
        [3, 0],
        [4, 1],
        [1, 1],
      ],
    ],
    [
      'quadrilateral',
      [
        [0, 0],
        [3, 0],
        [4, 2],
        [1, 1],
      ],
    ],
    [
      'concave quadrilateral',
      [
        [0, 0],
        [3, 0],
        [1, 1],
        [0.5, 3],
      ],
    ],
    [
      'antiparallelogram',
      [
        [0, 0],
        [3, 1],
        [3, 0],
        [0, 1],
      ],
    ],
    [
      'crossed quadrilateral',
      [
        [0, 0],
        [3, 1],
        [3, 0],
        [0, 2],
      ],
    ],
    [
      'irregular pentagon',
      [
        [0, 0],
        [3, 0],
        [4, 2],
        [2, 4],
        [0, 3],
      ],
    ],
    [
      'concave pentagon',
      [
        [0, 0],
        [3, 0],
        [4, 2],
        [2, 1],
        [0, 3],
      ],
    ],
    [
      'crossed pentagon',
      [
        [0, 0],
        [3, 0],
        [0, 2],
        [3, 2],
        [1, 5],
      ],
    ],
    [
      'irregular pentagram',
      [
        [0, 3],
        [2, -3],
        [-3, 1],
        [3, 1],
        [-2, -3],
      ],
    ],
    [
      'concave hexagon',
      [
        [0, 0],
        [3, 0],
        [4, 2],
        [2, 1],
        [0, 3],
        [-1, 1],
      ],
    ],
  ]
  for (const [name, ring] of shapes) {
    expect([name, shapeName(ring)]).toEqual([name, name])
    expect([name, shapeName([...ring].reverse())]).toEqual([name, name])
    expect([name, shapeName([...ring.slice(1), ...ring.slice(0, 1)])]).toEqual([name, name])
  }
})

describe('copies that lie otherwise', () => {
  for (const [k, id] of [
    'compound-of-ten-tetrahedra',
    'great-hexagonal-hexecontahedron',
    'heptagrammic-7-4-crossed-antiprism',
  ].entries()) {
    const seed = 240 + k
    test(`${id}, turned and shuffled, seed ${seed}`, () => {
      const moved = transformSolid(buildSolid(id), randomRotation(seeded(seed)), seed)
      expect(validateSolid(moved).filter((c) => !c.ok)).toEqual([])
    })
  }
})

describe('validateSolid is shown to fail on every family', () => {
  interface Loose {
    vertices: [number, number, number][]
    faces: { cycle: number[]; kind: number }[]
    kinds: { count: number }[]
    components: number[]
    family: SolidFamily
    precision: number
  }
  const broken: readonly [string, string, string, (s: Loose) => void][] = [
    ['dual', 'rhombic-dodecahedron', 'faces are flat', (s) => void ((s.vertices[0] as number[])[0]! += 1e-6)],
    ['dual', 'pentakis-dodecahedron', 'edges touch one sphere', (s) => s.vertices.forEach((p) => void (p[2] += 1e-6))],
    [
      'dual',
      'triakis-octahedron',
      'faces of a kind are congruent',
      (s) => s.vertices.forEach((p) => void (p[2] *= 1.001)),
    ],
    ['dual', 'small-rhombihexacron', 'every edge has two faces', (s) => void s.faces.pop()],
    ['dual', 'small-rhombihexacron', 'kinds are counted', (s) => void (s.faces[3]!.kind = 1)],
    ['compound', 'compound-of-five-cubes', 'components are closed', (s) => void (s.components[7] = 0)],
    ['compound', 'compound-of-five-cubes', 'components are closed', (s) => void s.components.pop()],
    ['compound', 'compound-of-five-cubes', 'edges have unit length', (s) => void (s.vertices[0]![0] += 1e-6)],
    [
      'antiprism',
      'pentagrammic-5-3-crossed-antiprism',
      'faces are regular',
      (s) => s.vertices.forEach((p) => void (p[2] *= 1.001)),
    ],
    ['own', 'cube', 'faces are flat', (s) => void (s.vertices[0]![0] += 1e-3)],
  ]
  for (const [family, id, name, breakIt] of broken)
    test(`${family}: ${id}: ${name}`, () => {
      const copy = structuredClone({ ...buildSolid(id), family }) as unknown as Loose
      if (family === 'own') copy.precision = 1e-5
      expect(validateSolid(copy as unknown as Solid).filter((c) => !c.ok)).toEqual([])
      breakIt(copy)
      const failed = validateSolid(copy as unknown as Solid).filter((c) => !c.ok)
      expect(failed.map((c) => c.name)).toContain(name)
    })
})

test('notes are plain sentences', () => {
  for (const { notes } of listSolids()) for (const note of notes) expect(note).toMatch(/^[A-Z].*\.$/)
  expect(solidFacts('rhombic-dodecahedron')?.notes).toEqual(['Dual of the cuboctahedron.'])
})

/**
 * Duals: reciprocity, counts against the published table of the originals with vertices and faces exchanged, names, and
 * published angles and volumes. Formulas marked "memory" are recalled; the star duals' angles follow from those of the
 * Catalan solids by changing the sign of √2 or √5, as the coordinates do
 * ("Closed-form expressions for uniform polyhedra and their duals", Discrete & Computational Geometry 27 (2002)).
 */
import { describe, expect, test } from 'vitest'
import { InputError } from '../../src/errors'
import { add, cross, distance, dot, norm, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import {
  buildSolid,
  findSolids,
  listFamily,
  listSolids,
  type Solid,
  type SolidFacts,
  solidFacts,
  validateSolid,
  whyNot,
} from '../../src/solids'
import { dualNames } from '../../src/solids/dual-names'
import { centralFaces, midradius, reciprocate } from '../../src/solids/duals'
import { edgesOf } from '../../src/solids/edges'
import { uniformNames } from '../../src/solids/names'
import { findIsometries } from '../../src/solids/symmetry'
import { table } from './table'
import { signedVolume } from './volumes'

const duals = listFamily('dual')
const originalOf = (f: SolidFacts): SolidFacts => solidFacts(f.dual as string) as SolidFacts
const rowOf = (f: SolidFacts) => table[(originalOf(f).index as number) - 1] as (typeof table)[number]
const idOf = (name: string): string => name.replaceAll(' ', '-')

describe('which duals there are', () => {
  test('the table of names follows the 75', () => {
    expect(dualNames.map((d) => d.original)).toEqual(uniformNames.map(([name]) => name))
    const ids = listSolids().map((f) => f.id)
    expect(new Set(ids).size).toBe(ids.length)
  })
  test('56 listed, 9 that are among the 75 already, 10 with vertices at infinity', () => {
    const count = (is: string): number => dualNames.filter((d) => d.is === is).length
    expect([count('listed'), count('uniform'), count('infinite'), duals.length]).toEqual([56, 9, 10, 56])
  })
  // Nine hemipolyhedra and the great dirhombicosidodecahedron (common practice, no source).
  test('vertices at infinity: exactly the duals of solids with faces through the centre', () => {
    const central = uniformNames.filter(([name]) => centralFaces(buildSolid(idOf(name))) > 0).map(([name]) => name)
    expect(central).toEqual(dualNames.filter((d) => d.is === 'infinite').map((d) => d.original))
    expect(central.filter((name) => name.includes('hemi')).length).toBe(9)
  })
  test('those are refused with the reason, and are not listed', () => {
    for (const { name, original, is } of dualNames) {
      if (is !== 'infinite') continue
      const id = idOf(name)
      expect(() => buildSolid(id)).toThrow(InputError)
      expect(() => buildSolid(id)).toThrow(new RegExp(`${original}, pass through the centre.* vertices at infinity`))
      expect(whyNot(id)).toContain('infinity')
      expect([solidFacts(id), findSolids(name)]).toEqual([undefined, []])
      expect(solidFacts(idOf(original))?.dual).toBeNull()
      expect(solidFacts(idOf(original))?.notes.join()).toContain('infinity')
    }
    expect([whyNot('cube'), whyNot('triakis-tetrahedron'), whyNot('nothing')]).toEqual([null, null, null])
  })
  test('not listed twice: the dual of a regular solid is similar to one of the 75', () => {
    const pairs = dualNames.filter((d) => d.is === 'uniform').map((d) => [d.original, d.name] as const)
    for (const [original, name] of pairs) {
      const solid = buildSolid(idOf(original))
      const { vertices, faces } = reciprocate(solid, midradius(solid))
      const other = buildSolid(idOf(name))
      // All distances between vertices, at the same circumradius.
      const spectrum = (points: readonly Vec3[]): number[] =>
        points.flatMap((p, i) => points.slice(i + 1).map((q) => distance(p, q) / norm(p))).sort((a, b) => a - b)
      const [a, b] = [spectrum(vertices), spectrum(other.vertices)]
      expect([name, a.length]).toEqual([name, b.length])
      expect(Math.max(...a.map((x, i) => Math.abs(x - (b[i] as number))))).toBeLessThan(1e-9)
      expect(faces.length).toBe(other.faces.length)
      const edge = (s: { vertices: readonly Vec3[]; faces: readonly { cycle: readonly number[] }[] }): number => {
        const [i, j] = (s.faces[0] as { cycle: readonly number[] }).cycle as [number, number]
        return distance(s.vertices[i] as Vec3, s.vertices[j] as Vec3) / norm(s.vertices[i] as Vec3)
      }
      expect(edge({ vertices, faces })).toBeCloseTo(edge(other), 9)
      expect(solidFacts(idOf(original))?.dual).toBe(idOf(name))
      expect(solidFacts(idOf(name))?.dual).toBe(idOf(original))
    }
  })
})

describe('reciprocity', () => {
  for (const f of duals)
    test(f.name, () => {
      const original = buildSolid(f.dual as string)
      const radius = midradius(original)
      const raw = reciprocate(original, radius)
      // Every point of the face that belongs to vertex v lies in the plane v · x = r².
      raw.faces.forEach(({ cycle }, v) => {
        for (const i of cycle)
          expect(Math.abs(dot(original.vertices[v] as Vec3, raw.vertices[i] as Vec3) - radius * radius)).toBeLessThan(
            1e-11,
          )
      })
      // Edges cross at right angles where they touch the sphere. Edge and dual edge have the same two faces at their ends.
      const across = new Map(
        edgesOf(original).map((e) => [
          e.sides
            .map((s) => s.face)
            .sort((a, b) => a - b)
            .join(),
          e,
        ]),
      )
      for (const { ends } of edgesOf(raw)) {
        const edge = across.get([...ends].sort((a, b) => a - b).join())
        if (!edge) throw new Error(`${f.id}: dual edge ${ends} crosses no edge`)
        const [a, b] = edge.ends.map((i) => original.vertices[i] as Vec3) as [Vec3, Vec3]
        const [p, q] = ends.map((i) => raw.vertices[i] as Vec3) as [Vec3, Vec3]
        const touch = scale(add(a, b), 0.5)
        const direction = scale(sub(q, p), 1 / distance(p, q))
        expect(Math.abs(dot(sub(b, a), direction))).toBeLessThan(1e-10)
        expect(norm(cross(sub(touch, p), direction))).toBeLessThan(1e-10)
      }
      // The dual of the dual is the original.
      const twice = reciprocate(raw, radius)
      twice.vertices.forEach((p, v) => {
        expect(distance(p, original.vertices[v] as Vec3)).toBeLessThan(1e-10)
      })
      const ringOf = (cycle: readonly number[]): string => {
        const n = cycle.length
        const start = cycle.indexOf(Math.min(...cycle))
        const ways = [1, n - 1].map((step) => cycle.map((_, k) => cycle[(start + k * step) % n]).join())
        return ways.sort()[0] as string
      }
      expect(twice.faces.map((x) => ringOf(x.cycle))).toEqual(original.faces.map((x) => ringOf(x.cycle)))
    })
})

describe('facts', () => {
  test('counts, characteristic, density, symmetry as the published table of the originals has them', () => {
    for (const f of duals) {
      const row = rowOf(f)
      const merged = f.notes.flatMap((n) => {
        const m = /^At (\d+) points (\d+) vertices coincide/.exec(n)
        return m ? [Number(m[1]) * (Number(m[2]) - 1)] : []
      })
      expect({
        id: f.id,
        faces: f.faces,
        vertices: f.vertices + merged.reduce((a, b) => a + b, 0),
        edges: f.edges,
        euler: f.euler,
        density: f.density,
        orientable: f.orientable,
        chiral: f.chiral,
        symmetry: f.symmetry,
      }).toEqual({
        id: f.id,
        faces: row.vertices,
        vertices: row.faces,
        edges: row.edges,
        euler: row.euler,
        density: row.density,
        orientable: row.orientable,
        chiral: row.chiral,
        symmetry: row.symmetry,
      })
      expect(f.notes[0]).toBe(`Dual of the ${row.name}.`)
      expect(f.vertexConfiguration).toBe(`V${originalOf(f).vertexConfiguration}`)
      expect(originalOf(f).dual).toBe(f.id)
    }
  })
  // Coplanar triangles or pentagrams of the original: 20 and 20 pairs, 12 pairs (counted from its faces by hand).
  test('vertices that coincide are said', () => {
    const said = duals.filter((f) => f.notes.length > 1).map((f) => [f.name, f.notes.slice(1)])
    expect(said).toEqual([
      [
        'small hexagonal hexecontahedron',
        ['At 20 points 2 vertices coincide (112 vertices if each counts for itself).'],
      ],
      [
        'great hexagonal hexecontahedron',
        ['At 12 points 2 vertices coincide (104 vertices if each counts for itself).'],
      ],
      [
        'small hexagrammic hexecontahedron',
        ['At 20 points 2 vertices coincide (112 vertices if each counts for itself).'],
      ],
    ])
  })
  test('one kind of face, named for its shape; the name tells how many there are', () => {
    const solids: Readonly<Record<string, number>> = {
      tetrahedron: 4,
      hexahedron: 6,
      octahedron: 8,
      dodecahedron: 12,
      icosahedron: 20,
      icositetrahedron: 24,
      triacontahedron: 30,
      hexecontahedron: 60,
    }
    const times: Readonly<Record<string, number>> = {
      triakis: 3,
      tetrakis: 4,
      pentakis: 5,
      stellapentakis: 5,
      disdyakis: 4,
      tridyakis: 6,
      tetradyakis: 8,
    }
    const shapes: readonly (readonly [RegExp, RegExp])[] = [
      [/akis/, /^(isosceles|scalene) triangle$/],
      [/rhombic /, /^rhombus$/],
      [/deltoidal|cronic/, /^(kite|dart)$/],
      [/cron$/, /^antiparallelogram$/],
      [/pentagonal/, /^(irregular|concave) pentagon$/],
      [/pentagrammic/, /^irregular pentagram$/],
      [/hexagonal|hexagrammic|triambic/, /hexag(on|ram)$/],
    ]
    for (const f of duals) {
      expect([f.name, f.facesByKind.length, f.facesByKind[0]?.count]).toEqual([f.name, 1, f.faces])
      const words = f.name.split(' ')
      const base = solids[words[words.length - 1] as string]
      const many = words.map((w) => times[w]).find((t) => t !== undefined)
      if (base !== undefined) expect([f.name, f.faces]).toEqual([f.name, base * (many ?? 1)])
      const shape = shapes.find(([name]) => name.test(f.name))
      expect(f.facesByKind[0]?.name, f.name).toMatch(shape?.[1] as RegExp)
    }
  })
  test('hands follow the original', () => {
    const chiral = duals.filter((f) => f.chiral)
    expect(chiral.length).toBe(9)
    for (const f of chiral) {
      const [right, left] = [buildSolid(f.id, 'right'), buildSolid(f.id, 'left')]
      expect([right.hand, left.hand]).toEqual(['right', 'left'])
      const original = buildSolid(f.dual as string, 'left')
      for (const p of reciprocate(original, midradius(original)).vertices)
        expect(Math.min(...left.vertices.map((q) => distance(p, q)))).toBeLessThan(1e-10)
    }
  })
  test('all are valid, and their rotations are those that are found from their faces alone', () => {
    for (const f of duals) {
      const solid = buildSolid(f.id)
      expect([f.id, validateSolid(solid).filter((c) => !c.ok)]).toEqual([f.id, []])
      const found = findIsometries(solid)
      expect([f.id, found.rotations.length, found.reflections.length === 0]).toEqual([
        f.id,
        solid.rotations.length,
        f.chiral,
      ])
    }
  })
})

const s2 = Math.SQRT2
const s5 = Math.sqrt(5)
const degrees = (cosine: number): number => (Math.acos(cosine) * 180) / Math.PI

describe('dihedral angles', () => {
  const published: readonly [string, number, string][] = [
    ['triakis tetrahedron', degrees(-7 / 11), 'memory'],
    ['rhombic dodecahedron', 120, 'memory'],
    ['tetrakis hexahedron', degrees(-4 / 5), 'memory'],
    ['triakis octahedron', degrees(-(3 + 8 * s2) / 17), 'memory'],
    ['deltoidal icositetrahedron', degrees(-(7 + 4 * s2) / 17), 'memory'],
    ['disdyakis dodecahedron', degrees(-(71 + 12 * s2) / 97), 'memory'],
    ['pentagonal icositetrahedron', 136 + 18 / 60 + 33 / 3600, 'memory, to the second'],
    ['rhombic triacontahedron', 144, 'memory'],
    ['pentakis dodecahedron', degrees(-(80 + 9 * s5) / 109), 'memory'],
    ['triakis icosahedron', degrees(-(24 + 15 * s5) / 61), 'memory'],
    ['deltoidal hexecontahedron', degrees(-(19 + 8 * s5) / 41), 'memory'],
    ['disdyakis triacontahedron', degrees(-(179 + 24 * s5) / 241), 'memory'],
    ['pentagonal hexecontahedron', 153 + 10 / 60 + 43 / 3600, 'memory, to the second'],
    ['great triakis octahedron', degrees(-(3 - 8 * s2) / 17), 'sign of √2 changed'],
    ['great deltoidal icositetrahedron', degrees(-(7 - 4 * s2) / 17), 'sign of √2 changed'],
    ['great disdyakis dodecahedron', degrees(-(71 - 12 * s2) / 97), 'sign of √2 changed'],
    ['great rhombic triacontahedron', 72, 'sign of √5 changed'],
    ['great stellapentakis dodecahedron', degrees(-(80 - 9 * s5) / 109), 'sign of √5 changed'],
    ['great triakis icosahedron', degrees(-(24 - 15 * s5) / 61), 'sign of √5 changed'],
    ['great deltoidal hexecontahedron', degrees(-(19 - 8 * s5) / 41), 'sign of √5 changed'],
    ['great disdyakis triacontahedron', degrees(-(179 - 24 * s5) / 241), 'sign of √5 changed'],
    ['medial rhombic triacontahedron', 120, 'memory'],
    ['small triambic icosahedron', degrees(-1 / 3), 'memory'],
    ['medial triambic icosahedron', degrees(-1 / 3), 'memory'],
    ['great triambic icosahedron', degrees(-1 / 3), 'memory'],
    ['great hexagonal hexecontahedron', 90, 'memory'],
  ]
  for (const [name, angle, source] of published)
    test(`${name}: ${angle.toFixed(4)} (${source})`, () => {
      const angles = solidFacts(idOf(name))?.dihedralAngles as SolidFacts['dihedralAngles']
      expect(angles.length).toBe(1)
      const within = source.includes('second') ? 1 / 3600 : 1e-6
      expect(Math.abs((angles[0]?.degrees as number) - angle)).toBeLessThan(within)
    })
})

describe('volumes of the Catalan solids (memory)', () => {
  const lengths = (s: Solid): number[] =>
    edgesOf(s).map((e) => distance(s.vertices[e.ends[0]] as Vec3, s.vertices[e.ends[1]] as Vec3))
  const tribonacci = (1 + Math.cbrt(19 - 3 * Math.sqrt(33)) + Math.cbrt(19 + 3 * Math.sqrt(33))) / 3
  const published: readonly [string, number, 'shortest' | 'longest' | 'original', number][] = [
    ['triakis tetrahedron', (3 * s2) / 20, 'longest', 1e-12],
    ['rhombic dodecahedron', (16 * Math.sqrt(3)) / 9, 'longest', 1e-11],
    ['tetrakis hexahedron', 32 / 9, 'shortest', 1e-11],
    ['triakis octahedron', 2 - s2, 'longest', 1e-11],
    ['deltoidal icositetrahedron', Math.sqrt(122 + 71 * s2), 'shortest', 1e-10],
    ['disdyakis dodecahedron', Math.sqrt(3 * (2194 + 1513 * s2)) / 7, 'shortest', 1e-10],
    [
      'pentagonal icositetrahedron',
      Math.sqrt((11 * (tribonacci - 4)) / (2 * (20 * tribonacci - 37))),
      'original',
      1e-10,
    ],
    ['rhombic triacontahedron', 4 * Math.sqrt(5 + 2 * s5), 'longest', 1e-10],
    ['pentakis dodecahedron', (15 / 76) * (23 + 11 * s5), 'longest', 1e-10],
    ['triakis icosahedron', (5 / 44) * (5 + 7 * s5), 'longest', 1e-10],
    ['disdyakis triacontahedron', (180 / 11) * (5 + 4 * s5), 'original', 1e-9],
    ['pentagonal hexecontahedron', 189.789852, 'shortest', 1e-6],
  ]
  for (const [name, value, unit, within] of published)
    test(`${name}: ${value} with the ${unit} edge as unit`, () => {
      const solid = buildSolid(idOf(name))
      const edge = unit === 'original' ? 1 : (unit === 'shortest' ? Math.min : Math.max)(...lengths(solid))
      expect(Math.abs(signedVolume(solid) / edge ** 3 - value)).toBeLessThan(within)
    })
})

/**
 * Circumradii, dihedral angles, volumes and facts of the trade against published values. Tags in the names: "found" was read
 * in an encyclopaedia article or a public wiki on polytopes, "memory" is recalled. Where a paper is the source it is named:
 * "Uniform solution for uniform polyhedra", Geometriae Dedicata 47 (1993); "Closed-form expressions for uniform polyhedra
 * and their duals", Discrete & Computational Geometry 27 (2002); "Uniform polyhedra", Phil. Trans. R. Soc. A 246 (1954).
 */
import { describe, expect, test } from 'vitest'
import { cross, dot, sub, type Vec3 } from '../../src/geometry/vec3'
import { buildSolid, listFamily } from '../../src/solids'
import type { Solid, SolidFacts } from '../../src/solids/types'

const u = (index: number): SolidFacts => listFamily('uniform')[index - 1] as SolidFacts
const s5 = Math.sqrt(5)
const s2 = Math.SQRT2

describe('circumradii at unit edge', () => {
  const published: readonly [number, number, number, string][] = [
    [12, 1.3437133737, 1e-9, 'memory'],
    [29, 2.1558373751, 1e-9, 'memory'],
    [40, 1.2744398820380232, 1e-12, 'found'],
    [46, 1.126897912799939, 1e-12, 'found'],
    [64, s2 / 2, 1e-12, 'found'],
    [75, s2 / 2, 1e-12, 'half the diagonal of its central squares'],
    [47, Math.sqrt(3) / 2, 1e-12, 'found'],
    [6, Math.sqrt(3) / 2, 1e-12, 'geometry'],
    [26, Math.sqrt(74 + 30 * s5) / 4, 1e-12, 'found'],
    [27, Math.sqrt(11 + 4 * s5) / 2, 1e-12, 'found'],
    [31, Math.sqrt((17 + 3 * s5) / 8), 1e-12, 'found'],
    [43, Math.sqrt((17 + 3 * s5) / 8), 1e-12, 'found'],
    [48, 1.134, 1e-3, 'found, weak source'],
    [67, 0.717, 1e-3, 'found, weak source'],
    [33, 2.233, 1e-3, 'found, weak source'],
    [49, (1 + s5) / 2, 1e-12, 'found'],
    [51, (1 + s5) / 2, 1e-12, 'found'],
    [53, Math.sqrt(2 * (5 - s5)) / 4, 1e-12, 'found'],
    [23, 1.401258538, 1e-9, 'found'],
    [74, 1.1600030093 / 2, 1e-10, 'Geometriae Dedicata 47 (1993), at edge 2'],
  ]
  for (const [index, radius, within, source] of published)
    test(`${u(index).name}: ${radius} (${source})`, () => {
      expect(Math.abs(u(index).circumradius - radius)).toBeLessThan(within)
    })

  test('29, 57, 69, 74 are the four positive roots of one polynomial of degree twelve (found)', () => {
    const p = (r: number): number =>
      4096 * r ** 12 - 27648 * r ** 10 + 47104 * r ** 8 - 35776 * r ** 6 + 13872 * r ** 4 - 2696 * r ** 2 + 209
    const slope = (r: number): number => (p(r + 1e-6) - p(r - 1e-6)) / 2e-6
    const radii = [29, 57, 69, 74].map((i) => u(i).circumradius)
    for (const r of radii) expect(Math.abs(p(r) / slope(r))).toBeLessThan(1e-9)
    expect(new Set(radii.map((r) => r.toFixed(6))).size).toBe(4)
    expect([...radii].sort((a, b) => b - a)).toEqual(radii)
  })

  test('46 through the plastic number (found)', () => {
    const p = 1.324717957244746
    expect(Math.abs(p ** 3 - p - 1)).toBeLessThan(1e-12)
    expect(Math.abs(u(46).circumradius - Math.sqrt(p * p + p + 2) / 2)).toBeLessThan(1e-9)
  })

  test('great truncated cuboctahedron at edge 2: all permutations of (±1, ±(1−√2), ±(1−2√2)) (found)', () => {
    const wanted = [1, s2 - 1, 2 * s2 - 1].sort((a, b) => a - b)
    const { vertices } = buildSolid('great-truncated-cuboctahedron')
    for (const v of vertices) {
      const got = v.map((x) => Math.abs(2 * x)).sort((a, b) => a - b)
      // The construction's axes are the cube's own only up to a turn, so compare the length alone.
      expect(Math.hypot(...got)).toBeCloseTo(Math.hypot(...wanted), 10)
    }
    expect(vertices.length).toBe(48)
  })
})

describe('dihedral angles in degrees (found)', () => {
  const published: readonly [number, string, string, number, number][] = [
    [1, 'triangle', 'triangle', 70.53, 0.005],
    [6, 'square', 'square', 90, 1e-9],
    [5, 'triangle', 'triangle', 109.47, 0.005],
    [23, 'pentagon', 'pentagon', 116.57, 0.006],
    [22, 'triangle', 'triangle', 138.19, 0.005],
    [11, 'square', 'hexagon', 144 + 44 / 60 + 8 / 3600, 1 / 3600],
    [11, 'square', 'octagon', 135, 1e-9],
    [11, 'hexagon', 'octagon', 125 + 15 / 60 + 51 / 3600, 1 / 3600],
    [27, 'triangle', 'square', 159.094843, 1e-6],
    [27, 'square', 'pentagon', 148.282526, 1e-6],
    [29, 'triangle', 'triangle', 164.18, 0.006],
    [29, 'triangle', 'pentagon', 152.93, 0.005],
    [34, 'pentagram', 'pentagram', 116.565051, 1e-6],
    [35, 'pentagon', 'pentagon', 63.434949, 1e-6],
    [3, 'triangle', 'hexagon', 70.52878, 1e-5],
    [49, 'triangle', 'decagon', 79.18768, 1e-5],
    [51, 'pentagon', 'decagon', 63.43495, 1e-5],
    [62, 'pentagram', 'hexagon', 79.18768, 1e-5],
    [31, 'pentagram', 'hexagon', 142.62263, 1e-5],
    [31, 'triangle', 'hexagon', 138.18969, 1e-5],
    [45, 'hexagon', 'decagram', 142.62263, 1e-5],
    [45, 'decagon', 'decagram', 116.56505, 1e-5],
    [45, 'hexagon', 'decagon', 100.81232, 1e-5],
  ]
  for (const [index, a, b, degrees, within] of published)
    test(`${u(index).name}, ${a}–${b}: ${degrees.toFixed(6)}`, () => {
      const facts = u(index)
      const kind = (name: string): number => facts.facesByKind.findIndex((k) => k.name === name)
      const pair = [kind(a), kind(b)].sort((x, y) => x - y)
      const got = facts.dihedralAngles.filter((d) => d.kinds[0] === pair[0] && d.kinds[1] === pair[1])
      expect(got.length).toBeGreaterThan(0)
      expect(Math.min(...got.map((d) => Math.abs(d.degrees - degrees)))).toBeLessThan(within)
    })
})

/** Volume of a convex solid: every face's cone from the centre. */
const volume = (solid: Solid): number =>
  solid.faces.reduce((sum, { cycle }) => {
    const points = cycle.map((i) => solid.vertices[i] as Vec3)
    let cone = 0
    for (let i = 1; i + 1 < points.length; i++)
      cone += dot(
        points[0] as Vec3,
        cross(sub(points[i] as Vec3, points[0] as Vec3), sub(points[i + 1] as Vec3, points[0] as Vec3)),
      )
    return sum + Math.abs(cone) / 6
  }, 0)

describe('volumes of the convex solids at unit edge (closed forms from memory; 7, 24, 26, 27, 28 found)', () => {
  const published: readonly [number, number, number][] = [
    [1, s2 / 12, 1e-12],
    [2, (23 * s2) / 12, 1e-11],
    [5, s2 / 3, 1e-12],
    [6, 1, 1e-12],
    [7, (5 * s2) / 3, 1e-11],
    [8, 8 * s2, 1e-11],
    [9, (21 + 14 * s2) / 3, 1e-10],
    [10, (12 + 10 * s2) / 3, 1e-10],
    [11, 22 + 14 * s2, 1e-10],
    [12, 7.8894774, 1e-7],
    [22, (5 * (3 + s5)) / 12, 1e-11],
    [23, (15 + 7 * s5) / 4, 1e-11],
    [24, (45 + 17 * s5) / 6, 1e-10],
    [25, (125 + 43 * s5) / 4, 1e-10],
    [26, (5 * (99 + 47 * s5)) / 12, 1e-10],
    [27, (60 + 29 * s5) / 3, 1e-10],
    [28, 95 + 50 * s5, 1e-9],
    [29, 37.6166499627, 1e-9],
  ]
  test('all 18 are here', () => {
    expect(published.length).toBe(18)
  })
  for (const [index, value, within] of published)
    test(`${u(index).name}: ${value}`, () => {
      expect(Math.abs(volume(buildSolid(u(index).id)) - value)).toBeLessThan(within)
    })
})

describe('facts of the trade (common practice, no source)', () => {
  test('great retrosnub icosidodecahedron: 92 faces, 150 edges, 60 vertices, density 37', () => {
    const f = u(74)
    expect([f.name, f.faces, f.edges, f.vertices, f.density]).toEqual([
      'great retrosnub icosidodecahedron',
      92,
      150,
      60,
      37,
    ])
  })
  test('small retrosnub icosicosidodecahedron: density 38', () => {
    expect([u(72).name, u(72).density]).toEqual(['small retrosnub icosicosidodecahedron', 38])
  })
  test('great dirhombicosidodecahedron: eight faces at a vertex, Euler characteristic −56', () => {
    const f = u(75)
    expect([f.name, f.vertexConfiguration.split('.').length, f.euler]).toEqual([
      'great dirhombicosidodecahedron',
      8,
      -56,
    ])
    const solid = buildSolid(f.id)
    solid.vertices.forEach((_, v) => {
      expect(solid.faces.filter((face) => face.cycle.includes(v)).length).toBe(8)
    })
  })
  test('its faces come in coplanar pairs, and all 60 squares pass through the centre (found)', () => {
    const solid = buildSolid('great-dirhombicosidodecahedron')
    const planes = solid.faces.map(({ cycle }) => {
      const [a, b, c] = cycle.slice(0, 3).map((i) => solid.vertices[i] as Vec3) as [Vec3, Vec3, Vec3]
      const n = cross(sub(b, a), sub(c, a))
      const k = 1 / Math.hypot(...n)
      return [n[0] * k, n[1] * k, n[2] * k, dot(n, a) * k] as const
    })
    let central = 0
    solid.faces.forEach((face, i) => {
      const p = planes[i] as (typeof planes)[number]
      if (face.cycle.length === 4) {
        expect(Math.abs(p[3])).toBeLessThan(1e-9)
        central++
      }
      const together = planes.filter((q) =>
        [1, -1].some((sign) => q.every((x, k) => Math.abs(x - sign * (p[k] as number)) < 1e-7)),
      ).length
      expect(together % 2).toBe(0)
    })
    expect(central).toBe(60)
  })
  test('counts over the set: 5 + 13 convex, 9 chiral, 15 not orientable, only {5/2}, {8/3}, {10/3} as stars', () => {
    const all = listFamily('uniform')
    expect(all.length).toBe(75)
    expect(all.filter((f) => f.chiral).map((f) => f.index)).toEqual([12, 29, 40, 46, 57, 60, 64, 69, 74])
    expect(all.filter((f) => !f.orientable).map((f) => f.index)).toEqual([
      4, 15, 18, 21, 39, 49, 50, 51, 56, 62, 63, 65, 70, 71, 73,
    ])
    const stars = new Set(all.flatMap((f) => f.facesByKind.filter((k) => k.d > 1).map((k) => `${k.n}/${k.d}`)))
    expect([...stars].sort()).toEqual(['10/3', '5/2', '8/3'])
    expect(all.filter((f) => f.faces % 2 === 1).map((f) => f.index)).toEqual([4])
    expect(all.filter((f) => f.euler === 0).map((f) => f.index)).toEqual([3])
  })
  test('conjugate pairs have the same counts (each pair found or from memory, checked against the table)', () => {
    const pairs =
      '9-19 10-17 11-20 13-14 18-21 22-53 23-52 24-54 25-55 26-66 27-67 28-68 30-47 31-48 32-72 33-61 34-35 37-58 39-73 40-60 42-43 49-71 50-63 51-70 62-65'
    for (const pair of pairs.split(' ')) {
      const [a, b] = pair.split('-').map((x) => u(Number(x))) as [SolidFacts, SolidFacts]
      expect([pair, a.vertices, a.edges, a.faces, a.euler, a.orientable, a.symmetry]).toEqual([
        pair,
        b.vertices,
        b.edges,
        b.faces,
        b.euler,
        b.orientable,
        b.symmetry,
      ])
    }
  })
})

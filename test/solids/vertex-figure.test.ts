/** Vertex figures against published configurations, known figures and the equation that closes them round the axis. */
import { describe, expect, test } from 'vitest'
import { dot, normalize, sub, type Vec3 } from '../../src/geometry/vec3'
import { buildSolid, listNames } from '../../src/solids'
import { solidParts } from '../../src/solids/parts'
import type { Solid } from '../../src/solids/types'
import { canonicalConfiguration } from '../../src/solids/vertex-configuration'
import { type FlatFigure, vertexFigure } from '../../src/solids/vertex-figure'
import { table } from './table'

const figureAt = (solid: Solid, vertex = 0): FlatFigure => {
  const { figure, reason } = vertexFigure(solid, vertex)
  if (!figure) throw new Error(reason)
  return figure
}
const lengths = ({ rings }: FlatFigure): number[] => rings.flatMap(({ sides }) => sides.map(({ length }) => length))
const kindOf = (solid: Solid, face: number) => solid.kinds[solid.faces[face]!.kind]!

/** The figure written as a vertex configuration. */
const spelled = (solid: Solid, { rings }: FlatFigure): string => {
  const { sides, windings } = rings[0]!
  const parts = sides.map(({ face, sense }) => {
    const { n, d } = kindOf(solid, face)
    const turns = sense === 'backwards' ? n - d : d
    return turns === 1 ? `${n}` : `${n}/${turns}`
  })
  return windings <= 1 ? parts.join('.') : `(${parts.join('.')})/${windings}`
}

describe('known figures', () => {
  test('cube: a triangle with sides √2, all forward', () => {
    const figure = figureAt(buildSolid('cube'))
    expect(lengths(figure)).toHaveLength(3)
    for (const length of lengths(figure)) expect(length).toBeCloseTo(Math.SQRT2, 12)
    expect(figure.rings[0]!.sides.map(({ sense }) => sense)).toEqual(['forward', 'forward', 'forward'])
  })

  test('great icosahedron: a pentagram, the sides of length 1 winding twice', () => {
    const { rings } = figureAt(buildSolid('great-icosahedron'))
    const { sides, windings } = rings[0]!
    expect(windings).toBe(2)
    expect(sides.map(({ length }) => length.toFixed(9))).toEqual(Array(5).fill('1.000000000'))
    // Its points lie on the circle round a pentagram of side 1.
    for (const { from } of sides) expect(Math.hypot(...from)).toBeCloseTo(0.5 / Math.sin((2 * Math.PI) / 5), 12)
  })

  test('tetrahemihexahedron: a crossed quadrilateral, one triangle back, squares edge-on', () => {
    const { sides } = figureAt(buildSolid('tetrahemihexahedron')).rings[0]!
    expect(sides.map(({ name, sense }) => `${name} ${sense}`).sort()).toEqual([
      'square edge-on',
      'square edge-on',
      'triangle backwards',
      'triangle forward',
    ])
  })

  test('| 3/2 5/3 3 5/2: eight faces in one ring, squares and the faces between them in turn', () => {
    const solid = buildSolid('great-dirhombicosidodecahedron')
    const { figure, faces } = vertexFigure(solid, 0)
    expect(faces.map((ring) => ring.length)).toEqual([8])
    const { sides } = figure!.rings[0]!
    expect(sides.filter(({ sense }) => sense === 'edge-on').map(({ name }) => name)).toEqual(Array(4).fill('square'))
    expect(sides.filter((_, i) => i % 2 === sides.findIndex(({ name }) => name !== 'square') % 2)).toHaveLength(4)
    const count = (name: string): number => sides.filter((side) => side.name === name).length
    expect([count('square'), count('triangle'), count('pentagram')]).toEqual([4, 2, 2])
  })
})

describe('the 75', () => {
  test.each(table.map(({ name, configuration }) => [name, configuration] as const))('%s', (name, configuration) => {
    const solid = buildSolid(name.replaceAll(' ', '-'))
    const figure = figureAt(solid)
    const [{ sides, windings }] = figure.rings as [FlatFigure['rings'][number]]
    expect(canonicalConfiguration(spelled(solid, figure))).toBe(canonicalConfiguration(configuration))
    let turning = 0
    const radius = Math.hypot(...sides[0]!.from)
    sides.forEach(({ face, length, sense, from, to }, i) => {
      const { n, d } = kindOf(solid, face)
      const side = 2 * Math.cos((Math.PI * d) / n)
      expect(length).toBeCloseTo(side, 9)
      expect(Math.hypot(to[0] - from[0], to[1] - from[1])).toBeCloseTo(side, 9)
      expect(Math.hypot(...from)).toBeCloseTo(radius, 9)
      expect(to).toEqual(sides[(i + 1) % sides.length]!.from)
      const angle = 2 * Math.asin(Math.min(1, side / (2 * radius)))
      if (sense !== 'edge-on') turning += sense === 'forward' ? angle : -angle
    })
    // The angles of the sides at the axis add up to whole turns, half turns for sides through the axis.
    const halves = sides.filter(({ sense }) => sense === 'edge-on').length
    const turns = turning / (2 * Math.PI)
    if (halves === 0) expect(turns).toBeCloseTo(windings, 9)
    else expect(Math.abs(Math.round(2 * turns) - 2 * turns)).toBeLessThan(1e-6)
    expect((Math.round(2 * turns) + halves) % 2).toBe(0)
  })

  test('every vertex of a solid has the same figure, its mirror image the same senses', () => {
    const wrong: unknown[] = []
    for (const id of ['great-retrosnub-icosidodecahedron', 'small-snub-icosicosidodecahedron', 'truncated-cube'])
      for (const hand of ['left', 'right'] as const) {
        const solid = buildSolid(id, hand)
        const first = canonicalConfiguration(spelled(solid, figureAt(solid)))
        solid.vertices.forEach((_, v) => {
          const here = canonicalConfiguration(spelled(solid, figureAt(solid, v)))
          if (here !== first) wrong.push({ id, hand, v, here, first })
        })
      }
    expect(wrong).toEqual([])
  })
})

describe('others', () => {
  test('rhombic dodecahedron: four rhombs at the sharp corners, three at the blunt ones, regular figures', () => {
    const solid = buildSolid('rhombic-dodecahedron')
    const counts = new Map<number, number>()
    solid.vertices.forEach((_, v) => {
      const all = lengths(figureAt(solid, v))
      counts.set(all.length, (counts.get(all.length) ?? 0) + 1)
      for (const length of all) expect(length).toBeCloseTo(all[0]!, 9)
      // Four edges of an octahedron's slope, 54.7° from the axis, or three of a cube's blunt corner, 70.5°.
      const slope = Math.hypot(...figureAt(solid, v).rings[0]!.sides[0]!.from)
      expect(slope).toBeCloseTo(all.length === 4 ? Math.SQRT2 : Math.sqrt(8), 9)
    })
    expect([...counts].sort()).toEqual([
      [3, 8],
      [4, 6],
    ])
  })

  test('five cubes: two cubes at each vertex, a triangle each, apart', () => {
    const solid = buildSolid('compound-of-five-cubes')
    const { faces, figure } = vertexFigure(solid, 0)
    expect(faces.map((ring) => ring.length)).toEqual([3, 3])
    for (const ring of faces) expect(new Set(ring.map((face) => solid.components![face])).size).toBe(1)
    // Three edges of a cube, each with tangent √2 to the axis.
    for (const { sides } of figure!.rings)
      for (const { from, length } of sides) {
        expect(Math.hypot(...from)).toBeCloseTo(Math.SQRT2, 9)
        expect(length).toBeCloseTo(Math.sqrt(6), 9)
      }
  })

  test('prisms and antiprisms: 2 cos(π d/n), crossed antiprisms with the polygon back', () => {
    const sides = (id: string) => figureAt(buildSolid(id)).rings[0]!.sides
    const found = listNames().filter(({ family }) => family === 'prism' || family === 'antiprism')
    for (const { id } of found) {
      const solid = buildSolid(id)
      for (const { face, length } of sides(id)) {
        const { n, d } = kindOf(solid, face)
        expect(Math.abs(length - 2 * Math.cos((Math.PI * d) / n))).toBeLessThan(1e-9)
      }
    }
    expect(found.length).toBe(205)
  })

  test('duals: every side lies in its face; where there is no figure the reason is told and the faces are listed', () => {
    const reasons = new Set<string>()
    let [figures, vertices] = [0, 0]
    const wrong: unknown[] = []
    for (const { id, family } of listNames()) {
      if (family !== 'dual') continue
      const solid = buildSolid(id)
      const { vertexOrbits } = solidParts(solid)
      const firsts = vertexOrbits.flatMap((orbit, v) => (vertexOrbits.indexOf(orbit) === v ? [v] : []))
      for (const v of firsts) {
        const { figure, reason, faces } = vertexFigure(solid, v)
        vertices++
        expect(faces.flat().every((face) => solid.faces[face]!.cycle.includes(v))).toBe(true)
        if (!figure) {
          reasons.add(reason)
          continue
        }
        figures++
        for (const { sides } of figure.rings)
          for (const { face, from, to, length } of sides) {
            // Law of cosines in the triangle of vertex and side: an edge at angle a to the axis is 1 / cos a long.
            const { cycle } = solid.faces[face]!
            const k = cycle.indexOf(v)
            const ways = [cycle.at(k - 1)!, cycle[(k + 1) % cycle.length]!].map((q) =>
              normalize(sub(solid.vertices[q]!, solid.vertices[v]!)),
            ) as [Vec3, Vec3]
            const [a, b] = ways.map((way) => 1 / dot(way, figure.axis)) as [number, number]
            const across = Math.sqrt(a * a + b * b - 2 * a * b * dot(...ways))
            if (Math.abs(across - length) > 1e-9) wrong.push({ id, v, face, across, length })
            const flat = [Math.hypot(...from), Math.hypot(...to)].sort()
            const spread = [Math.sqrt(a * a - 1), Math.sqrt(b * b - 1)].sort()
            if (flat.some((r, i) => Math.abs(r - spread[i]!) > 1e-9)) wrong.push({ id, v, face, flat, spread })
          }
      }
    }
    expect(wrong).toEqual([])
    expect(reasons.size).toBe(2)
    expect(figures).toBeGreaterThan(0.8 * vertices)
  })
})

test('the faces leave a gap: refused', () => {
  const cube = buildSolid('cube')
  expect(() => vertexFigure({ ...cube, faces: cube.faces.slice(1) }, cube.faces[0]!.cycle[0]!)).toThrow(/gap/)
})

describe('parts', () => {
  test('small snub icosicosidodecahedron: the snub triangles are one orbit, the others two', () => {
    const { kinds, orbits } = solidParts(buildSolid('small-snub-icosicosidodecahedron'))
    const sizes = new Map<number, number>()
    orbits.forEach((orbit, face) => {
      if (kinds[face] === 'triangle') sizes.set(orbit, (sizes.get(orbit) ?? 0) + 1)
    })
    expect([...sizes.values()].sort((a, b) => a - b)).toEqual([20, 20, 60])
  })

  test('every vertex has as many faces as edges meet there; orbits are as large as the group allows', () => {
    for (const id of ['cube', 'rhombic-dodecahedron', 'great-rhombidodecahedron', 'compound-of-five-cubes']) {
      const solid = buildSolid(id)
      const { facesAt, vertexOrbits } = solidParts(solid)
      expect(facesAt.flat().length).toBe(solid.faces.reduce((sum, { cycle }) => sum + cycle.length, 0))
      const sizes = new Map<number, number>()
      for (const orbit of vertexOrbits) sizes.set(orbit, (sizes.get(orbit) ?? 0) + 1)
      for (const size of sizes.values()) expect(solid.rotations.length % size).toBe(0)
    }
  })
})

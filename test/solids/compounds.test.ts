/** The five regular compounds: counts as in "Regular Polytopes" (Methuen, 1948), chapter 3, recalled from memory. */
import { describe, expect, test } from 'vitest'
import { apply, cross, distance, dot, normalize, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily, mirrorSolid, type Solid, type SolidFacts, validateSolid } from '../../src/solids'
import { findIsometries } from '../../src/solids/symmetry'

interface Row {
  readonly id: string
  readonly component: string
  readonly components: number
  readonly vertices: number
  readonly vertexShared: number
  readonly planes: number
  /** The regular (or quasiregular) solid whose vertices it has, and the one whose face planes it has. */
  readonly around: string
  readonly inside: string
  readonly symmetry: string
}

const rows: readonly Row[] = [
  ['two-tetrahedra', 'tetrahedron', 2, 8, 1, 8, 'cube', 'octahedron', 'O_h'],
  ['five-tetrahedra', 'tetrahedron', 5, 20, 1, 20, 'dodecahedron', 'icosahedron', 'I'],
  ['ten-tetrahedra', 'tetrahedron', 10, 20, 2, 20, 'dodecahedron', 'icosahedron', 'I_h'],
  ['five-cubes', 'cube', 5, 20, 2, 30, 'dodecahedron', 'rhombic-triacontahedron', 'I_h'],
  ['five-octahedra', 'octahedron', 5, 30, 1, 20, 'icosidodecahedron', 'icosahedron', 'I_h'],
].map((r) => {
  const [id, component, components, vertices, vertexShared, planes, around, inside, symmetry] = r as [
    ...[string, string, number, number, number, number, string, string, string],
  ]
  return { id: `compound-of-${id}`, component, components, vertices, vertexShared, planes, around, inside, symmetry }
})

/** All distances between points, ascending, as parts of the largest: equal for similar sets. */
const spectrum = (points: readonly Vec3[]): number[] => {
  const all = points.flatMap((p, i) => points.slice(i + 1).map((q) => distance(p, q)))
  const most = Math.max(...all)
  return all.map((x) => x / most).sort((a, b) => a - b)
}

const normalsOf = (solid: Solid): Vec3[] =>
  solid.faces.map(({ cycle }) => {
    const [a, b, c] = cycle.slice(0, 3).map((v) => solid.vertices[v] as Vec3) as [Vec3, Vec3, Vec3]
    const n = normalize(cross(sub(b, a), sub(c, a)))
    return dot(n, a) < 0 ? scale(n, -1) : n
  })

const different = (vectors: readonly Vec3[]): Vec3[] =>
  vectors.filter((v, i) => !vectors.slice(0, i).some((w) => distance(v, w) < 1e-9))

const expectAlike = (a: readonly number[], b: readonly number[]): void => {
  expect(a.length).toBe(b.length)
  expect(Math.max(...a.map((x, i) => Math.abs(x - (b[i] as number))))).toBeLessThan(1e-9)
}

test('there are five', () => {
  expect(listFamily('compound').map((f) => f.id)).toEqual(rows.map((r) => r.id))
})

for (const row of rows)
  describe(row.id, () => {
    const facts = listFamily('compound').find((f) => f.id === row.id) as SolidFacts
    const solid = buildSolid(row.id)
    const part = listFamily('uniform').find((f) => f.id === row.component) as SolidFacts

    test('counts, symmetry, and nothing where nothing is defined', () => {
      expect({
        components: facts.components,
        vertices: facts.vertices,
        edges: facts.edges,
        faces: facts.faces,
        symmetry: facts.symmetry,
      }).toEqual({
        components: row.components,
        vertices: row.vertices,
        edges: row.components * part.edges,
        faces: row.components * part.faces,
        symmetry: row.symmetry,
      })
      expect([facts.euler, facts.density, facts.index, facts.wythoff, facts.vertexConfiguration]).toEqual([
        null,
        null,
        null,
        '',
        '',
      ])
      expect(facts.circumradius).toBeCloseTo(part.circumradius, 12)
      expect(facts.dihedralAngles.map((a) => a.degrees)).toHaveLength(1)
      expect(facts.dihedralAngles[0]?.degrees).toBeCloseTo(part.dihedralAngles[0]?.degrees as number, 9)
      expect(validateSolid(solid).filter((c) => !c.ok)).toEqual([])
    })

    test('every component is the regular solid; vertices are shared as published', () => {
      const whole = buildSolid(row.component)
      for (let k = 0; k < row.components; k++) {
        const faces = solid.faces.filter((_, i) => solid.components?.[i] === k)
        expect(faces.length).toBe(part.faces)
        const used = [...new Set(faces.flatMap((f) => f.cycle))]
        expectAlike(spectrum(used.map((v) => solid.vertices[v] as Vec3)), spectrum(whole.vertices))
      }
      solid.vertices.forEach((_, v) => {
        const owners = new Set(solid.components?.filter((_, i) => solid.faces[i]?.cycle.includes(v)))
        expect(owners.size).toBe(row.vertexShared)
      })
      expect(facts.notes.includes('Every vertex is shared by two components.')).toBe(row.vertexShared === 2)
    })

    test('its vertices and its face planes are those of one solid each', () => {
      expectAlike(spectrum(solid.vertices), spectrum(buildSolid(row.around).vertices))
      const planes = different(normalsOf(solid))
      expect(planes.length).toBe(row.planes)
      expectAlike(spectrum(planes), spectrum(different(normalsOf(buildSolid(row.inside)))))
    })

    test('in two of the five, faces of different components lie in one plane', () => {
      const normals = normalsOf(solid)
      let pairs = 0
      normals.forEach((n, i) => {
        normals.slice(i + 1).forEach((m, k) => {
          if (distance(n, m) > 1e-9) return
          expect(solid.components?.[i]).not.toBe(solid.components?.[i + 1 + k])
          pairs++
        })
      })
      expect(pairs).toBe(row.id.includes('ten-') || row.id.includes('octahedra') ? 20 : 0)
      expect(facts.notes.some((n) => n.includes(`${pairs} pairs`))).toBe(pairs > 0)
    })

    test('rotations permute the components, all of them', () => {
      const found = findIsometries(solid)
      expect(found.rotations.length).toBe(solid.rotations.length)
      expect(solid.rotations.length).toBe(row.symmetry.startsWith('O') ? 24 : 60)
      expect(found.reflections.length === 0).toBe(facts.chiral)
      const centreOf = (k: number): string[] =>
        solid.faces
          .flatMap((f, i) => (solid.components?.[i] === k ? f.cycle : []))
          .map(String)
          .sort()
      const known = new Set(Array.from({ length: row.components }, (_, k) => centreOf(k).join()))
      for (const g of solid.rotations) {
        const image = solid.vertices.map((p) => solid.vertices.findIndex((q) => distance(apply(g, p), q) < 1e-9))
        expect(image.includes(-1)).toBe(false)
        for (let k = 0; k < row.components; k++) {
          const moved = centreOf(k).map((v) => String(image[Number(v)]))
          expect(known.has(moved.sort().join())).toBe(true)
        }
      }
    })
  })

describe('hands of the five tetrahedra', () => {
  const right = buildSolid('compound-of-five-tetrahedra', 'right')
  const left = buildSolid('compound-of-five-tetrahedra', 'left')
  // The angle by hand: its tangent is √3(√5 − 2).
  const turnOf = (solid: Solid): number[] => {
    const axes = solid.rotations
      .filter((m) => Math.abs(m[0][0] + m[1][1] + m[2][2] - 1 - 2 * Math.cos((2 * Math.PI) / 5)) < 1e-9)
      .map((m) => normalize([m[2][1] - m[1][2], m[0][2] - m[2][0], m[1][0] - m[0][1]]))
    const normals = normalsOf(solid)
    return solid.faces.map(({ cycle }, i) => {
      const n = normals[i] as Vec3
      const flat = (p: Vec3): Vec3 => normalize(sub(p, scale(n, dot(n, p))))
      const nearest = axes.reduce((a, b) => (dot(b, n) > dot(a, n) ? b : a))
      const angles = cycle.map((v) => {
        const [a, b] = [flat(nearest), flat(solid.vertices[v] as Vec3)]
        return Math.atan2(dot(n, cross(a, b)), dot(a, b))
      })
      return angles.reduce((a, b) => (Math.abs(b) < Math.abs(a) ? b : a))
    })
  }
  test('right is turned counter-clockwise, left clockwise', () => {
    const angle = Math.atan(Math.sqrt(3) * (Math.sqrt(5) - 2))
    expect([right.hand, left.hand]).toEqual(['right', 'left'])
    for (const a of turnOf(right)) expect(a).toBeCloseTo(angle, 9)
    for (const a of turnOf(left)) expect(a).toBeCloseTo(-angle, 9)
    expect(mirrorSolid(left).components).toEqual(right.components)
  })
  test('both together are the ten', () => {
    const ten = buildSolid('compound-of-ten-tetrahedra')
    expect(ten.hand).toBe('none')
    expect(ten.faces.length).toBe(right.faces.length + left.faces.length)
  })
})

describe('what can be touched', () => {
  const published: readonly [string, number, string][] = [
    ['compound-of-two-tetrahedra', 24, 'eight pyramids of three triangles'],
    ['compound-of-five-tetrahedra', 60, 'three for each of twenty faces'],
    ['compound-of-ten-tetrahedra', 180, 'memory'],
    ['compound-of-five-cubes', 360, 'memory'],
  ]
  for (const [id, count, source] of published)
    test(`${id}: ${count} panels (${source})`, () => {
      for (const fill of ['nonzero', 'evenodd'] as const) {
        const skin = computeSkin(buildSolid(id), fill)
        expect(skin.panels.length).toBe(count)
        expect([skin.bodies, skin.parts]).toEqual([1, 1])
      }
    })
  test('two tetrahedra: one with a half-size one on each face (worked out by hand)', () => {
    const skin = computeSkin(buildSolid('compound-of-two-tetrahedra'))
    expect(skin.volume).toBeCloseTo(Math.SQRT2 / 8, 12)
    expect(skin.area).toBeCloseTo((6 * Math.sqrt(3)) / 4, 12)
  })
})

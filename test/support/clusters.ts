/**
 * Random parts without any common symmetry: boxes, tetrahedra and star prisms that cross, touch along edges and share
 * planes, as a solid of several components.
 */
import { identity3, type Vec3 } from '../../src/geometry/vec3'
import type { Solid } from '../../src/solids'
import type { Random } from './random'

export interface Part {
  readonly vertices: Vec3[]
  /** Counter-clockwise seen from outside; a star's cycle steps over its neighbours. */
  readonly faces: number[][]
  /** The same part without self-crossing faces, for the library. */
  readonly plain?: { readonly vertices: Vec3[]; readonly triangles: number[][] }
}

/** Corners in binary order of their coordinates. */
export const box = (low: Vec3, high: Vec3): Part => {
  const vertices: Vec3[] = []
  for (let i = 0; i < 8; i++) vertices.push([(i & 1 ? high : low)[0], (i & 2 ? high : low)[1], (i & 4 ? high : low)[2]])
  return {
    vertices,
    faces: [
      [0, 2, 3, 1],
      [4, 5, 7, 6],
      [0, 1, 5, 4],
      [2, 6, 7, 3],
      [0, 4, 6, 2],
      [1, 3, 7, 5],
    ],
  }
}

const tetrahedron = (p: readonly [Vec3, Vec3, Vec3, Vec3]): Part => {
  const [a, b, c, d] = p
  const u = [b[0] - a[0], b[1] - a[1], b[2] - a[2]] as const
  const v = [c[0] - a[0], c[1] - a[1], c[2] - a[2]] as const
  const w = [d[0] - a[0], d[1] - a[1], d[2] - a[2]] as const
  const six =
    u[0] * (v[1] * w[2] - v[2] * w[1]) - u[1] * (v[0] * w[2] - v[2] * w[0]) + u[2] * (v[0] * w[1] - v[1] * w[0])
  const vertices = six > 0 ? [a, b, c, d] : [a, c, b, d]
  return {
    vertices,
    faces: [
      [0, 2, 1],
      [0, 1, 3],
      [1, 2, 3],
      [2, 0, 3],
    ],
  }
}

/** Kept to multiples of 2⁻¹⁰, which single precision holds exactly. */
const exact = (x: number): number => Math.round(1024 * x) / 1024

/**
 * An upright prism over a star pentagon whose tips are a, b, c, d, e: its side walls are the five long rectangles from
 * tip to tip, its ends two pentagrams, as in a uniform star prism. For the library: the ten-cornered outline.
 */
const starPrism = (centre: Vec3, radius: number, turn: number, height: number): Part => {
  const tips = Array.from({ length: 5 }, (_, i): [number, number] => {
    const angle = turn + (2 * Math.PI * i) / 5
    return [exact(centre[0] + radius * Math.cos(angle)), exact(centre[1] + radius * Math.sin(angle))]
  })
  const low = centre[2]
  const high = centre[2] + height
  const star = [0, 2, 4, 1, 3]
  const vertices = [...tips.map(([x, y]): Vec3 => [x, y, low]), ...tips.map(([x, y]): Vec3 => [x, y, high])]
  const faces = [star.map((i) => i).reverse(), star.map((i) => i + 5)]
  star.forEach((i, k) => {
    const j = star[(k + 1) % 5]!
    faces.push([i, j, j + 5, i + 5])
  })
  // Between tips i and i + 1 the outline turns in where the side i → i + 2 crosses the side i − 1 → i + 1.
  const outline = tips.flatMap((tip, i) => [
    tip,
    crossing(tip, tips[(i + 2) % 5]!, tips[(i + 4) % 5]!, tips[(i + 1) % 5]!),
  ])
  const centreOfTips: [number, number] = [
    tips.reduce((s, t) => s + t[0], 0) / 5,
    tips.reduce((s, t) => s + t[1], 0) / 5,
  ]
  const rim = [...outline, centreOfTips]
  const triangles: number[][] = []
  for (let i = 0; i < 10; i++) {
    const j = (i + 1) % 10
    triangles.push([10, j, i], [21, i + 11, j + 11], [i, j, j + 11], [i, j + 11, i + 11])
  }
  return {
    vertices,
    faces,
    plain: {
      vertices: [...rim.map(([x, y]): Vec3 => [x, y, low]), ...rim.map(([x, y]): Vec3 => [x, y, high])],
      triangles,
    },
  }
}

const crossing = (
  a: readonly [number, number],
  b: readonly [number, number],
  c: readonly [number, number],
  d: readonly [number, number],
): [number, number] => {
  const det = (b[0] - a[0]) * (d[1] - c[1]) - (b[1] - a[1]) * (d[0] - c[0])
  const t = ((c[0] - a[0]) * (d[1] - c[1]) - (c[1] - a[1]) * (d[0] - c[0])) / det
  return [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])]
}

/** A lattice with steps of a half: planes, edges and corners coincide exactly and often. */
const lattice = (random: Random): number => Math.floor(random() * 7) / 2

/** One part; many of its coordinates are on a lattice. */
export const part = (random: Random): Part => {
  const kind = random()
  if (kind < 0.15) {
    const centre: Vec3 = [lattice(random), lattice(random), lattice(random)]
    return starPrism(centre, 0.5 + random(), 2 * Math.PI * random(), 0.5 + Math.floor(random() * 4) / 2)
  }
  if (kind < 0.5) {
    const low: Vec3 = [lattice(random), lattice(random), lattice(random)]
    const size = (): number => 0.5 + Math.floor(random() * 4) / 2
    return box(low, [low[0] + size(), low[1] + size(), low[2] + size()])
  }
  const coordinate = kind < 0.75 ? lattice : (r: Random): number => exact(3.5 * r())
  for (;;) {
    const point = (): Vec3 => [coordinate(random), coordinate(random), coordinate(random)]
    const corners = [point(), point(), point(), point()] as const
    const [a, b, c, d] = corners
    const u = [b[0] - a[0], b[1] - a[1], b[2] - a[2]] as const
    const v = [c[0] - a[0], c[1] - a[1], c[2] - a[2]] as const
    const w = [d[0] - a[0], d[1] - a[1], d[2] - a[2]] as const
    const six =
      u[0] * (v[1] * w[2] - v[2] * w[1]) - u[1] * (v[0] * w[2] - v[2] * w[0]) + u[2] * (v[0] * w[1] - v[1] * w[0])
    if (Math.abs(six) > 0.5) return tetrahedron(corners)
  }
}

export const asSolid = (parts: readonly Part[]): Solid => {
  const vertices: Vec3[] = []
  const faces = parts.flatMap((p) => {
    const base = vertices.length
    vertices.push(...p.vertices)
    return p.faces.map((f) => ({ cycle: f.map((i) => base + i), kind: 0, orbit: 0 }))
  })
  const kinds = [{ id: 0, name: 'face', n: 0, d: 1, count: faces.length }]
  return {
    id: 'cluster',
    name: 'cluster',
    hand: 'none',
    vertices,
    faces,
    kinds,
    rotations: [identity3],
    // Exact coordinates, but no promise about the smallest feature: a narrow tolerance without a gap serves.
    precision: 5e-10,
  }
}

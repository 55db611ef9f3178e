/** The isometries that map a solid onto itself, found from its faces alone. */
import { SnapGrid } from '../geometry/snap'
import {
  add,
  apply,
  cross,
  determinant,
  distance,
  dot,
  identity3,
  type Mat3,
  multiply,
  norm,
  normalize,
  scale,
  sub,
  transpose,
  type Vec3,
} from '../geometry/vec3'

interface Shape {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly { readonly cycle: readonly number[]; readonly kind: number }[]
}

export interface Isometries {
  /** Determinant +1, identity first. */
  readonly rotations: readonly Mat3[]
  /** Determinant −1; empty for a chiral solid. */
  readonly reflections: readonly Mat3[]
}

/** Whether m is in the list, to rounding; most others differ in the first number already. */
const contains = (list: readonly Mat3[], m: Mat3): boolean => {
  for (const x of list) {
    if (Math.abs(x[0][0] - m[0][0]) > 1e-6 || Math.abs(x[0][1] - m[0][1]) > 1e-6) continue
    if (distance(x[0], m[0]) < 1e-6 && distance(x[1], m[1]) < 1e-6 && distance(x[2], m[2]) < 1e-6) return true
  }
  return false
}

/** All products of the generators, which are isometries of one finite shape. */
const generated = (generators: readonly Mat3[]): Mat3[] => {
  const elements: Mat3[] = [identity3]
  for (const element of elements)
    for (const g of generators) {
      const m = multiply(g, element)
      if (!contains(elements, m)) elements.push(m)
    }
  return elements
}

/** Right-handed (or, mirrored, left-handed) orthonormal frame on a flag: vertex, next vertex, face centre. */
const flagFrame = (vertex: Vec3, next: Vec3, centre: Vec3, handed: 1 | -1): Mat3 => {
  const u = normalize(sub(next, vertex))
  const inward = sub(centre, vertex)
  const w = normalize(cross(u, inward))
  return transpose([u, cross(w, u), scale(w, handed)])
}

/**
 * Every isometry takes the first corner of the first face to some corner of a face of the same kind, one way round or the
 * other; each such candidate is kept if it maps vertices to vertices and faces to faces.
 * @param shape centred at the origin
 */
export const findIsometries = (shape: Shape): Isometries => {
  const { vertices, faces } = shape
  const grid = new SnapGrid(1e-7, 1e-7, 1e-2)
  for (const [x, y, z] of vertices) grid.add(x, y, z)
  const keyOf = (kind: number, cycle: readonly number[]): string =>
    `${kind}:${[...cycle].sort((a, b) => a - b).join(' ')}`
  const known = new Set(faces.map((f) => keyOf(f.kind, f.cycle)))
  const centres = faces.map(({ cycle }) =>
    scale(
      cycle.reduce((s, v) => add(s, vertices[v]!), [0, 0, 0] as Vec3),
      1 / cycle.length,
    ),
  )
  const counts = new Map<number, number>()
  for (const f of faces) counts.set(f.kind, (counts.get(f.kind) ?? 0) + f.cycle.length)
  const rarest = [...counts.entries()].sort((a, b) => a[1] - b[1] || a[0] - b[0])[0]![0]
  const home = faces.findIndex((f) => f.kind === rarest)
  const [first, second] = faces[home]!.cycle as readonly [number, number]
  const from = flagFrame(vertices[first]!, vertices[second]!, centres[home]!, 1)
  const maps = (m: Mat3): boolean => {
    const image: number[] = []
    for (const p of vertices) {
      const [x, y, z] = apply(m, p)
      const there = grid.find(x, y, z)
      if (there < 0) return false
      image.push(there)
    }
    return faces.every((f) =>
      known.has(
        keyOf(
          f.kind,
          f.cycle.map((v) => image[v]!),
        ),
      ),
    )
  }
  // A candidate that is a product of isometries found before need not be tried on all faces.
  const generators: Mat3[] = []
  let group: Mat3[] = [identity3]
  const isIsometry = (m: Mat3): boolean => {
    if (contains(group, m)) return true
    if (!maps(m)) return false
    generators.push(m)
    group = generated(generators)
    return true
  }
  const found: { 1: Mat3[]; '-1': Mat3[] } = { 1: [], '-1': [] }
  faces.forEach((f, i) => {
    if (f.kind !== rarest) return
    const n = f.cycle.length
    for (let k = 0; k < n; k++)
      for (const step of [1, n - 1])
        for (const handed of [1, -1] as const) {
          const a = vertices[f.cycle[k]!]!
          const b = vertices[f.cycle[(k + step) % n]!]!
          const m = multiply(flagFrame(a, b, centres[i]!, handed), transpose(from))
          const list = found[handed]
          if (!contains(list, m) && isIsometry(m)) list.push(m)
        }
  })
  const rotations = found[1].filter((m) => determinant(m) > 0)
  return { rotations: identityFirst(rotations), reflections: found['-1'] }
}

const identityFirst = (list: readonly Mat3[]): Mat3[] => {
  return [...list].sort((a, b) => Number(traceOf(b) > 2.999) - Number(traceOf(a) > 2.999))
}

const traceOf = (m: Mat3): number => m[0][0] + m[1][1] + m[2][2]

/** Axis of a rotation by less than half a turn, or of the half turn itself. */
const axisOf = (m: Mat3): Vec3 => {
  const skew: Vec3 = [m[2][1] - m[1][2], m[0][2] - m[2][0], m[1][0] - m[0][1]]
  if (norm(skew) > 1e-6) return normalize(skew)
  const columns = transpose(m).map((c, i): Vec3 => add(c, identity3[i]!))
  return normalize(columns.reduce((a, b) => (norm(b) > norm(a) ? b : a)))
}

/** Schoenflies symbol of a finite group of isometries: I_h, O, T_d, D_7h, D_5d, C_2v, C_1 … */
export const schoenflies = ({ rotations, reflections }: Isometries): string => {
  const order = rotations.length
  const turning = (n: number): Mat3[] =>
    rotations.filter((m) => Math.abs(traceOf(m) - 1 - 2 * Math.cos((2 * Math.PI) / n)) < 1e-6)
  const inverts = reflections.some((m) => traceOf(m) < -3 + 1e-6)
  if (order === 1) return reflections.length === 0 ? 'C_1' : inverts ? 'C_i' : 'C_s'
  const mirrors = reflections.filter((m) => Math.abs(traceOf(m) - 1) < 1e-6)
  /** A mirror at right angles to one of the axes of order n. */
  const levelMirror = (n: number): boolean =>
    turning(n).some((r) => mirrors.some((m) => dot(apply(m, axisOf(r)), axisOf(r)) < -1 + 1e-6))
  if (turning(order).length > 0) {
    if (reflections.length === 0) return `C_${order}`
    return levelMirror(order) ? `C_${order}h` : mirrors.length > 0 ? `C_${order}v` : `S_${2 * order}`
  }
  if (turning(order / 2).length > 0) {
    if (reflections.length === 0) return `D_${order / 2}`
    return `D_${order / 2}${levelMirror(order / 2) ? 'h' : 'd'}`
  }
  const letter = order === 60 ? 'I' : order === 24 ? 'O' : order === 12 ? 'T' : '?'
  if (reflections.length === 0) return letter
  return letter === 'T' && !inverts ? 'T_d' : `${letter}_h`
}

/**
 * Reciprocation about a sphere at the centre: each face plane becomes a vertex, each vertex a face, and every edge an edge
 * at right angles to it. About the sphere that touches the edges, both edges touch it at the same point.
 * Method as in "Dual Models" (Cambridge University Press, 1983).
 */
import { BrokenPromise } from '../errors'
import { SnapGrid } from '../geometry/snap'
import type { Vec2 } from '../geometry/vec2'
import { add, cross, dot, norm, normalize, planeFrame, scale, sub, type Vec3 } from '../geometry/vec3'
import { shapeName } from './polygon-names'
import type { RawSolid } from './raw'
import { cornersOf, ringOf } from './vertex-ring'

interface Shape {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly { readonly cycle: readonly number[] }[]
}

/** Vertices may coincide: vertex i belongs to face i of the original, face j to its vertex j. */
export interface Reciprocal {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly { readonly cycle: readonly number[] }[]
}

/** The foot of the perpendicular from the centre on a face's plane; null if the plane passes through the centre. */
export const footOf = (points: readonly Vec3[]): Vec3 | null => {
  // Crossed faces may have no area at all, so the normal comes from the two edges that tell it best.
  let best: Vec3 = [0, 0, 0]
  const n = points.length
  const edges = points.map((p, i) => sub(points[(i + 1) % n]!, p))
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++) {
      const c = cross(edges[i]!, edges[j]!)
      if (norm(c) > norm(best)) best = c
    }
  const normal = normalize(best)
  const offset = points.reduce((s, p) => s + dot(p, normal), 0) / n
  const size = Math.max(...points.map(norm))
  return Math.abs(offset) < 1e-9 * size ? null : scale(normal, offset)
}

/** How many faces pass through the centre: their vertices in the dual would lie at infinity. */
export const centralFaces = (solid: Shape): number =>
  solid.faces.filter((f) => footOf(f.cycle.map((v) => solid.vertices[v]!)) === null).length

/** Radius of the sphere that touches all edges; of a uniform solid the distance of its edges' middles. */
export const midradius = (solid: Shape): number => {
  const [a, b] = solid.faces[0]!.cycle as readonly [number, number]
  return norm(scale(add(solid.vertices[a]!, solid.vertices[b]!), 0.5))
}

/**
 * @param radius of the sphere
 * @throws BrokenPromise when a face passes through the centre, or the faces round a vertex do not form one ring
 */
export const reciprocate = (solid: Shape, radius: number): Reciprocal => {
  const vertices = solid.faces.map((f, face): Vec3 => {
    const foot = footOf(f.cycle.map((v) => solid.vertices[v]!))
    if (!foot) throw new BrokenPromise('A face through the centre has no reciprocal.', { face })
    return scale(foot, (radius * radius) / dot(foot, foot))
  })
  const corners = cornersOf(solid, solid.vertices.length)
  const faces = corners.map((list, vertex) => ({ cycle: ringOf(list, vertex).map((step) => step.face) }))
  return { vertices, faces }
}

export interface Merged {
  readonly raw: RawSolid
  /** How many points stand for several vertices, and how many vertices each; empty where none coincide. */
  readonly coincident: ReadonlyMap<number, number>
}

/** A dual as a solid: vertices that coincide are one, and its one kind of face is named by its shape. */
export const dualSolid = (reciprocal: Reciprocal): Merged => {
  const grid = new SnapGrid(1e-7, 1e-7, 1e-2)
  const number = reciprocal.vertices.map(([x, y, z]) => grid.add(x, y, z))
  const vertices = Array.from({ length: grid.size }, (_, i): Vec3 => [grid.x[i]!, grid.y[i]!, grid.z[i]!])
  const times = vertices.map(() => 0)
  for (const i of number) times[i]!++
  const coincident = new Map<number, number>()
  for (const t of times) if (t > 1) coincident.set(t, (coincident.get(t) ?? 0) + 1)
  const shape = shapeOf(reciprocal.faces[0]!.cycle.map((v) => reciprocal.vertices[v]!))
  const faces = reciprocal.faces.map((f) => ({ cycle: f.cycle.map((v) => number[v]!), d: 1, shape }))
  return { raw: { vertices, faces }, coincident }
}

const shapeOf = (points: readonly Vec3[]): string => {
  const foot = footOf(points)
  if (!foot) throw new BrokenPromise('A face of a dual passes through the centre.', {})
  const { u, v } = planeFrame(normalize(foot))
  return shapeName(points.map((p): Vec2 => [dot(p, u), dot(p, v)]))
}

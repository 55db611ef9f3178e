/** The faces round one vertex, and the flat figure in which a plane across the axis cuts them. */
import type { Vec2 } from '../geometry/vec2'
import { add, cross, distance, dot, norm, normalize, planeFrame, scale, sub, type Vec3 } from '../geometry/vec3'
import type { Solid } from './types'
import { type Corner, cornersOf, type RingStep, ringsOf, type Sense, windingOf } from './vertex-ring'

export interface FigureSide {
  readonly face: number
  /** Name of the face's kind. */
  readonly name: string
  /** Seen from outside the solid, the axis in the origin, counter-clockwise as a whole. Unit: see `FlatFigure.cut`. */
  readonly from: Vec2
  readonly to: Vec2
  readonly length: number
  readonly sense: Sense
}

export interface FigureRing {
  readonly sides: readonly FigureSide[]
  /** How often the ring winds round the axis; 0 where forward and back cancel out (the axis lies outside the figure). */
  readonly windings: number
}

export interface FlatFigure {
  /**
   * `neighbours`: the plane through the other ends of the edges, in the solid's own unit (with unit edge, a face {n/d} gives
   * a side of 2 cos(π d/n)). `near`: a plane across the axis at any small distance, that distance being the unit.
   */
  readonly cut: 'neighbours' | 'near'
  /** Unit vector from the vertex along the axis into the section plane. */
  readonly axis: Vec3
  readonly rings: readonly FigureRing[]
}

/** Faces of each ring in cyclic order, and the figure or the reason why there is none. */
export type VertexFigure = { readonly vertex: number; readonly faces: readonly (readonly number[])[] } & (
  | { readonly figure: FlatFigure; readonly reason: null }
  | { readonly figure: null; readonly reason: string }
)

/** Least cosine between axis and edge: beyond it the figure would reach twenty times as far as the plane is away. */
const leastSlope = 0.05

/**
 * The vertex figure. For a uniform solid, a prism or an antiprism: the polygon whose sides join the two neighbours of the
 * vertex in each face (H. S. M. Coxeter, M. S. Longuet-Higgins, J. C. P. Miller, "Uniform polyhedra", Philosophical
 * Transactions of the Royal Society A, 1954). For all others: the section of the faces by a plane across the axis close to
 * the vertex; the axis points to the centre, or, where edges go the other way, along the mean of the edges.
 * @param vertex index into `solid.vertices`
 * @throws BrokenPromise when the faces leave a gap round the vertex
 */
export const vertexFigure = (solid: Solid, vertex: number): VertexFigure =>
  figureOf(solid, vertex, cornersOf(solid, solid.vertices.length)[vertex]!)

const figureOf = (solid: Solid, vertex: number, corners: readonly Corner[]): VertexFigure => {
  const rings = ringsOf(corners, vertex, (face) => solid.components?.[face] ?? 0)
  const faces = rings.map((ring) => ring.map(({ face }) => face))
  const none = (reason: string): VertexFigure => ({ vertex, faces, figure: null, reason })
  const p = solid.vertices[vertex]!
  const isUniform = ['uniform', 'prism', 'antiprism'].includes(solid.family ?? 'uniform')
  if (isUniform) {
    const axis = scale(normalize(p), -1)
    return { vertex, faces, figure: drawn(solid, vertex, rings, axis, 'neighbours'), reason: null }
  }
  if (corners.some((corner) => isHollow(solid, vertex, corner)))
    return none(
      'A face has an angle of more than 180° here, so a plane across the axis does not cut it in one stretch.',
    )
  const axis = axisOf(solid, vertex, rings)
  if (!axis) return none('The edges here spread so far apart that no plane cuts all of them near the vertex.')
  return { vertex, faces, figure: drawn(solid, vertex, rings, axis, 'near'), reason: null }
}

/** Directions of the edges, once for each face that has them. */
const edgesAt = (solid: Solid, vertex: number, rings: readonly (readonly RingStep[])[]): Vec3[] =>
  rings.flat().map(({ to }) => normalize(sub(solid.vertices[to]!, solid.vertices[vertex]!)))

const axisOf = (solid: Solid, vertex: number, rings: readonly (readonly RingStep[])[]): Vec3 | null => {
  const edges = edgesAt(solid, vertex, rings)
  const inward = scale(solid.vertices[vertex]!, -1)
  const mean = edges.reduce<Vec3>(add, [0, 0, 0])
  for (const way of [inward, mean]) {
    if (norm(way) < 1e-6) continue
    const axis = normalize(way)
    if (edges.every((edge) => dot(edge, axis) > leastSlope)) return axis
  }
  return null
}

/**
 * Whether the face fills more than half a turn at this corner: the corner bends against the face's turning as a whole. A
 * face that crosses itself so that its turns cancel out has no such corner.
 */
const isHollow = (solid: Solid, vertex: number, { face, ends }: Corner): boolean => {
  const cycle = solid.faces[face]!.cycle.map((v) => solid.vertices[v]!)
  const at = (i: number): Vec3 => cycle[(i + cycle.length) % cycle.length]!
  const bend = (a: Vec3, b: Vec3, c: Vec3): Vec3 => cross(sub(b, a), sub(c, b))
  const bends = cycle.map((b, i) => bend(at(i - 1), b, at(i + 1)))
  const widest = bends.reduce((best, b) => (norm(b) > norm(best) ? b : best))
  const normal = normalize(widest)
  const turning = bends.reduce((sum, b, i) => {
    const along = dot(sub(at(i), at(i - 1)), sub(at(i + 1), at(i)))
    return sum + Math.atan2(dot(b, normal), along)
  }, 0)
  const whole = Math.round(turning / (2 * Math.PI))
  const here = bend(solid.vertices[ends[0]]!, solid.vertices[vertex]!, solid.vertices[ends[1]]!)
  return whole * dot(here, normal) < -1e-9 * norm(widest)
}

const drawn = (
  solid: Solid,
  vertex: number,
  rings: readonly (readonly RingStep[])[],
  axis: Vec3,
  cut: FlatFigure['cut'],
): FlatFigure => {
  const p = solid.vertices[vertex]!
  // Always seen from outside, also where the vertex is the bottom of a pit and its axis points outwards.
  const { u, v } = planeFrame(dot(axis, p) > 0 ? axis : scale(axis, -1))
  const onPlane = (q: number): Vec3 => {
    const edge = sub(solid.vertices[q]!, p)
    return cut === 'near' ? scale(edge, 1 / dot(edge, axis)) : edge
  }
  const flat = (w: Vec3): Vec2 => [dot(w, u), dot(w, v)]
  const bearing = (q: number): number => {
    const [x, y] = flat(onPlane(q))
    return Math.atan2(y, x)
  }
  return {
    cut,
    axis,
    rings: rings.map((ring) => {
      const { senses, windings, isClockwise } = windingOf(ring, bearing)
      const sides = ring.map(({ face, from, to }, i): FigureSide => {
        const [a, b] = [onPlane(from), onPlane(to)]
        const name = solid.kinds[solid.faces[face]!.kind]!.name
        const ends = isClockwise ? { from: flat(b), to: flat(a) } : { from: flat(a), to: flat(b) }
        return { face, name, ...ends, length: distance(a, b), sense: senses[i]! }
      })
      return { sides: isClockwise ? sides.reverse() : sides, windings }
    }),
  }
}

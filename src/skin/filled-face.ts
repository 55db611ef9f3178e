/**
 * The filled region of one face under a fill rule: its true boundary, whether a point lies in it, and where a plane
 * cuts it. Star polygons are filled either wholly (nonzero) or with their centres open (even-odd).
 */
import { type Vec2, windingNumber } from '../geometry/vec2'
import { dot, lerp, type Vec3 } from '../geometry/vec3'
import type { FillRule, Solid } from '../solids/types'
import { type Frame, toPlane, toSpace } from './planes'

export interface FilledFace {
  readonly index: number
  readonly kind: number
  readonly plane: number
  readonly frame: Frame
  /** The face's cycle in `frame`. */
  readonly cycle: readonly Vec2[]
  /** Segments that bound the filled region, in space; the inner crossings of a star are not among them if filled over. */
  readonly boundary: readonly (readonly [Vec3, Vec3])[]
  readonly fill: FillRule
}

/** Does the filled region contain p (a point in the face's frame, not on its boundary)? */
export const covers = (face: FilledFace, p: Vec2): boolean => {
  const w = windingNumber(face.cycle, p)
  return face.fill === 'nonzero' ? w !== 0 : (w & 1) !== 0
}

/** A face ready to be cut. @param plane id of its face plane @param frame of that plane */
export const fillFace = (solid: Solid, index: number, plane: number, frame: Frame, fill: FillRule): FilledFace => {
  const { cycle: ids, kind } = solid.faces[index]!
  const cycle = ids.map((i) => toPlane(frame, solid.vertices[i]!))
  const bare: FilledFace = { index, kind, plane, frame, cycle, boundary: [], fill }
  const boundary: [Vec3, Vec3][] = []
  // A rough vertex is taken where it meets the plane, so that what is computed from this face lies in the plane exactly.
  const corner = (i: number): Vec3 =>
    solid.precision === undefined ? solid.vertices[ids[i]!]! : toSpace(frame, cycle[i]![0], cycle[i]![1])
  const n = cycle.length
  for (let i = 0; i < n; i++) {
    const a = cycle[i]!
    const b = cycle[(i + 1) % n]!
    const cuts = [0, 1]
    for (let j = 0; j < n; j++) {
      const t = crossingParameter(a, b, cycle[j]!, cycle[(j + 1) % n]!)
      if (t > 1e-9 && t < 1 - 1e-9 && !cuts.some((c) => Math.abs(c - t) < 1e-9)) cuts.push(t)
    }
    cuts.sort((x, y) => x - y)
    for (let k = 0; k + 1 < cuts.length; k++) {
      const s = cuts[k]!
      const t = cuts[k + 1]!
      const m = (s + t) / 2
      // A short step to either side; sub-edges of regular stars are no shorter than a tenth of the edge.
      const step = 1e-4 * (t - s)
      const dx = b[0] - a[0]
      const dy = b[1] - a[1]
      const mx = a[0] + m * dx
      const my = a[1] + m * dy
      if (covers(bare, [mx - step * dy, my + step * dx]) !== covers(bare, [mx + step * dy, my - step * dx])) {
        const from = s === 0 ? corner(i) : toSpace(frame, a[0] + s * dx, a[1] + s * dy)
        const to = t === 1 ? corner((i + 1) % n) : toSpace(frame, a[0] + t * dx, a[1] + t * dy)
        boundary.push([from, to])
      }
    }
  }
  return { ...bare, boundary }
}

/** Parameter on a→b where the line c→d meets it inside c→d's length, or NaN. */
const crossingParameter = (a: Vec2, b: Vec2, c: Vec2, d: Vec2): number => {
  const ex = b[0] - a[0]
  const ey = b[1] - a[1]
  const fx = d[0] - c[0]
  const fy = d[1] - c[1]
  const det = ex * fy - ey * fx
  if (Math.abs(det) < 1e-12) return Number.NaN
  const gx = c[0] - a[0]
  const gy = c[1] - a[1]
  const s = (gx * ey - gy * ex) / det
  if (s < -1e-9 || s > 1 + 1e-9) return Number.NaN
  return (gx * fy - gy * fx) / det
}

export interface PlaneCut {
  /** Stretches of the plane inside the filled face. */
  readonly segments: readonly (readonly [Vec3, Vec3])[]
  /** Points where the plane only touches it. */
  readonly touches: readonly Vec3[]
}

const nothing: PlaneCut = { segments: [], touches: [] }

/** Where the plane {p: normal · p = offset} meets the filled face, which must lie in another plane. */
export const cutByPlane = (face: FilledFace, normal: Vec3, offset: number, on: number): PlaneCut => {
  const inPlane: [Vec3, Vec3][] = []
  const points: Vec3[] = []
  for (const segment of face.boundary) {
    const [p, q] = segment
    const dp = dot(normal, p) - offset
    const dq = dot(normal, q) - offset
    const pOn = Math.abs(dp) <= on
    const qOn = Math.abs(dq) <= on
    if (pOn && qOn) {
      inPlane.push([p, q])
      points.push(p, q)
    } else if (pOn) points.push(p)
    else if (qOn) points.push(q)
    else if (dp > 0 !== dq > 0) points.push(lerp(p, q, dp / (dp - dq)))
  }
  if (points.length === 0) return nothing
  // All points lie on one line: sort along its longest axis.
  const axis = widestAxis(points)
  points.sort((a, b) => a[axis]! - b[axis]!)
  const distinct: Vec3[] = []
  for (const p of points) {
    const last = distinct[distinct.length - 1]
    if (!last || Math.abs(p[axis]! - last[axis]!) > on) distinct.push(p)
  }
  const segments: [Vec3, Vec3][] = []
  const touches: Vec3[] = []
  let previousCovered = false
  for (let i = 0; i < distinct.length; i++) {
    const p = distinct[i]!
    const q = distinct[i + 1]
    let covered = false
    if (q) {
      const m = lerp(p, q, 0.5)
      covered =
        inPlane.some(([a, b]) => (m[axis]! - a[axis]!) * (m[axis]! - b[axis]!) < 0) ||
        covers(face, toPlane(face.frame, m))
      if (covered) segments.push([p, q])
    }
    if (!covered && !previousCovered) touches.push(p)
    previousCovered = covered
  }
  return { segments, touches }
}

const widestAxis = (points: readonly Vec3[]): 0 | 1 | 2 => {
  let best: 0 | 1 | 2 = 0
  let widest = -1
  for (const axis of [0, 1, 2] as const) {
    let low = Number.POSITIVE_INFINITY
    let high = Number.NEGATIVE_INFINITY
    for (const p of points) {
      if (p[axis] < low) low = p[axis]
      if (p[axis] > high) high = p[axis]
    }
    if (high - low > widest) {
      widest = high - low
      best = axis
    }
  }
  return best
}

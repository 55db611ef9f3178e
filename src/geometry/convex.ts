/**
 * Convex parts of flat polygons, and how much two of them overlap. Written for speed on many small polygons: a convex
 * part is a flat array x0, y0, x1, y1, … counter-clockwise; straight corners are allowed.
 */
import earcut from 'earcut'
import { BrokenPromise } from '../errors'
import { cross2, type Motion2, type Ring2, signedArea, sub2, type Vec2 } from './vec2'

export type ConvexPart = Float64Array

/**
 * Takes a polygon (outer ring counter-clockwise, holes clockwise, rings simple) apart into convex parts: ear clipping,
 * then diagonals that are not needed are removed (Hertel and Mehlhorn, Foundations of Computation Theory, 1983).
 * @throws BrokenPromise when the parts do not add up to the polygon
 */
export const convexParts = (rings: readonly Ring2[]): ConvexPart[] => {
  const outer = rings[0]
  if (!outer) return []
  if (rings.length === 1 && isConvex(outer)) return [Float64Array.from(outer.flat())]
  const points = rings.flat()
  const holes: number[] = []
  for (let i = 0, n = 0; i + 1 < rings.length; i++) holes.push((n += rings[i]!.length))
  const corners = earcut(
    points.flatMap((p) => [p[0], p[1]]),
    holes,
  )
  const area = rings.reduce((sum, ring) => sum + signedArea(ring), 0)
  const faces: number[][] = []
  for (let i = 0; i < corners.length; i += 3) {
    const t = [corners[i]!, corners[i + 1]!, corners[i + 2]!]
    const a = signedArea(t.map((k) => points[k]!))
    if (a < 0) t.reverse()
    if (Math.abs(a) > 1e-14 * area) faces.push(t)
  }
  const parts = withoutNeedlessDiagonals(faces, points)
  const sum = parts.reduce((s, f) => s + signedArea(f.map((k) => points[k]!)), 0)
  if (!(Math.abs(sum - area) <= 1e-9 * area))
    throw new BrokenPromise('A polygon could not be taken apart into convex parts.', { area, sum, rings: rings.length })
  return parts.map((f) => Float64Array.from(f.flatMap((k) => [points[k]![0], points[k]![1]])))
}

// Relative to the product of the two sides, i.e. the sine of the turn.
const straight = 1e-12

const turn = (a: Vec2, b: Vec2, c: Vec2): number => {
  const p = sub2(b, a)
  const q = sub2(c, b)
  return cross2(p, q) / Math.sqrt((p[0] * p[0] + p[1] * p[1]) * (q[0] * q[0] + q[1] * q[1]) || 1)
}

const isConvex = (ring: Ring2): boolean =>
  // A ring that always turns left could still go round twice; simple rings do not.
  ring.every((p, i) => turn(ring[(i + ring.length - 1) % ring.length]!, p, ring[(i + 1) % ring.length]!) >= -straight)

const withoutNeedlessDiagonals = (faces: number[][], points: readonly Vec2[]): number[][] => {
  for (let merged = true; merged; ) {
    merged = false
    const owner = new Map<string, [number, number]>()
    faces.forEach((f, k) => {
      f.forEach((v, i) => {
        owner.set(`${v} ${f[(i + 1) % f.length]}`, [k, i])
      })
    })
    search: for (let k = 0; k < faces.length; k++) {
      const f = faces[k]!
      for (let i = 0; i < f.length; i++) {
        const other = owner.get(`${f[(i + 1) % f.length]} ${f[i]}`)
        if (!other || other[0] <= k) continue
        const g = faces[other[0]]!
        // f from the far end of the diagonal round to its near end, then g likewise.
        const ring = [...rotated(f, i + 1), ...rotated(g, other[1] + 1).slice(1, -1)]
        if (!isConvex(ring.map((v) => points[v]!))) continue
        faces[k] = ring
        faces.splice(other[0], 1)
        merged = true
        break search
      }
    }
  }
  return faces
}

const rotated = (list: readonly number[], start: number): number[] =>
  list.map((_, i) => list[(start + i) % list.length]!)

/** Writes the points of `from` (x0, y0, …), moved, into `to` from place `at` on. */
export const moveInto = (to: Float64Array, at: number, from: Float64Array, m: Motion2): void => {
  const { c, s, x, y } = m
  for (let i = 0; i < from.length; i += 2) {
    const px = from[i]!
    const py = from[i + 1]!
    to[at + i] = c * px - s * py + x
    to[at + i + 1] = s * px + c * py + y
  }
}

/** Whether a side of the part p[p0 … p1) has all of q[q0 … q1) on its outer side, but for `slack`. */
const sideSeparates = (
  p: Float64Array,
  p0: number,
  p1: number,
  q: Float64Array,
  q0: number,
  q1: number,
  slack: number,
): boolean => {
  let x = p[p1 - 2]!
  let y = p[p1 - 1]!
  for (let j = p0; j < p1; j += 2) {
    const nx = p[j]!
    const ny = p[j + 1]!
    const ex = nx - x
    const ey = ny - y
    const limit = slack * Math.sqrt(ex * ex + ey * ey)
    let k = q0
    for (; k < q1; k += 2) if (ex * (q[k + 1]! - y) - ey * (q[k]! - x) > limit) break
    if (k === q1) return true
    x = nx
    y = ny
  }
  return false
}

/**
 * Whether two convex parts, given as stretches p[p0 … p1) and q[q0 … q1) of flat arrays, lie side by side, going into
 * each other by no more than `slack` (separating axes).
 */
export const separated = (
  p: Float64Array,
  p0: number,
  p1: number,
  q: Float64Array,
  q0: number,
  q1: number,
  slack: number,
): boolean => sideSeparates(p, p0, p1, q, q0, q1, slack) || sideSeparates(q, q0, q1, p, p0, p1, slack)

let scratchA = new Float64Array(256)
let scratchB = new Float64Array(256)

/**
 * Area common to two convex parts p[p0 … p1) and q[q0 … q1), in the square of their unit (Sutherland and Hodgman, Comm.
 * ACM 17, 1974).
 */
export const overlapArea = (
  p: Float64Array,
  p0: number,
  p1: number,
  q: Float64Array,
  q0: number,
  q1: number,
): number => {
  const room = 2 * (p1 - p0 + q1 - q0)
  if (scratchA.length < room) {
    scratchA = new Float64Array(room)
    scratchB = new Float64Array(room)
  }
  let from = scratchA
  let to = scratchB
  let n = p1 - p0
  for (let i = 0; i < n; i++) from[i] = p[p0 + i]!
  let x = q[q1 - 2]!
  let y = q[q1 - 1]!
  for (let j = q0; j < q1 && n > 0; j += 2) {
    const ex = q[j]! - x
    const ey = q[j + 1]! - y
    let m = 0
    let px = from[n - 2]!
    let py = from[n - 1]!
    let pd = ex * (py - y) - ey * (px - x)
    for (let k = 0; k < n; k += 2) {
      const cx = from[k]!
      const cy = from[k + 1]!
      const cd = ex * (cy - y) - ey * (cx - x)
      if (pd < 0 !== cd < 0) {
        const t = pd / (pd - cd)
        to[m++] = px + t * (cx - px)
        to[m++] = py + t * (cy - py)
      }
      if (cd >= 0) {
        to[m++] = cx
        to[m++] = cy
      }
      px = cx
      py = cy
      pd = cd
    }
    n = m
    const swap = from
    from = to
    to = swap
    x = q[j]!
    y = q[j + 1]!
  }
  if (n < 6) return 0
  // Relative to the first corner, so that far from the origin nothing is lost.
  const ox = from[0]!
  const oy = from[1]!
  let twice = 0
  for (let k = 2; k + 2 < n; k += 2)
    twice += (from[k]! - ox) * (from[k + 3]! - oy) - (from[k + 2]! - ox) * (from[k + 1]! - oy)
  return twice / 2
}

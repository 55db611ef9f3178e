/**
 * Whether a stretch of edge lies on faces that do not end there. A model may close that way: a filled star given as
 * triangles meets its neighbour's edge in its middle, a box without a floor stands on a table.
 */
import { type Vec2, windingNumber } from '../geometry/vec2'
import { cross, distance, dot, norm, sub, type Vec3 } from '../geometry/vec3'
import { planeOf } from './mend'

interface Cycled {
  readonly cycle: readonly number[]
}

interface Prepared {
  readonly points: readonly Vec3[]
  readonly low: Vec3
  readonly high: Vec3
  /** Made when first needed. */
  plane: { readonly normal: Vec3; readonly offset: number } | null
}

/** Stretches times faces that are looked at, at most; beyond that a stretch counts as free. */
const workBound = 40_000_000

/**
 * @param reach how far a stretch may be from a face and still lie on it
 * @param beat called often
 * @returns for a stretch with these ends and these faces ending at it: whether other faces cover all of it
 */
export const coverFinder = (
  points: readonly Vec3[],
  faces: readonly Cycled[],
  reach: number,
  beat: () => void,
): ((ends: readonly [number, number], own: readonly number[]) => boolean) => {
  const prepared = faces.map(({ cycle }): Prepared => {
    const corners = cycle.map((v) => points[v]!)
    const low = [0, 1, 2].map((k) => corners.reduce((m, p) => Math.min(m, p[k]!), Infinity) - reach) as unknown as Vec3
    const high = [0, 1, 2].map(
      (k) => corners.reduce((m, p) => Math.max(m, p[k]!), -Infinity) + reach,
    ) as unknown as Vec3
    return { points: corners, low, high, plane: null }
  })
  let work = 0
  return ([i, j], own) => {
    const a = points[i]!
    const b = points[j]!
    const length = distance(a, b)
    const covered: (readonly [number, number])[] = []
    beat()
    work += prepared.length
    if (work > workBound) return false
    prepared.forEach((face, f) => {
      for (let k = 0; k < 3; k++)
        if (Math.max(a[k]!, b[k]!) < face.low[k]! || Math.min(a[k]!, b[k]!) > face.high[k]!) return
      if (own.includes(f)) return
      face.plane ??= planeOf(face.points)
      const { normal, offset } = face.plane
      if (Math.abs(dot(normal, a) - offset) > reach || Math.abs(dot(normal, b) - offset) > reach) return
      covered.push(...stretchesInside(face.points, normal, a, b, reach))
    })
    covered.sort((x, y) => x[0] - y[0])
    let to = 0
    for (const [from, end] of covered) if (from <= to + reach / length) to = Math.max(to, end)
    return to >= 1 - reach / length
  }
}

/** Parameters from..to on a→b, which lies in the face's plane, that are inside the face or on its rim. */
const stretchesInside = (
  face: readonly Vec3[],
  normal: Vec3,
  a: Vec3,
  b: Vec3,
  reach: number,
): (readonly [number, number])[] => {
  const d = sub(b, a)
  const length = norm(d)
  // In the plane: along the stretch and across it.
  const u: Vec3 = [d[0] / length, d[1] / length, d[2] / length]
  const v = cross(normal, u)
  const ring = face.map((p): Vec2 => {
    const e = sub(p, a)
    return [dot(e, u), dot(e, v)]
  })
  const stops = [0, length]
  ring.forEach((p, i) => {
    const q = ring[(i + 1) % ring.length]!
    if (Math.abs(p[1]) <= reach) stops.push(p[0])
    if (p[1] > 0 !== q[1] > 0) stops.push(p[0] + ((q[0] - p[0]) * p[1]) / (p[1] - q[1]))
  })
  const inner = stops.filter((s) => s >= 0 && s <= length).sort((x, y) => x - y)
  const found: (readonly [number, number])[] = []
  for (let i = 0; i + 1 < inner.length; i++) {
    const from = inner[i]!
    const to = inner[i + 1]!
    if (to - from <= reach / 4) continue
    const m: Vec2 = [(from + to) / 2, 0]
    if (onRim(ring, m, reach) || windingNumber(ring, m) !== 0) found.push([from / length, to / length])
  }
  return found
}

const onRim = (ring: readonly Vec2[], m: Vec2, reach: number): boolean =>
  ring.some((p, i) => {
    const q = ring[(i + 1) % ring.length]!
    const dx = q[0] - p[0]
    const dy = q[1] - p[1]
    const l2 = dx * dx + dy * dy
    if (l2 === 0) return false
    const t = Math.min(1, Math.max(0, ((m[0] - p[0]) * dx + (m[1] - p[1]) * dy) / l2))
    return Math.hypot(p[0] + t * dx - m[0], p[1] + t * dy - m[1]) <= reach
  })

/** Convex hulls, and whether something can be turned so that it fits a rectangle. */

/**
 * Convex hull of points given as x0, y0, x1, y1, …: counter-clockwise, no three on a line (monotone chain, Andrew,
 * Information Processing Letters 9, 1979).
 */
export const convexHull = (points: ArrayLike<number>): Float64Array => {
  const n = points.length / 2
  const order = byX(points, n)
  const hull = new Float64Array(2 * n + 2)
  let m = 0
  let floor = 0
  for (let k = 0; k < 2 * n - 1; k++) {
    // To the right along the lower side, then back along the upper one.
    if (k === n) floor = m - 2
    const i = order[k < n ? k : 2 * n - 2 - k]!
    const x = points[i]!
    const y = points[i + 1]!
    while (
      m >= floor + 4 &&
      (hull[m - 2]! - hull[m - 4]!) * (y - hull[m - 3]!) - (hull[m - 1]! - hull[m - 3]!) * (x - hull[m - 4]!) <= 0
    )
      m -= 2
    hull[m++] = x
    hull[m++] = y
  }
  return hull.slice(0, Math.max(2, m - 2))
}

/** Places of the points in the array, by x and then y. Few points, nearly sorted in runs: insertion is fastest. */
const byX = (points: ArrayLike<number>, n: number): Int32Array => {
  const order = new Int32Array(n)
  for (let i = 0; i < n; i++) order[i] = 2 * i
  if (n > 96) return order.sort((a, b) => points[a]! - points[b]! || points[a + 1]! - points[b + 1]!)
  for (let i = 1; i < n; i++) {
    const p = order[i]!
    const x = points[p]!
    const y = points[p + 1]!
    let k = i
    for (; k > 0; k--) {
      const q = order[k - 1]!
      const d = points[q]! - x
      if (d < 0 || (d === 0 && points[q + 1]! <= y)) break
      order[k] = q
    }
    order[k] = p
  }
  return order
}

/** Size of the box round the points when they are turned by the angle counter-clockwise (its cosine and sine). */
export const turnedBox = (
  points: ArrayLike<number>,
  c: number,
  s: number,
): { minX: number; minY: number; maxX: number; maxY: number } => {
  let minX = Number.POSITIVE_INFINITY
  let minY = Number.POSITIVE_INFINITY
  let maxX = Number.NEGATIVE_INFINITY
  let maxY = Number.NEGATIVE_INFINITY
  for (let i = 0; i < points.length; i += 2) {
    const x = c * points[i]! - s * points[i + 1]!
    const y = s * points[i]! + c * points[i + 1]!
    if (x < minX) minX = x
    if (x > maxX) maxX = x
    if (y < minY) minY = y
    if (y > maxY) maxY = y
  }
  return { minX, minY, maxX, maxY }
}

/** Whether points turned by the angle (radians) fit into width × height, upright. */
export const fitsAt = (points: ArrayLike<number>, angle: number, width: number, height: number): boolean => {
  const { minX, minY, maxX, maxY } = turnedBox(points, Math.cos(angle), Math.sin(angle))
  return maxX - minX <= width && maxY - minY <= height
}

/**
 * An angle in radians, 0 ≤ angle < π, by which the convex hull can be turned so that it fits into width × height, or
 * null if there is none. Exact: between two directions of hull sides (modulo a right angle) width and height are single
 * cosines, so it is enough to try the ends of these intervals and the angles where a cosine meets its limit.
 */
export const fittingAngle = (hull: ArrayLike<number>, width: number, height: number): number | null => {
  const { minX, minY, maxX, maxY } = turnedBox(hull, 1, 0)
  if (maxX - minX <= width && maxY - minY <= height) return 0
  if (maxX - minX <= height && maxY - minY <= width) return Math.PI / 2
  // Cheap refusals: the area, and a diagonal longer than that of the rectangle.
  if (hullArea(hull) > width * height) return null
  const diagonal2 = width * width + height * height
  if ((maxX - minX) ** 2 > diagonal2 || (maxY - minY) ** 2 > diagonal2) return null

  const quarter = Math.PI / 2
  const stops: number[] = [0, quarter]
  const n = hull.length
  for (let i = n - 2, j = 0; j < n; i = j, j += 2) {
    const a = -Math.atan2(hull[j + 1]! - hull[i + 1]!, hull[j]! - hull[i]!)
    stops.push(a - quarter * Math.floor(a / quarter))
  }
  stops.sort((a, b) => a - b)
  const slack = 1e-9
  for (let k = 0; k + 1 < stops.length; k++) {
    const from = stops[k]!
    const to = stops[k + 1]!
    if (to - from < 1e-12) continue
    const { wide, high } = spans(hull, (from + to) / 2)
    const tries = [from, to]
    for (const limit of [width, height])
      for (const [dx, dy] of [wide, [high[1], -high[0]] as const]) {
        // Extent along the turned axis: |d| cos(angle + direction of d).
        const size = Math.hypot(dx, dy)
        if (size <= limit || limit <= 0) continue
        const base = -Math.atan2(dy, dx)
        const half = Math.acos(limit / size)
        tries.push(wrapNear(base + half, from), wrapNear(base - half, from))
      }
    for (const angle of tries) {
      if (angle < from - slack || angle > to + slack) continue
      const c = Math.cos(angle)
      const s = Math.sin(angle)
      const x = c * wide[0] - s * wide[1]
      const y = s * high[0] + c * high[1]
      if (x <= width + slack && y <= height + slack) return angle
      if (x <= height + slack && y <= width + slack) return angle + quarter
    }
  }
  return null
}

const wrapNear = (angle: number, from: number): number => {
  const turn = 2 * Math.PI
  return angle - turn * Math.floor((angle - from + 1e-9) / turn)
}

/** The vectors between the extreme points in x and in y when the hull is turned by the angle. */
const spans = (
  hull: ArrayLike<number>,
  angle: number,
): { wide: readonly [number, number]; high: readonly [number, number] } => {
  const c = Math.cos(angle)
  const s = Math.sin(angle)
  let left = 0
  let right = 0
  let low = 0
  let top = 0
  let minX = Number.POSITIVE_INFINITY
  let minY = Number.POSITIVE_INFINITY
  let maxX = Number.NEGATIVE_INFINITY
  let maxY = Number.NEGATIVE_INFINITY
  for (let i = 0; i < hull.length; i += 2) {
    const x = c * hull[i]! - s * hull[i + 1]!
    const y = s * hull[i]! + c * hull[i + 1]!
    if (x < minX) {
      minX = x
      left = i
    }
    if (x > maxX) {
      maxX = x
      right = i
    }
    if (y < minY) {
      minY = y
      low = i
    }
    if (y > maxY) {
      maxY = y
      top = i
    }
  }
  return {
    wide: [hull[right]! - hull[left]!, hull[right + 1]! - hull[left + 1]!],
    high: [hull[top]! - hull[low]!, hull[top + 1]! - hull[low + 1]!],
  }
}

const hullArea = (hull: ArrayLike<number>): number => {
  let twice = 0
  const n = hull.length
  for (let i = n - 2, j = 0; j < n; i = j, j += 2) twice += hull[i]! * hull[j + 1]! - hull[j]! * hull[i + 1]!
  return twice / 2
}

/**
 * The angle in [0, π) that gives the turned hull the least of max(width / w, height / h), i.e. the most room in the
 * rectangle w × h; a multiple of it is the scale at which it would just fit. Found on the sides' directions, as for the
 * least rectangle round a convex polygon (Freeman and Shapira, Comm. ACM 18, 1975); here a very good one, not the best.
 */
export const roomiestAngle = (hull: ArrayLike<number>, width: number, height: number): number => {
  let best = 0
  let least = Number.POSITIVE_INFINITY
  const n = hull.length
  for (let i = n - 2, j = 0; j < n; i = j, j += 2) {
    const a = -Math.atan2(hull[j + 1]! - hull[i + 1]!, hull[j]! - hull[i]!)
    for (const turn of [0, Math.PI / 2]) {
      const angle = a + turn - Math.PI * Math.floor((a + turn) / Math.PI)
      const box = turnedBox(hull, Math.cos(angle), Math.sin(angle))
      const load = Math.max((box.maxX - box.minX) / width, (box.maxY - box.minY) / height)
      if (load < least - 1e-9) {
        least = load
        best = angle
      }
    }
  }
  if (least <= 1) return best
  return fittingAngle(hull, width, height) ?? best
}

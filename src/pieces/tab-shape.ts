/**
 * The shape of one tab, in the frame of its crease: x along the crease from 0 to its length, y away from the panel that
 * carries it. Folded over, the tab keeps these coordinates on the back of the panel across the seam, y then running into
 * that panel; so what stands in the way in the flat and what bounds it behind are obstacles in one frame.
 */

/** A convex obstacle: points x0, y0, x1, y1, …; two points are a segment. The tab keeps `gap` mm away from it. */
export interface Obstacle {
  readonly points: ArrayLike<number>
  readonly gap: number
  /** What the builder would call it. */
  readonly why: 'flat' | 'behind'
}

/** A trapezoid with its root on the crease from x0 to x1 and end angles in degrees. */
export interface TabShape {
  readonly x0: number
  readonly x1: number
  readonly depth: number
  readonly startAngle: number
  readonly endAngle: number
}

export interface TabLimits {
  /** Greatest depth in mm, and the least that still holds. */
  readonly depth: number
  readonly leastDepth: number
  /** Widest end angles in degrees at x = 0 and at x = length. */
  readonly startAngle: number
  readonly endAngle: number
  /** Least length of the root and of the free edge, mm. */
  readonly leastRoot: number
  readonly leastTop: number
}

const cot = (degrees: number): number => 1 / Math.tan((degrees * Math.PI) / 180)
const sin = (degrees: number): number => Math.sin((degrees * Math.PI) / 180)

/** Glued area in mm². */
export const tabArea = (t: TabShape): number =>
  t.depth * (t.x1 - t.x0 - (t.depth * (cot(t.startAngle) + cot(t.endAngle))) / 2)

/** Corners, root first: (x1, 0), (x0, 0), then the free edge back. Counter-clockwise once mapped to the piece's plane. */
export const tabCorners = (t: TabShape): [number, number][] => [
  [t.x1, 0],
  [t.x0, 0],
  [t.x0 + t.depth * cot(t.startAngle), t.depth],
  [t.x1 - t.depth * cot(t.endAngle), t.depth],
]

/** Depths and end angles are tried in these steps; the result is the largest of what fits. */
const depthSteps = [1, 0.85, 0.7, 0.55, 0.4, 0.25]
const angleSteps = [1, 0.7, 0.45, 0.3]

/**
 * Trapezoids that fit, the largest glued area first, at most one for each depth.
 * @param length of the crease in mm
 */
export const tabShapes = (length: number, obstacles: readonly Obstacle[], limits: TabLimits): TabShape[] => {
  const depths = new Set(depthSteps.map((k) => Math.max(limits.leastDepth, k * limits.depth)))
  const found: TabShape[] = []
  for (const depth of depths) {
    const best = largestAt(length, depth, obstacles, limits)
    if (best) found.push(best)
  }
  return found.sort((a, b) => tabArea(b) - tabArea(a))
}

/** An obstacle as far as it matters at one depth. */
interface Near {
  readonly from: number
  readonly to: number
  readonly gap: number
  /** Points beside the tab (0 ≤ y ≤ depth + gap), and how far it reaches left and right just below the crease line. */
  readonly beside: readonly number[]
  readonly lowFrom: number
  readonly lowTo: number
}

const largestAt = (
  length: number,
  depth: number,
  obstacles: readonly Obstacle[],
  limits: TabLimits,
): TabShape | undefined => {
  const near: Near[] = []
  for (const { points, gap, why } of obstacles) {
    const beside = between(points, 0, depth + gap)
    const low = why === 'flat' ? between(points, -gap, 0) : []
    if (beside.length === 0 && low.length === 0) continue
    let [from, to, lowFrom, lowTo] = [Infinity, -Infinity, Infinity, -Infinity]
    for (let i = 0; i < beside.length; i += 2) {
      from = Math.min(from, beside[i]!)
      to = Math.max(to, beside[i]!)
    }
    for (let i = 0; i < low.length; i += 2) {
      lowFrom = Math.min(lowFrom, low[i]!)
      lowTo = Math.max(lowTo, low[i]!)
    }
    from = Math.min(from, lowFrom)
    to = Math.max(to, lowTo)
    if (to < -2 * depth - length || from > 2 * length + 2 * depth) continue
    near.push({ from: from - gap, to: to + gap, gap, beside, lowFrom, lowTo })
  }
  let best: TabShape | undefined
  for (const column of freeColumns(near, length)) {
    for (const a of angleSteps)
      for (const b of angleSteps) {
        const startAngle = a * limits.startAngle
        const endAngle = b * limits.endAngle
        let x0 = 0
        let x1 = length
        for (const o of near)
          if (o.to <= column) x0 = Math.max(x0, leftBound(o, startAngle))
          else x1 = Math.min(x1, -leftBound(mirrored(o), endAngle))
        const shape = { x0, x1, depth, startAngle, endAngle }
        const top = x1 - x0 - depth * (cot(startAngle) + cot(endAngle))
        if (x1 - x0 < limits.leastRoot || top < limits.leastTop) continue
        if (!best || tabArea(shape) > tabArea(best) + 1e-9) best = shape
      }
  }
  return best
}

/** The least x0 at which the tab's slanted start keeps its gap from an obstacle to its left. */
const leftBound = (o: Near, angle: number): number => {
  const slope = cot(angle)
  const inset = o.gap / sin(angle)
  let bound = o.lowTo + o.gap
  for (let i = 0; i < o.beside.length; i += 2) bound = Math.max(bound, o.beside[i]! - o.beside[i + 1]! * slope + inset)
  return bound
}

const mirrored = (o: Near): Near => ({
  ...o,
  beside: o.beside.map((v, i) => (i % 2 === 0 ? -v : v)),
  lowTo: -o.lowFrom,
})

/** One x in each stretch of the crease over which nothing stands, obstacles being spread by their gaps. */
const freeColumns = (near: readonly Near[], length: number): number[] => {
  const taken = near.map((o): [number, number] => [o.from, o.to]).sort((a, b) => a[0] - b[0])
  const columns: number[] = []
  let reached = 0
  for (const [from, to] of taken) {
    if (from >= length) break
    if (from > reached + 1e-6) columns.push((reached + from) / 2)
    reached = Math.max(reached, to)
  }
  if (reached < length - 1e-6) columns.push((reached + length) / 2)
  return columns
}

/** A convex polygon or segment between two heights: corner points of what is left. */
const between = (points: ArrayLike<number>, low: number, high: number): number[] => {
  const out: number[] = []
  const n = points.length
  for (let i = n - 2, j = 0; j < n; i = j, j += 2) {
    const [ax, ay, bx, by] = [points[i]!, points[i + 1]!, points[j]!, points[j + 1]!]
    for (const level of [low, high])
      if (ay < level !== by < level) out.push(ax + ((level - ay) / (by - ay)) * (bx - ax), level)
    if (by >= low && by <= high) out.push(bx, by)
  }
  return out
}

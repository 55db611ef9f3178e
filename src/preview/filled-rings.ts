/**
 * The filled region of one polygon with self-crossing edges (a star polygon) as simple rings that can be triangulated
 * and outlined.
 */
import { cross2, signedArea, sub2, type Vec2, windingNumber } from '../geometry/vec2'
import { add, dot, planeFrame, scale, sub, type Vec3 } from '../geometry/vec3'

type FillRule = 'nonzero' | 'evenodd'

/** One connected part: its outer ring counter-clockwise seen from the tip of the normal, then its holes clockwise. */
export type Polygon3 = Vec3[][]

/** Relative to the polygon's size; crossings nearer than ten times this are one point. */
const tolerance = 1e-9
/** How far beside the middle of an edge its two sides are tried, relative to its length. */
const probeStep = 1e-6

/** Parameter of the point on a→b where the line c→d crosses it within c…d, or NaN. */
const crossing = (a: Vec2, b: Vec2, c: Vec2, d: Vec2): number => {
  const u = sub2(b, a)
  const v = sub2(d, c)
  const det = cross2(u, v)
  if (Math.abs(det) < tolerance * tolerance) return Number.NaN
  const s = cross2(sub2(c, a), v) / det
  const t = cross2(sub2(c, a), u) / det
  return t > -tolerance && t < 1 + tolerance ? s : Number.NaN
}

interface Step {
  readonly from: number
  readonly to: number
  used: boolean
}

/**
 * Splits a plane polygon, given by its vertex cycle, into simple rings by the fill rule: nonzero fills a star whole,
 * even-odd leaves its twice-covered parts open. Every edge is cut where the others cross it; the pieces with filled
 * ground on one side only are the outline; walked with the ground on the left and the sharpest left turn at each
 * corner, parts that only touch at a corner come apart.
 *
 * @param cycle vertices in the order of the edges, in one plane, any unit
 * @param normal unit normal of the plane, the side from which counter-clockwise is told
 */
export const filledRings = (cycle: readonly Vec3[], normal: Vec3, rule: FillRule): Polygon3[] => {
  const origin = cycle[0]
  if (!origin) return []
  const { u, v } = planeFrame(normal)
  const ring = cycle.map((p): Vec2 => [dot(sub(p, origin), u), dot(sub(p, origin), v)])
  const size = Math.max(...ring.map(([x, y]) => Math.hypot(x, y)))
  if (!(size > 0)) return []
  const unit = ring.map(([x, y]): Vec2 => [x / size, y / size])

  const points: Vec2[] = []
  const pointId = (p: Vec2): number => {
    const found = points.findIndex((q) => Math.hypot(q[0] - p[0], q[1] - p[1]) < 10 * tolerance)
    return found >= 0 ? found : points.push(p) - 1
  }
  const isFilled = (p: Vec2): boolean => {
    const w = windingNumber(unit, p)
    return rule === 'nonzero' ? w !== 0 : w % 2 !== 0
  }

  const steps = new Map<string, Step>()
  unit.forEach((a, i) => {
    const b = unit[(i + 1) % unit.length]!
    const cuts = [0, 1]
    unit.forEach((c, j) => {
      if (j === i) return
      const s = crossing(a, b, c, unit[(j + 1) % unit.length]!)
      if (s > tolerance && s < 1 - tolerance) cuts.push(s)
    })
    cuts.sort((x, y) => x - y)
    const at = (s: number): Vec2 => [a[0] + s * (b[0] - a[0]), a[1] + s * (b[1] - a[1])]
    for (let k = 0; k + 1 < cuts.length; k++) {
      const from = pointId(at(cuts[k]!))
      const to = pointId(at(cuts[k + 1]!))
      if (from === to) continue
      const p = points[from]!
      const q = points[to]!
      const m: Vec2 = [(p[0] + q[0]) / 2, (p[1] + q[1]) / 2]
      const n: Vec2 = [-(q[1] - p[1]) * probeStep, (q[0] - p[0]) * probeStep]
      const left = isFilled([m[0] + n[0], m[1] + n[1]])
      const right = isFilled([m[0] - n[0], m[1] - n[1]])
      if (left && !right) steps.set(`${from}>${to}`, { from, to, used: false })
      if (right && !left) steps.set(`${to}>${from}`, { from: to, to: from, used: false })
    }
  })

  const leaving = new Map<number, Step[]>()
  for (const step of steps.values()) leaving.set(step.from, [...(leaving.get(step.from) ?? []), step])
  const sharpestLeft = (step: Step): Step | undefined => {
    const d = sub2(points[step.to]!, points[step.from]!)
    let best: Step | undefined
    let bestTurn = Number.NEGATIVE_INFINITY
    for (const next of leaving.get(step.to) ?? []) {
      const e = sub2(points[next.to]!, points[next.from]!)
      const turn = Math.atan2(cross2(d, e), d[0] * e[0] + d[1] * e[1])
      if (turn > bestTurn) {
        bestTurn = turn
        best = next
      }
    }
    return best
  }

  const outers: Vec2[][] = []
  const holes: Vec2[][] = []
  for (const first of steps.values()) {
    if (first.used) continue
    const path: Vec2[] = []
    for (let step: Step | undefined = first; step && !step.used; step = sharpestLeft(step)) {
      step.used = true
      path.push(points[step.from]!)
    }
    // Edges that all but coincide may leave a walk without ground.
    if (path.length >= 3) (signedArea(path) > 0 ? outers : holes).push(path)
  }

  const toSpace = (path: readonly Vec2[]): Vec3[] =>
    path.map(([x, y]) => add(origin, add(scale(u, x * size), scale(v, y * size))))
  const polygons = outers.map((outer) => ({ outer, holes: [] as Vec2[][] }))
  for (const hole of holes) {
    // The smallest outer ring around a point just inside the filled side of the hole's first edge.
    const [p, q] = [hole[0]!, hole[1]!]
    const probe: Vec2 = [(p[0] + q[0]) / 2 - (q[1] - p[1]) * probeStep, (p[1] + q[1]) / 2 + (q[0] - p[0]) * probeStep]
    const around = polygons.filter((g) => windingNumber(g.outer, probe) !== 0)
    around.sort((a, b) => signedArea(a.outer) - signedArea(b.outer))
    around[0]?.holes.push(hole)
  }
  return polygons.map((g) => [toSpace(g.outer), ...g.holes.map(toSpace)])
}

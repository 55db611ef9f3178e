/**
 * From where a piece is seen best: its panels turned to the viewer, and as little of the model in between as may be. Many
 * pieces are cups or pits whose panels face each other, so the mean of their normals says nothing.
 */
import type { Plan, PlanPanel, Point3 } from '../../plan/types'

const dot = (a: Point3, b: Point3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
const minus = (a: Point3, b: Point3): Point3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]

/** Evenly spread over the sphere: a Fibonacci lattice. */
const directions: readonly Point3[] = Array.from({ length: 320 }, (_, i): Point3 => {
  const z = 1 - (2 * i + 1) / 320
  const r = Math.sqrt(1 - z * z)
  const turn = i * Math.PI * (3 - Math.sqrt(5))
  return [r * Math.cos(turn), r * Math.sin(turn), z]
})

interface Wall {
  readonly panel: PlanPanel
  readonly offset: number
  readonly middle: Point3
  readonly radius: number
  /** The two coordinates that the panel is seen along best. */
  readonly axes: readonly [0 | 1 | 2, 0 | 1 | 2]
}

const walls = new WeakMap<Plan, readonly Wall[]>()
const wallsOf = (plan: Plan): readonly Wall[] => {
  const known = walls.get(plan)
  if (known) return known
  const made = plan.panels.map((panel): Wall => {
    const ring = panel.rings[0]!
    const middle: Point3 = [0, 1, 2].map((k) => ring.reduce((sum, p) => sum + p[k]!, 0) / ring.length) as Point3
    const radius = Math.max(...ring.map((p) => Math.hypot(...minus(p, middle))))
    const [x, y, z] = panel.normal.map(Math.abs) as Point3
    const axes = x >= y && x >= z ? ([1, 2] as const) : y >= z ? ([0, 2] as const) : ([0, 1] as const)
    return { panel, offset: dot(panel.normal, ring[0]!), middle, radius, axes }
  })
  walls.set(plan, made)
  return made
}

/** Even-odd over all rings, so that holes are holes. */
const covers = ({ panel, axes: [i, j] }: Wall, p: Point3): boolean => {
  let inside = false
  for (const ring of panel.rings)
    for (let k = 0, last = ring.length - 1; k < ring.length; last = k++) {
      const a = ring[k]!
      const b = ring[last]!
      if (a[j] > p[j] === b[j] > p[j]) continue
      if (p[i] < a[i] + ((p[j] - a[j]) * (b[i] - a[i])) / (b[j] - a[j])) inside = !inside
    }
  return inside
}

/** A point well inside a panel: of the middles between its corners, and of all of them, the first that it covers. */
const insideOf = (wall: Wall): Point3 => {
  if (covers(wall, wall.middle)) return wall.middle
  const ring = wall.panel.rings[0]!
  for (let step = 2; step < ring.length; step++)
    for (let k = 0; k < ring.length; k++) {
      const [a, b] = [ring[k]!, ring[(k + step) % ring.length]!]
      const middle: Point3 = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2, (a[2] + b[2]) / 2]
      if (covers(wall, middle)) return middle
    }
  return wall.middle
}

/** A ray from `p` along `d` meets the panel. */
const blocks = (wall: Wall, p: Point3, d: Point3): boolean => {
  const to = minus(wall.middle, p)
  const along = dot(to, d)
  if (along < -wall.radius || dot(to, to) - along * along > wall.radius * wall.radius) return false
  const { normal } = wall.panel
  const slope = dot(normal, d)
  if (Math.abs(slope) < 1e-9) return false
  const t = (wall.offset - dot(normal, p)) / slope
  return t > 1e-4 * wall.radius && covers(wall, [p[0] + t * d[0], p[1] + t * d[1], p[2] + t * d[2]])
}

/** So many panels of the piece are looked at, the largest ones. */
const lookedAt = 16

/**
 * @param shown panel ids that are on the model, those of the piece included
 * @returns unit vector from the model to the viewer
 */
export const vantage = (plan: Plan, piece: number, shown: ReadonlySet<number>): Point3 => {
  const mine = new Set(plan.pieces.find(({ id }) => id === piece)?.panels.map(({ panel }) => panel))
  const all = wallsOf(plan).filter(({ panel }) => shown.has(panel.id))
  const own = all
    .filter(({ panel }) => mine.has(panel.id))
    .sort((a, b) => b.panel.areaMm2 - a.panel.areaMm2)
    .slice(0, lookedAt)
  const area = own.reduce((sum, { panel }) => sum + panel.areaMm2, 0)
  if (area === 0) return [0, 0, 1]
  const middle = [0, 1, 2].map((k) => own.reduce((sum, w) => sum + w.middle[k]! * w.panel.areaMm2, 0) / area) as Point3
  const far = Math.hypot(...middle) || 1
  // Of two equal views the one that looks at the model's near side.
  const outward = (d: Point3): number => (0.2 * area * dot(d, middle)) / far
  const turned = (d: Point3): number =>
    own.reduce((sum, { panel }) => sum + panel.areaMm2 * Math.max(0, dot(panel.normal, d)), 0)
  const ranked = directions.map((d) => ({ d, score: turned(d) + outward(d) })).sort((a, b) => b.score - a.score)
  const places = own.map((wall) => ({ wall, at: insideOf(wall) }))
  const seen = (d: Point3): number =>
    places.reduce((sum, { wall, at }) => {
      const facing = dot(wall.panel.normal, d)
      if (facing <= 0 || all.some((other) => other !== wall && blocks(other, at, d))) return sum
      return sum + wall.panel.areaMm2 * facing
    }, 0)
  let chosen = ranked[0]!.d
  let most = Number.NEGATIVE_INFINITY
  for (const { d, score: atMost } of ranked) {
    // What stands in the way can only take away.
    if (atMost <= most) break
    const score = seen(d) + outward(d)
    if (score <= most) continue
    most = score
    chosen = d
  }
  return chosen
}

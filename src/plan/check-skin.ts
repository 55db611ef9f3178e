/** Checks of a plan's model in space: panels, closing, creases, angles, bodies. */
import { add, cross, distance, dot, norm, scale, sub, type Vec3 } from '../geometry/vec3'
import { offPlaneMm, type PlanIndex, verdict, within } from './check-support'
import type { PlanCheck, PlanPanel, Point3 } from './types'

const zero: Vec3 = [0, 0, 0]

/** Half the sum of cross products of a ring's points: its area times its normal (Newell's method). */
const ringVector = (ring: readonly Point3[]): Vec3 => {
  // About the first point, not the origin, so that no large terms cancel.
  const origin = ring[0]!
  let sum = zero
  for (let i = 1; i + 1 < ring.length; i++) sum = add(sum, cross(sub(ring[i]!, origin), sub(ring[i + 1]!, origin)))
  return scale(sum, 0.5)
}

export const panelVector = (panel: PlanPanel): Vec3 => panel.rings.map(ringVector).reduce(add, zero)

export const panelsAreTrue = ({ plan, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const panel of plan.panels) {
    const say = (what: string): number => faults.push(`panel ${panel.id}: ${what}`)
    if (panel.rings.length === 0 || panel.rings.some((ring) => ring.length < 3)) {
      say('a ring of fewer than three points')
      continue
    }
    const vector = panelVector(panel)
    const area = norm(vector)
    // A crooked ring edge shifts the area by up to the tolerance times the outline.
    const slack = near * Math.sqrt(area) + near * near
    if (!within(norm(panel.normal), 1, 3e-6)) say(`normal of length ${norm(panel.normal)}`)
    else if (!(norm(sub(vector, scale(panel.normal, area))) <= 1e-3 * area + slack))
      say('rings are not CCW seen from outside')
    if (!within(area, panel.areaMm2, 1e-6 * area + slack)) say(`area is ${area} mm², not ${panel.areaMm2}`)
    const height = dot(panel.normal, panel.rings[0]![0]!)
    for (const point of panel.rings.flat())
      if (!within(dot(panel.normal, point), height, near)) {
        say(`not flat by ${Math.abs(dot(panel.normal, point) - height)} mm`)
        break
      }
    if (dot(ringVector(panel.rings[0]!), panel.normal) <= 0) say('the outer ring does not come first')
    if (panel.rings.slice(1).some((hole) => dot(ringVector(hole), panel.normal) >= 0)) say('a hole that is not CW')
  }
  return verdict('panels are flat and true', faults, `${plan.panels.length} panels`)
}

/** The area vectors of a closed surface sum to zero; so do those of each body, and its volume is not negative. */
export const skinCloses = ({ plan, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const sums = new Map<number, { vector: Vec3; area: number; volume: number }>()
  let farthest = 0
  for (const panel of plan.panels) {
    const vector = panelVector(panel)
    const sum = sums.get(panel.body) ?? { vector: zero, area: 0, volume: 0 }
    sums.set(panel.body, {
      vector: add(sum.vector, vector),
      area: sum.area + norm(vector),
      volume: sum.volume + dot(panel.rings[0]![0]!, vector) / 3,
    })
    for (const point of panel.rings.flat()) farthest = Math.max(farthest, norm(point))
  }
  for (const [body, { vector, area, volume }] of sums) {
    if (!(norm(vector) <= 1e-6 * area)) faults.push(`body ${body}: area vectors sum to ${norm(vector)} of ${area} mm²`)
    if (!(volume >= -1e-6 * area)) faults.push(`body ${body}: inside out, volume ${volume} mm³`)
  }
  if (!within(2 * farthest, plan.model.heightMm, 2 * near))
    faults.push(`the farthest point lies on a sphere of ${2 * farthest} mm, not ${plan.model.heightMm}`)
  if (sums.size !== plan.docket.bodies) faults.push(`${sums.size} bodies, the docket says ${plan.docket.bodies}`)
  return verdict('skin closes', faults, `${sums.size} closed ${sums.size === 1 ? 'body' : 'bodies'}`)
}

interface Stretch {
  readonly crease: number
  readonly from: number
  readonly to: number
}

/**
 * Each ring edge must be covered by creases end to end, without overlap, and each crease must lie along one ring edge of
 * its first panel (same direction) and one of its second (other direction). So each stretch of edge has its one partner.
 */
export const creasesCover = ({ plan, panels, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const wanted = new Map<number, { crease: number; from: Point3; to: Point3 }[]>()
  for (const { id, panels: sides, ends } of plan.creases) {
    if (sides[0] === sides[1]) faults.push(`crease ${id}: the same panel on both sides`)
    if (!(distance(ends[0], ends[1]) > near)) faults.push(`crease ${id}: no length`)
    sides.forEach((side, i) => {
      const entry = { crease: id, from: ends[i]!, to: ends[1 - i]! }
      const list = wanted.get(side)
      if (list) list.push(entry)
      else wanted.set(side, [entry])
    })
  }
  for (const panel of panels.values()) {
    const edges = panel.rings.flatMap((ring) =>
      ring.map((from, i) => {
        const to = ring[(i + 1) % ring.length]!
        const length = distance(from, to)
        return { from, length, along: scale(sub(to, from), 1 / length), covered: [] as Stretch[] }
      }),
    )
    for (const { crease, from, to } of wanted.get(panel.id) ?? []) {
      const edge = edges.find((e) => {
        const a = dot(sub(from, e.from), e.along)
        const b = dot(sub(to, e.from), e.along)
        const on = (p: Point3, t: number): boolean => distance(p, add(e.from, scale(e.along, t))) <= 2 * near
        return b > a && a >= -2 * near && b <= e.length + 2 * near && on(from, a) && on(to, b)
      })
      if (!edge) faults.push(`crease ${crease}: lies along no edge of panel ${panel.id}`)
      else {
        const at = (p: Point3): number => dot(sub(p, edge.from), edge.along)
        edge.covered.push({ crease, from: at(from), to: at(to) })
      }
    }
    for (const { covered, length } of edges) {
      covered.sort((s, t) => s.from - t.from)
      let reached = 0
      const meets = covered.every(({ from, to }) => {
        const joins = within(from, reached, 4 * near)
        reached = to
        return joins
      })
      if (!meets || !within(reached, length, 4 * near))
        faults.push(`panel ${panel.id}: an edge of ${length} mm is not covered end to end by creases`)
    }
  }
  return verdict('creases cover every ring', faults, `${plan.creases.length} creases`)
}

/**
 * The angle between the backs of two panels from their normals alone: 180 degrees less the angle between the normals at
 * a mountain, and more at a valley. A mountain is where n₁ × n₂ runs along the crease as the first panel's ring does.
 */
export const anglesAgree = ({ plan, panels }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const loose = offPlaneMm(plan)
  for (const { id, panels: sides, ends, innerAngle } of plan.creases) {
    // Degrees; normals may be written to six places, and an edge a little off its panels' planes tilts against them.
    const slack = 3e-4 + (60 * loose) / distance(...ends)
    const [first, second] = [panels.get(sides[0])!.normal, panels.get(sides[1])!.normal]
    const turn = cross(first, second)
    const between = (Math.atan2(norm(turn), dot(first, second)) * 180) / Math.PI
    const mountain = dot(turn, sub(ends[1], ends[0])) > 0
    const inner = mountain ? 180 - between : 180 + between
    // Panels back to back on one plane (0 or 360 degrees) leave the turn without a direction.
    const backToBack = between > 180 - slack && (within(innerAngle, 0, slack) || within(innerAngle, 360, slack))
    if (!within(inner, innerAngle, slack) && !backToBack)
      faults.push(`crease ${id}: inner angle ${innerAngle}°, its panels say ${inner}°`)
  }
  return verdict('inner angles agree', faults, `${plan.creases.length} angles`)
}

/** Creases on the surface stay within one body; bodies meet along line contacts only. */
export const bodiesKeepApart = ({ plan, panels }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const { id, panels: sides, contact } of plan.creases) {
    const [first, second] = sides.map((side) => panels.get(side)!.body)
    if (contact === 'surface' && first !== second)
      faults.push(`crease ${id}: joins bodies ${first} and ${second} on the surface`)
  }
  return verdict('bodies keep apart', faults, 'they meet along lines only')
}

/**
 * Where panels meet: the panel sides round every edge in order of angle, and neighbouring edges on one line with the same
 * panels grown together into stretches. Along a stretch, outside sectors and inside wedges take turns.
 */
import { BrokenPromise } from '../errors'
import { UnionFind } from '../geometry/union-find'
import { cross, distance, dot, normalize, planeFrame, sub, type Vec3 } from '../geometry/vec3'
import type { RawPanel } from './panels'

/** One panel edge in a fan. */
export interface Blade {
  readonly panel: number
  readonly ring: number
  readonly edge: number
  /** The ring runs along the fan's direction: the outside then follows, turning counter-clockwise about it. */
  readonly aligned: boolean
  /** Radians about the fan's direction, from the first blade. */
  readonly angle: number
}

export interface Stretch {
  /** Point numbers; the fan's direction runs from the first to the second. */
  readonly from: number
  readonly to: number
  /** Blades in order of angle, starting with an aligned one: outside sectors lie between 0–1, 2–3, …, wedges between. */
  readonly blades: readonly Blade[]
}

export interface Stretches {
  readonly stretches: readonly Stretch[]
  /** By panel, ring, edge: its stretch. Ring edges that belong to one stretch follow each other. */
  readonly stretchOf: readonly (readonly (readonly number[])[])[]
}

/** Angles this close are one direction: two panels back to back. */
export const backToBack = (on: number): number => Math.max(1e-6, 20 * on)

/**
 * @param panels with one ring edge for every edge of the arrangements
 * @param on how far points may be off their lines and planes
 * @throws BrokenPromise when outside and inside do not take turns round an edge
 */
export const findStretches = (
  panels: readonly RawPanel[],
  points: readonly Vec3[],
  on: number,
  report: (done: number) => void = () => {},
): Stretches => {
  const sameAngle = backToBack(on)
  const groups = new Map<number, number>()
  const members: FanEdge[][] = []
  const groupOf = panels.map((panel, p) =>
    panel.rings.map((ring, r) =>
      ring.map((from, e) => {
        const to = ring[(e + 1) % ring.length]!
        const key = Math.min(from, to) * 0x4000000 + Math.max(from, to)
        let g = groups.get(key)
        if (g === undefined) {
          g = members.length
          groups.set(key, g)
          members.push([])
        }
        members[g]!.push({ panel: p, ring: r, edge: e, from, to })
        return g
      }),
    ),
  )
  const fans = members.map((list, i) => {
    if (i % 1024 === 0) report(i / members.length)
    return fanOf(list, panels, points, sameAngle)
  })

  // Two groups grow together when every ring that runs through one runs straight on through the other.
  const through = new Map<number, number>()
  groupOf.forEach((rings, p) => {
    rings.forEach((list, r) => {
      const ring = panels[p]!.rings[r]!
      for (let e = 0; e < list.length; e++) {
        const before = list[(e + list.length - 1) % list.length]!
        const after = list[e]!
        if (before === after || fans[before]!.length !== fans[after]!.length) continue
        const a = points[ring[(e + ring.length - 1) % ring.length]!]!
        const b = points[ring[e]!]!
        const c = points[ring[(e + 1) % ring.length]!]!
        const u = normalize(sub(b, a))
        const v = normalize(sub(c, b))
        const turn = cross(u, v)
        const slack = Math.max(1e-6, (2 * on) / Math.min(distance(a, b), distance(b, c)))
        if (dot(turn, turn) > slack * slack || dot(u, v) < 0) continue
        const key = Math.min(before, after) * 0x4000000 + Math.max(before, after)
        through.set(key, (through.get(key) ?? 0) + 1)
      }
    })
  })
  const merged = new UnionFind(members.length)
  for (const [key, times] of through) {
    const a = Math.floor(key / 0x4000000)
    const b = key % 0x4000000
    if (times === fans[a]!.length) merged.union(a, b)
  }

  const number = new Map<number, number>()
  const ends = new Map<number, Map<number, number>>()
  const stretchOfGroup = members.map((_, g) => {
    const root = merged.find(g)
    if (!number.has(root)) number.set(root, number.size)
    return number.get(root)!
  })
  members.forEach((list, g) => {
    const s = stretchOfGroup[g]!
    let counts = ends.get(s)
    if (!counts) ends.set(s, (counts = new Map()))
    for (const v of [list[0]!.from, list[0]!.to]) counts.set(v, (counts.get(v) ?? 0) + 1)
  })
  const first = [...number.entries()].sort((a, b) => a[1] - b[1]).map(([root]) => root)
  const stretches = first.map((root, s): Stretch => {
    const loose = [...ends.get(s)!.entries()].filter(([, times]) => times === 1).map(([v]) => v)
    if (loose.length !== 2) throw new BrokenPromise('A stretch does not have two ends.', { stretch: s, ends: loose })
    const g = members[root]![0]!
    const d = sub(points[Math.max(g.from, g.to)]!, points[Math.min(g.from, g.to)]!)
    const [a, b] = loose as [number, number]
    const forward = dot(sub(points[b]!, points[a]!), d) > 0
    return { from: forward ? a : b, to: forward ? b : a, blades: fans[root]! }
  })
  return { stretches, stretchOf: groupOf.map((rings) => rings.map((list) => list.map((g) => stretchOfGroup[g]!))) }
}

/** A panel's edge, by the points it runs between. */
export interface FanEdge {
  readonly panel: number
  readonly ring: number
  readonly edge: number
  readonly from: number
  readonly to: number
}

/** The blades round one edge in order of angle, see `Stretch.blades`. */
export const fanOf = (
  list: readonly FanEdge[],
  panels: readonly { readonly normal: Vec3 }[],
  points: readonly Vec3[],
  sameAngle: number,
): Blade[] => {
  const { from, to } = list[0]!
  const low = Math.min(from, to)
  const d = normalize(sub(points[Math.max(from, to)]!, points[low]!))
  const { u, v } = planeFrame(d)
  const angles = list.map((m) => {
    const aligned = m.from === low
    const w = cross(panels[m.panel]!.normal, aligned ? d : [-d[0], -d[1], -d[2]])
    return { panel: m.panel, ring: m.ring, edge: m.edge, aligned, angle: Math.atan2(dot(w, v), dot(w, u)) }
  })
  const zero = (angles.find((b) => b.aligned) ?? angles[0]!).angle
  const blades = angles
    .map((b) => {
      let angle = b.angle - zero
      if (angle < -sameAngle) angle += 2 * Math.PI
      if (angle > 2 * Math.PI - sameAngle) angle -= 2 * Math.PI
      return { ...b, angle }
    })
    // Back to back, the blade that closes a sector comes before the one that opens the next.
    .sort((a, b) =>
      Math.abs(a.angle - b.angle) > sameAngle ? a.angle - b.angle : Number(a.aligned) - Number(b.aligned),
    )
  while (!blades[0]!.aligned) {
    const last = blades.shift()!
    blades.push({ ...last, angle: last.angle + 2 * Math.PI })
    if (blades.every((b) => !b.aligned)) break
  }
  if (blades.length % 2 !== 0 || blades.some((b, i) => b.aligned !== (i % 2 === 0)))
    throw new BrokenPromise('Panels around an edge do not take turns with the outside.', {
      blades: blades.map((b) => [b.panel, b.aligned, b.angle]),
    })
  return blades
}

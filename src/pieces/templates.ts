/**
 * Which nets are the same shape, and which are mirror images. A net is walked round from one of its outer ring edges,
 * turning off at every fold; the numbers met on the way (edge lengths, corner angles, inner angles of folds) describe it
 * up to rotation. The least such list over all starts is its canonical key: equal keys, congruent nets. The same walk
 * the other way round gives the key of the mirror image.
 */
import { cross2, distance2, dot2, sub2, type Vec2 } from '../geometry/vec2'
import type { Net } from './lay-out'
import type { PanelGraph, RingEdge } from './panel-graph'

/** Numbers that differ by less are equal: far above rounding (1e-9), below what tells two shapes apart (3e-5). */
const tolerance = 1e-6

export interface NetKey {
  readonly numbers: Float64Array
  /** The outer ring edge where the canonical walk starts. */
  readonly start: RingEdge
}

const compare = (a: Float64Array, b: Float64Array): number => {
  const n = Math.min(a.length, b.length)
  for (let i = 0; i < n; i++) {
    const d = a[i]! - b[i]!
    if (d < -tolerance) return -1
    if (d > tolerance) return 1
  }
  return a.length - b.length
}

/** The key of a net, or of its mirror image. */
export const netKey = (graph: PanelGraph, net: Net, mirrored: boolean): NetKey => {
  const folds = new Set(net.folds)
  const starts: RingEdge[] = net.panels.flatMap((panel) =>
    graph.flat[panel]!.rings[0]!.map((_, index) => ({ panel, ring: 0, index })),
  )
  // Starts whose first corner is not the least cannot win.
  const heads = starts.map((s) => Float64Array.from(corner(graph, folds, s, mirrored)))
  const least = heads.reduce((m, h) => (compare(h, m) < 0 ? h : m))
  let best: NetKey | undefined
  starts.forEach((start, i) => {
    if (compare(heads[i]!, least) > 0) return
    const numbers = walk(graph, folds, start, mirrored)
    if (!best || compare(numbers, best.numbers) < 0) best = { numbers, start }
  })
  return best!
}

/** Edge length, turn at its far end, and 0 for a cut or 1 to 2 for a fold. */
const corner = (graph: PanelGraph, folds: ReadonlySet<number>, e: RingEdge, mirrored: boolean): number[] => {
  const ring = graph.flat[e.panel]!.rings[e.ring]!
  const n = ring.length
  const a = ring[mirrored ? (e.index + 1) % n : e.index]!
  const b = ring[mirrored ? e.index : (e.index + 1) % n]!
  const c = ring[mirrored ? (e.index + n - 1) % n : (e.index + 2) % n]!
  const p = sub2(b, a)
  const q = sub2(c, b)
  const turn = Math.atan2(mirrored ? -cross2(p, q) : cross2(p, q), dot2(p, q))
  const link = graph.links[linkAt(graph, e)]!
  return [distance2(a, b) / graph.edgeMm, turn, folds.has(link.id) ? 1 + link.innerAngle / 360 : 0]
}

const linkAt = (graph: PanelGraph, e: RingEdge): number => {
  let offset = 0
  for (let r = 0; r < e.ring; r++) offset += graph.flat[e.panel]!.rings[r]!.length
  return graph.linksOf[e.panel]![offset + e.index]!
}

const walk = (graph: PanelGraph, folds: ReadonlySet<number>, start: RingEdge, mirrored: boolean): Float64Array => {
  const out: number[] = []
  // `skip`: the first edge is the fold that led here.
  const visit = (from: RingEdge, skip: boolean): void => {
    const rings = graph.flat[from.panel]!.rings
    round(from, skip)
    if (rings.length === 1) return
    const frame = frameAt(graph, from, mirrored)
    const others = rings
      .map((_, ring) => ring)
      .filter((ring) => ring !== from.ring)
      .map((ring) => firstIn(rings[ring]!.map(frame), from.panel, ring, mirrored))
      .sort((a, b) => byPlace(a.at, b.at))
    for (const { at, edge } of others) {
      out.push(at[0] / graph.edgeMm, at[1] / graph.edgeMm)
      round(edge, false)
    }
  }
  const round = (from: RingEdge, skip: boolean): void => {
    const n = graph.flat[from.panel]!.rings[from.ring]!.length
    for (let k = 0; k < n; k++) {
      const e = { ...from, index: (from.index + (mirrored ? n - k : k)) % n }
      const numbers = corner(graph, folds, e, mirrored)
      out.push(...numbers)
      if ((k === 0 && skip) || numbers[2] === 0) continue
      const { sides } = graph.links[linkAt(graph, e)]!
      visit(sides[0].panel === e.panel ? sides[1] : sides[0], true)
    }
  }
  visit(start, false)
  return Float64Array.from(out)
}

/** Coordinates along and beside a ring edge. */
const frameAt = (graph: PanelGraph, e: RingEdge, mirrored: boolean): ((p: Vec2) => Vec2) => {
  const ring = graph.flat[e.panel]!.rings[e.ring]!
  const a = ring[e.index]!
  const b = ring[(e.index + 1) % ring.length]!
  const length = distance2(a, b)
  const x: Vec2 = [(b[0] - a[0]) / length, (b[1] - a[1]) / length]
  const [origin, along]: [Vec2, Vec2] = mirrored ? [b, [-x[0], -x[1]]] : [a, x]
  return (p) => [dot2(sub2(p, origin), along), cross2(x, sub2(p, origin))]
}

/** mm: coordinates that differ by less are equal. */
const near = 1e-5

const byPlace = (a: Vec2, b: Vec2): number => {
  const dx = a[0] - b[0]
  const dy = a[1] - b[1]
  if (Math.abs(dx) > near) return dx
  return Math.abs(dy) > near ? dy : 0
}

/** The edge of a ring that leaves its least point, in the direction of the walk. */
const firstIn = (points: readonly Vec2[], panel: number, ring: number, mirrored: boolean) => {
  let k = 0
  points.forEach((p, i) => {
    if (byPlace(p, points[k]!) < 0) k = i
  })
  const index = mirrored ? (k + points.length - 1) % points.length : k
  return { at: points[k]!, edge: { panel, ring, index } }
}

export interface NetTemplate {
  readonly template: number
  readonly hand: 'none' | 'left' | 'right'
  /** Congruent nets have corresponding starts. */
  readonly start: RingEdge
}

/** Template and hand of each net; templates are numbered by first appearance. */
export const nameTemplates = (graph: PanelGraph, nets: readonly Net[]): NetTemplate[] => {
  const known: { numbers: Float64Array; hand: 'none' | 'left' | 'right' }[] = []
  return nets.map((net) => {
    const { numbers, start } = netKey(graph, net, false)
    let template = known.findIndex((k) => k.numbers.length === numbers.length && compare(k.numbers, numbers) === 0)
    if (template < 0) {
      const order = compare(numbers, netKey(graph, net, true).numbers)
      template = known.push({ numbers, hand: order === 0 ? 'none' : order < 0 ? 'left' : 'right' }) - 1
    }
    return { template, hand: known[template]!.hand, start }
  })
}

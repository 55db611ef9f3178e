/**
 * Where bodies touch and no crease tells of it: at a single vertex, at a corner that stands on the middle of a panel or of
 * an edge, and along an edge that lies on the middle of a panel. Such places hold nothing together on their own.
 */
import { boxAround, boxGrid } from '../geometry/box-grid'
import { UnionFind } from '../geometry/union-find'
import { distance2, type Ring2, sub2, type Vec2, windingNumber } from '../geometry/vec2'
import { distance, dot, lerp, norm, sub, type Vec3 } from '../geometry/vec3'
import { type Frame, frameOf, toPlane } from './planes'
import type { SkinCrease, SkinPanel, Touch } from './types'

interface Surface {
  readonly points: readonly Vec3[]
  readonly panels: readonly SkinPanel[]
  readonly creases: readonly SkinCrease[]
  readonly slack: number
}

/** All touches of a skin; its line contacts are not among them. Points first, each list in the order of the skin. */
export const findTouches = (skin: Surface): Touch[] => {
  const near = 1e-7 * Math.max(1e-12, reach(skin.points)) + 2 * skin.slack
  const flat = skin.panels.map((p) => flatten(p, skin.points))
  const meeting = boxGrid(
    skin.panels.map((p) =>
      boxAround(
        p.rings[0]!.map((v) => skin.points[v]!),
        near,
      ),
    ),
  )
  const lines = touchesAlongLines(skin, flat, meeting, near)
  return [...touchesAtPoints(skin, flat, meeting, near, lines), ...lines]
}

interface Flat {
  readonly frame: Frame
  readonly rings: readonly Ring2[]
}

type Meeting = ReturnType<typeof boxGrid>

const reach = (points: readonly Vec3[]): number => points.reduce((most, p) => Math.max(most, norm(p)), 0)

const flatten = (panel: SkinPanel, points: readonly Vec3[]): Flat => {
  const frame = frameOf({ normal: panel.normal, offset: dot(panel.normal, points[panel.rings[0]![0]!]!) })
  return { frame, rings: panel.rings.map((ring) => ring.map((v) => toPlane(frame, points[v]!))) }
}

/** Where a point of the panel's plane lies: inside, off it, or on edge `edge` of ring `ring`. */
const locate = (rings: readonly Ring2[], p: Vec2, near: number): 'inside' | 'off' | { ring: number; edge: number } => {
  for (const [ring, points] of rings.entries())
    for (let edge = 0; edge < points.length; edge++)
      if (distanceToSegment(p, points[edge]!, points[(edge + 1) % points.length]!) <= near) return { ring, edge }
  return rings.reduce((sum, ring) => sum + windingNumber(ring, p), 0) !== 0 ? 'inside' : 'off'
}

const distanceToSegment = (p: Vec2, a: Vec2, b: Vec2): number => {
  const d = sub2(b, a)
  const t = Math.max(0, Math.min(1, ((p[0] - a[0]) * d[0] + (p[1] - a[1]) * d[1]) / (d[0] * d[0] + d[1] * d[1] || 1)))
  return distance2(p, [a[0] + t * d[0], a[1] + t * d[1]])
}

/** Creases of one body that run over the middle of a panel of another, by the parts of them that do. */
const touchesAlongLines = (skin: Surface, flat: readonly Flat[], meeting: Meeting, near: number): Touch[] => {
  const touches: Touch[] = []
  for (const crease of skin.creases) {
    const own = crease.panels.map((p) => skin.panels[p]!.body)
    const a = skin.points[crease.ends[0]]!
    const b = skin.points[crease.ends[1]]!
    const candidates = new Set<number>()
    meeting(boxAround([a, b]), (p) => candidates.add(p))
    for (const p of [...candidates].sort((x, y) => x - y)) {
      const panel = skin.panels[p]!
      if (own.includes(panel.body)) continue
      const { frame, rings } = flat[p]!
      const offset = dot(frame.normal, frame.origin)
      if (Math.abs(dot(frame.normal, a) - offset) > near || Math.abs(dot(frame.normal, b) - offset) > near) continue
      for (const [s, t] of stretchesInside(rings, toPlane(frame, a), toPlane(frame, b), near)) {
        const ends: [Vec3, Vec3] = [lerp(a, b, s), lerp(a, b, t)]
        const bodies = [...new Set([...own, panel.body])].sort((x, y) => x - y)
        touches.push({ kind: 'line', ends, length: distance(...ends), bodies, panels: [...crease.panels, p] })
      }
    }
  }
  // An edge has two panels a side and may have been met from both: one record each place.
  const seen = new Set<string>()
  return touches.filter((t) => {
    const key = `${t.bodies.join()}:${t.ends.map((e) => e.map((x) => Math.round(x / (4 * near))).join()).join()}`
    if (seen.has(key)) return false
    seen.add(key)
    return true
  })
}

/** Parameters on a→b between which the segment runs through the inside of the region, not along its rings. */
const stretchesInside = (rings: readonly Ring2[], a: Vec2, b: Vec2, near: number): [number, number][] => {
  const length = distance2(a, b)
  const marks = [0, 1]
  for (const ring of rings)
    ring.forEach((c, i) => {
      const d = ring[(i + 1) % ring.length]!
      const e = sub2(b, a)
      const f = sub2(d, c)
      const g = sub2(c, a)
      const det = e[0] * f[1] - e[1] * f[0]
      if (Math.abs(det) > 1e-12 * length) {
        const t = (g[0] * f[1] - g[1] * f[0]) / det
        if (t > 0 && t < 1) marks.push(t)
      }
    })
  marks.sort((x, y) => x - y)
  const found: [number, number][] = []
  for (let i = 0; i + 1 < marks.length; i++) {
    const [s, t] = [marks[i]!, marks[i + 1]!]
    if ((t - s) * length <= 2 * near) continue
    const m = (s + t) / 2
    if (locate(rings, [a[0] + m * (b[0] - a[0]), a[1] + m * (b[1] - a[1])], near) !== 'inside') continue
    const last = found[found.length - 1]
    if (last && (s - last[1]) * length <= near) last[1] = t
    else found.push([s, t])
  }
  return found
}

/**
 * Vertices whose panel corners fall apart into several fans that belong to different bodies. Corners hang together along
 * the creases, line contacts and line touches that run through the vertex.
 */
const touchesAtPoints = (
  skin: Surface,
  flat: readonly Flat[],
  meeting: Meeting,
  near: number,
  lines: readonly Touch[],
): Touch[] => {
  interface Corner {
    readonly panel: number
    readonly joins: readonly string[]
  }
  const corners: Corner[][] = skin.points.map(() => [])
  const nameOf = (id: number): string => {
    const { contact, stretch } = skin.creases[id]!
    return contact === 'line' ? `line ${stretch}` : `crease ${id}`
  }
  for (const panel of skin.panels)
    panel.rings.forEach((ring, r) => {
      const creases = panel.creases[r]!
      ring.forEach((v, i) => {
        const before = creases[(i + ring.length - 1) % ring.length]!
        corners[v]!.push({ panel: panel.id, joins: [nameOf(before), nameOf(creases[i]!)] })
      })
    })
  const touches: Touch[] = []
  corners.forEach((list, v) => {
    const at = skin.points[v]!
    const here = new Set(list.map((c) => c.panel))
    const others = new Set<number>()
    meeting(boxAround([at]), (p) => {
      if (!here.has(p)) others.add(p)
    })
    const all = [...list]
    for (const p of [...others].sort((x, y) => x - y)) {
      const { frame, rings } = flat[p]!
      if (Math.abs(dot(frame.normal, at) - dot(frame.normal, frame.origin)) > near) continue
      const place = locate(rings, toPlane(frame, at), near)
      if (place === 'off') continue
      all.push({
        panel: p,
        joins: place === 'inside' ? [] : [nameOf(skin.panels[p]!.creases[place.ring]![place.edge]!)],
      })
    }
    if (all.length < 2) return
    const fans = new UnionFind(all.length)
    const first = new Map<string, number>()
    all.forEach(({ joins }, i) => {
      for (const join of joins) {
        const j = first.get(join)
        if (j === undefined) first.set(join, i)
        else fans.union(i, j)
      }
    })
    // A body is one thing; and bodies that touch along a line through here are told of already.
    const bodies = new Map<number, number>()
    all.forEach(({ panel }, i) => {
      const { body } = skin.panels[panel]!
      const j = bodies.get(body)
      if (j === undefined) bodies.set(body, i)
      else fans.union(i, j)
    })
    for (const { ends, bodies: pair } of lines) {
      if (ends.length < 2 || distanceToLine(at, ends[0]!, ends[1]!) > 2 * near) continue
      const known = pair.map((b) => bodies.get(b)).filter((i) => i !== undefined)
      for (const i of known) fans.union(known[0]!, i)
    }
    const roots = new Set(all.map((_, i) => fans.find(i)))
    if (roots.size < 2) return
    touches.push({
      kind: 'point',
      ends: [at],
      length: 0,
      bodies: [...bodies.keys()].sort((x, y) => x - y),
      panels: [...new Set(all.map((c) => c.panel))].sort((x, y) => x - y),
    })
  })
  return touches
}

const distanceToLine = (p: Vec3, a: Vec3, b: Vec3): number => {
  const along = dot(sub(p, a), sub(b, a)) / distance(a, b) ** 2
  return distance(p, lerp(a, b, Math.max(0, Math.min(1, along))))
}

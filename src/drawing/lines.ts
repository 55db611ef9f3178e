/** Cuts and folds of a laid piece, every line once. */
import type { Vec2 } from '../geometry/vec2'
import type { PlanCrease } from '../plan/types'
import type { LaidPiece } from './layout'
import type { LineKind, LineMark } from './types'

/**
 * How a fold is drawn: mountain dash-dot, valley dashed (Yoshizawa's line convention, 1954). On a mirrored sheet one looks
 * at the inside of the model, where every mountain is a valley.
 */
export const foldKind = (crease: PlanCrease, mirrored: boolean): LineKind => {
  if (Math.abs(crease.innerAngle - 180) < 1e-6) return 'level'
  return crease.innerAngle < 180 !== mirrored ? 'mountain' : 'valley'
}

interface Stretch {
  from: number
  to: number
}

/**
 * All marks of the piece's lines. Where panels touch along a slit, or a tab's root covers part of a panel's edge, the
 * stretches of each straight line are united first, so that no stretch is drawn (or cut) twice.
 */
export const pieceLines = (laid: LaidPiece): LineMark[] => {
  const { piece, mirrored } = laid
  const marks: LineMark[] = []
  const drawn = new Set<number>()
  const cuts: [Vec2, Vec2][] = []
  for (const { panel, edges } of laid.panels)
    for (const { from, to, crease, use } of edges) {
      if (use === 'fold') {
        if (drawn.has(crease.id)) continue
        drawn.add(crease.id)
        const kind = foldKind(crease, mirrored)
        marks.push({ type: 'line', kind, points: [from, to], closed: false, piece: piece.id, panel, crease: crease.id })
        continue
      }
      const tab = laid.tabs.find((t) => t.crease === crease && t.panel === panel)
      if (!tab) {
        cuts.push([from, to])
        continue
      }
      // The tab's root is scored, what is left of the edge on either side is cut.
      const along = ([x, y]: Vec2): number => (x - from[0]) * (to[0] - from[0]) + (y - from[1]) * (to[1] - from[1])
      const [near, far] = along(tab.root[0]) < along(tab.root[1]) ? tab.root : [tab.root[1], tab.root[0]]
      cuts.push([from, near], [far, to])
      const kind = foldKind(crease, mirrored)
      const points = [near, far]
      marks.push({ type: 'line', kind, points, closed: false, piece: piece.id, panel, crease: crease.id })
    }
  for (const { outline, root } of laid.tabs)
    outline.forEach((p, i) => {
      const q = outline[(i + 1) % outline.length]!
      if (!(onEnd(p, root) && onEnd(q, root))) cuts.push([p, q])
    })
  for (const points of uniteStraight(cuts))
    marks.push({ type: 'line', kind: 'cut', points, closed: false, piece: piece.id })
  return marks
}

const near = (a: Vec2, b: Vec2): boolean => Math.abs(a[0] - b[0]) < 1e-5 && Math.abs(a[1] - b[1]) < 1e-5
const onEnd = (p: Vec2, root: readonly [Vec2, Vec2]): boolean => near(p, root[0]) || near(p, root[1])

/** Segments on one straight line, united where they overlap; then chained end to end into polylines. */
const uniteStraight = (segments: readonly (readonly [Vec2, Vec2])[]): Vec2[][] => {
  const lines = new Map<string, { origin: Vec2; dx: number; dy: number; list: Stretch[] }[]>()
  for (const [a, b] of segments) {
    let dx = b[0] - a[0]
    let dy = b[1] - a[1]
    const length = Math.hypot(dx, dy)
    if (length < 1e-5) continue
    dx /= length
    dy /= length
    if (dx < -1e-9 || (Math.abs(dx) <= 1e-9 && dy < 0)) {
      dx = -dx
      dy = -dy
    }
    // Buckets of direction; the neighbouring one is searched too, since a direction may fall on a border.
    const bucket = Math.round(Math.atan2(dy, dx) * 2000)
    let home: { origin: Vec2; dx: number; dy: number; list: Stretch[] } | undefined
    for (const k of [bucket, bucket - 1, bucket + 1])
      home ??= lines.get(String(k))?.find((l) => {
        const off = (p: Vec2): number => Math.abs(l.dx * (p[1] - l.origin[1]) - l.dy * (p[0] - l.origin[0]))
        return off(a) < 1e-4 && off(b) < 1e-4
      })
    if (!home) {
      home = { origin: a, dx, dy, list: [] }
      const list = lines.get(String(bucket))
      if (list) list.push(home)
      else lines.set(String(bucket), [home])
    }
    const { origin, list } = home
    const t = (p: Vec2): number => (p[0] - origin[0]) * home.dx + (p[1] - origin[1]) * home.dy
    list.push({ from: Math.min(t(a), t(b)), to: Math.max(t(a), t(b)) })
  }
  const out: [Vec2, Vec2][] = []
  for (const bucket of lines.values())
    for (const { origin, dx, dy, list } of bucket) {
      list.sort((p, q) => p.from - q.from)
      const merged: Stretch[] = []
      for (const s of list) {
        const last = merged[merged.length - 1]
        // Only true overlaps are united: segments that merely follow each other keep their corner.
        if (last && s.from < last.to - 1e-4) last.to = Math.max(last.to, s.to)
        else merged.push({ ...s })
      }
      const at = (t: number): Vec2 => [origin[0] + t * dx, origin[1] + t * dy]
      for (const { from, to } of merged) out.push([at(from), at(to)])
    }
  return chain(out)
}

/** Joins segments that share an end which no third segment uses. */
const chain = (segments: readonly [Vec2, Vec2][]): Vec2[][] => {
  const cell = (p: Vec2): string => `${Math.round(p[0] * 1e3)} ${Math.round(p[1] * 1e3)}`
  const at = new Map<string, number[]>()
  segments.forEach((s, i) => {
    for (const p of s) {
      const list = at.get(cell(p))
      if (list) list.push(i)
      else at.set(cell(p), [i])
    }
  })
  const used = segments.map(() => false)
  const follow = (line: Vec2[]): void => {
    for (;;) {
      const end = line[line.length - 1]!
      const here = at.get(cell(end)) ?? []
      const next = here.length === 2 ? here.find((i) => !used[i]) : undefined
      if (next === undefined) return
      used[next] = true
      const [a, b] = segments[next]!
      line.push(cell(a) === cell(end) ? b : a)
    }
  }
  return segments.flatMap((s, i) => {
    if (used[i]) return []
    used[i] = true
    const line: Vec2[] = [s[0], s[1]]
    follow(line)
    line.reverse()
    follow(line)
    return [line]
  })
}

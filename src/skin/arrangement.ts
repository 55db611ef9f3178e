/**
 * The arrangement of one face plane: the stretches in which other faces cut it, and the outlines of its own faces, split
 * at all their crossings and traced into cells (a doubly connected edge list). Half-edges 2e and 2e+1 are twins; the
 * cell of a half-edge lies to its left, seen from the tip of the plane's normal.
 */
import { BrokenPromise } from '../errors'
import { SnapGrid } from '../geometry/snap'
import { type Vec2, windingNumber } from '../geometry/vec2'
import { cross as cross3, distance, dot, type Vec3 } from '../geometry/vec3'
import { covers, cutByPlane, type FilledFace, type PlaneCut } from './filled-face'
import { type FacePlane, type Frame, toPlane } from './planes'
import type { Tolerance } from './tolerance'

export interface Cell {
  /** One half-edge of the outer boundary, then one of each hole's. */
  readonly starts: number[]
  /** Area with holes taken off. */
  area: number
  /** Faces of this plane whose filled region covers the cell; empty: the cell is open air. */
  faces: number[]
  /** A point well inside. */
  inside: Vec2
}

export interface Arrangement {
  readonly plane: FacePlane
  readonly frame: Frame
  /** Vertex i at (points.x[i], points.y[i]) in `frame`. */
  readonly points: SnapGrid
  /** By half-edge: start vertex, next half-edge round the cell, cell (-1: the unbounded one). */
  readonly origin: Int32Array
  readonly next: Int32Array
  readonly cell: Int32Array
  readonly cells: readonly Cell[]
  /** Planes other than this one whose filled faces reach along the whole of edge e: crossers[crossersFrom[e] …]. */
  readonly crossers: Int32Array
  readonly crossersFrom: Int32Array
  /** Half-edge from vertex a to vertex b, or -1. */
  halfEdge(a: number, b: number): number
}

interface Line {
  /** Unit direction and the foot point. */
  readonly dx: number
  readonly dy: number
  readonly px: number
  readonly py: number
  readonly spans: { from: number; to: number; plane: number }[]
  readonly marks: number[]
  merged: [number, number][]
}

/**
 * Cuts up one plane.
 * @param own filled faces that lie in the plane
 * @param others filled faces of other planes that may reach it (more than needed does no harm)
 * @throws BrokenPromise when the tolerance gap is not kept or a cell cannot be traced
 */
export const arrange = (
  plane: FacePlane,
  frame: Frame,
  own: readonly FilledFace[],
  others: readonly FilledFace[],
  tolerance: Tolerance,
): Arrangement => {
  const { on } = tolerance
  const lines: Line[] = []
  const addSegment = (a: Vec3, b: Vec3, from: number): void => {
    const [ax, ay] = toPlane(frame, a)
    const [bx, by] = toPlane(frame, b)
    const length = Math.hypot(bx - ax, by - ay)
    if (length <= tolerance.merge) return
    let line = lines.find((l) => Math.abs(across(l, ax, ay)) <= on && Math.abs(across(l, bx, by)) <= on)
    if (!line) {
      line = { dx: (bx - ax) / length, dy: (by - ay) / length, px: ax, py: ay, spans: [], marks: [], merged: [] }
      lines.push(line)
    }
    const s = along(line, ax, ay)
    const t = along(line, bx, by)
    line.spans.push({ from: Math.min(s, t), to: Math.max(s, t), plane: from })
    line.marks.push(s, t)
  }
  const touches: Vec2[] = []
  for (const face of own) for (const [a, b] of face.boundary) addSegment(a, b, plane.id)
  // Only what lies in this plane's own faces matters; the rest would make cells of open air.
  const ownCuts = new Map<number, PlaneCut>()
  for (const face of others) {
    const cut = cutByPlane(face, plane.normal, plane.offset, on)
    if (cut.segments.length > 0) {
      let mine = ownCuts.get(face.plane)
      if (!mine) {
        const { normal, origin } = face.frame
        mine = mergeCuts(own.map((f) => cutByPlane(f, normal, dot(normal, origin), on)))
        ownCuts.set(face.plane, mine)
      }
      const axis = cross3(plane.normal, face.frame.normal)
      for (const segment of cut.segments)
        for (const limit of mine.segments) {
          const common = overlap(segment, limit, axis, 2 * on)
          if (!common) continue
          if (distance(common[0], common[1]) > tolerance.merge) addSegment(common[0], common[1], face.plane)
          else touches.push(toPlane(frame, common[0]))
        }
      for (const p of mine.touches) touches.push(toPlane(frame, p))
    }
    for (const p of cut.touches) touches.push(toPlane(frame, p))
  }

  for (const line of lines) line.merged = mergeSpans(line.spans, on)
  for (let i = 0; i < lines.length; i++) {
    const a = lines[i]!
    for (let j = i + 1; j < lines.length; j++) {
      const b = lines[j]!
      const det = a.dx * b.dy - a.dy * b.dx
      if (Math.abs(det) < 1e-10) continue
      const gx = b.px - a.px
      const gy = b.py - a.py
      const s = (gx * b.dy - gy * b.dx) / det
      if (!reaches(a.merged, s, on)) continue
      const t = (gx * a.dy - gy * a.dx) / det
      if (!reaches(b.merged, t, on)) continue
      a.marks.push(s)
      b.marks.push(t)
    }
    for (const [x, y] of touches)
      if (Math.abs(across(a, x, y)) <= on) {
        const s = along(a, x, y)
        if (reaches(a.merged, s, on)) a.marks.push(s)
      }
  }

  const points = new SnapGrid(tolerance.merge, tolerance.gap, tolerance.cell)
  const origin: number[] = []
  const direction: number[] = []
  const crossers: number[] = []
  const crossersFrom: number[] = [0]
  for (const line of lines) {
    const marks = line.marks.sort((x, y) => x - y)
    const angle = Math.atan2(line.dy, line.dx)
    let previous = -1
    let previousMark = 0
    for (const mark of marks) {
      const vertex = points.add(line.px + mark * line.dx, line.py + mark * line.dy, 0)
      if (vertex === previous) continue
      const middle = (mark + previousMark) / 2
      if (previous >= 0 && reaches(line.merged, middle, 0)) {
        origin.push(previous, vertex)
        direction.push(angle, angle > 0 ? angle - Math.PI : angle + Math.PI)
        const first = crossers.length
        for (const span of line.spans)
          if (span.plane !== plane.id && span.from < middle && middle < span.to)
            if (crossers.indexOf(span.plane, first) < 0) crossers.push(span.plane)
        crossersFrom.push(crossers.length)
      }
      previous = vertex
      previousMark = mark
    }
  }

  // Typed arrays from here on: a mesh keeps thousands of arrangements, and the collector need not look into these.
  const origins = Int32Array.from(origin)
  const outgoing = new Int32Array(points.size).fill(-1)
  for (let h = 0; h < origins.length; h++) outgoing[origins[h]!] = h
  const next = linkHalfEdges(origins, direction, points.size)
  const { cell, cells } = traceCells(origins, next, points)
  for (const c of cells) {
    c.inside = interiorPoint(c, origins, next, points)
    for (const face of own) if (covers(face, c.inside)) c.faces.push(face.index)
  }
  return {
    plane,
    frame,
    points,
    origin: origins,
    next,
    cell,
    cells,
    crossers: Int32Array.from(crossers),
    crossersFrom: Int32Array.from(crossersFrom),
    halfEdge: edgeFinder(origins, next, outgoing),
  }
}

/** Made apart from `arrange`, so that it does not keep alive all that was needed on the way. */
const edgeFinder =
  (origin: Int32Array, next: Int32Array, outgoing: Int32Array): Arrangement['halfEdge'] =>
  (a, b) => {
    const start = outgoing[a]!
    for (let h = start; h >= 0; ) {
      if (origin[h ^ 1] === b) return h
      h = next[h ^ 1]!
      if (h === start) break
    }
    return -1
  }

const mergeCuts = (cuts: readonly PlaneCut[]): PlaneCut => ({
  segments: cuts.flatMap((c) => c.segments),
  touches: cuts.flatMap((c) => c.touches),
})

/** What two segments on one line have in common, maybe a point, with `axis` along the line; null if `near` apart. */
const overlap = (a: readonly [Vec3, Vec3], b: readonly [Vec3, Vec3], axis: Vec3, near: number): [Vec3, Vec3] | null => {
  const [a0, a1] = dot(axis, a[0]) <= dot(axis, a[1]) ? a : [a[1], a[0]]
  const [b0, b1] = dot(axis, b[0]) <= dot(axis, b[1]) ? b : [b[1], b[0]]
  const from = dot(axis, a0) >= dot(axis, b0) ? a0 : b0
  const to = dot(axis, a1) <= dot(axis, b1) ? a1 : b1
  const length = dot(axis, to) - dot(axis, from)
  return length >= 0 ? [from, to] : -length <= near * Math.sqrt(dot(axis, axis)) ? [from, from] : null
}

const across = (l: Line, x: number, y: number): number => l.dx * (y - l.py) - l.dy * (x - l.px)
const along = (l: Line, x: number, y: number): number => l.dx * (x - l.px) + l.dy * (y - l.py)

const mergeSpans = (spans: Line['spans'], on: number): [number, number][] => {
  const merged: [number, number][] = []
  for (const { from, to } of [...spans].sort((a, b) => a.from - b.from)) {
    const last = merged[merged.length - 1]
    if (last && from <= last[1] + on) last[1] = Math.max(last[1], to)
    else merged.push([from, to])
  }
  return merged
}

const reaches = (merged: readonly [number, number][], t: number, on: number): boolean => {
  for (const [from, to] of merged) if (t >= from - on && t <= to + on) return true
  return false
}

/** next[h]: at the end of h, turn as far clockwise as possible from the way back, which keeps the cell on the left. */
const linkHalfEdges = (origin: Int32Array, direction: readonly number[], vertices: number): Int32Array => {
  const outgoing: number[][] = Array.from({ length: vertices }, () => [])
  for (let h = 0; h < origin.length; h++) outgoing[origin[h]!]!.push(h)
  const next = new Int32Array(origin.length).fill(-1)
  for (const list of outgoing) {
    list.sort((a, b) => direction[a]! - direction[b]!)
    for (let i = 0; i < list.length; i++) next[list[(i + 1) % list.length]! ^ 1] = list[i]!
  }
  return next
}

/** The half-edges of the closed walk that starts at h. */
export const walk = (next: Int32Array, start: number): number[] => {
  const path: number[] = []
  let h = start
  do {
    path.push(h)
    h = next[h]!
  } while (h !== start)
  return path
}

const ringOf = (path: readonly number[], origin: Int32Array, points: SnapGrid): Vec2[] =>
  path.map((h) => [points.x[origin[h]!]!, points.y[origin[h]!]!])

const areaOf = (ring: readonly Vec2[]): number => {
  // Relative to the first point: small cells far from the origin keep their digits.
  const [ox, oy] = ring[0]!
  let twice = 0
  for (let i = 1; i + 1 < ring.length; i++) {
    const [ax, ay] = ring[i]!
    const [bx, by] = ring[i + 1]!
    twice += (ax - ox) * (by - oy) - (bx - ox) * (ay - oy)
  }
  return twice / 2
}

const traceCells = (origin: Int32Array, next: Int32Array, points: SnapGrid): { cell: Int32Array; cells: Cell[] } => {
  const cell = new Int32Array(origin.length).fill(-2)
  const cells: Cell[] = []
  const rims: { start: number; ring: Vec2[]; path: number[]; area: number }[] = []
  const rings: Vec2[][] = []
  for (let start = 0; start < origin.length; start++) {
    if (cell[start] !== -2) continue
    const path = walk(next, start)
    const ring = ringOf(path, origin, points)
    const area = areaOf(ring)
    // Dangling stretches enclose nothing but rounding; the smallest real cells are near 1e-10 edge².
    if (area > 1e-13) {
      for (const h of path) cell[h] = cells.length
      cells.push({ starts: [start], area, faces: [], inside: [0, 0] })
      rings.push(ring)
    } else {
      for (const h of path) cell[h] = -1
      rims.push({ start, ring, path, area })
    }
  }
  // Each connected component has one outer rim. The component with the widest reach lies in no cell; of the others, each
  // may be an island in a cell of another component.
  if (rims.length > 1) {
    const component = components(origin)
    for (const rim of rims) {
      const [x, y] = rim.ring[0]!
      const home = component[origin[rim.start]!]
      let best = -1
      for (let c = 0; c < cells.length; c++) {
        if (component[origin[cells[c]!.starts[0]!]!] === home) continue
        if (best >= 0 && cells[c]!.area >= cells[best]!.area) continue
        if (windingNumber(rings[c]!, [x, y]) !== 0) best = c
      }
      if (best < 0) continue
      for (const h of rim.path) cell[h] = best
      cells[best]!.starts.push(rim.start)
    }
    // Areas of holes are taken off only now: the search above compares whole outer rings.
    for (const rim of rims) {
      const c = cell[rim.start]!
      if (c >= 0) cells[c]!.area += rim.area
    }
  }
  return { cell, cells }
}

const components = (origin: Int32Array): number[] => {
  const root: number[] = []
  const find = (i: number): number => {
    while (root[i] !== i) i = root[i] = root[root[i]!]!
    return i
  }
  for (const v of origin) root[v] = v
  for (let h = 0; h < origin.length; h += 2) root[find(origin[h]!)] = find(origin[h + 1]!)
  return root.map((_, i) => find(i))
}

/** A point inside a cell, by the diagonal argument of polygon triangulation at one of its convex corners. */
const interiorPoint = (c: Cell, origin: Int32Array, next: Int32Array, points: SnapGrid): Vec2 => {
  const outer = walk(next, c.starts[0]!)
  const ids = outer.map((h) => origin[h]!)
  const at = (i: number): Vec2 => [points.x[i]!, points.y[i]!]
  const distinct = [...new Set(c.starts.flatMap((s) => walk(next, s)).map((h) => origin[h]!))].map(at)
  let best: Vec2 | undefined
  let bestArea = 0
  for (let i = 0; i < ids.length; i++) {
    const a = at(ids[(i + ids.length - 1) % ids.length]!)
    const b = at(ids[i]!)
    const d = at(ids[(i + 1) % ids.length]!)
    const area = cross(a, b, d)
    if (area <= bestArea) continue
    // Any convex corner will do; the largest triangle is the safest. If other vertices lie in it, the one farthest
    // from the side a–d sees b, and the middle of that diagonal is inside.
    let seen: Vec2 | undefined
    for (const p of distinct) {
      if (same(p, a) || same(p, b) || same(p, d)) continue
      if (cross(a, b, p) < 0 || cross(b, d, p) < 0 || cross(d, a, p) < 0) continue
      if (!seen || cross(d, a, p) > cross(d, a, seen)) seen = p
    }
    if (seen && best && area < 4 * bestArea) continue
    best = seen ? [(b[0] + seen[0]) / 2, (b[1] + seen[1]) / 2] : [(a[0] + b[0] + d[0]) / 3, (a[1] + b[1] + d[1]) / 3]
    bestArea = area
  }
  if (best) return best
  throw new BrokenPromise('A cell has no convex corner.', { vertices: ids.length, area: c.area })
}

const cross = (a: Vec2, b: Vec2, p: Vec2): number => (b[0] - a[0]) * (p[1] - a[1]) - (b[1] - a[1]) * (p[0] - a[0])
const same = (a: Vec2, b: Vec2): boolean => a[0] === b[0] && a[1] === b[1]

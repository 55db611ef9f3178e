/**
 * A patch: panels laid flat beside each other while nets are being searched for. Patches never change; joining two gives
 * a third, so that a search can go back to what it had. Millions are tried, hence the flat arrays.
 */
import { moveInto, overlapArea, separated } from '../geometry/convex'
import { convexHull, fittingAngle } from '../geometry/hull'
import { UnionFind } from '../geometry/union-find'
import { compose2, type Motion2 } from '../geometry/vec2'
import type { Link, PanelGraph } from './panel-graph'

/** The rectangle that a piece has to fit into, in mm; it may be turned freely. */
export interface FitRectangle {
  readonly widthMm: number
  readonly heightMm: number
}

export interface Patch {
  /** Panel ids. */
  readonly panels: Int32Array
  /** From each panel's frame to the patch's plane: c, s, x, y each (see `Motion2`); same order. */
  readonly motions: Float64Array
  /** Crease ids of the folds. */
  readonly folds: readonly number[]
  /** Convex parts of the panels in the patch's plane, as in `PanelGraph.parts`, panel after panel. */
  readonly coords: Float64Array
  /** Boxes of the panels: minX, minY, maxX, maxY each; and of all of them. */
  readonly boxes: Float64Array
  readonly box: Float64Array
  readonly hull: Float64Array
  /** mm² */
  readonly area: number
  /** An angle by which the patch turns into the rectangle. */
  readonly angle: number
}

/**
 * Parts that go into each other by less than this many mm touch; it is above rounding (1e-9 mm on the largest models)
 * and far below the smallest panel (0.005 mm).
 */
const touchMm = 1e-8
/** Common area in mm² from which two panels overlap: above rounding, below what a checker could see. */
const overlapMm2 = 1e-6

const motionAt = (motions: Float64Array, i: number): Motion2 => ({
  c: motions[4 * i]!,
  s: motions[4 * i + 1]!,
  x: motions[4 * i + 2]!,
  y: motions[4 * i + 3]!,
})

/** Writes the box of coords[from … to) into boxes at `at`. */
const boxInto = (boxes: Float64Array, at: number, coords: Float64Array, from: number, to: number): void => {
  let minX = coords[from]!
  let maxX = minX
  let minY = coords[from + 1]!
  let maxY = minY
  for (let k = from + 2; k < to; k += 2) {
    const x = coords[k]!
    const y = coords[k + 1]!
    if (x < minX) minX = x
    else if (x > maxX) maxX = x
    if (y < minY) minY = y
    else if (y > maxY) maxY = y
  }
  boxes[at] = minX
  boxes[at + 1] = minY
  boxes[at + 2] = maxX
  boxes[at + 3] = maxY
}

const wholeBox = (boxes: Float64Array, n: number): Float64Array => {
  const box = boxes.slice(0, 4)
  for (let i = 4; i < 4 * n; i += 4) {
    if (boxes[i]! < box[0]!) box[0] = boxes[i]!
    if (boxes[i + 1]! < box[1]!) box[1] = boxes[i + 1]!
    if (boxes[i + 2]! > box[2]!) box[2] = boxes[i + 2]!
    if (boxes[i + 3]! > box[3]!) box[3] = boxes[i + 3]!
  }
  return box
}

/** One panel by itself. It is let through even when it does not fit the rectangle: nothing smaller can be cut. */
export const singlePatch = (graph: PanelGraph, panel: number, fit: FitRectangle): Patch => {
  const coords = graph.parts[panel]!
  const boxes = new Float64Array(4)
  boxInto(boxes, 0, coords, 0, coords.length)
  const hull = convexHull(coords)
  return {
    panels: Int32Array.of(panel),
    motions: Float64Array.of(1, 0, 0, 0),
    folds: [],
    coords,
    boxes,
    box: boxes,
    hull,
    area: graph.areas[panel]!,
    angle: fittingAngle(hull, fit.widthMm, fit.heightMm) ?? 0,
  }
}

export const inverse2 = (m: Motion2): Motion2 => ({
  c: m.c,
  s: -m.s,
  x: -(m.c * m.x + m.s * m.y),
  y: m.s * m.x - m.c * m.y,
})

/**
 * The motion with cosine and sine brought back onto the unit circle. A patch is moved thousands of times in a search, and
 * without this a rounding error doubles with every inverse.
 */
const normalized = (m: Motion2): Motion2 => {
  const k = 1.5 - 0.5 * (m.c * m.c + m.s * m.s)
  return { c: k * m.c, s: k * m.s, x: m.x, y: m.y }
}

/** Whether two panels overlap by more than `overlapMm2`: parts of `a` from place p, parts of `b` from place q on. */
const overlapping = (
  a: Float64Array,
  p: number,
  sizesA: Int32Array,
  b: Float64Array,
  q: number,
  sizesB: Int32Array,
): boolean => {
  let area = 0
  for (let i = 0; i < sizesA.length; i++) {
    const p1 = p + sizesA[i]!
    let q0 = q
    for (let j = 0; j < sizesB.length; j++) {
      const q1 = q0 + sizesB[j]!
      if (!separated(a, p, p1, b, q0, q1, touchMm)) {
        area += overlapArea(a, p, p1, b, q0, q1)
        if (area > overlapMm2) return true
      }
      q0 = q1
    }
    p = p1
  }
  return false
}

// Room for the patch that is moved; grown when needed.
let movedCoords = new Float64Array(4096)
let movedBoxes = new Float64Array(1024)
let hullPoints = new Float64Array(512)

/** Whether points (x0, y0, … up to n) turned by the angle fit the rectangle one way or the other. */
const fitsAt = (points: Float64Array, n: number, angle: number, { widthMm, heightMm }: FitRectangle): boolean => {
  const c = Math.cos(angle)
  const s = Math.sin(angle)
  let minX = Number.POSITIVE_INFINITY
  let maxX = Number.NEGATIVE_INFINITY
  let minY = Number.POSITIVE_INFINITY
  let maxY = Number.NEGATIVE_INFINITY
  for (let i = 0; i < n; i += 2) {
    const x = c * points[i]! - s * points[i + 1]!
    const y = s * points[i]! + c * points[i + 1]!
    if (x < minX) minX = x
    if (x > maxX) maxX = x
    if (y < minY) minY = y
    if (y > maxY) maxY = y
  }
  return maxX - minX <= widthMm && maxY - minY <= heightMm
}

/**
 * Joins two patches by folding at a crease between them; null when panels would overlap or the net would not fit the
 * rectangle. The patch with more panels stays where it is.
 */
export const joinPatches = (graph: PanelGraph, p: Patch, q: Patch, link: Link, fit: FitRectangle): Patch | null => {
  const area = p.area + q.area
  if (area > fit.widthMm * fit.heightMm) return null
  const swap = q.panels.length > p.panels.length
  const a = swap ? q : p
  const b = swap ? p : q
  const first = a.panels.indexOf(link.sides[0].panel)
  const ia = first >= 0 ? first : a.panels.indexOf(link.sides[1].panel)
  const ib = b.panels.indexOf(link.sides[first >= 0 ? 1 : 0].panel)
  const across = first >= 0 ? link.motion : inverse2(link.motion)
  const move = normalized(compose2(compose2(motionAt(a.motions, ia), across), inverse2(motionAt(b.motions, ib))))

  if (overlapWhenMoved(graph, a, b, move)) return null

  const n = a.hull.length + b.hull.length
  if (hullPoints.length < n) hullPoints = new Float64Array(2 * n)
  hullPoints.set(a.hull)
  moveInto(hullPoints, a.hull.length, b.hull, move)
  let angle: number | null = a.angle
  let hull: Float64Array | undefined
  if (!fitsAt(hullPoints, n, angle, fit)) {
    angle = b.angle - Math.atan2(move.s, move.c)
    if (!fitsAt(hullPoints, n, angle, fit)) {
      hull = convexHull(hullPoints.subarray(0, n))
      angle = fittingAngle(hull, fit.widthMm, fit.heightMm)
      if (angle === null) return null
    }
  }
  hull ??= convexHull(hullPoints.subarray(0, n))

  const [na, nb] = [a.panels.length, b.panels.length]
  const panels = new Int32Array(na + nb)
  panels.set(a.panels)
  panels.set(b.panels, na)
  const motions = new Float64Array(4 * (na + nb))
  motions.set(a.motions)
  for (let i = 0; i < nb; i++) {
    const m = normalized(compose2(move, motionAt(b.motions, i)))
    motions[4 * (na + i)] = m.c
    motions[4 * (na + i) + 1] = m.s
    motions[4 * (na + i) + 2] = m.x
    motions[4 * (na + i) + 3] = m.y
  }
  const coords = new Float64Array(a.coords.length + b.coords.length)
  coords.set(a.coords)
  coords.set(movedCoords.subarray(0, b.coords.length), a.coords.length)
  const boxes = new Float64Array(4 * (na + nb))
  boxes.set(a.boxes)
  boxes.set(movedBoxes.subarray(0, 4 * nb), 4 * na)
  const box = wholeBox(boxes, na + nb)
  return { panels, motions, folds: [...a.folds, ...b.folds, link.id], coords, boxes, box, hull, area, angle }
}

/** Leaves the moved parts and boxes of `b` in `movedCoords` and `movedBoxes`. */
const overlapWhenMoved = (graph: PanelGraph, a: Patch, b: Patch, move: Motion2): boolean => {
  if (movedCoords.length < b.coords.length) movedCoords = new Float64Array(2 * b.coords.length)
  if (movedBoxes.length < b.boxes.length) movedBoxes = new Float64Array(2 * b.boxes.length)
  moveInto(movedCoords, 0, b.coords, move)
  const nb = b.panels.length
  for (let j = 0, at = 0; j < nb; j++) {
    const end = at + graph.parts[b.panels[j]!]!.length
    boxInto(movedBoxes, 4 * j, movedCoords, at, end)
    at = end
  }
  const [left, low, right, top] = wholeBox(movedBoxes, nb) as unknown as [number, number, number, number]
  for (let i = 0, at = 0; i < a.panels.length; i++) {
    const start = at
    at += graph.parts[a.panels[i]!]!.length
    const minX = a.boxes[4 * i]!
    const minY = a.boxes[4 * i + 1]!
    const maxX = a.boxes[4 * i + 2]!
    const maxY = a.boxes[4 * i + 3]!
    if (minX >= right || left >= maxX || minY >= top || low >= maxY) continue
    for (let j = 0, there = 0; j < nb; j++) {
      const begin = there
      there += graph.parts[b.panels[j]!]!.length
      if (minX >= movedBoxes[4 * j + 2]! || movedBoxes[4 * j]! >= maxX) continue
      if (minY >= movedBoxes[4 * j + 3]! || movedBoxes[4 * j + 1]! >= maxY) continue
      const [sizesA, sizesB] = [graph.partSizes[a.panels[i]!]!, graph.partSizes[b.panels[j]!]!]
      if (overlapping(a.coords, start, sizesA, movedCoords, begin, sizesB)) return true
    }
  }
  return false
}

/**
 * A patch without some of its folds: what is left hangs together in one or more patches, each lying as it lay.
 * @param singles by panel: `singlePatch`
 */
export const splitPatch = (
  patch: Patch,
  keep: (fold: number) => boolean,
  graph: PanelGraph,
  singles: readonly Patch[],
): Patch[] => {
  const n = patch.panels.length
  const sets = new UnionFind(n)
  const kept = patch.folds.filter(keep)
  if (kept.length === patch.folds.length) return [patch]
  const ends = kept.map((fold) => patch.panels.indexOf(graph.links[fold]!.sides[0].panel))
  kept.forEach((fold, k) => {
    sets.union(ends[k]!, patch.panels.indexOf(graph.links[fold]!.sides[1].panel))
  })
  const members = Array.from({ length: n }, (): number[] => [])
  for (let i = 0; i < n; i++) members[sets.find(i)]!.push(i)
  const folds: number[][] = members.map(() => [])
  kept.forEach((fold, k) => {
    folds[sets.find(ends[k]!)]!.push(fold)
  })
  const starts: number[] = []
  for (let i = 0, at = 0; i < n; i++) {
    starts.push(at)
    at += graph.parts[patch.panels[i]!]!.length
  }
  return members.flatMap((list, root): Patch[] => {
    if (list.length === 0) return []
    if (list.length === 1) return [singles[patch.panels[root]!]!]
    const panels = Int32Array.from(list, (i) => patch.panels[i]!)
    const motions = new Float64Array(4 * list.length)
    const boxes = new Float64Array(4 * list.length)
    let size = 0
    let area = 0
    for (const p of panels) {
      size += graph.parts[p]!.length
      area += graph.areas[p]!
    }
    const coords = new Float64Array(size)
    size = 0
    list.forEach((i, k) => {
      const length = graph.parts[panels[k]!]!.length
      coords.set(patch.coords.subarray(starts[i], starts[i]! + length), size)
      size += length
      for (let d = 0; d < 4; d++) {
        motions[4 * k + d] = patch.motions[4 * i + d]!
        boxes[4 * k + d] = patch.boxes[4 * i + d]!
      }
    })
    const box = wholeBox(boxes, list.length)
    return [
      { panels, motions, folds: folds[root]!, coords, boxes, box, hull: convexHull(coords), area, angle: patch.angle },
    ]
  })
}

/**
 * A patch: panels laid flat beside each other while nets are being searched for. Patches never change; joining two gives
 * a third, so that a search can go back to what it had.
 */
import { type ConvexPart, movePart, overlapArea, separated } from '../geometry/convex'
import { convexHull, fittingAngle } from '../geometry/hull'
import { UnionFind } from '../geometry/union-find'
import { compose2, identity2, type Motion2 } from '../geometry/vec2'
import type { Link, PanelGraph } from './panel-graph'

/** The rectangle that a piece has to fit into, in mm; it may be turned freely. */
export interface FitRectangle {
  readonly widthMm: number
  readonly heightMm: number
}

export interface Patch {
  /** Panel ids. */
  readonly panels: readonly number[]
  /** From each panel's frame to the patch's plane; same order. */
  readonly motions: readonly Motion2[]
  /** Crease ids of the folds. */
  readonly folds: readonly number[]
  /** Convex parts of each panel in the patch's plane. */
  readonly parts: readonly (readonly ConvexPart[])[]
  /** Boxes of the panels: minX, minY, maxX, maxY each; and of all of them. */
  readonly boxes: Float64Array
  readonly box: Float64Array
  readonly hull: Float64Array
  /** mm² */
  readonly area: number
}

/**
 * Parts that go into each other by less than this many mm touch; it is above rounding (1e-9 mm on the largest models)
 * and far below the smallest panel (0.005 mm).
 */
const touchMm = 1e-8
/** Common area in mm² from which two panels overlap: above rounding, below what a checker could see. */
export const overlapMm2 = 1e-6

const boxesOf = (parts: readonly (readonly ConvexPart[])[]): { boxes: Float64Array; box: Float64Array } => {
  const boxes = new Float64Array(4 * parts.length)
  const box = Float64Array.of(Infinity, Infinity, -Infinity, -Infinity)
  parts.forEach((list, i) => {
    let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity]
    for (const part of list)
      for (let k = 0; k < part.length; k += 2) {
        const x = part[k]!
        const y = part[k + 1]!
        if (x < minX) minX = x
        if (x > maxX) maxX = x
        if (y < minY) minY = y
        if (y > maxY) maxY = y
      }
    boxes.set([minX, minY, maxX, maxY], 4 * i)
    box[0] = Math.min(box[0]!, minX)
    box[1] = Math.min(box[1]!, minY)
    box[2] = Math.max(box[2]!, maxX)
    box[3] = Math.max(box[3]!, maxY)
  })
  return { boxes, box }
}

export const singlePatch = (graph: PanelGraph, panel: number): Patch => {
  const parts = [graph.parts[panel]!]
  return {
    panels: [panel],
    motions: [identity2],
    folds: [],
    parts,
    ...boxesOf(parts),
    hull: convexHull(graph.flat[panel]!.rings[0]!.flat()),
    area: graph.areas[panel]!,
  }
}

export const inverse2 = (m: Motion2): Motion2 => ({
  c: m.c,
  s: -m.s,
  x: -(m.c * m.x + m.s * m.y),
  y: m.s * m.x - m.c * m.y,
})

/** Whether the parts of two panels overlap by more than `overlapMm2`. */
const overlapping = (p: readonly ConvexPart[], q: readonly ConvexPart[]): boolean => {
  let area = 0
  for (const a of p)
    for (const b of q)
      if (!separated(a, b, touchMm)) {
        area += overlapArea(a, b)
        if (area > overlapMm2) return true
      }
  return false
}

const boxesMeet = (a: Float64Array, i: number, b: Float64Array, j: number): boolean =>
  a[i]! < b[j + 2]! && b[j]! < a[i + 2]! && a[i + 1]! < b[j + 3]! && b[j + 1]! < a[i + 3]!

/**
 * Joins two patches by folding at a crease between them, or tells why not: null when panels would overlap or the net
 * would not fit the rectangle. The larger patch stays where it is.
 */
export const joinPatches = (p: Patch, q: Patch, link: Link, fit: FitRectangle): Patch | null => {
  if (p.area + q.area > fit.widthMm * fit.heightMm) return null
  const swap = q.panels.length > p.panels.length
  const a = swap ? q : p
  const b = swap ? p : q
  const first = a.panels.indexOf(link.sides[0].panel)
  const ia = first >= 0 ? first : a.panels.indexOf(link.sides[1].panel)
  const ib = b.panels.indexOf(link.sides[first >= 0 ? 1 : 0].panel)
  const across = first >= 0 ? link.motion : inverse2(link.motion)
  const move = compose2(compose2(a.motions[ia]!, across), inverse2(b.motions[ib]!))

  const points = new Float64Array(a.hull.length + b.hull.length)
  points.set(a.hull)
  points.set(movePart(b.hull, move), a.hull.length)
  const hull = convexHull(points)
  if (fittingAngle(hull, fit.widthMm, fit.heightMm) === null) return null

  const moved = b.parts.map((list) => list.map((part) => movePart(part, move)))
  const { boxes, box } = boxesOf(moved)
  if (boxesMeet(a.box, 0, box, 0))
    for (let i = 0; i < a.panels.length; i++) {
      if (!boxesMeet(a.boxes, 4 * i, box, 0)) continue
      for (let j = 0; j < moved.length; j++)
        if (boxesMeet(a.boxes, 4 * i, boxes, 4 * j) && overlapping(a.parts[i]!, moved[j]!)) return null
    }
  const allBoxes = new Float64Array(a.boxes.length + boxes.length)
  allBoxes.set(a.boxes)
  allBoxes.set(boxes, a.boxes.length)
  return {
    panels: [...a.panels, ...b.panels],
    motions: [...a.motions, ...b.motions.map((m) => compose2(move, m))],
    folds: [...a.folds, ...b.folds, link.id],
    parts: [...a.parts, ...moved],
    boxes: allBoxes,
    box: Float64Array.of(
      Math.min(a.box[0]!, box[0]!),
      Math.min(a.box[1]!, box[1]!),
      Math.max(a.box[2]!, box[2]!),
      Math.max(a.box[3]!, box[3]!),
    ),
    hull,
    area: a.area + b.area,
  }
}

/** A patch without some of its folds: what is left hangs together in one or more patches, each lying as it lay. */
export const splitPatch = (patch: Patch, keep: (fold: number) => boolean, graph: PanelGraph): Patch[] => {
  const place = new Map<number, number>()
  patch.panels.forEach((p, i) => {
    place.set(p, i)
  })
  const sets = new UnionFind(patch.panels.length)
  const kept = patch.folds.filter(keep)
  for (const fold of kept) {
    const [a, b] = graph.links[fold]!.sides
    sets.union(place.get(a.panel)!, place.get(b.panel)!)
  }
  const groups = new Map<number, number[]>()
  patch.panels.forEach((_, i) => {
    const root = sets.find(i)
    const group = groups.get(root)
    if (group) group.push(i)
    else groups.set(root, [i])
  })
  const folds = new Map<number, number[]>([...groups.keys()].map((root) => [root, []]))
  for (const fold of kept) folds.get(sets.find(place.get(graph.links[fold]!.sides[0].panel)!))!.push(fold)
  return [...groups].map(([root, members]): Patch => {
    if (members.length === 1) return singlePatch(graph, patch.panels[members[0]!]!)
    const parts = members.map((i) => patch.parts[i]!)
    return {
      panels: members.map((i) => patch.panels[i]!),
      motions: members.map((i) => patch.motions[i]!),
      folds: folds.get(root)!,
      parts,
      ...boxesOf(parts),
      hull: convexHull(flatten(parts)),
      area: members.reduce((sum, i) => sum + graph.areas[patch.panels[i]!]!, 0),
    }
  })
}

const flatten = (parts: readonly (readonly ConvexPart[])[]): Float64Array => {
  let n = 0
  for (const list of parts) for (const part of list) n += part.length
  const out = new Float64Array(n)
  n = 0
  for (const list of parts)
    for (const part of list) {
      out.set(part, n)
      n += part.length
    }
  return out
}

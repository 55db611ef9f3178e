/**
 * Set operations on regions of the plane: the one door to clipper-lib (Vatti's algorithm, Communications of the ACM 35,
 * 1992, on integer coordinates).
 *
 * A region is a list of rings in mm, open lists of points, filled by the nonzero rule: outer rings counter-clockwise,
 * holes clockwise. Results have the same form, with rings that may touch but do not cross.
 *
 * clipper-lib is silently wrong on fractions, so coordinates are rounded to a grid: 1e-5 mm while everything lies within
 * 474 mm of the origin, 1e-4 mm up to 4.7 m, where its products still are exact in a double. Results are good to that
 * grid, and slivers thinner than it come and go.
 */
import ClipperLib, { type Path, type Paths, type PolyNode } from 'clipper-lib'
import { BrokenPromise } from '../errors'
import { type Ring2, signedArea, type Vec2 } from './vec2'

export type Region = readonly Ring2[]

/** One connected region: its outer ring counter-clockwise, then its holes clockwise. */
export type PolygonWithHoles = Ring2[]

ClipperLib.Error = (message) => {
  // As shipped it opens an alert box.
  throw new BrokenPromise(`Clipping failed: ${message}`)
}

/** Largest integer coordinate for which clipper-lib keeps to plain arithmetic. */
const exactRange = 47_453_132

const unitsPerMm = (...regions: Region[]): number => {
  let far = 0
  for (const region of regions)
    for (const ring of region) for (const [x, y] of ring) far = Math.max(far, Math.abs(x), Math.abs(y))
  // Written so that NaN, which Math.max passes on, ends in the error too.
  if (far * 1e5 < exactRange) return 1e5
  if (far * 1e4 < exactRange) return 1e4
  throw new BrokenPromise('A coordinate is too large for clipping.', { mm: far, limit: exactRange / 1e4 })
}

const toPath = (ring: Ring2, k: number): Path => ring.map(([x, y]) => ({ X: Math.round(x * k), Y: Math.round(y * k) }))
const toPaths = (region: Region, k: number): Paths => region.map((ring) => toPath(ring, k))
const fromPath = (path: Path, k: number): Ring2 => path.map(({ X, Y }): Vec2 => [X / k, Y / k])
const fromPaths = (paths: Paths, k: number): Ring2[] => paths.filter((p) => p.length > 2).map((p) => fromPath(p, k))

const { ctUnion, ctDifference, ctIntersection, ctXor } = ClipperLib.ClipType
const { ptSubject, ptClip } = ClipperLib.PolyType
const nonzero = ClipperLib.PolyFillType.pftNonZero

const run = (operation: number, a: Paths, b: Paths, keepCollinear: boolean): Paths => {
  const clipper = new ClipperLib.Clipper()
  clipper.PreserveCollinear = keepCollinear
  clipper.AddPaths(a, ptSubject, true)
  clipper.AddPaths(b, ptClip, true)
  const out = new ClipperLib.Paths()
  if (!clipper.Execute(operation, out, nonzero, nonzero))
    throw new BrokenPromise('Clipping gave no result.', { operation, rings: a.length + b.length })
  return out
}

const operate = (operation: number, a: Region, b: Region, keepCollinear: boolean): Ring2[] => {
  const k = unitsPerMm(a, b)
  return fromPaths(run(operation, toPaths(a, k), toPaths(b, k), keepCollinear), k)
}

/** Everything that lies in any of the rings. @param keepCollinear keep points in the middle of straight edges */
export const union = (region: Region, keepCollinear = false): Ring2[] => operate(ctUnion, region, [], keepCollinear)

/** What lies in `a` but not in `b`. */
export const difference = (a: Region, b: Region, keepCollinear = false): Ring2[] =>
  operate(ctDifference, a, b, keepCollinear)

/** What lies in both. */
export const intersection = (a: Region, b: Region, keepCollinear = false): Ring2[] =>
  operate(ctIntersection, a, b, keepCollinear)

/** What lies in exactly one of the two. */
export const symmetricDifference = (a: Region, b: Region): Ring2[] => operate(ctXor, a, b, false)

/** Area in mm² of a region whose rings do not cross (as the functions here return them): holes count against it. */
export const regionArea = (region: Region): number => region.reduce((sum, ring) => sum + signedArea(ring), 0)

/** Area in mm² common to both. */
export const intersectionArea = (a: Region, b: Region): number => regionArea(intersection(a, b))

/** Area in mm² of `a` outside `b`. */
export const differenceArea = (a: Region, b: Region): number => regionArea(difference(a, b))

export interface OffsetOptions {
  /** Corners: round (all points within the distance), or mitred up to `miterLimit` times the distance. */
  readonly join?: 'round' | 'miter'
  /** Default 2. */
  readonly miterLimit?: number
  /** Greatest distance in mm between a round corner and its chords; default 0.01. */
  readonly arcToleranceMm?: number
}

/** The region grown by `distanceMm` on all sides, or shrunk if it is negative. Overlapping rings are merged first. */
export const offset = (region: Region, distanceMm: number, options: OffsetOptions = {}): Ring2[] => {
  const { join = 'round', miterLimit = 2, arcToleranceMm = 0.01 } = options
  const reach = Math.abs(distanceMm) * Math.max(2, miterLimit)
  const k = unitsPerMm(
    region.map((ring) => ring.map(([x, y]): Vec2 => [x + Math.sign(x) * reach, y + Math.sign(y) * reach])),
  )
  const whole = run(ctUnion, toPaths(region, k), [], false)
  const machine = new ClipperLib.ClipperOffset(miterLimit, arcToleranceMm * k)
  const { jtRound, jtMiter } = ClipperLib.JoinType
  machine.AddPaths(whole, join === 'round' ? jtRound : jtMiter, ClipperLib.EndType.etClosedPolygon)
  const out = new ClipperLib.Paths()
  machine.Execute(out, distanceMm * k)
  return fromPaths(out, k)
}

/** A region taken apart into its connected polygons, each with its holes; islands in holes are polygons of their own. */
export const polygons = (region: Region, keepCollinear = false): PolygonWithHoles[] => {
  const k = unitsPerMm(region)
  const clipper = new ClipperLib.Clipper()
  clipper.PreserveCollinear = keepCollinear
  clipper.AddPaths(toPaths(region, k), ptSubject, true)
  const tree = new ClipperLib.PolyTree()
  clipper.Execute(ctUnion, tree, nonzero, nonzero)
  const out: PolygonWithHoles[] = []
  const visit = (node: PolyNode): void => {
    for (const outer of node.Childs()) {
      const holes = outer.Childs()
      out.push([outer.Contour(), ...holes.map((h) => h.Contour())].map((path) => fromPath(path, k)))
      for (const hole of holes) visit(hole)
    }
  }
  visit(tree)
  return out
}

/**
 * Minkowski sum: all a + b with a in the region and b in the simple ring `pattern` (either way round). The set of
 * forbidden positions of a part B beside a part A (no-fit polygon) is `minkowskiSum(A, −B)`, `−B` turned by 180 degrees.
 * Contacts that only just fit (gaps of width zero) are filled by the closed sum.
 */
export const minkowskiSum = (region: Region, pattern: Ring2): Ring2[] => {
  const first = pattern[0]
  if (!first || region.length === 0) return []
  const reach = Math.max(...pattern.flatMap(([x, y]) => [Math.abs(x), Math.abs(y)]))
  const k = unitsPerMm(
    region.map((ring) => ring.map(([x, y]): Vec2 => [Math.abs(x) + reach, Math.abs(y) + reach])),
    [pattern],
  )
  const p = toPath(signedArea(pattern) < 0 ? [...pattern].reverse() : pattern, k)
  const shift = (path: Path, by: { X: number; Y: number }): Path =>
    path.map(({ X, Y }) => ({ X: X + by.X, Y: Y + by.Y }))
  const paths: Paths = []
  for (const path of toPaths(region, k)) {
    // The sum of the boundaries, and one copy of either part for what lies deeper inside than the other reaches.
    paths.push(...ClipperLib.Clipper.Minkowski(p, path, true, true))
    paths.push(shift(path, p[0]!), shift(p, path[0]!))
  }
  return fromPaths(run(ctUnion, paths, [], false), k)
}

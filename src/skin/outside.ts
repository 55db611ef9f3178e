/**
 * Which sides of which cells the unbounded outside touches.
 *
 * Work is done on representative planes only: a cell side stands for all its images under the rotations, and the outside
 * is the same under each of them. Around every edge the cells are sorted by angle; the two sides that face each other
 * across a sector bound the same region of space and are joined. Boundary parts that hang on at a single point (or not
 * at all) are reached by rays to the first thing they hit.
 */
import { BrokenPromise } from '../errors'
import { UnionFind } from '../geometry/union-find'
import type { Vec2 } from '../geometry/vec2'
import { windingNumber } from '../geometry/vec2'
import { add, apply, cross, dot, normalize, planeFrame, scale, sub, transpose, type Vec3 } from '../geometry/vec3'
import { type Arrangement, walk } from './arrangement'
import { covers, type FilledFace } from './filled-face'
import { type PlaneSet, toPlane, toSpace } from './planes'

/** One cell that meets an edge, as it stands around it. */
interface Spoke {
  readonly plane: number
  /** Cell sides (numbered as in `Sides`) that face the sector after and before this cell, turning about the edge. */
  readonly after: number
  readonly before: number
  readonly angle: number
}

/** Numbers the two sides of all cells of the representative arrangements; side 0 faces the plane's normal. */
export interface Sides {
  readonly count: number
  /** First number of each representative's cells, by plane id. */
  readonly base: ReadonlyMap<number, number>
  /** True: the outside touches this side. */
  readonly outside: readonly boolean[]
  /**
   * By representative plane id, then by edge: bit s is set when, on side s of the plane, nothing stands between the cells
   * on the two sides of the edge.
   */
  readonly level: ReadonlyMap<number, Uint8Array>
}

/** Number of a cell's side; see `Sides.base`. Side 0 faces the plane's normal. */
export const sideOf = (base: number, cell: number, side: 0 | 1): number => base + 2 * cell + side

/** @throws BrokenPromise when two planes disagree on how an edge is divided, or no ray escapes. */
export const findOutside = (
  set: PlaneSet,
  arrangements: ReadonlyMap<number, Arrangement>,
  faces: readonly FilledFace[],
  report: (done: number) => void = () => {},
): Sides => {
  const base = new Map<number, number>()
  let count = 0
  for (const r of set.representatives) {
    base.set(r, count)
    count += 2 * arrangements.get(r)!.cells.length
  }
  const regions = new UnionFind(count + 1)
  const infinity = count

  const level = new Map<number, Uint8Array>()
  for (const [i, r] of set.representatives.entries()) {
    report((0.7 * i) / set.representatives.length)
    const arrangement = arrangements.get(r)!
    const bits = new Uint8Array(arrangement.origin.length / 2)
    for (let e = 0; e < bits.length; e++) {
      const fan = spokesAround(set, arrangements, base, arrangement, e)
      for (let i = 0; i < fan.length; i++) {
        const a = fan[i]!
        const b = fan[(i + 1) % fan.length]!
        regions.union(a.after, b.before)
        if (a !== b && a.plane === r && b.plane === r) bits[e]! |= 1 << ((a.after - base.get(r)!) & 1)
      }
    }
    level.set(r, bits)
    for (const { motion, flips } of set.stabilizers.get(r)!) {
      const image = cellImages(arrangement, motion)
      const b = base.get(r)!
      for (let c = 0; c < arrangement.cells.length; c++) {
        if (arrangement.cells[c]!.faces.length === 0) continue
        regions.union(sideOf(b, c, 0), sideOf(b, image[c]!, flips ? 1 : 0))
        regions.union(sideOf(b, c, 1), sideOf(b, image[c]!, flips ? 0 : 1))
      }
    }
  }
  castRays(set, arrangements, faces, base, regions, infinity, (done) => report(0.7 + 0.3 * done))

  const home = regions.find(infinity)
  const outside = Array.from({ length: count }, (_, s) => regions.find(s) === home)
  for (const r of set.representatives) {
    const b = base.get(r)!
    arrangements.get(r)!.cells.forEach((cell, c) => {
      if (cell.faces.length > 0) return
      outside[b + 2 * c] = false
      outside[b + 2 * c + 1] = false
    })
  }
  if (!outside.includes(true)) throw new BrokenPromise('The skin is empty.', { cells: count / 2 })
  return { count, base, outside, level }
}

/** The cells that meet edge e of a representative, sorted by angle about the edge (from vertex of half-edge 2e on). */
const spokesAround = (
  set: PlaneSet,
  arrangements: ReadonlyMap<number, Arrangement>,
  base: ReadonlyMap<number, number>,
  home: Arrangement,
  e: number,
): Spoke[] => {
  const { points, origin, frame, cell, cells } = home
  const covered = (h: number): boolean => cell[h]! >= 0 && cells[cell[h]!]!.faces.length > 0
  // Edges in the open air of this plane are other planes' business.
  if (!covered(2 * e) && !covered(2 * e + 1)) return []
  const a = toSpace(frame, points.x[origin[2 * e]!]!, points.y[origin[2 * e]!]!)
  const b = toSpace(frame, points.x[origin[2 * e + 1]!]!, points.y[origin[2 * e + 1]!]!)
  const d = normalize(sub(b, a))
  const { u, v } = planeFrame(d)
  const fan: Spoke[] = []
  for (let k = home.crossersFrom[e]! - 1; k < home.crossersFrom[e + 1]!; k++) {
    const id = k < home.crossersFrom[e]! ? home.plane.id : home.crossers[k]!
    const plane = set.planes[id]!
    const there = arrangements.get(plane.representative)!
    const h = id === home.plane.id ? 2 * e : locateEdge(there, transpose(plane.motion), a, b)
    if (h < 0)
      throw new BrokenPromise('Two planes disagree on how an edge is divided.', { planes: [home.plane.id, id], a, b })
    const start = base.get(plane.representative)!
    // Left of d in the plane is normal × d; turning on about d from there leads to the side that the normal faces.
    const left = cross(plane.normal, d)
    const leftCell = there.cell[h]!
    const rightCell = there.cell[h ^ 1]!
    if (leftCell >= 0 && there.cells[leftCell]!.faces.length > 0)
      fan.push({
        plane: id,
        after: sideOf(start, leftCell, 0),
        before: sideOf(start, leftCell, 1),
        angle: Math.atan2(dot(left, v), dot(left, u)),
      })
    if (rightCell >= 0 && there.cells[rightCell]!.faces.length > 0)
      fan.push({
        plane: id,
        after: sideOf(start, rightCell, 1),
        before: sideOf(start, rightCell, 0),
        angle: Math.atan2(-dot(left, v), -dot(left, u)),
      })
  }
  return fan.sort((p, q) => p.angle - q.angle)
}

/** The half-edge of an arrangement that runs from inverse·a to inverse·b, or -1. */
const locateEdge = (there: Arrangement, inverse: Parameters<typeof apply>[0], a: Vec3, b: Vec3): number => {
  const [ax, ay] = toPlane(there.frame, apply(inverse, a))
  const [bx, by] = toPlane(there.frame, apply(inverse, b))
  const i = there.points.find(ax, ay, 0)
  const j = there.points.find(bx, by, 0)
  return i < 0 || j < 0 ? -1 : there.halfEdge(i, j)
}

/** By cell: the cell that a rotation which keeps the plane carries it to. */
export const cellImages = (arrangement: Arrangement, motion: Parameters<typeof apply>[0]): number[] => {
  const { frame, points, origin, cells } = arrangement
  const image = (i: number): Vec3 => apply(motion, toSpace(frame, points.x[i]!, points.y[i]!))
  const flips = dot(apply(motion, frame.normal), frame.normal) < 0
  return cells.map((cell, c) => {
    const h = cell.starts[0]!
    const a = toPlane(frame, image(origin[h]!))
    const b = toPlane(frame, image(origin[h ^ 1]!))
    const i = points.find(a[0], a[1], 0)
    const j = points.find(b[0], b[1], 0)
    const there = i < 0 || j < 0 ? -1 : arrangement.halfEdge(i, j)
    if (there < 0) throw new BrokenPromise('A rotation does not map a plane’s cells to cells.', { cell: c })
    return arrangement.cell[flips ? there ^ 1 : there]!
  })
}

interface Hit {
  readonly distance: number
  readonly face: FilledFace
  readonly point: Vec3
}

/** Spheres round the faces, x, y, z, radius² face after face: most faces are passed by far off. */
const spheresRound = (faces: readonly FilledFace[]): Float64Array => {
  const spheres = new Float64Array(4 * faces.length)
  faces.forEach(({ cycle, frame }, i) => {
    const points = cycle.map(([x, y]) => toSpace(frame, x, y))
    const centre = scale(
      points.reduce((s, p) => add(s, p), [0, 0, 0] as Vec3),
      1 / points.length,
    )
    const reach = points.reduce((most, p) => Math.max(most, dot(sub(p, centre), sub(p, centre))), 0)
    spheres.set([...centre, reach * (1 + 1e-9)], 4 * i)
  })
  return spheres
}

/** First filled face that a ray meets, or null if it escapes. A face plane that the ray starts on is no hit. */
const firstHit = (faces: readonly FilledFace[], spheres: Float64Array, from: Vec3, direction: Vec3): Hit | null => {
  const [ox, oy, oz] = from
  const [dx, dy, dz] = direction
  let best: Hit | null = null
  for (let i = 0; i < faces.length; i++) {
    const x = spheres[4 * i]! - ox
    const y = spheres[4 * i + 1]! - oy
    const z = spheres[4 * i + 2]! - oz
    const along = x * dx + y * dy + z * dz
    if (x * x + y * y + z * z - along * along > spheres[4 * i + 3]!) continue
    const face = faces[i]!
    const { normal, origin } = face.frame
    const slope = dot(normal, direction)
    if (Math.abs(slope) < 1e-9) continue
    const distance = dot(normal, sub(origin, from)) / slope
    if (distance < 1e-7 || (best && distance >= best.distance)) continue
    const point = add(from, scale(direction, distance))
    if (covers(face, toPlane(face.frame, point))) best = { distance, face, point }
  }
  return best
}

/** The cell side of a representative that stands for the side hit, or -1 if the point lies too near an edge to tell. */
const sideHit = (
  set: PlaneSet,
  arrangements: ReadonlyMap<number, Arrangement>,
  base: ReadonlyMap<number, number>,
  hit: Hit,
  direction: Vec3,
): number => {
  const plane = set.planes[hit.face.plane]!
  const there = arrangements.get(plane.representative)!
  const [x, y] = toPlane(there.frame, apply(transpose(plane.motion), hit.point))
  const { cells, next, origin, points } = there
  let best = -1
  for (let c = 0; c < cells.length; c++) {
    if (best >= 0 && cells[c]!.area >= cells[best]!.area) continue
    const ring: Vec2[] = walk(next, cells[c]!.starts[0]!).map((h) => [points.x[origin[h]!]!, points.y[origin[h]!]!])
    if (windingNumber(ring, [x, y]) !== 0) best = c
  }
  if (best < 0 || cells[best]!.faces.length === 0) return -1
  return sideOf(base.get(plane.representative)!, best, dot(plane.normal, direction) < 0 ? 0 : 1)
}

/**
 * Joins regions whose boundary falls apart into several pieces. A boundary piece whose sides enclose a positive volume
 * has its region on the outside; each such piece sends rays out until it is known to belong to the unbounded outside,
 * or a fixed number of rays has told nothing new.
 */
const castRays = (
  set: PlaneSet,
  arrangements: ReadonlyMap<number, Arrangement>,
  faces: readonly FilledFace[],
  base: ReadonlyMap<number, number>,
  regions: UnionFind,
  infinity: number,
  report: (done: number) => void,
): void => {
  const images = new Map<number, number>()
  for (const p of set.planes) images.set(p.representative, (images.get(p.representative) ?? 0) + 1)
  interface Piece {
    volume: number
    sides: { plane: number; cell: number; side: 0 | 1; area: number }[]
  }
  const pieces = new Map<number, Piece>()
  for (const r of set.representatives) {
    const arrangement = arrangements.get(r)!
    arrangement.cells.forEach((cell, c) => {
      if (cell.faces.length === 0) return
      for (const side of [0, 1] as const) {
        const root = regions.find(sideOf(base.get(r)!, c, side))
        let piece = pieces.get(root)
        if (!piece) pieces.set(root, (piece = { volume: 0, sides: [] }))
        piece.volume += ((side === 0 ? 1 : -1) * arrangement.plane.offset * cell.area * images.get(r)!) / 3
        piece.sides.push({ plane: r, cell: c, side, area: cell.area })
      }
    })
  }
  const open = [...pieces.values()].filter((p) => p.volume > -1e-12).sort((a, b) => b.volume - a.volume)
  const spheres = spheresRound(faces)
  for (const [i, piece] of open.entries()) {
    report(i / open.length)
    piece.sides.sort((a, b) => b.area - a.area)
    const rays = Math.max(48, Math.min(400, 2 * piece.sides.length))
    for (let k = 0; k < rays; k++) {
      const { plane, cell, side } = piece.sides[k % piece.sides.length]!
      if (regions.find(sideOf(base.get(plane)!, cell, side)) === regions.find(infinity)) break
      const { frame, cells } = arrangements.get(plane)!
      const inside = cells[cell]!.inside
      const from = toSpace(frame, inside[0], inside[1])
      const direction = spread(k, scale(frame.normal, side === 0 ? 1 : -1))
      const hit = firstHit(faces, spheres, from, direction)
      if (!hit) regions.union(infinity, sideOf(base.get(plane)!, cell, side))
      else {
        const other = sideHit(set, arrangements, base, hit, direction)
        if (other >= 0) regions.union(other, sideOf(base.get(plane)!, cell, side))
      }
    }
  }
}

/** The k-th of a fixed spread of directions in the half-space that `normal` points into (a golden-angle spiral). */
const spread = (k: number, normal: Vec3): Vec3 => {
  const { u, v } = planeFrame(normal)
  // A fixed irrational offset keeps rays off the solid's own symmetry planes.
  const height = 1 - ((k * 0.61803398875 + 0.0721) % 1) * 0.97
  const angle = k * 2.39996322973 + 0.317
  const radius = Math.sqrt(1 - height * height)
  return add(scale(normal, height), add(scale(u, radius * Math.cos(angle)), scale(v, radius * Math.sin(angle))))
}

/** Safe repairs: corners at one place become one, and faces that are nothing go. */
import { SnapGrid } from '../geometry/snap'
import { cross, dot, norm, scale, sub, type Vec3 } from '../geometry/vec3'
import type { RawFace, RawModel } from './types'

export interface MendedFace extends Omit<RawFace, 'cycle'> {
  readonly cycle: readonly number[]
  /** Position in the file's list of faces. */
  readonly index: number
}

export interface Mended {
  readonly points: readonly Vec3[]
  readonly faces: readonly MendedFace[]
  /** Corners that lay near another one without being equal. */
  readonly near: number
  /** The farthest that one of these was moved, in file units. */
  readonly widest: number
  /** Vertices of the file that repeat another one exactly. */
  readonly equal: number
  readonly shortEdges: number
  readonly flatFaces: number
  readonly unused: number
}

/**
 * @param reach corners no farther apart are one, in file units
 * @param size radius of the model, in file units
 * @param beat called often
 */
export const mend = (raw: RawModel, reach: number, size: number, beat: () => void): Mended => {
  const c = raw.coordinates
  const grid = new SnapGrid(reach, reach, Math.max(4 * reach, size / 64))
  const given = new Int32Array(c.length / 3).fill(-1)
  let near = 0
  let equal = 0
  const pointOf = (v: number): number => {
    if (given[v]! >= 0) return given[v]!
    const x = c[3 * v]!
    const y = c[3 * v + 1]!
    const z = c[3 * v + 2]!
    const before = grid.size
    const id = grid.add(x, y, z)
    if (id < before) {
      if (grid.x[id] === x && grid.y[id] === y && grid.z[id] === z) equal++
      else near++
    }
    given[v] = id
    return id
  }
  const at = (i: number): Vec3 => [grid.x[i]!, grid.y[i]!, grid.z[i]!]
  let shortEdges = 0
  let flatFaces = 0
  const faces: MendedFace[] = []
  raw.faces.forEach((face, index) => {
    if ((index & 1023) === 0) beat()
    const cycle = face.cycle.map(pointOf)
    const kept = withoutShortEdges(cycle)
    const gone = kept.length < 3 || isThin(kept.map(at), reach)
    if (gone) flatFaces++
    else {
      shortEdges += cycle.length - kept.length
      faces.push({ ...face, cycle: kept, index })
    }
  })
  // Corners of faces that went may now be unused.
  const numbers = new Map<number, number>()
  const points: Vec3[] = []
  const renumbered = faces.map((f) => ({
    ...f,
    cycle: f.cycle.map((v) => {
      let n = numbers.get(v)
      if (n === undefined) {
        n = points.length
        numbers.set(v, n)
        points.push(at(v))
      }
      return n
    }),
  }))
  const unused = given.reduce((sum, id) => sum + (id < 0 ? 1 : 0), 0)
  return { points, faces: renumbered, near, widest: grid.widestMerge, equal, shortEdges, flatFaces, unused }
}

/** Drops corners that repeat the one before, and spikes: there and back along one edge. */
const withoutShortEdges = (cycle: readonly number[]): number[] => {
  const kept: number[] = []
  for (const v of cycle) {
    if (kept[kept.length - 1] === v) continue
    if (kept.length > 1 && kept[kept.length - 2] === v) kept.pop()
    else kept.push(v)
  }
  // The same where the end meets the beginning.
  let from = 0
  let to = kept.length
  for (;;) {
    if (to - from > 1 && kept[from] === kept[to - 1]) to--
    else if (to - from > 2 && kept[from] === kept[to - 2]) to -= 2
    else if (to - from > 2 && kept[from + 1] === kept[to - 1]) from += 2
    else return kept.slice(from, to)
  }
}

/** Whether all corners lie on one line within `reach`. */
const isThin = (points: readonly Vec3[], reach: number): boolean => {
  const o = points[0]!
  const longest = (from: Vec3): Vec3 =>
    points.reduce<Vec3>((best, p) => (norm(sub(p, from)) > norm(best) ? sub(p, from) : best), [0, 0, 0])
  const far = longest(o)
  // From one end of the longest stretch, so that the line is well given.
  const end: Vec3 = [o[0] + far[0], o[1] + far[1], o[2] + far[2]]
  const along = longest(end)
  const length = norm(along)
  if (length <= reach) return true
  return points.every((p) => norm(cross(sub(p, end), along)) <= reach * length)
}

/** Best plane of a face: normal from its area where it has one, else from the widest corner; offset the mean. */
export const planeOf = (points: readonly Vec3[]): { normal: Vec3; offset: number; off: number; worst: number } => {
  const o = points[0]!
  let area: Vec3 = [0, 0, 0]
  let widest: Vec3 = [0, 0, 0]
  for (let i = 1; i + 1 < points.length; i++) {
    const n = cross(sub(points[i]!, o), sub(points[i + 1]!, o))
    area = [area[0] + n[0], area[1] + n[1], area[2] + n[2]]
    if (norm(n) > norm(widest)) widest = n
  }
  // Crossed faces whose parts cancel out have no area, but still a plane.
  const n = norm(area) > 1e-3 * norm(widest) ? area : widest
  const normal = scale(n, 1 / norm(n))
  const offset = points.reduce((sum, p) => sum + dot(normal, p), 0) / points.length
  let off = 0
  let worst = 0
  points.forEach((p, i) => {
    const d = Math.abs(dot(normal, p) - offset)
    if (!(d <= off)) {
      off = d
      worst = i
    }
  })
  return { normal, offset, off, worst }
}

/**
 * From outside cell sides to panels: cells of one plane and one side that nothing on the outside separates grow together,
 * their boundaries are traced as simple rings, and the rotations carry them to all planes of the orbit.
 */
import { BrokenPromise } from '../errors'
import { SnapGrid } from '../geometry/snap'
import { UnionFind } from '../geometry/union-find'
import { apply, scale, type Vec3 } from '../geometry/vec3'
import type { Arrangement } from './arrangement'
import { cellImages, type Sides, sideOf } from './outside'
import { type FacePlane, type PlaneSet, toSpace } from './planes'
import type { Tolerance } from './tolerance'

/** A panel before its edges are merged into creases: every ring edge is an edge of the arrangement. */
export interface RawPanel {
  readonly normal: Vec3
  readonly rings: readonly (readonly number[])[]
  readonly faces: readonly number[]
  readonly kind: number
  readonly orbit: number
}

interface Template {
  readonly side: 0 | 1
  /** Vertex numbers of the representative arrangement, in the winding wanted seen from outside. */
  readonly rings: number[][]
  readonly faces: number[]
  readonly kind: number
  readonly orbit: number
}

/**
 * @param kindOfFace colour of each face; where coplanar faces of different kinds overlap, the lowest kind wins
 * @param carried see `carriedFaces`
 * @returns panels of all planes and the points that their rings refer to
 */
export const collectPanels = (
  set: PlaneSet,
  arrangements: ReadonlyMap<number, Arrangement>,
  sides: Sides,
  kindOfFace: readonly number[],
  carried: (plane: FacePlane, face: number) => number,
  tolerance: Tolerance,
  report: (done: number) => void = () => {},
): { panels: RawPanel[]; points: Vec3[] } => {
  const templates = new Map<number, Template[]>()
  let orbits = 0
  for (const [i, r] of set.representatives.entries()) {
    report(i / set.representatives.length)
    const list = panelsOfPlane(set, arrangements.get(r)!, sides, kindOfFace, orbits)
    orbits = list.reduce((m, t) => Math.max(m, t.orbit + 1), orbits)
    templates.set(r, list)
  }
  const grid = new SnapGrid(tolerance.merge, tolerance.gap, tolerance.cell)
  const panels: RawPanel[] = []
  for (const plane of set.planes) {
    const arrangement = arrangements.get(plane.representative)!
    const placed = new Map<number, number>()
    const place = (v: number): number => {
      let id = placed.get(v)
      if (id === undefined) {
        const { frame, points } = arrangement
        const p = apply(plane.motion, toSpace(frame, points.x[v]!, points.y[v]!))
        id = grid.add(p[0], p[1], p[2])
        placed.set(v, id)
      }
      return id
    }
    for (const t of templates.get(plane.representative)!)
      panels.push({
        normal: t.side === 0 ? plane.normal : scale(plane.normal, -1),
        rings: t.rings.map((ring) => ring.map(place)),
        faces: t.faces.map((f) => carried(plane, f)).sort((a, b) => a - b),
        kind: t.kind,
        orbit: t.orbit,
      })
  }
  const points = Array.from({ length: grid.size }, (_, i): Vec3 => [grid.x[i]!, grid.y[i]!, grid.z[i]!])
  return { panels, points }
}

const panelsOfPlane = (
  set: PlaneSet,
  arrangement: Arrangement,
  sides: Sides,
  kindOfFace: readonly number[],
  firstOrbit: number,
): Template[] => {
  const r = arrangement.plane.id
  const base = sides.base.get(r)!
  const { cell, cells, origin, next } = arrangement
  const kinds = cells.map((c) => Math.min(...c.faces.map((f) => kindOfFace[f]!)))
  const joined = new UnionFind(2 * cells.length)
  // seamless[side][e]: on that side the surface runs on across e, in one colour.
  const level = sides.level.get(r)!
  const seamless: [Uint8Array, Uint8Array] = [new Uint8Array(level.length), new Uint8Array(level.length)]
  for (let e = 0; e < level.length; e++) {
    const left = cell[2 * e]!
    const right = cell[2 * e + 1]!
    if (level[e] === 0 || kinds[left] !== kinds[right]) continue
    for (const side of [0, 1] as const) {
      if (!(level[e]! & (1 << side)) || !sides.outside[sideOf(base, left, side)]) continue
      seamless[side][e] = 1
      joined.union(2 * left + side, 2 * right + side)
    }
  }

  const members = new Map<number, { side: 0 | 1; faces: Set<number>; kind: number; rings: number[][] }>()
  const membersOf = (root: number): { side: 0 | 1; faces: Set<number>; kind: number; rings: number[][] } => {
    let m = members.get(root)
    if (!m) {
      m = { side: (root & 1) as 0 | 1, faces: new Set(), kind: kinds[root >> 1]!, rings: [] }
      members.set(root, m)
    }
    return m
  }
  for (const side of [0, 1] as const) {
    for (let c = 0; c < cells.length; c++)
      if (sides.outside[sideOf(base, c, side)]) {
        const m = membersOf(joined.find(2 * c + side))
        for (const f of cells[c]!.faces) m.faces.add(f)
      }
    const done = new Array<boolean>(origin.length).fill(false)
    const bounds = (h: number): boolean => {
      const c = cell[h]!
      return c >= 0 && sides.outside[sideOf(base, c, side)]! && !seamless[side][h >> 1]
    }
    for (let start = 0; start < origin.length; start++) {
      if (done[start] || !bounds(start)) continue
      const ring: number[] = []
      let h = start
      do {
        done[h] = true
        ring.push(origin[h]!)
        h = next[h]!
        while (seamless[side][h >> 1]) h = next[h ^ 1]!
      } while (h !== start)
      const m = membersOf(joined.find(2 * cell[start]! + side))
      for (const loop of simpleLoops(ring)) {
        // A loop there and back is a slit: a body touches the middle of this panel along a line. Closed through the
        // inside, the panel runs on under it, and there is nothing to fold or glue.
        if (loop.length < 3) continue
        m.rings.push(side === 0 ? loop : loop.reverse())
      }
    }
  }

  const roots = [...members.keys()].sort((a, b) => a - b)
  const orbitOf = new UnionFind(2 * cells.length)
  for (const { motion, flips } of set.stabilizers.get(r)!) {
    const image = cellImages(arrangement, motion)
    for (const root of roots) {
      const there = joined.find(2 * image[root >> 1]! + (flips ? (root & 1) ^ 1 : root & 1))
      orbitOf.union(root, there)
    }
  }
  const orbitNumber = new Map<number, number>()
  return roots.map((root) => {
    const { side, faces, kind, rings } = members.get(root)!
    const key = orbitOf.find(root)
    if (!orbitNumber.has(key)) orbitNumber.set(key, firstOrbit + orbitNumber.size)
    return {
      side,
      rings: outerFirst(rings, arrangement, side),
      faces: [...faces].sort((a, b) => a - b),
      kind,
      orbit: orbitNumber.get(key)!,
    }
  })
}

/** Cuts a closed walk at vertices that it visits more than once, so that each loop is simple. */
const simpleLoops = (ring: readonly number[]): number[][] => {
  const loops: number[][] = []
  const stack: number[] = []
  const position = new Map<number, number>()
  for (const v of ring) {
    const seen = position.get(v)
    if (seen !== undefined) {
      const loop = stack.splice(seen)
      for (const w of loop) position.delete(w)
      loops.push(loop)
    }
    position.set(v, stack.length)
    stack.push(v)
  }
  loops.push(stack)
  return loops
}

const outerFirst = (rings: readonly number[][], arrangement: Arrangement, side: 0 | 1): number[][] => {
  const { points } = arrangement
  const areaOf = (ring: readonly number[]): number => {
    let twice = 0
    const o = ring[0]!
    for (let i = 1; i + 1 < ring.length; i++) {
      const a = ring[i]!
      const b = ring[i + 1]!
      twice +=
        (points.x[a]! - points.x[o]!) * (points.y[b]! - points.y[o]!) -
        (points.x[b]! - points.x[o]!) * (points.y[a]! - points.y[o]!)
    }
    return (side === 0 ? twice : -twice) / 2
  }
  const outer = rings.filter((ring) => areaOf(ring) > 0)
  const holes = rings.filter((ring) => areaOf(ring) <= 0)
  if (outer.length !== 1)
    throw new BrokenPromise('A panel does not have exactly one outer ring.', {
      plane: arrangement.plane.id,
      areas: rings.map(areaOf),
    })
  return [...outer, ...holes]
}

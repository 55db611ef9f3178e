/** What a model must keep, after mending, to be built: faces that are faces, closed, with a volume. */
import type { InputError, Progress } from '../errors'
import { cross, dot, norm, scale, sub, type Vec3 } from '../geometry/vec3'
import { type OpenStretch, openStretches } from './closed'
import { fault } from './file'
import { coverFinder } from './lying'
import { type Mended, type MendedFace, planeOf } from './mend'

/** Where a face stands in its file. */
export type PlaceOf = (face: MendedFace) => string

/** Short, for messages: at most six significant digits. */
export const short = (x: number): string => String(Number(x.toPrecision(6)))
export const point = (p: Vec3): string => `(${p.map(short).join(', ')})`

/** @throws InputError when a face runs along one edge twice the same way: its filled region would be doubly wound */
export const checkCycles = (
  file: string,
  faces: readonly MendedFace[],
  points: readonly Vec3[],
  place: PlaceOf,
): void => {
  for (const f of faces) {
    if (new Set(f.cycle).size === f.cycle.length) continue
    const seen = new Set<string>()
    f.cycle.forEach((a, i) => {
      const key = `${a} ${f.cycle[(i + 1) % f.cycle.length]}`
      if (seen.has(key))
        throw fault(
          file,
          place(f),
          `face ${f.index + 1} repeats the edge that begins at ${point(points[a]!)}; name each corner once.`,
        )
      seen.add(key)
    })
  }
}

/** Faces with the same edges: the first of each group, and how often it occurs. */
export const distinctFaces = (faces: readonly MendedFace[]): { face: MendedFace; times: number }[] => {
  const found = new Map<string, { face: MendedFace; times: number }>()
  for (const face of faces) {
    const n = face.cycle.length
    const key = face.cycle
      .map((a, i) => {
        const b = face.cycle[(i + 1) % n]!
        return a < b ? `${a}-${b}` : `${b}-${a}`
      })
      .sort()
      .join(' ')
    const same = found.get(key)
    if (same) same.times++
    else found.set(key, { face, times: 1 })
  }
  return [...found.values()]
}

export interface Closed {
  readonly faces: readonly MendedFace[]
  /** Faces that went because they repeat one that stays. */
  readonly repeated: number
  /** Groups of equal faces of which none stays. */
  readonly walls: number
  /** Free edges: nothing is joined to the face there. */
  readonly open: readonly OpenStretch[]
  /** Stretches with an odd number of faces that are not free. */
  readonly lying: number
}

/**
 * Doubled faces are counted once. Where that leaves the model open, but taking both of each pair away does not, they were
 * walls between two parts: inside, and nothing to build.
 *
 * @param beat called often
 *
 * A stretch of edge with an odd number of faces is free when it has one face only and does not lie on other faces.
 */
export const closeUp = ({ points, faces }: Mended, reach: number, beat: () => void): Closed => {
  const distinct = distinctFaces(faces)
  beat()
  const once = distinct.map((d) => d.face)
  const open = openStretches(points, once, reach, beat)
  const asOnce = { faces: once, repeated: faces.length - once.length, walls: 0, open, lying: 0 }
  if (open.length === 0) return asOnce
  const odd = distinct.filter((d) => d.times % 2 === 1)
  if (odd.length > 0 && odd.length < once.length) {
    const unpaired = odd.map((d) => d.face)
    if (openStretches(points, unpaired, reach, beat).length === 0) {
      const repeated = odd.reduce((sum, d) => sum + d.times - 1, 0)
      return { faces: unpaired, repeated, walls: once.length - unpaired.length, open: [], lying: 0 }
    }
  }
  const covered = coverFinder(points, once, reach, beat)
  const free = open.filter((s) => s.faces.length === 1 && !covered(s.ends, s.faces))
  return { ...asOnce, open: free, lying: open.length - free.length }
}

/** The error for a model with gaps: the longest of them, with its ends and its faces. */
export const notClosed = (
  file: string,
  points: readonly Vec3[],
  faces: readonly MendedFace[],
  open: readonly OpenStretch[],
  place: PlaceOf,
): InputError => {
  const length = ({ ends }: OpenStretch): number => norm(sub(points[ends[0]]!, points[ends[1]]!))
  const worst = open.reduce((best, s) => (length(s) > length(best) ? s : best))
  const owner = faces[worst.faces[0]!]!
  const all = open.length === 1 ? 'It is the only such edge' : `There are ${open.length} such edges`
  return fault(
    file,
    place(owner),
    `not closed: the edge from ${point(points[worst.ends[0]]!)} to ${point(points[worst.ends[1]]!)} has ` +
      `this face only. ${all}; add the face that is missing there, or take the loose one away.`,
  )
}

/**
 * The greatest distance of a corner from its face's plane.
 * @param limit what is still taken as flat, in file units
 * @throws InputError that names the face, the corner and how far it is off
 */
export const unflatness = (
  file: string,
  points: readonly Vec3[],
  faces: readonly MendedFace[],
  limit: number,
  size: number,
  place: PlaceOf,
  progress: Progress,
): number => {
  let most = 0
  faces.forEach((f, i) => {
    if ((i & 1023) === 0) progress('model', 0.7 + (0.1 * i) / faces.length)
    if (f.cycle.length < 4) return
    const { off, worst } = planeOf(f.cycle.map((v) => points[v]!))
    if (!(off <= limit))
      throw fault(
        file,
        place(f),
        `face ${f.index + 1} is not flat: its corner at ${point(points[f.cycle[worst]!]!)} is ${short(off)} off its plane ` +
          `(${((100 * off) / size).toPrecision(2)} % of the model's radius); move the corner or split the face into triangles.`,
      )
    if (off > most) most = off
  })
  return most
}

/**
 * @param thin less than this across is no body, in file units
 * @throws InputError when all corners lie in one plane or on one line, or nearly
 */
export const checkVolume = (file: string, points: readonly Vec3[], thin: number): void => {
  const farthest = (from: Vec3, height: (d: Vec3) => number): Vec3 =>
    points.reduce<Vec3>(
      (best, p) => {
        const d = sub(p, from)
        return height(d) > height(best) ? d : best
      },
      [0, 0, 0],
    )
  const o = points[0]!
  const along = farthest(o, norm)
  const wide = farthest(o, (d) => norm(cross(d, along)))
  const normal = cross(along, wide)
  const across = norm(normal) / norm(along)
  const what = 'the model encloses no volume that could be built; export a solid body.'
  if (!(across > thin)) throw fault(file, '', `all corners lie on one line, within ${short(across)}: ${what}`)
  const n = scale(normal, 1 / norm(normal))
  const high = Math.abs(
    dot(
      farthest(o, (d) => Math.abs(dot(d, n))),
      n,
    ),
  )
  if (!(high > thin)) throw fault(file, '', `all corners lie in one plane, within ${short(high)}: ${what}`)
}

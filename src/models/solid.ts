/** From mended faces to a `Solid`: centred, scaled, with kinds, components and, for small exact models, rotations. */
import type { Progress } from '../errors'
import { UnionFind } from '../geometry/union-find'
import { apply, distance, identity3, type Mat3, scale, sub, type Vec3 } from '../geometry/vec3'
import { findIsometries } from '../solids/symmetry'
import type { Solid, SolidFace } from '../solids/types'
import { kindsOf } from './kinds'
import { leastSphere } from './least-sphere'
import type { MendedFace } from './mend'

/** Beyond this finding the rotations takes longer than they save. */
const greatestTurned = 400
/** `findIsometries` compares points to 1e-7; a solid's own rotations must be much better than that. */
const worstTurned = 1e-10

/** `own-` and the file's name in small letters, digits and hyphens. */
export const idOf = (fileName: string): string => {
  const words = nameOf(fileName)
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .toLowerCase()
    .match(/[a-z0-9]+/g)
  return `own-${words?.join('-').slice(0, 60) ?? 'model'}`
}

/** The file's name without folders and ending. */
export const nameOf = (fileName: string): string => {
  const last = fileName.replace(/^.*[/\\]/, '').replace(/\.[A-Za-z0-9]+$/, '')
  return (
    last
      .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
      .trim()
      .slice(0, 80) || 'model'
  )
}

/** Faces that share an edge belong to one component. */
const componentsOf = (faces: readonly MendedFace[], count: number): number[] => {
  const union = new UnionFind(faces.length)
  const first = new Map<number, number>()
  faces.forEach(({ cycle }, i) => {
    cycle.forEach((a, k) => {
      const b = cycle[(k + 1) % cycle.length]!
      const key = Math.min(a, b) * count + Math.max(a, b)
      const other = first.get(key)
      if (other === undefined) first.set(key, i)
      else union.union(other, i)
    })
  })
  const numbers = new Map<number, number>()
  return faces.map((_, i) => {
    const root = union.find(i)
    const n = numbers.get(root) ?? numbers.size
    numbers.set(root, n)
    return n
  })
}

/** Key of a face by its edges; a pentagon and the pentagram on its corners differ. */
const edgeKey = (kind: number, cycle: readonly number[]): string =>
  `${kind}:${cycle
    .map((a, i) => {
      const b = cycle[(i + 1) % cycle.length]!
      return a < b ? `${a}-${b}` : `${b}-${a}`
    })
    .sort()
    .join(' ')}`

const cornerKey = (kind: number, cycle: readonly number[]): string =>
  `${kind}:${[...cycle].sort((a, b) => a - b).join(' ')}`

/** The rotations, identity first, and the orbit of each face; the identity alone wherever there is any doubt. */
const turnsOf = (
  vertices: readonly Vec3[],
  faces: readonly { readonly cycle: readonly number[]; readonly kind: number }[],
  precision: number,
): { rotations: readonly Mat3[]; orbit: number[] } => {
  const alone = { rotations: [identity3], orbit: faces.map((_, i) => i) }
  if (faces.length > greatestTurned || precision > worstTurned) return alone
  // Two faces on the same corners could be taken for each other.
  if (new Set(faces.map((f) => cornerKey(f.kind, f.cycle))).size !== faces.length) return alone
  const { rotations } = findIsometries({ vertices, faces })
  if (rotations.length < 2) return alone
  const faceAt = new Map(faces.map((f, i) => [edgeKey(f.kind, f.cycle), i]))
  const union = new UnionFind(faces.length)
  for (const g of rotations) {
    const image = vertices.map((p) => {
      const q = apply(g, p)
      let best = -1
      let least = 10 * Math.max(precision, 1e-12)
      vertices.forEach((r, i) => {
        const d = distance(q, r)
        if (d < least) {
          least = d
          best = i
        }
      })
      return best
    })
    for (let i = 0; i < faces.length; i++) {
      const { kind, cycle } = faces[i]!
      const there = faceAt.get(
        edgeKey(
          kind,
          cycle.map((v) => image[v]!),
        ),
      )
      if (there === undefined) return alone
      union.union(i, there)
    }
  }
  const numbers = new Map<number, number>()
  const orbit = faces.map((_, i) => {
    const root = union.find(i)
    const n = numbers.get(root) ?? numbers.size
    numbers.set(root, n)
    return n
  })
  return { rotations, orbit }
}

/**
 * @param precision in file units
 * @returns the solid, its greatest distance from the centre in file units, and how many materials were too many (0: none)
 */
export const solidFrom = (
  fileName: string,
  points: readonly Vec3[],
  mended: readonly MendedFace[],
  precision: number,
  progress: Progress,
): { solid: Solid; farthest: number; tooManyKinds: number } => {
  const numbers = new Map<number, number>()
  const used: Vec3[] = []
  const cycles = mended.map((f) =>
    f.cycle.map((v) => {
      let n = numbers.get(v)
      if (n === undefined) {
        n = used.length
        numbers.set(v, n)
        used.push(points[v]!)
      }
      return n
    }),
  )
  const { centre } = leastSphere(used)
  progress('model', 0.9)
  const farthest = used.reduce((m, p) => Math.max(m, distance(p, centre)), 0)
  const vertices = used.map((p) => scale(sub(p, centre), 1 / farthest))
  const { kinds, kind, tooMany } = kindsOf(mended)
  const bare = cycles.map((cycle, i) => ({ cycle, kind: kind[i]! }))
  const relative = Math.max(precision / farthest, 1e-12)
  const { rotations, orbit } = turnsOf(vertices, bare, relative)
  const components = componentsOf(
    cycles.map((cycle, i) => ({ ...mended[i]!, cycle })),
    used.length,
  )
  progress('model', 1)
  const solid: Solid = {
    id: idOf(fileName),
    name: nameOf(fileName),
    hand: 'none',
    vertices,
    faces: bare.map((f, i): SolidFace => ({ ...f, orbit: orbit[i]! })),
    kinds,
    rotations,
    family: 'own',
    precision: relative,
    ...(components.some((c) => c > 0) ? { components } : {}),
  }
  return { solid, farthest, tooManyKinds: tooMany }
}

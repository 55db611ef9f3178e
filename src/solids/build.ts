/** From a constructed polyhedron to a `Solid`: kinds, orbits, hands. */
import { SnapGrid } from '../geometry/snap'
import { apply, type Mat3, type Vec3 } from '../geometry/vec3'
import { polygonName } from './polygon-names'
import type { RawFace, RawSolid } from './raw'
import { findIsometries, type Isometries } from './symmetry'
import type { FaceKind, Solid, SolidFace, SolidFamily } from './types'

/** A face's kind: {n/d} for regular ones, else the name of its shape. */
const sortOf = (f: RawFace): string => f.shape ?? `${f.cycle.length}/${f.d}`

const kindsOf = (raw: RawSolid): FaceKind[] => {
  const kinds = new Map<string, { n: number; d: number; name: string; count: number }>()
  for (const f of raw.faces) {
    const kind = kinds.get(sortOf(f))
    const n = f.cycle.length
    if (kind) kind.count++
    else kinds.set(sortOf(f), { n, d: f.d, name: f.shape ?? polygonName(n, f.d), count: 1 })
  }
  return [...kinds.values()]
    .sort((a, b) => a.n - b.n || a.d - b.d)
    .map(({ n, d, name, count }, id) => ({ id, name, n, d, count }))
}

export interface Built {
  readonly solid: Solid
  readonly isometries: Isometries
}

/**
 * The right-handed (or only) form, with its isometries.
 * @param known the isometries, where they need not be sought
 */
export const buildFrom = (
  raw: RawSolid,
  about: { readonly id: string; readonly name: string; readonly family: SolidFamily },
  known?: Isometries,
): Built => {
  const kinds = kindsOf(raw)
  const faces = raw.faces.map((f) => ({
    cycle: f.cycle,
    kind: kinds.findIndex((k) => (f.shape ? k.name === f.shape : k.n === f.cycle.length && k.d === f.d)),
  }))
  const isometries = known ?? findIsometries({ vertices: raw.vertices, faces })
  const chiral = isometries.reflections.length === 0
  return {
    solid: {
      ...about,
      hand: chiral ? 'right' : 'none',
      vertices: raw.vertices,
      faces: withOrbits(raw.vertices, faces, isometries.rotations),
      kinds,
      rotations: isometries.rotations,
      ...(raw.components ? { components: raw.components } : {}),
    },
    isometries,
  }
}

const withOrbits = (
  vertices: readonly Vec3[],
  faces: readonly { readonly cycle: readonly number[]; readonly kind: number }[],
  rotations: readonly Mat3[],
): SolidFace[] => {
  const grid = new SnapGrid(1e-7, 1e-7, 1e-2)
  for (const [x, y, z] of vertices) grid.add(x, y, z)
  const keyOf = (kind: number, cycle: readonly number[]): string =>
    `${kind}:${[...cycle].sort((a, b) => a - b).join(' ')}`
  const faceAt = new Map(faces.map((f, i) => [keyOf(f.kind, f.cycle), i]))
  const orbit = faces.map(() => -1)
  let count = 0
  faces.forEach(({ kind, cycle }, i) => {
    if (orbit[i] !== -1) return
    for (const g of rotations) {
      const image = cycle.map((v) => {
        const [x, y, z] = apply(g, vertices[v]!)
        return grid.find(x, y, z)
      })
      orbit[faceAt.get(keyOf(kind, image))!] = count
    }
    count++
  })
  return faces.map((f, i) => ({ ...f, orbit: orbit[i]! }))
}

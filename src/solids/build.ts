/** From a constructed polyhedron to a `Solid`: kinds, orbits, hands. */
import { SnapGrid } from '../geometry/snap'
import { apply, type Mat3, type Vec3 } from '../geometry/vec3'
import { findIsometries, type Isometries } from './symmetry'
import type { FaceKind, Solid, SolidFace } from './types'
import type { RawSolid } from './wythoff'

const polygonNames: Readonly<Record<string, string>> = {
  '3/1': 'triangle',
  '4/1': 'square',
  '5/1': 'pentagon',
  '5/2': 'pentagram',
  '6/1': 'hexagon',
  '8/1': 'octagon',
  '8/3': 'octagram',
  '10/1': 'decagon',
  '10/3': 'decagram',
}

/** English name of {n/d}; d is the polygon's density, under n/2. */
export const polygonName = (n: number, d: number): string =>
  polygonNames[`${n}/${d}`] ?? (d === 1 ? `${n}-gon` : `${n}/${d}-gram`)

const kindsOf = (raw: RawSolid): FaceKind[] => {
  const counts = new Map<string, number>()
  for (const f of raw.faces) counts.set(`${f.cycle.length}/${f.d}`, (counts.get(`${f.cycle.length}/${f.d}`) ?? 0) + 1)
  return [...counts.entries()]
    .map(([key, count]) => {
      const [n, d] = key.split('/').map(Number) as [number, number]
      return { id: 0, name: polygonName(n, d), n, d, count }
    })
    .sort((a, b) => a.n - b.n || a.d - b.d)
    .map((kind, id) => ({ ...kind, id }))
}

export interface Built {
  readonly solid: Solid
  readonly isometries: Isometries
}

/** The right-handed (or only) form, with its isometries. */
export const buildFrom = (raw: RawSolid, id: string, name: string): Built => {
  const kinds = kindsOf(raw)
  const faces = raw.faces.map((f) => ({
    cycle: f.cycle,
    kind: kinds.findIndex((k) => k.n === f.cycle.length && k.d === f.d),
  }))
  const isometries = findIsometries({ vertices: raw.vertices, faces })
  const chiral = isometries.reflections.length === 0
  return {
    solid: {
      id,
      name,
      hand: chiral ? 'right' : 'none',
      vertices: raw.vertices,
      faces: withOrbits(raw.vertices, faces, isometries.rotations),
      kinds,
      rotations: isometries.rotations,
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
  const images = rotations.map((g) =>
    vertices.map((p) => {
      const [x, y, z] = apply(g, p)
      return grid.find(x, y, z)
    }),
  )
  const orbit = faces.map(() => -1)
  let count = 0
  faces.forEach((f, i) => {
    if (orbit[i] !== -1) return
    for (const image of images)
      orbit[
        faceAt.get(
          keyOf(
            f.kind,
            f.cycle.map((v) => image[v]!),
          ),
        )!
      ] = count
    count++
  })
  return faces.map((f, i) => ({ ...f, orbit: orbit[i]! }))
}

/**
 * The five regular compounds: their vertices are those of one regular solid and their face planes those of one. Each is made
 * of the images of one solid inscribed in a cube, under the rotations of a group that contains that solid's own.
 * Published in "Regular Polytopes" (Methuen, 1948), chapter 3.
 */

import { SnapGrid } from '../geometry/snap'
import { apply, distance, identity3, type Mat3, normalize, rotationAbout, scale, type Vec3 } from '../geometry/vec3'
import type { RawSolid } from './raw'
import { generateGroup } from './schwarz'

export interface CompoundName {
  readonly name: string
  readonly construct: () => RawSolid
  readonly notes: readonly string[]
}

interface Component {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly (readonly number[])[]
}

const tetrahedron: Component = {
  vertices: [
    [1, 1, 1],
    [1, -1, -1],
    [-1, 1, -1],
    [-1, -1, 1],
  ],
  faces: [
    [1, 2, 3],
    [0, 3, 2],
    [0, 1, 3],
    [0, 2, 1],
  ],
}

const opposite: Component = { ...tetrahedron, vertices: tetrahedron.vertices.map((p) => scale(p, -1)) }

const cube: Component = {
  vertices: [0, 1, 2, 3, 4, 5, 6, 7].map((i): Vec3 => [i & 1 ? 1 : -1, i & 2 ? 1 : -1, i & 4 ? 1 : -1]),
  faces: [
    [0, 2, 6, 4],
    [1, 3, 7, 5],
    [0, 1, 5, 4],
    [2, 3, 7, 6],
    [0, 1, 3, 2],
    [4, 5, 7, 6],
  ],
}

const octahedron: Component = {
  vertices: [
    [1, 0, 0],
    [-1, 0, 0],
    [0, 1, 0],
    [0, -1, 0],
    [0, 0, 1],
    [0, 0, -1],
  ],
  faces: [0, 1].flatMap((x) => [2, 3].flatMap((y) => [4, 5].map((z) => [x, y, z]))),
}

/** The 60 rotations of the icosahedron with fivefold axes (0, 1, τ) and so on; the cube's threefold axes are among its own. */
const icosahedral = (): Mat3[] => {
  const golden = (1 + Math.sqrt(5)) / 2
  return generateGroup([
    rotationAbout(normalize([0, 1, golden]), (2 * Math.PI) / 5),
    rotationAbout(normalize([1, 1, 1]), (2 * Math.PI) / 3),
  ])
}

/** The different images of the components, scaled to unit edge; vertices that components share are one. */
const spread = (components: readonly Component[], group: readonly Mat3[]): RawSolid => {
  const first = components[0]!
  const edge = distance(first.vertices[first.faces[0]![0]!]!, first.vertices[first.faces[0]![1]!]!)
  const grid = new SnapGrid(1e-7, 1e-7, 1e-2)
  const seen = new Set<string>()
  const faces: { cycle: number[]; d: number }[] = []
  const owner: number[] = []
  for (const component of components)
    for (const g of group) {
      const numbers = component.vertices.map((p) => {
        const [x, y, z] = apply(g, scale(p, 1 / edge))
        return grid.add(x, y, z)
      })
      const key = [...numbers].sort((a, b) => a - b).join(' ')
      if (seen.has(key)) continue
      for (const face of component.faces) {
        faces.push({ cycle: face.map((v) => numbers[v]!), d: 1 })
        owner.push(seen.size)
      }
      seen.add(key)
    }
  const vertices = Array.from({ length: grid.size }, (_, i): Vec3 => [grid.x[i]!, grid.y[i]!, grid.z[i]!])
  return { vertices, faces, components: owner }
}

const coplanar = 'Faces of different components lie in one plane, in 20 pairs.'
const shared = 'Every vertex is shared by two components.'

/**
 * The right-handed five tetrahedra: seen from outside, every triangle is turned counter-clockwise, by arctan √3(√5 − 2) or
 * about 22.24°, out of the place where its corners would point to the nearest fivefold axes.
 */
export const compoundNames: readonly CompoundName[] = [
  {
    name: 'compound of two tetrahedra',
    construct: () => spread([tetrahedron, opposite], [identity3]),
    notes: [],
  },
  { name: 'compound of five tetrahedra', construct: () => spread([tetrahedron], icosahedral()), notes: [] },
  {
    name: 'compound of ten tetrahedra',
    construct: () => spread([tetrahedron, opposite], icosahedral()),
    notes: [shared, coplanar],
  },
  { name: 'compound of five cubes', construct: () => spread([cube], icosahedral()), notes: [shared] },
  { name: 'compound of five octahedra', construct: () => spread([octahedron], icosahedral()), notes: [coplanar] },
]

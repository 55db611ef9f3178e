/** Solids and scenes made here, so that these tests lean on no other room. */
import { cross, dot, norm, normalize, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import type { FacesLike } from '../../src/preview/thumbnail'
import type { SceneItem } from '../../src/preview/types'

const phi = (1 + Math.sqrt(5)) / 2

export const icosahedronVertices: readonly Vec3[] = [-1, 1].flatMap((a) =>
  [-phi, phi].flatMap((b): Vec3[] => [
    [0, a, b],
    [a, b, 0],
    [b, 0, a],
  ]),
)

const edge = 2

/** Vertices around vertex v of the icosahedron, counter-clockwise seen from outside. */
const around = (v: number): number[] => {
  const axis = normalize(icosahedronVertices[v]!)
  const near = icosahedronVertices.flatMap((p, i) =>
    Math.abs(norm(sub(p, icosahedronVertices[v]!)) - edge) < 1e-9 ? [i] : [],
  )
  const first = icosahedronVertices[near[0]!]!
  const u = normalize(sub(first, scale(axis, dot(first, axis))))
  const w = cross(axis, u)
  const angle = (i: number): number => Math.atan2(dot(icosahedronVertices[i]!, w), dot(icosahedronVertices[i]!, u))
  return near.sort((a, b) => angle(a) - angle(b))
}

/** Twelve pentagons that cut through each other. */
export const greatDodecahedron: FacesLike = {
  vertices: icosahedronVertices,
  faces: icosahedronVertices.map((_, v) => ({ cycle: around(v), kind: 0 })),
}

/** Twelve pentagrams that cut through each other. */
export const smallStellatedDodecahedron: FacesLike = {
  vertices: icosahedronVertices,
  faces: icosahedronVertices.map((_, v) => {
    const [a, b, c, d, e] = around(v) as [number, number, number, number, number]
    return { cycle: [a, c, e, b, d], kind: 0 }
  }),
}

const corner = (i: number): Vec3 => [i & 1 ? 1 : -1, i & 2 ? 1 : -1, i & 4 ? 1 : -1]

/** Two tetrahedra through each other. */
export const twoTetrahedra: FacesLike = {
  vertices: Array.from({ length: 8 }, (_, i) => corner(i)),
  faces: [
    [0, 3, 5, 6],
    [1, 2, 4, 7],
  ].flatMap((t, kind) => t.map((_, skip) => ({ cycle: t.filter((__, i) => i !== skip), kind }))),
}

const cubeSides: readonly (readonly [Vec3, readonly Vec3[]])[] = (
  [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ] as Vec3[]
).flatMap((axis) =>
  [1, -1].map((sign): readonly [Vec3, readonly Vec3[]] => {
    const normal = scale(axis, sign)
    const u: Vec3 = [axis[2], axis[0], axis[1]]
    const v = cross(normal, u)
    const at = (a: number, b: number): Vec3 => [
      normal[0] + a * u[0] + b * v[0],
      normal[1] + a * u[1] + b * v[1],
      normal[2] + a * u[2] + b * v[2],
    ]
    return [normal, [at(-1, -1), at(1, -1), at(1, 1), at(-1, 1)]]
  }),
)

/** A cube of side 2; ids 0–5 in the order +x −x +y −y +z −z, groups of two opposite sides, kind x, y or z. */
export const cubeItems = (colours = ['#c0504d', '#9bbb59', '#4f81bd']): SceneItem[] =>
  cubeSides.map(([normal, ring], id) => ({
    id,
    group: id >> 1,
    kind: 'xyz'[id >> 1]!,
    colour: colours[id >> 1]!,
    normal,
    rings: [ring],
  }))

/** The same with a square window in every side, through which the insides show. */
export const windowItems = (): SceneItem[] =>
  cubeItems().map((item) => {
    const [ring] = item.rings
    const hole = ring!.map((p): Vec3 => {
      const off = sub(p, item.normal)
      return [item.normal[0] + off[0] * 0.5, item.normal[1] + off[1] * 0.5, item.normal[2] + off[2] * 0.5]
    })
    return { ...item, rings: [ring!, hole.reverse()] }
  })

/** Triangles anywhere in a ball, cutting through each other. @param next uniform numbers 0…1 */
export const randomItems = (count: number, next: () => number): SceneItem[] =>
  Array.from({ length: count }, (_, id) => {
    const point = (): Vec3 => [2 * next() - 1, 2 * next() - 1, 2 * next() - 1]
    let ring: Vec3[] = []
    let square: Vec3 = [0, 0, 0]
    while (norm(square) < 0.05) {
      ring = [point(), point(), point()]
      square = cross(sub(ring[1]!, ring[0]!), sub(ring[2]!, ring[0]!))
    }
    const hex = `#${Math.floor(next() * 0xffffff)
      .toString(16)
      .padStart(6, '0')}`
    return { id: 100 + id, group: id % 7, kind: `k${id % 5}`, colour: hex, normal: normalize(square), rings: [ring] }
  })

/** Every item with a second one on its back, in another colour and with ids 1000 higher. */
export const backToBack = (items: readonly SceneItem[]): SceneItem[] =>
  items.flatMap((item): SceneItem[] => [
    {
      ...item,
      id: item.id + 1000,
      colour: '#4080c0',
      normal: scale(item.normal, -1),
      rings: item.rings.map((ring) => [...ring].reverse()),
    },
    item,
  ])

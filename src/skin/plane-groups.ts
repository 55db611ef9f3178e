/**
 * Face planes of a model whose coordinates are only good to some precision: coplanar faces are coplanar within it, not to
 * the last digit. Large faces set the planes; smaller ones join the plane that they lie on.
 */
import { BrokenPromise } from '../errors'
import { add, dot, norm, scale, type Vec3 } from '../geometry/vec3'
import type { Solid } from '../solids/types'
import { acrossFace } from './area'

export interface PlaneGroup {
  normal: Vec3
  offset: number
  readonly faces: number[]
}

/** Cells of the table of normals; planes whose normals differ by more than half of this are never one plane. */
const normalCell = 2e-3

/**
 * @param on how far a vertex may stand off the plane of its face, in the solid's unit
 * @returns planes in the order of their largest faces, and the plane of each face
 * @throws BrokenPromise for a face without area
 */
export const groupByPlane = (solid: Solid, on: number): { groups: PlaneGroup[]; groupOfFace: number[] } => {
  const { vertices, faces } = solid
  const areas = faces.map((f) => acrossFace(f.cycle.map((v) => vertices[v]!)))
  const sizes = areas.map(norm)
  sizes.forEach((size, face) => {
    if (!(size > 0)) throw new BrokenPromise('A face has no area.', { face })
  })
  const order = faces.map((_, i) => i).sort((a, b) => sizes[b]! - sizes[a]! || a - b)
  const besides = facesByEdge(solid)
  const lies = (face: number, normal: Vec3, offset: number): boolean =>
    faces[face]!.cycle.every((v) => Math.abs(dot(normal, vertices[v]!) - offset) <= on)
  const planeOf = (face: number): { normal: Vec3; offset: number } => {
    const normal = scale(areas[face]!, 1 / sizes[face]!)
    const { cycle } = faces[face]!
    return { normal, offset: cycle.reduce((s, v) => s + dot(normal, vertices[v]!), 0) / cycle.length }
  }

  const groups: PlaneGroup[] = []
  const groupOfFace = new Array<number>(faces.length).fill(-1)
  const table = new Map<string, number[]>()
  for (const seed of order) {
    if (groupOfFace[seed]! >= 0) continue
    const plane = planeOf(seed)
    let id = candidates(table, plane.normal).find((g) => lies(seed, groups[g]!.normal, groups[g]!.offset)) ?? -1
    if (id < 0) {
      id = groups.length
      groups.push({ ...plane, faces: [] })
      enter(table, plane.normal, id)
    }
    // From a face on to its neighbours: a small one's own normal may be all noise, its corners are not.
    const { normal, offset, faces: members } = groups[id]!
    const queue = [seed]
    groupOfFace[seed] = id
    for (let face = queue.pop(); face !== undefined; face = queue.pop()) {
      members.push(face)
      const { cycle } = faces[face]!
      cycle.forEach((v, i) => {
        for (const other of besides.get(edgeKey(v, cycle[(i + 1) % cycle.length]!))!) {
          if (groupOfFace[other]! >= 0 || !lies(other, normal, offset)) continue
          groupOfFace[other] = id
          queue.push(other)
        }
      })
    }
  }
  for (const group of groups) refit(group)
  return { groups, groupOfFace }

  /** All faces together know the plane better than the largest alone, unless one of them would fall off. */
  function refit(group: PlaneGroup): void {
    group.faces.sort((a, b) => a - b)
    let sum: Vec3 = [0, 0, 0]
    for (const f of group.faces) sum = add(sum, scale(areas[f]!, dot(areas[f]!, group.normal) < 0 ? -1 : 1))
    const normal = scale(sum, 1 / norm(sum))
    let offset = 0
    let count = 0
    for (const f of group.faces)
      for (const v of faces[f]!.cycle) {
        offset += dot(normal, vertices[v]!)
        count++
      }
    offset /= count
    if (!group.faces.every((f) => lies(f, normal, offset))) return
    group.normal = normal
    group.offset = offset
  }
}

const edgeKey = (a: number, b: number): number => Math.min(a, b) * 0x4000000 + Math.max(a, b)

const facesByEdge = (solid: Solid): Map<number, number[]> => {
  const map = new Map<number, number[]>()
  solid.faces.forEach(({ cycle }, face) => {
    cycle.forEach((v, i) => {
      const key = edgeKey(v, cycle[(i + 1) % cycle.length]!)
      const list = map.get(key)
      if (list) list.push(face)
      else map.set(key, [face])
    })
  })
  return map
}

const cellOf = (normal: Vec3): [number, number, number] => [
  Math.floor(normal[0] / normalCell),
  Math.floor(normal[1] / normalCell),
  Math.floor(normal[2] / normalCell),
]

const enter = (table: Map<string, number[]>, normal: Vec3, id: number): void => {
  const key = cellOf(normal).join(' ')
  const list = table.get(key)
  if (list) list.push(id)
  else table.set(key, [id])
}

/** Groups whose normals are close to ±normal, in ascending order. */
const candidates = (table: ReadonlyMap<string, number[]>, normal: Vec3): number[] => {
  const found: number[] = []
  for (const sign of [1, -1]) {
    const [i, j, k] = cellOf(scale(normal, sign))
    for (let x = i - 1; x <= i + 1; x++)
      for (let y = j - 1; y <= j + 1; y++)
        for (let z = k - 1; z <= k + 1; z++) for (const id of table.get(`${x} ${y} ${z}`) ?? []) found.push(id)
  }
  return found.sort((a, b) => a - b)
}

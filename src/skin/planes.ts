/**
 * Face planes: faces that lie in one plane are handled together, and planes that a rotation of the solid carries onto
 * each other are cut up once.
 */
import { BrokenPromise } from '../errors'
import { SnapGrid } from '../geometry/snap'
import type { Vec2 } from '../geometry/vec2'
import {
  add,
  apply,
  distance,
  dot,
  identity3,
  type Mat3,
  norm,
  planeFrame,
  scale,
  sub,
  type Vec3,
} from '../geometry/vec3'
import type { Solid } from '../solids/types'
import { acrossFace } from './area'
import { groupByPlane } from './plane-groups'
import type { Tolerance } from './tolerance'

/** A frame of a plane: point = origin + x·u + y·v, with u × v = normal. */
export interface Frame {
  readonly origin: Vec3
  readonly u: Vec3
  readonly v: Vec3
  readonly normal: Vec3
}

/** Coordinates of p in the frame; what stands off the plane is dropped. */
export const toPlane = (f: Frame, p: Vec3): Vec2 => {
  const d = sub(p, f.origin)
  return [dot(d, f.u), dot(d, f.v)]
}
/** The point of space at (x, y) of the frame. */
export const toSpace = (f: Frame, x: number, y: number): Vec3 => add(f.origin, add(scale(f.u, x), scale(f.v, y)))

export interface FacePlane {
  readonly id: number
  /** Unit; `motion` carries the representative's normal onto it, sign included. */
  readonly normal: Vec3
  /** normal · point, for the points of the plane. */
  readonly offset: number
  readonly faces: readonly number[]
  /** The plane of this orbit that is cut up. */
  readonly representative: number
  /** Rotation that takes the representative onto this plane. */
  readonly motion: Mat3
}

/** A rotation that maps a representative plane onto itself; `flips` when it turns the plane's two sides round. */
export interface Stabilizer {
  readonly motion: Mat3
  readonly flips: boolean
}

export interface PlaneSet {
  readonly planes: readonly FacePlane[]
  /** Ids of the representatives, ascending. */
  readonly representatives: readonly number[]
  /** By representative: the rotations that keep it, without the identity. */
  readonly stabilizers: ReadonlyMap<number, readonly Stabilizer[]>
  /** By face: its plane. */
  readonly planeOfFace: readonly number[]
}

/**
 * Sorts the faces of a solid into planes and the planes into orbits under `solid.rotations`.
 * @throws BrokenPromise when a face is not flat within `tolerance.on`, or a rotation does not map planes to planes.
 */
export const findPlanes = (solid: Solid, tolerance: Tolerance): PlaneSet => {
  if (solid.precision !== undefined) return roughPlanes(solid, tolerance)
  const { found, planeOfFace, lookUp } = exactPlanes(solid, tolerance)
  const planes: (FacePlane | undefined)[] = found.map(() => undefined)
  const representatives: number[] = []
  const stabilizers = new Map<number, Stabilizer[]>()
  const isIdentity = (m: Mat3): boolean => distance(m[0], identity3[0]) + distance(m[1], identity3[1]) < 1e-6
  for (let r = 0; r < found.length; r++) {
    if (planes[r]) continue
    const { normal, offset } = found[r]!
    representatives.push(r)
    const keep: Stabilizer[] = []
    stabilizers.set(r, keep)
    planes[r] = { id: r, normal, offset, faces: found[r]!.faces, representative: r, motion: identity3 }
    for (const motion of solid.rotations) {
      if (isIdentity(motion)) continue
      const image = apply(motion, normal)
      let target = lookUp(image, offset)
      let flips = false
      if (target < 0 || (target === r && dot(image, normal) < 0)) {
        target = lookUp(scale(image, -1), -offset)
        flips = true
      }
      if (target < 0)
        throw new BrokenPromise('A rotation of the solid does not map its planes to planes.', { plane: r })
      if (target === r) keep.push({ motion, flips })
      else if (!planes[target])
        planes[target] = {
          id: target,
          normal: image,
          offset,
          faces: found[target]!.faces,
          representative: r,
          motion,
        }
    }
  }
  return { planes: planes as FacePlane[], representatives, stabilizers, planeOfFace }
}

/** Faces sorted into planes where equal planes agree to rounding. `lookUp`: id of the plane with this normal, or -1. */
const exactPlanes = (
  solid: Solid,
  tolerance: Tolerance,
): {
  found: { normal: Vec3; offset: number; faces: number[] }[]
  planeOfFace: number[]
  lookUp: (normal: Vec3, offset: number) => number
} => {
  // Normals are compared on the unit sphere, where a looser bound than for points is safe: planes that differ by less
  // than 1e-7 in direction would have vertices inside the tolerance gap.
  const normals = new SnapGrid(1e-7, 1e-7, 1e-2)
  const byNormal = new Map<number, number[]>()
  const found: { normal: Vec3; offset: number; faces: number[] }[] = []
  const lookUp = (normal: Vec3, offset: number): number => {
    const k = normals.find(normal[0], normal[1], normal[2])
    if (k < 0) return -1
    for (const p of byNormal.get(k) ?? []) if (Math.abs(found[p]!.offset - offset) <= tolerance.on) return p
    return -1
  }
  const planeOfFace = solid.faces.map((face, index) => {
    const points = face.cycle.map((i) => solid.vertices[i]!)
    const area = acrossFace(points)
    const normal = scale(area, 1 / norm(area))
    const offset = points.reduce((s, p) => s + dot(normal, p), 0) / points.length
    for (const p of points)
      if (Math.abs(dot(normal, p) - offset) > tolerance.on)
        throw new BrokenPromise('A face is not flat.', { face: index, by: dot(normal, p) - offset })
    let id = lookUp(normal, offset)
    if (id < 0) id = lookUp(scale(normal, -1), -offset)
    if (id < 0) {
      id = found.length
      found.push({ normal, offset, faces: [] })
      const k = normals.add(normal[0], normal[1], normal[2])
      const list = byNormal.get(k)
      if (list) list.push(id)
      else byNormal.set(k, [id])
    }
    found[id]!.faces.push(index)
    return id
  })
  return { found, planeOfFace, lookUp }
}

/** Every plane its own representative: motions found in rough coordinates are rough themselves. */
const roughPlanes = (solid: Solid, tolerance: Tolerance): PlaneSet => {
  const { groups, groupOfFace } = groupByPlane(solid, tolerance.on)
  const planes = groups.map(
    ({ normal, offset, faces }, id): FacePlane => ({
      id,
      normal,
      offset,
      faces,
      representative: id,
      motion: identity3,
    }),
  )
  return {
    planes,
    representatives: planes.map((p) => p.id),
    stabilizers: new Map(planes.map((p) => [p.id, []])),
    planeOfFace: groupOfFace,
  }
}

/**
 * By face of the representative of `plane`: the face of `plane` that the plane's motion carries it to.
 * @throws BrokenPromise when there is none
 */
export const carriedFaces = (
  solid: Solid,
  set: PlaneSet,
  tolerance: Tolerance,
): ((plane: FacePlane, face: number) => number) => {
  const grid = new SnapGrid(tolerance.merge, tolerance.merge, tolerance.cell)
  const number = solid.vertices.map((p) => grid.add(p[0], p[1], p[2]))
  // Two coplanar faces may share all vertices (a pentagon and its pentagram), so the kind is part of the key.
  const keyOf = (kind: number, vertices: readonly number[]): string =>
    `${kind}:${[...vertices].sort((a, b) => a - b).join(' ')}`
  const faceOf = new Map<string, number>()
  solid.faces.forEach((f, i) => {
    faceOf.set(
      keyOf(
        f.kind,
        f.cycle.map((v) => number[v]!),
      ),
      i,
    )
  })
  return (plane, face) => {
    if (plane.id === plane.representative) return face
    const { cycle, kind } = solid.faces[face]!
    const image = cycle.map((v) => {
      const p = apply(plane.motion, solid.vertices[v]!)
      return grid.find(p[0], p[1], p[2])
    })
    const there = faceOf.get(keyOf(kind, image))
    if (there === undefined || set.planeOfFace[there] !== plane.id)
      throw new BrokenPromise('A rotation of the solid does not map its faces to faces.', { face, plane: plane.id })
    return there
  }
}

/** The frame of a plane, its origin the point nearest to the centre. */
export const frameOf = (plane: { normal: Vec3; offset: number }): Frame => {
  const { u, v } = planeFrame(plane.normal)
  return { origin: scale(plane.normal, plane.offset), u, v, normal: plane.normal }
}

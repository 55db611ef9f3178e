/** Which faces and vertices of a solid belong together: what can be shown alone. */
import { SnapGrid } from '../geometry/snap'
import { apply, norm, type Vec3 } from '../geometry/vec3'
import type { Solid } from './types'
import { cornersOf } from './vertex-ring'

export interface SolidParts {
  /** By face: name of its kind, and its orbit under the rotations. */
  readonly kinds: readonly string[]
  readonly orbits: readonly number[]
  readonly vertices: readonly Vec3[]
  /** By vertex: the faces that meet there, each once. */
  readonly facesAt: readonly (readonly number[])[]
  /** By vertex: its orbit under the rotations, numbered as they come. */
  readonly vertexOrbits: readonly number[]
}

/** @returns kinds, orbits and vertices of the solid as plain data */
export const solidParts = (solid: Solid): SolidParts => ({
  kinds: solid.faces.map(({ kind }) => solid.kinds[kind]!.name),
  orbits: solid.faces.map(({ orbit }) => orbit),
  vertices: solid.vertices,
  facesAt: cornersOf(solid, solid.vertices.length).map((corners) => [...new Set(corners.map(({ face }) => face))]),
  vertexOrbits: orbitsOf(solid),
})

const orbitsOf = ({ vertices, rotations, precision = 0 }: Solid): number[] => {
  if (rotations.length === 1) return vertices.map((_, i) => i)
  const size = Math.max(...vertices.map(norm))
  const near = Math.max(1e-7, 4 * precision) * size
  const grid = new SnapGrid(near, near, Math.max(0.01 * size, 2 * near))
  // Points that coincide have one number in the grid and one orbit.
  const numbers = vertices.map(([x, y, z]) => grid.add(x, y, z))
  const orbit = new Map<number, number>()
  let count = 0
  return vertices.map((vertex, i) => {
    const known = orbit.get(numbers[i]!)
    if (known !== undefined) return known
    for (const g of rotations) orbit.set(grid.find(...apply(g, vertex)), count)
    orbit.set(numbers[i]!, count)
    return count++
  })
}

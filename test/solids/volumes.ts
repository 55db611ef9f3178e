/** Volumes for tests, straight from the faces. */
import { cross, dot, type Vec3 } from '../../src/geometry/vec3'
import type { Solid } from '../../src/solids'
import { edgesOf, orientFaces } from '../../src/solids/edges'

/** Every face's cone from the centre with its sign: a region counts as often as the surface winds round it. */
export const signedVolume = (solid: Solid): number => {
  const signs = orientFaces(solid, edgesOf(solid))
  if (!signs) throw new Error(`${solid.id} cannot be oriented`)
  let total = 0
  solid.faces.forEach(({ cycle }, i) => {
    const at = (k: number): Vec3 => solid.vertices[cycle[k] as number] as Vec3
    for (let k = 1; k + 1 < cycle.length; k++) total += ((signs[i] as number) * dot(at(0), cross(at(k), at(k + 1)))) / 6
  })
  return Math.abs(total)
}

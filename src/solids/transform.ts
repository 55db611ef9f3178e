/** Copies of a solid that lie otherwise, are mirrored, or list their parts in another order. */
import { seededRandom } from '../geometry/random'
import { apply, determinant, type Mat3, multiply, transpose, type Vec3 } from '../geometry/vec3'
import type { Solid, SolidFace } from './types'

/**
 * @param matrix orthogonal; with determinant −1 the hand changes
 * @param shuffleSeed if given, vertices, faces, the start and the direction of every cycle are shuffled by it
 */
export const transformSolid = (solid: Solid, matrix: Mat3, shuffleSeed?: number): Solid => {
  const mirrored = determinant(matrix) < 0
  const inverse = transpose(matrix)
  const moved: Solid = {
    ...solid,
    hand: mirrored && solid.hand !== 'none' ? (solid.hand === 'left' ? 'right' : 'left') : solid.hand,
    vertices: solid.vertices.map((p) => apply(matrix, p)),
    rotations: solid.rotations.map((g) => multiply(matrix, multiply(g, inverse))),
  }
  return shuffleSeed === undefined ? moved : shuffle(moved, shuffleSeed)
}

const mirrorX: Mat3 = [
  [-1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
]

/** The mirror image; for a chiral solid its other hand. */
export const mirrorSolid = (solid: Solid): Solid => transformSolid(solid, mirrorX)

const shuffle = (solid: Solid, seed: number): Solid => {
  const random = seededRandom(seed)
  const permutation = (n: number): number[] => {
    const list = Array.from({ length: n }, (_, i) => i)
    for (let i = n - 1; i > 0; i--) {
      const j = random.below(i + 1)
      const keep = list[i]!
      list[i] = list[j]!
      list[j] = keep
    }
    return list
  }
  const order = permutation(solid.vertices.length)
  const placeOf: number[] = []
  order.forEach((old, place) => {
    placeOf[old] = place
  })
  const vertices = order.map((old) => solid.vertices[old] as Vec3)
  const faceOrder = permutation(solid.faces.length)
  const faces = faceOrder.map((i): SolidFace => {
    const face = solid.faces[i]!
    const cycle = face.cycle.map((v) => placeOf[v]!)
    const turn = random.below(cycle.length)
    const turned = [...cycle.slice(turn), ...cycle.slice(0, turn)]
    return { ...face, cycle: random.next() < 0.5 ? turned : turned.reverse() }
  })
  const { components } = solid
  return { ...solid, vertices, faces, ...(components ? { components: faceOrder.map((i) => components[i]!) } : {}) }
}

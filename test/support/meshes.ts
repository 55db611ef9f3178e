/** Large triangle meshes: a closed sphere, and a heap of tetrahedra that cut through each other. */
import { identity3, type Vec3 } from '../../src/geometry/vec3'
import type { Solid } from '../../src/solids'
import { seeded } from './random'

const asMesh = (name: string, vertices: readonly Vec3[], triangles: readonly (readonly number[])[]): Solid => ({
  id: name,
  name,
  hand: 'none',
  vertices,
  faces: triangles.map((cycle) => ({ cycle, kind: 0, orbit: 0 })),
  kinds: [{ id: 0, name: 'card', n: 3, d: 1, count: triangles.length }],
  rotations: [identity3],
  family: 'own',
  precision: 1e-9,
})

/** A sphere of radius 1 in `rows` bands of staggered triangles: 4 · rows · (rows − 1) of them. */
export const sphereMesh = (rows: number): Solid => {
  const round = 2 * rows
  const vertices: Vec3[] = [
    [0, 0, 1],
    [0, 0, -1],
  ]
  for (let i = 1; i < rows; i++)
    for (let j = 0; j < round; j++) {
      const down = (Math.PI * i) / rows
      const about = (2 * Math.PI * (j + (i % 2) / 2)) / round
      vertices.push([Math.sin(down) * Math.cos(about), Math.sin(down) * Math.sin(about), Math.cos(down)])
    }
  const at = (i: number, j: number): number =>
    i === 0 ? 0 : i === rows ? 1 : 2 + (i - 1) * round + ((j + round) % round)
  const triangles: number[][] = []
  for (let i = 0; i < rows; i++)
    for (let j = 0; j < round; j++) {
      const shift = i % 2
      if (i > 0) triangles.push([at(i, j), at(i + 1, shift ? j + 1 : j), at(i, j + 1)])
      if (i < rows - 1) triangles.push([at(i, j), at(i + 1, shift ? j : j - 1), at(i + 1, shift ? j + 1 : j)])
    }
  return asMesh(`sphere-${rows}`, vertices, triangles)
}

/** `count` tetrahedra, about as large as the gaps between them are small: 4 · count triangles, heavily crossing. */
export const heapMesh = (count: number, seed: number): Solid => {
  const random = seeded(seed)
  const vertices: Vec3[] = []
  const triangles: number[][] = []
  // The heap grows with the number, so that each part meets about as many others.
  const side = (4 * Math.cbrt(count / 1250)) / 8
  for (let k = 0; k < count; k++) {
    const centre = [random(), random(), random()].map((x) => 8 * side * x)
    const base = vertices.length
    for (let i = 0; i < 4; i++) vertices.push(centre.map((x) => x + 1.5 * (random() - 0.5)) as unknown as Vec3)
    triangles.push(
      [base, base + 1, base + 2],
      [base, base + 3, base + 1],
      [base + 1, base + 3, base + 2],
      [base, base + 2, base + 3],
    )
  }
  return asMesh(`heap-${count}`, vertices, triangles)
}

/** Small models to break: text that a person can follow. */
import { seededRandom } from '../../src/geometry/random'
import { bytesOf, type Mesh } from './write'

export const box = (low: readonly number[], high: readonly number[], from = 0): Mesh => ({
  vertices: [0, 1, 2, 3, 4, 5, 6, 7].map((i) => {
    const bit = (k: number): number => (i >> k) & 1
    return [0, 1, 2].map((k) => (bit(k) ? high[k]! : low[k]!)) as unknown as [number, number, number]
  }),
  faces: [
    [0, 1, 3, 2],
    [4, 5, 7, 6],
    [0, 1, 5, 4],
    [2, 3, 7, 6],
    [0, 2, 6, 4],
    [1, 3, 7, 5],
  ].map((cycle) => cycle.map((v) => v + from)),
})

export const both = (a: Mesh, b: Mesh): Mesh => ({
  vertices: [...a.vertices, ...b.vertices],
  faces: [...a.faces, ...b.faces.map((cycle) => cycle.map((v) => v + a.vertices.length))],
})

export const cubeLines = [
  '# unit cube', // line 1
  'v 0 0 0',
  'v 1 0 0',
  'v 0 1 0',
  'v 1 1 0',
  'v 0 0 1',
  'v 1 0 1',
  'v 0 1 1',
  'v 1 1 1', // line 9
  'f 1 2 4 3', // line 10
  'f 5 6 8 7',
  'f 1 2 6 5',
  'f 3 4 8 7',
  'f 1 3 7 5',
  'f 2 4 8 6', // line 15
]

/** The cube's lines with some of them, by number, replaced; null leaves a line out, an array puts several in. */
export const cubeWith = (changes: Readonly<Record<number, string | readonly string[] | null>>): Uint8Array =>
  bytesOf(
    cubeLines
      .flatMap((line, i) => {
        const change = changes[i + 1]
        return change === undefined ? [line] : change === null ? [] : change
      })
      .join('\n'),
  )

/** A closed surface of 2·rows·columns triangles or so, bumpy and without symmetry. */
export const bumpy = (rows: number, columns: number, seed: number): Mesh => {
  const random = seededRandom(seed)
  const at = (polar: number, azimuth: number): [number, number, number] => {
    const r = 1 + 0.05 * random.next()
    return [r * Math.sin(polar) * Math.cos(azimuth), r * Math.sin(polar) * Math.sin(azimuth), r * Math.cos(polar)]
  }
  const vertices = [at(0, 0), at(Math.PI, 0)]
  const number = (r: number, c: number): number => 2 + (r - 1) * columns + (c % columns)
  for (let r = 1; r < rows; r++)
    for (let c = 0; c < columns; c++) vertices.push(at((Math.PI * r) / rows, (2 * Math.PI * c) / columns))
  const faces: number[][] = []
  for (let c = 0; c < columns; c++) {
    faces.push([0, number(1, c), number(1, c + 1)], [1, number(rows - 1, c), number(rows - 1, c + 1)])
    for (let r = 1; r + 1 < rows; r++)
      faces.push(
        [number(r, c), number(r, c + 1), number(r + 1, c)],
        [number(r, c + 1), number(r + 1, c + 1), number(r + 1, c)],
      )
  }
  return { vertices, faces }
}

/**
 * Which faces may meet which: bounding boxes in a uniform grid. For the solids of the catalogue nearly every face meets
 * every other; for a large mesh of small faces this keeps the cost near the number of true meetings.
 */
import type { Vec3 } from '../geometry/vec3'
import type { FilledFace } from './filled-face'

interface Box {
  readonly low: Vec3
  readonly high: Vec3
}

const boxOf = (face: FilledFace, slack: number): Box => {
  const low: [number, number, number] = [Infinity, Infinity, Infinity]
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity]
  for (const [a] of face.boundary)
    for (const k of [0, 1, 2] as const) {
      low[k] = Math.min(low[k], a[k] - slack)
      high[k] = Math.max(high[k], a[k] + slack)
    }
  return { low, high }
}

/**
 * @param slack boxes are grown by this much, so that faces that only touch are found
 * @returns for the faces of one plane, all faces of other planes whose boxes meet theirs, in ascending order
 */
export const neighbourFinder = (
  faces: readonly FilledFace[],
  slack: number,
): ((own: readonly FilledFace[]) => FilledFace[]) => {
  const boxes = faces.map((f) => boxOf(f, slack))
  const low: [number, number, number] = [Infinity, Infinity, Infinity]
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity]
  const mean: [number, number, number] = [0, 0, 0]
  for (const b of boxes)
    for (const k of [0, 1, 2] as const) {
      low[k] = Math.min(low[k], b.low[k])
      high[k] = Math.max(high[k], b.high[k])
      mean[k] += (b.high[k] - b.low[k]) / boxes.length
    }
  // Cells about as large as a face: fewer than 8 cells a face, and no more cells than faces in any case.
  const limit = Math.max(1, Math.round(Math.cbrt(faces.length)))
  const count = ([0, 1, 2] as const).map((k) => {
    const cells = Math.floor((high[k] - low[k]) / Math.max(mean[k], 1e-12))
    return Math.max(1, Math.min(limit * 2, cells))
  }) as [number, number, number]
  const cellOf = (k: 0 | 1 | 2, x: number): number =>
    Math.max(0, Math.min(count[k] - 1, Math.floor(((x - low[k]) / (high[k] - low[k] || 1)) * count[k])))
  const forCells = (b: Box, visit: (cell: number) => void): void => {
    for (let i = cellOf(0, b.low[0]); i <= cellOf(0, b.high[0]); i++)
      for (let j = cellOf(1, b.low[1]); j <= cellOf(1, b.high[1]); j++)
        for (let k = cellOf(2, b.low[2]); k <= cellOf(2, b.high[2]); k++) visit((i * count[1] + j) * count[2] + k)
  }
  const cells = new Map<number, number[]>()
  boxes.forEach((b, f) => {
    forCells(b, (cell) => {
      const list = cells.get(cell)
      if (list) list.push(f)
      else cells.set(cell, [f])
    })
  })
  return (own) => {
    const found = new Set<number>()
    for (const face of own) {
      const b = boxes[face.index]!
      forCells(b, (cell) => {
        for (const f of cells.get(cell)!) {
          const c = boxes[f]!
          if (faces[f]!.plane === face.plane || found.has(f)) continue
          if (b.low[0] > c.high[0] || b.low[1] > c.high[1] || b.low[2] > c.high[2]) continue
          if (c.low[0] > b.high[0] || c.low[1] > b.high[1] || c.low[2] > b.high[2]) continue
          found.add(f)
        }
      })
    }
    return [...found].sort((a, b) => a - b).map((f) => faces[f]!)
  }
}

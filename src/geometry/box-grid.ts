/** Which of many boxes meet a given one: a uniform grid, cells about as large as the boxes. */
import type { Vec3 } from './vec3'

export interface Box3 {
  readonly low: Vec3
  readonly high: Vec3
}

/** The least box round some points, grown by `slack` on every side. */
export const boxAround = (points: Iterable<Vec3>, slack = 0): Box3 => {
  const low: [number, number, number] = [Infinity, Infinity, Infinity]
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity]
  for (const p of points)
    for (const k of [0, 1, 2] as const) {
      low[k] = Math.min(low[k], p[k] - slack)
      high[k] = Math.max(high[k], p[k] + slack)
    }
  return { low, high }
}

/** Do two boxes meet, touching included? */
export const boxesMeet = (a: Box3, b: Box3): boolean =>
  a.low[0] <= b.high[0] &&
  a.low[1] <= b.high[1] &&
  a.low[2] <= b.high[2] &&
  b.low[0] <= a.high[0] &&
  b.low[1] <= a.high[1] &&
  b.low[2] <= a.high[2]

/**
 * @returns calls `visit` with the number of every box that meets the one given; a number may come several times
 */
export const boxGrid = (boxes: readonly Box3[]): ((box: Box3, visit: (index: number) => void) => void) => {
  const low: [number, number, number] = [Infinity, Infinity, Infinity]
  const high: [number, number, number] = [-Infinity, -Infinity, -Infinity]
  const mean: [number, number, number] = [0, 0, 0]
  for (const b of boxes)
    for (const k of [0, 1, 2] as const) {
      low[k] = Math.min(low[k], b.low[k])
      high[k] = Math.max(high[k], b.high[k])
      mean[k] += (b.high[k] - b.low[k]) / boxes.length
    }
  // Fewer than 8 cells a box, and at most about twice as many along each side as a cube of all boxes would have.
  const limit = Math.max(1, Math.round(Math.cbrt(boxes.length)))
  const count = ([0, 1, 2] as const).map((k) => {
    const cells = Math.floor((high[k] - low[k]) / Math.max(mean[k], 1e-12))
    return Math.max(1, Math.min(limit * 2, cells))
  }) as [number, number, number]
  const cellOf = (k: 0 | 1 | 2, x: number): number =>
    Math.max(0, Math.min(count[k] - 1, Math.floor(((x - low[k]) / (high[k] - low[k] || 1)) * count[k])))
  const forCells = (b: Box3, visit: (cell: number) => void): void => {
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
  return (box, visit) => {
    forCells(box, (cell) => {
      for (const f of cells.get(cell) ?? []) if (boxesMeet(box, boxes[f]!)) visit(f)
    })
  }
}

/**
 * Points that are meant to be equal, given one number. Two points no farther apart than `merge` are the same point;
 * two that are farther apart than `merge` but nearer than `gap` break the caller's promise that no such pair exists,
 * and are reported instead of guessed at. `gap` = `merge` turns that check off.
 */
import { BrokenPromise } from '../errors'

export class SnapGrid {
  /** Coordinates of point i: x[i], y[i], z[i]. */
  readonly x: number[] = []
  readonly y: number[] = []
  readonly z: number[] = []
  private readonly head = new Map<number, number>()
  private readonly next: number[] = []
  /** Greatest distance seen between points taken as equal, and least between points told apart (within one grid cell). */
  widestMerge = 0
  closestPair = Number.POSITIVE_INFINITY

  /** @param cell side of a hash cell; a few points per cell is best. Must exceed `gap`. */
  constructor(
    readonly merge: number,
    readonly gap: number,
    readonly cell: number,
  ) {}

  get size(): number {
    return this.x.length
  }

  /** The number of the point at (x, y, z), or -1. */
  find(x: number, y: number, z: number): number {
    const { cell, gap } = this
    const reach = Math.max(gap, this.merge)
    const x1 = Math.floor((x + reach) / cell)
    const y1 = Math.floor((y + reach) / cell)
    const z1 = Math.floor((z + reach) / cell)
    for (let i = Math.floor((x - reach) / cell); i <= x1; i++)
      for (let j = Math.floor((y - reach) / cell); j <= y1; j++)
        for (let k = Math.floor((z - reach) / cell); k <= z1; k++) {
          let p = this.head.get(hash(i, j, k)) ?? -1
          for (; p >= 0; p = this.next[p]!) {
            const dx = this.x[p]! - x
            const dy = this.y[p]! - y
            const dz = this.z[p]! - z
            // Not Math.hypot: it is several times slower and nothing here can overflow.
            const d = Math.sqrt(dx * dx + dy * dy + dz * dz)
            if (d <= this.merge) {
              if (d > this.widestMerge) this.widestMerge = d
              return p
            }
            if (d < this.closestPair) this.closestPair = d
            if (d < gap)
              throw new BrokenPromise('Two points lie closer than the tolerance gap allows.', {
                distance: d,
                merge: this.merge,
                gap,
                at: [x, y, z],
              })
          }
        }
    return -1
  }

  /** The number of the point at (x, y, z); a new one if there is none yet. */
  add(x: number, y: number, z: number): number {
    const found = this.find(x, y, z)
    if (found >= 0) return found
    const id = this.x.length
    this.x.push(x)
    this.y.push(y)
    this.z.push(z)
    const key = hash(Math.floor(x / this.cell), Math.floor(y / this.cell), Math.floor(z / this.cell))
    this.next.push(this.head.get(key) ?? -1)
    this.head.set(key, id)
    return id
  }
}

// Collisions only cost a distance test, so a cheap integer mix is enough.
const hash = (i: number, j: number, k: number): number =>
  (Math.imul(i, 73856093) ^ Math.imul(j, 19349663) ^ Math.imul(k, 83492791)) | 0

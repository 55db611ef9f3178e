/**
 * Points that are meant to be equal, given one number. Two points no farther apart than `merge` are the same point;
 * two that are farther apart than `merge` but nearer than `gap` break the caller's promise that no such pair exists,
 * and are reported instead of guessed at. `gap` = `merge` turns that check off.
 */
import { BrokenPromise } from '../errors'

export class SnapGrid {
  /** Coordinates of point i < size: x[i], y[i], z[i]. Typed arrays, since a mesh has one grid per face plane. */
  x = new Float64Array(8)
  y = new Float64Array(8)
  z = new Float64Array(8)
  size = 0
  /** Hash table of chains: first point of each bucket, then the next in its chain, −1 at the end. */
  private head = new Int32Array(16).fill(-1)
  private next = new Int32Array(8)
  /** Greatest distance seen between points taken as equal, and least between points told apart (within one grid cell). */
  widestMerge = 0
  closestPair = Number.POSITIVE_INFINITY

  /** @param cell side of a hash cell; a few points per cell is best. Must exceed `gap`. */
  constructor(
    readonly merge: number,
    readonly gap: number,
    readonly cell: number,
  ) {}

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
          let p = this.head[hash(i, j, k) & (this.head.length - 1)]!
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
    const id = this.size++
    if (id === this.x.length) this.grow()
    this.x[id] = x
    this.y[id] = y
    this.z[id] = z
    this.enter(id)
    return id
  }

  private enter(id: number): void {
    const { cell } = this
    const key = hash(Math.floor(this.x[id]! / cell), Math.floor(this.y[id]! / cell), Math.floor(this.z[id]! / cell))
    const bucket = key & (this.head.length - 1)
    this.next[id] = this.head[bucket]!
    this.head[bucket] = id
  }

  private grow(): void {
    const capacity = 2 * this.x.length
    const longer = (a: Float64Array<ArrayBuffer>): Float64Array<ArrayBuffer> => {
      const b = new Float64Array(capacity)
      b.set(a)
      return b
    }
    this.x = longer(this.x)
    this.y = longer(this.y)
    this.z = longer(this.z)
    this.next = new Int32Array(capacity)
    this.head = new Int32Array(2 * capacity).fill(-1)
    for (let id = 0; id < this.size - 1; id++) this.enter(id)
  }
}

// Collisions only cost a distance test, so a cheap integer mix is enough.
const hash = (i: number, j: number, k: number): number => {
  const h = Math.imul(i, 73856093) ^ Math.imul(j, 19349663) ^ Math.imul(k, 83492791)
  return h ^ (h >>> 15)
}

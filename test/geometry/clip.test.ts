import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { BrokenPromise } from '../../src/errors'
import {
  difference,
  differenceArea,
  intersection,
  intersectionArea,
  minkowskiSum,
  offset,
  polygons,
  regionArea,
  symmetricDifference,
  union,
} from '../../src/geometry/clip'
import type { Ring2 } from '../../src/geometry/vec2'

const rect = (x: number, y: number, w: number, h: number): Ring2 => [
  [x, y],
  [x + w, y],
  [x + w, y + h],
  [x, y + h],
]
const rectangle = fc
  .tuple(
    fc.integer({ min: -50, max: 50 }),
    fc.integer({ min: -50, max: 50 }),
    fc.integer({ min: 1, max: 40 }),
    fc.integer({ min: 1, max: 40 }),
  )
  .map(([x, y, w, h]) => ({ x, y, w, h, ring: rect(x, y, w, h) }))
const overlap = (a: number, b: number, c: number, d: number): number => Math.max(0, Math.min(b, d) - Math.max(a, c))

describe('clip', () => {
  it('agrees with interval arithmetic on pairs of rectangles', () => {
    fc.assert(
      fc.property(rectangle, rectangle, (a, b) => {
        const common = overlap(a.x, a.x + a.w, b.x, b.x + b.w) * overlap(a.y, a.y + a.h, b.y, b.y + b.h)
        expect(intersectionArea([a.ring], [b.ring])).toBeCloseTo(common, 6)
        expect(regionArea(union([a.ring, b.ring]))).toBeCloseTo(a.w * a.h + b.w * b.h - common, 6)
        expect(differenceArea([a.ring], [b.ring])).toBeCloseTo(a.w * a.h - common, 6)
        expect(regionArea(symmetricDifference([a.ring], [b.ring]))).toBeCloseTo(a.w * a.h + b.w * b.h - 2 * common, 6)
      }),
      { seed: 11 },
    )
  })

  it('leaves clockwise holes open and returns them clockwise', () => {
    const hole = [...rect(2, 2, 3, 3)].reverse()
    const whole = difference([rect(0, 0, 10, 10)], [rect(2, 2, 3, 3)])
    expect(regionArea(whole)).toBeCloseTo(91, 6)
    expect(intersectionArea(whole, [rect(2, 2, 3, 3)])).toBeCloseTo(0, 6)
    expect(regionArea(union([rect(0, 0, 10, 10), hole]))).toBeCloseTo(91, 6)
    const parts = polygons([rect(0, 0, 10, 10), hole, rect(3, 3, 1, 1), rect(20, 0, 5, 5)])
    expect(parts.map((p) => p.length).sort()).toEqual([1, 1, 2])
  })

  it('keeps collinear points only when told', () => {
    const ring: Ring2 = [
      [0, 0],
      [5, 0],
      [10, 0],
      [10, 10],
    ]
    expect(union([ring])[0]).toHaveLength(3)
    expect(union([ring], true)[0]).toHaveLength(4)
    expect(intersection([ring], [rect(-1, -1, 20, 20)], true)[0]).toHaveLength(4)
  })

  it('grows a rectangle by the Steiner formula and shrinks it exactly', () => {
    const [w, h, d] = [30, 20, 4]
    const grown = regionArea(offset([rect(-15, 3, w, h)], d, { arcToleranceMm: 1e-4 }))
    expect(grown).toBeCloseTo(w * h + 2 * (w + h) * d + Math.PI * d * d, 1)
    expect(regionArea(offset([rect(-15, 3, w, h)], -d))).toBeCloseTo((w - 2 * d) * (h - 2 * d), 6)
    expect(regionArea(offset([rect(0, 0, w, h)], d, { join: 'miter' }))).toBeCloseTo((w + 2 * d) * (h + 2 * d), 6)
    expect(offset([rect(0, 0, 6, 6)], -3.5)).toEqual([])
  })

  it('adds convex parts as mixed areas say, whichever is larger', () => {
    // area(A + B) for rectangles: (w1 + w2)(h1 + h2)
    fc.assert(
      fc.property(rectangle, rectangle, (a, b) => {
        expect(regionArea(minkowskiSum([a.ring], b.ring))).toBeCloseTo((a.w + b.w) * (a.h + b.h), 5)
        expect(regionArea(minkowskiSum([a.ring], [...b.ring].reverse()))).toBeCloseTo((a.w + b.w) * (a.h + b.h), 5)
      }),
      { seed: 12, numRuns: 50 },
    )
  })

  it('keeps a hole in a sum where the part fits with room, and fills it where it does not', () => {
    const frame = [rect(0, 0, 30, 30), [...rect(10, 10, 10, 10)].reverse()]
    expect(regionArea(minkowskiSum(frame, rect(0, 0, 4, 6)))).toBeCloseTo(34 * 36 - 6 * 4, 5)
    expect(regionArea(minkowskiSum(frame, rect(0, 0, 11, 2)))).toBeCloseTo(41 * 32, 5)
  })

  it('reports coordinates that cannot be clipped instead of computing nonsense', () => {
    expect(() => union([rect(0, 0, 5000, 1)])).toThrow(BrokenPromise)
    expect(() => union([rect(0, Number.NaN, 1, 1)])).toThrow(BrokenPromise)
    expect(regionArea(union([rect(0, 0, 2000, 1)]))).toBeCloseTo(2000, 6)
  })
})

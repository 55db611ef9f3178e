import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { intersectionArea } from '../../src/geometry/clip'
import { convexParts, overlapArea, separated } from '../../src/geometry/convex'
import { convexHull, fittingAngle, roomiestAngle, turnedBox } from '../../src/geometry/hull'
import { cross2, type Ring2, signedArea, sub2, type Vec2 } from '../../src/geometry/vec2'

/** Star-shaped rings: simple, seldom convex, with thin spikes. */
const star = fc.array(fc.double({ min: 0.05, max: 1, noNaN: true }), { minLength: 3, maxLength: 14 }).map(
  (radii): Ring2 =>
    radii.map((r, i): Vec2 => {
      const a = (2 * Math.PI * i) / radii.length
      return [40 * r * Math.cos(a), 40 * r * Math.sin(a)]
    }),
)
const place = fc.tuple(
  fc.double({ min: -60, max: 60, noNaN: true }),
  fc.double({ min: -60, max: 60, noNaN: true }),
  fc.double({ min: 0, max: 6.3, noNaN: true }),
)
const move = (ring: Ring2, [x, y, a]: readonly [number, number, number]): Ring2 =>
  ring.map(([u, v]): Vec2 => [x + u * Math.cos(a) - v * Math.sin(a), y + u * Math.sin(a) + v * Math.cos(a)])
const ringOf = (part: Float64Array): Ring2 => {
  const ring: Vec2[] = []
  for (let i = 0; i < part.length; i += 2) ring.push([part[i]!, part[i + 1]!])
  return ring
}

describe('convex parts', () => {
  it('are convex, counter-clockwise, and add up to the polygon', () => {
    fc.assert(
      fc.property(star, fc.boolean(), (outer, holed) => {
        const hole = outer.map(([x, y]): Vec2 => [x * 0.5, y * 0.5]).reverse()
        const rings = holed ? [outer, hole] : [outer]
        const parts = convexParts(rings).map(ringOf)
        for (const ring of parts)
          ring.forEach((p, i) => {
            const a = ring[(i + ring.length - 1) % ring.length]!
            const b = ring[(i + 1) % ring.length]!
            expect(cross2(sub2(p, a), sub2(b, p))).toBeGreaterThan(-1e-8)
          })
        const area = rings.reduce((s, r) => s + signedArea(r), 0)
        expect(parts.reduce((s, r) => s + signedArea(r), 0)).toBeCloseTo(area, 6)
        // No part reaches beyond the polygon.
        for (const part of parts) expect(intersectionArea([part], rings)).toBeCloseTo(signedArea(part), 2)
      }),
      { seed: 21 },
    )
  })

  it('leave a convex polygon whole and cut a regular star into few', () => {
    const square: Ring2 = [
      [0, 0],
      [1, 0],
      [2, 0],
      [2, 2],
      [0, 2],
    ]
    expect(convexParts([square])).toHaveLength(1)
    const pentagram = Array.from({ length: 10 }, (_, i): Vec2 => {
      const r = i % 2 === 0 ? 1 : 0.382
      return [r * Math.cos((i * Math.PI) / 5), r * Math.sin((i * Math.PI) / 5)]
    })
    expect(convexParts([pentagram]).length).toBeLessThanOrEqual(6)
  })

  it('measure overlaps as clipping does, and are separated exactly when there is none', () => {
    let meeting = 0
    fc.assert(
      fc.property(star, star, place, (a, b, at) => {
        const moved = move(b, at)
        let sum = 0
        let apart = true
        for (const p of convexParts([a]))
          for (const q of convexParts([moved])) {
            sum += overlapArea(p, 0, p.length, q, 0, q.length)
            apart &&= separated(p, 0, p.length, q, 0, q.length, 0)
          }
        const area = intersectionArea([a], [moved])
        if (area > 1) meeting++
        expect(Math.abs(sum - area)).toBeLessThan(0.01)
        expect(apart).toBe(sum <= 1e-12)
      }),
      { seed: 22 },
    )
    expect(meeting).toBeGreaterThan(20)
  })

  it('tell touching from overlapping for slivers', () => {
    const tall = Float64Array.of(0, 0, 0.005, 0, 0.005, 80, 0, 80)
    const beside = tall.map((v, i) => (i % 2 === 0 ? v + 0.005 : v))
    const over = tall.map((v, i) => (i % 2 === 0 ? v + 0.004 : v))
    expect(separated(tall, 0, 8, beside, 0, 8, 1e-8)).toBe(true)
    expect(separated(tall, 0, 8, over, 0, 8, 1e-8)).toBe(false)
    expect(overlapArea(tall, 0, 8, over, 0, 8)).toBeCloseTo(0.001 * 80, 9)
  })
})

describe('hull and fit', () => {
  const cloud = fc.array(fc.tuple(fc.integer({ min: -50, max: 50 }), fc.integer({ min: -50, max: 50 })), {
    minLength: 3,
    maxLength: 120,
  })

  it('has every point on or inside, and only points of the cloud at corners', () => {
    fc.assert(
      fc.property(cloud, (points) => {
        const hull = ringOf(convexHull(points.flat()))
        for (const h of hull) expect(points.some((p) => p[0] === h[0] && p[1] === h[1])).toBe(true)
        if (hull.length < 3) return
        hull.forEach((a, i) => {
          const b = hull[(i + 1) % hull.length]!
          expect(points.filter((p) => cross2(sub2(b, a), sub2(p, a)) < 0)).toEqual([])
        })
      }),
      { seed: 23 },
    )
  })

  it('finds a fitting angle whenever a search in steps of a third of a degree finds one, and then it does fit', () => {
    const found = { fits: 0, not: 0 }
    fc.assert(
      fc.property(cloud, fc.integer({ min: 40, max: 130 }), fc.integer({ min: 40, max: 130 }), (points, w, h) => {
        const hull = convexHull(points.flat())
        const angle = fittingAngle(hull, w, h)
        const fits = (a: number, slack: number): boolean => {
          const box = turnedBox(hull, Math.cos(a), Math.sin(a))
          return box.maxX - box.minX <= w + slack && box.maxY - box.minY <= h + slack
        }
        if (angle !== null) expect(fits(angle, 1e-6)).toBe(true)
        else
          expect(Array.from({ length: 540 }, (_, k) => (k * Math.PI) / 540).filter((a) => fits(a, -1e-6))).toEqual([])
        found[angle === null ? 'not' : 'fits']++
      }),
      { seed: 24, numRuns: 300 },
    )
    expect(Math.min(found.fits, found.not)).toBeGreaterThan(50)
  })

  it('fits a long bar only along the diagonal', () => {
    const bar = Float64Array.of(0, 0, 330, 0, 330, 2, 0, 2)
    const angle = fittingAngle(bar, 190, 277)
    expect(angle).not.toBeNull()
    expect(fittingAngle(Float64Array.of(0, 0, 337, 0, 337, 2, 0, 2), 190, 277)).toBeNull()
    const box = turnedBox(bar, Math.cos(angle!), Math.sin(angle!))
    expect(box.maxX - box.minX).toBeLessThanOrEqual(190 + 1e-6)
    expect(box.maxY - box.minY).toBeLessThanOrEqual(277 + 1e-6)
  })

  it('turns a bar upright where the rectangle has the most room for it', () => {
    const bar = Float64Array.of(0, 0, 150, 0, 150, 20, 0, 20)
    expect(roomiestAngle(bar, 190, 277)).toBeCloseTo(Math.PI / 2, 9)
  })
})

import { describe, expect, test } from 'vitest'
import { type Vec2, windingNumber } from '../../src/geometry/vec2'
import { add, cross, dot, norm, planeFrame, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import { filledRings } from '../../src/preview/filled-rings'
import { buildModel } from '../../src/preview/model'
import { randomDirection, seeded } from '../support/random'

/** Regular star polygon {n/d} with circumradius 1, in a plane askew. */
const star = (n: number, d: number, normal: Vec3): Vec3[] => {
  const { u, v } = planeFrame(normal)
  const middle: Vec3 = [0.3, -0.2, 0.7]
  return Array.from({ length: n }, (_, i) => {
    const a = (2 * Math.PI * d * i) / n + 0.1
    return add(middle, add(scale(u, Math.cos(a)), scale(v, Math.sin(a))))
  })
}

const areaOf = (ring: readonly Vec3[], normal: Vec3): number =>
  dot(
    ring.reduce<Vec3>((sum, p, i) => add(sum, cross(p, ring[(i + 1) % ring.length]!)), [0, 0, 0]),
    normal,
  ) / 2

/**
 * Area covered at least k times by {n/d}, from trigonometry: all its edges touch a circle of radius ρ = cos(πd/n), and
 * that part is bounded like {n/(d − k + 1)} about the same circle, with inner corners on {n/(d − k)}.
 */
const coveredAtLeast = (n: number, d: number, k: number): number => {
  const rho = Math.cos((Math.PI * d) / n)
  const outer = rho / Math.cos((Math.PI * (d - k + 1)) / n)
  const inner = rho / Math.cos((Math.PI * (d - k)) / n)
  return n * outer * inner * Math.sin(Math.PI / n)
}

describe('the filled region of a regular star polygon', () => {
  const normal = randomDirection(seeded(3))
  // Parts under even-odd: tips; for density 3 also the middle, which is covered three times.
  const cases: [number, number, number][] = [
    [5, 2, 5],
    [7, 2, 7],
    [8, 3, 9],
    [10, 3, 11],
    [7, 3, 8],
  ]
  test.each(cases)('{%i/%i}', (n, d, evenOddParts) => {
    for (const cycle of [star(n, d, normal), star(n, d, normal).reverse()]) {
      const whole = filledRings(cycle, normal, 'nonzero')
      expect(whole.map((p) => p.map((r) => r.length))).toEqual([[2 * n]])
      expect(areaOf(whole[0]![0]!, normal)).toBeCloseTo(coveredAtLeast(n, d, 1), 10)

      const odd = filledRings(cycle, normal, 'evenodd')
      expect(odd.length).toBe(evenOddParts)
      const area = odd.flat().reduce((sum, ring) => sum + areaOf(ring, normal), 0)
      let expected = 0
      for (let k = 1; k <= d; k++) expected += (k % 2 === 1 ? 1 : -1) * coveredAtLeast(n, d, k)
      expect(area).toBeCloseTo(expected, 10)
    }
  })

  test('a convex polygon stays as it is', () => {
    const square = star(4, 1, normal)
    const [only, ...more] = filledRings(square, normal, 'evenodd')
    expect(more).toEqual([])
    expect(only!.map((r) => r.length)).toEqual([4])
    for (const p of only![0]!) expect(Math.min(...square.map((q) => norm(sub(p, q))))).toBeLessThan(1e-12)
  })

  test('{12/5} even-odd, covered up to five times', () => {
    // Covered 1 to 5 times from tip to middle; what is covered three times hangs together around what is covered more.
    const parts = filledRings(star(12, 5, normal), normal, 'evenodd')
    const area = parts.flat().reduce((sum, ring) => sum + areaOf(ring, normal), 0)
    let expected = 0
    for (let k = 1; k <= 5; k++) expected += (k % 2 === 1 ? 1 : -1) * coveredAtLeast(12, 5, k)
    expect(area).toBeCloseTo(expected, 10)
  })
})

describe('the filled region of any plane polygon', () => {
  // Seeds 9 and 21 give a region with a hole.
  test.each([1, 2, 3, 9, 21])('agrees with winding numbers and triangulates to its area, seed %i', (seed) => {
    const random = seeded(seed)
    const normal = randomDirection(seeded(seed + 100))
    const { u, v } = planeFrame(normal)
    const cycle = Array.from({ length: 9 }, () => add(scale(u, random()), scale(v, random())))
    const flat = (p: Vec3): Vec2 => [dot(p, u), dot(p, v)]
    let filled = 0
    for (const rule of ['nonzero', 'evenodd'] as const) {
      const parts = filledRings(cycle, normal, rule)
      const rings = parts.flat().map((ring) => ring.map(flat))
      for (let i = 0; i < 500; i++) {
        const p: Vec2 = [random(), random()]
        const w = windingNumber(cycle.map(flat), p)
        const isIn = rule === 'nonzero' ? w !== 0 : w % 2 !== 0
        expect(rings.reduce((sum, ring) => sum + windingNumber(ring, p), 0)).toBe(isIn ? 1 : 0)
        if (isIn) filled++
      }
      if (rule === 'nonzero' && (seed === 9 || seed === 21))
        expect(parts.reduce((sum, part) => sum + part.length - 1, 0)).toBe(1)
      const [first = [], ...moreRings] = parts
      const item = { id: 0, group: -1, kind: 'k', colour: '#abc', normal, rings: first, moreRings }
      const { closed, triangles, radius } = buildModel([item])
      let area = 0
      for (let t = 0; t < triangles.length; t += 3) {
        const [a, b, c] = [0, 1, 2].map((k) => [...closed.subarray(3 * triangles[t + k]!, 3 * triangles[t + k]! + 3)])
        const twice = dot(cross(sub(b as never, a as never), sub(c as never, a as never)), normal)
        expect(twice).toBeGreaterThan(-1e-12)
        area += (radius * radius * twice) / 2
      }
      expect(area).toBeCloseTo(
        parts.flat().reduce((sum, ring) => sum + areaOf(ring, normal), 0),
        9,
      )
    }
    expect(filled).toBeGreaterThan(50)
  })
})

test('a hole goes to the part around it, not to the first, seeds 46 and 157', () => {
  for (const [length, seed] of [
    [9, 46],
    [13, 157],
  ] as const) {
    const random = seeded(seed)
    const cycle = Array.from({ length }, (): Vec3 => [random(), random(), 0])
    const parts = filledRings(cycle, [0, 0, 1], 'nonzero')
    const holed = parts.findIndex((part) => part.length === 2)
    expect(holed).toBeGreaterThan(0)
    const [outer, hole] = parts[holed]!.map((ring) => ring.map(([x, y]): Vec2 => [x, y]))
    for (const p of hole!) expect(windingNumber(outer!, p)).toBe(1)
  }
})

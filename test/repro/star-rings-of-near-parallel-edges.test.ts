import { expect, test } from 'vitest'
import { type Vec2, windingNumber } from '../../src/geometry/vec2'
import { filledRings } from '../../src/preview/filled-rings'
import { seeded } from '../support/random'

// The sides of an edge were tried so far off that another edge, almost parallel, lay between; a walk of one step came
// out, and its second point was missing.
test('a polygon with edges that cross at a very small angle gives whole rings, seed 80', () => {
  const random = seeded(80)
  const cycle = Array.from({ length: 13 }, (): [number, number, number] => [random(), random(), 0])
  const flat = cycle.map(([x, y]): Vec2 => [x, y])
  for (const rule of ['nonzero', 'evenodd'] as const) {
    const rings = filledRings(cycle, [0, 0, 1], rule).flat()
    expect(Math.min(...rings.map((ring) => ring.length))).toBeGreaterThanOrEqual(3)
    const wrong: Vec2[] = []
    for (let i = 0; i < 2000; i++) {
      const p: Vec2 = [random(), random()]
      const w = windingNumber(flat, p)
      const isIn = rule === 'nonzero' ? w !== 0 : w % 2 !== 0
      const sum = rings.reduce(
        (total, ring) =>
          total +
          windingNumber(
            ring.map(([x, y]): Vec2 => [x, y]),
            p,
          ),
        0,
      )
      if (sum !== (isIn ? 1 : 0)) wrong.push(p)
    }
    expect(wrong).toEqual([])
  }
})

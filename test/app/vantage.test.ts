import { describe, expect, test } from 'vitest'
import { vantage } from '../../src/app/ui/vantage'
import type { Plan, Point3 } from '../../src/plan/types'
import { cubePlan } from '../plan/by-hand'

/** A square of side 2 about (x, 0, z), facing up. */
const plate = (id: number, x: number, z: number): Plan['panels'][number] => ({
  id,
  normal: [0, 0, 1],
  rings: [
    [
      [x - 1, -1, z],
      [x + 1, -1, z],
      [x + 1, 1, z],
      [x - 1, 1, z],
    ],
  ],
  faces: [id],
  colour: 'square',
  areaMm2: 4,
  body: 0,
})
const onePiecePlan = (panels: Plan['panels'], mine: number[]): Plan => {
  const plan = cubePlan()
  const [piece] = plan.pieces
  return { ...plan, panels, pieces: [{ ...piece!, id: 9, panels: mine.map((panel) => ({ panel, rings: [] })) }] }
}
const all = (plan: Plan): Set<number> => new Set(plan.panels.map(({ id }) => id))
const cosine = (a: Point3, b: Point3): number =>
  (a[0] * b[0] + a[1] * b[1] + a[2] * b[2]) / (Math.hypot(...a) * Math.hypot(...b))

describe('the view of a piece', () => {
  test('looks straight at a panel with nothing in the way', () => {
    const plan = cubePlan()
    expect(cosine(vantage(plan, 1, all(plan)), [0, 0, 1])).toBeGreaterThan(0.98)
  })

  test('looks past a plate that hides the panel from straight above', () => {
    const plan = onePiecePlan([plate(0, 0, 0), plate(1, 0, 1)], [0])
    const [x, y, z] = vantage(plan, 9, all(plan))
    // From the middle of the lower plate the ray leaves under the upper one's edge, one up and one across.
    expect(z).toBeGreaterThan(0)
    expect(Math.max(Math.abs(x), Math.abs(y)) / z).toBeGreaterThan(1)
  })

  test('does so only while the plate is there', () => {
    const plan = onePiecePlan([plate(0, 0, 0), plate(1, 0, 1)], [0])
    expect(cosine(vantage(plan, 9, new Set([0])), [0, 0, 1])).toBeGreaterThan(0.98)
  })

  test('looks into a pit whose walls face each other', () => {
    const wall = (id: number, normal: Point3, ring: Point3[]): Plan['panels'][number] => ({
      ...plate(id, 0, 0),
      normal,
      rings: [ring],
    })
    // Two walls of a trench along y that is open upwards; their normals cancel out.
    const plan = onePiecePlan(
      [
        wall(
          0,
          [1, 0, 0.1],
          [
            [-1, -1, 0],
            [-1, 1, 0],
            [-1.1, 1, 1],
            [-1.1, -1, 1],
          ],
        ),
        wall(
          1,
          [-1, 0, 0.1],
          [
            [1, -1, 0],
            [1.1, -1, 1],
            [1.1, 1, 1],
            [1, 1, 0],
          ],
        ),
      ],
      [0, 1],
    )
    expect(vantage(plan, 9, all(plan))[2]).toBeGreaterThan(0.2)
  })
})

import { describe, expect, test } from 'vitest'
import { drawPiece } from '../../src/app/ui/piece-drawing'
import type { Point2 } from '../../src/plan/types'
import { cubePlan } from '../plan/by-hand'

const length = (a: Point2, b: Point2): number => Math.hypot(b[0] - a[0], b[1] - a[1])
/** Twice the signed area with y down: positive for clockwise on paper. */
const turn = (ring: readonly Point2[]): number =>
  ring.reduce((sum, [x, y], i) => {
    const [p, q] = ring[(i + 1) % ring.length]!
    return sum + x * q - p * y
  }, 0)

describe('a piece alone', () => {
  const plan = cubePlan()
  const [box, lid] = plan.pieces

  test('the open box: four folds round its bottom, eight seam edges on the walls, four of them with a tab root', () => {
    const drawn = drawPiece(plan, box!)
    const between = drawn.folds.slice(0, 4)
    expect(between.map(({ kind, from, to }) => [kind, Math.round(length(from, to))])).toEqual(
      Array.from({ length: 4 }, () => ['mountain', 40]),
    )
    // Walls to each other: both edges on the piece; walls to the lid: one.
    const edges = new Map<number, number>()
    for (const { crease } of drawn.seams) edges.set(crease, (edges.get(crease) ?? 0) + 1)
    expect([...edges.values()].sort()).toEqual([1, 1, 1, 1, 2, 2, 2, 2])
    expect(drawn.folds).toHaveLength(4 + box!.tabs.length)
    expect(drawn.seams.every(({ from, to }) => Math.abs(length(from, to) - 40) < 1e-9)).toBe(true)
  })

  test('labels of seams stand inside the panel, off the edge', () => {
    const drawn = drawPiece(plan, lid!)
    const [xs, ys] = [0, 1].map((k) => drawn.outline.map((p) => p[k]!)) as [number[], number[]]
    for (const { at } of drawn.seams) {
      expect(at[0]).toBeGreaterThan(Math.min(...xs))
      expect(at[0]).toBeLessThan(Math.max(...xs))
      expect(at[1]).toBeGreaterThan(Math.min(...ys))
      expect(at[1]).toBeLessThan(Math.max(...ys))
    }
  })

  test('lies as on its sheet: turned by the placement, y down', () => {
    const turned = cubePlan()
    turned.sheets[0]!.placed[1]!.rotation = 90
    const drawn = drawPiece(turned, turned.pieces[1]!)
    // (40, 0) turned by 90 degrees is (0, 40), which with y down is (0, -40).
    expect(drawn.outline[1]![0]).toBeCloseTo(0, 9)
    expect(drawn.outline[1]![1]).toBeCloseTo(-40, 9)
    expect(turn(drawn.outline)).toBeLessThan(0)
  })

  test('on a mirrored sheet it is mirrored, and mountain and valley change places', () => {
    const inside = cubePlan()
    for (const placed of inside.sheets[0]!.placed) placed.mirrored = true
    const drawn = drawPiece(inside, inside.pieces[0]!)
    expect(drawn.mirrored).toBe(true)
    expect(new Set(drawn.folds.map(({ kind }) => kind))).toEqual(new Set(['valley']))
    expect(turn(drawn.outline)).toBeGreaterThan(0)
  })
})

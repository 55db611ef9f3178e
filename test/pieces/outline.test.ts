import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { difference, regionArea, union } from '../../src/geometry/clip'
import { signedArea } from '../../src/geometry/vec2'
import { bestFitRotation, cutLines, pieceOutline, piecePoints, piecesOf } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'
import { cube, cubeOnCube, icosahedron, lumpy, pitted, smallStellated } from './fixtures'
import { a4, planOf } from './plans'

/** Perimeter of a net: all ring edges that are no folds. */
const cutLength = (skin: Skin, edgeMm: number, panels: readonly number[], folds: readonly number[]): number =>
  panels
    .flatMap((p) => skin.panels[p]!.creases.flat())
    .reduce((sum, c) => sum + (folds.includes(c) ? 0 : skin.creases[c]!.length * edgeMm), 0)
const perimeter = (ring: readonly (readonly [number, number])[]): number =>
  ring.reduce((sum, p, i) => {
    const q = ring[(i + 1) % ring.length]!
    return sum + Math.hypot(q[0] - p[0], q[1] - p[1])
  }, 0)

describe('cut lines', () => {
  for (const [name, make, edgeMm] of [
    ['icosahedron', icosahedron, 60],
    ['small stellated body', smallStellated, 60],
    ['pitted body', pitted, 90],
    ['cube on cube', cubeOnCube, 70],
  ] as const)
    it(`enclose the net with its tabs, once round: ${name}`, () => {
      const plan = planOf(make(), edgeMm)
      plan.pieces.forEach((piece, i) => {
        const tabs = plan.tabs[i]!
        const lines = cutLines(plan.skin, piece, tabs)
        const area = piece.panels.reduce((s, p) => s + p.rings.reduce((t, r) => t + signedArea(r), 0), 0)
        const withTabs = tabs.reduce((s, t) => s + signedArea(t.outline), area)
        expect(lines.reduce((s, l) => s + signedArea(l), 0)).toBeCloseTo(withTabs, 6)
        // The same region, by clipping.
        const all = [...piece.panels.flatMap((p) => p.rings), ...tabs.map((t) => t.outline)]
        expect(regionArea(difference(union(all), union(lines)))).toBeLessThan(0.02)
        expect(regionArea(difference(union(lines), union(all)))).toBeLessThan(0.02)
        expect(pieceOutline(plan.skin, piece, tabs)).toEqual(lines[0])
        // Without tabs: every edge that is no fold, once.
        const bare = cutLines(plan.skin, piece, []).reduce((s, l) => s + perimeter(l), 0)
        expect(bare).toBeCloseTo(
          cutLength(
            plan.skin,
            edgeMm,
            piece.panels.map((p) => p.panel),
            piece.folds,
          ),
          6,
        )
      })
    })

  it('have slits of no width where a net touches itself: a pit with three folds around its flat vertex', () => {
    // Ten angles of 36 degrees lie round an icosahedron's vertex of the pitted body: flat, they just close.
    const skin = pitted()
    const around = skin.creases.filter((c) => c.ends.includes(0)).map((c) => c.id)
    expect(around).toHaveLength(10)
    const piece = piecesOf(skin, 50, around.slice(1), a4).find((p) => p.panels.length === 10)!
    const outline = pieceOutline(skin, piece, [])
    const folds = piece.folds
    expect(perimeter(outline)).toBeCloseTo(
      cutLength(
        skin,
        50,
        piece.panels.map((p) => p.panel),
        folds,
      ),
      6,
    )
    expect(signedArea(outline)).toBeCloseTo(10 * skin.panels[0]!.area * 2500, 6)
  })

  it('run round a hole, the other way, and round what is folded into it', () => {
    const skin = cubeOnCube()
    const top = skin.panels.find((p) => p.rings.length === 2)!
    const alone = piecesOf(skin, 50, [], a4).find((p) => p.panels[0]!.panel === top.id)!
    const lines = cutLines(skin, alone, [])
    expect(lines.map((l) => Math.round(signedArea(l)))).toEqual([2500, -400])
    // A wall of the smaller cube (0.4 × 0.3) folded inwards from the hole's edge lies in the hole.
    const piece = piecesOf(skin, 50, [top.creases[1]![0]!], a4).find((p) => p.panels.length === 2)!
    const both = cutLines(skin, piece, [])
    expect(both.map((l) => Math.round(signedArea(l)))).toEqual([2500, -400 + 300])
  })
})

describe('bestFitRotation', () => {
  it('turns every piece with its tabs into the rectangle, and says when there is no way: seed 51', () => {
    let turned = 0
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -30, max: 40 }), { minLength: 5, maxLength: 12 }), (heights) => {
        const plan = planOf(lumpy(heights.map((h) => h / 100)), 60, { effort: 10 })
        plan.pieces.forEach((piece, i) => {
          const degrees = bestFitRotation(piece, plan.tabs[i]!, a4)!
          expect(degrees).toBeGreaterThanOrEqual(0)
          expect(degrees).toBeLessThan(180)
          const a = (degrees * Math.PI) / 180
          const points = piecePoints(piece, plan.tabs[i]!)
          const xs: number[] = []
          const ys: number[] = []
          for (let k = 0; k < points.length; k += 2) {
            xs.push(points[k]! * Math.cos(a) - points[k + 1]! * Math.sin(a))
            ys.push(points[k]! * Math.sin(a) + points[k + 1]! * Math.cos(a))
          }
          expect(Math.max(...xs) - Math.min(...xs)).toBeLessThan(190 + 1e-6)
          expect(Math.max(...ys) - Math.min(...ys)).toBeLessThan(277 + 1e-6)
          if (degrees > 1) turned++
        })
      }),
      { seed: 51, numRuns: 10 },
    )
    expect(turned).toBeGreaterThan(0)
    const big = piecesOf(cube(), 200, [], a4)[0]!
    expect(bestFitRotation(big, [], a4)).toBeNull()
  })
})

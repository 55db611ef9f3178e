import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { UnionFind } from '../../src/geometry/union-find'
import { distance, scale, type Vec3 } from '../../src/geometry/vec3'
import { foldPiece, move3, type Piece, piecesOf } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'
import { cubeOnCube, lumpy, pitted, smallStellated } from './fixtures'
import { a4 } from './plans'

/** Any spanning forest: creases in the given order, unless they close a ring. */
const forest = (skin: Skin, order: readonly number[]): number[] => {
  const sets = new UnionFind(skin.panels.length)
  return order.filter((c) => sets.union(...skin.creases[c]!.panels))
}

/** Greatest difference between distances of ring points after folding and on the skin: no frame is needed for this. */
const misfit = (skin: Skin, edgeMm: number, piece: Piece, amount: number): number => {
  const motions = foldPiece(skin, piece, amount)
  const here: Vec3[] = []
  const there: Vec3[] = []
  piece.panels.forEach(({ panel, rings }, i) => {
    rings.forEach((ring, r) => {
      ring.forEach((p, k) => {
        here.push(move3(motions[i]!, [p[0], p[1], 0]))
        there.push(scale(skin.points[skin.panels[panel]!.rings[r]![k]!]!, edgeMm))
      })
    })
  })
  let worst = 0
  for (let i = 0; i < here.length; i++)
    for (let j = 0; j < i; j += 7)
      worst = Math.max(worst, Math.abs(distance(here[i]!, here[j]!) - distance(there[i]!, there[j]!)))
  return worst
}

/** Handedness: the sign of the volume that four points span, which distances do not tell. */
const spanned = (p: readonly Vec3[]): number => {
  const [a, b, c] = [1, 2, 3].map((k) => [0, 1, 2].map((d) => p[k]![d]! - p[0]![d]!)) as [number[], number[], number[]]
  return (
    a[0]! * (b[1]! * c[2]! - b[2]! * c[1]!) -
    a[1]! * (b[0]! * c[2]! - b[2]! * c[0]!) +
    a[2]! * (b[0]! * c[1]! - b[1]! * c[0]!)
  )
}

describe('foldPiece', () => {
  for (const [name, make] of [
    ['small stellated body', smallStellated],
    ['pitted body', pitted],
    ['cube on cube', cubeOnCube],
  ] as const)
    it(`brings the whole skin back from one net of any tree of folds: ${name}, seed 61`, () => {
      const skin = make()
      const all = skin.creases.map((c) => c.id)
      fc.assert(
        fc.property(fc.shuffledSubarray(all, { minLength: all.length }), (order) => {
          const pieces = piecesOf(skin, 70, forest(skin, order), a4)
          expect(pieces).toHaveLength(1)
          // 1e-6 of the height, which is over 70 mm.
          expect(misfit(skin, 70, pieces[0]!, 1)).toBeLessThan(7e-5)
          expect(misfit(skin, 70, pieces[0]!, 0)).toBeGreaterThan(1)
        }),
        { seed: 61, numRuns: 8 },
      )
    })

  it('folds mountains back and valleys forward: the solid is not its mirror image', () => {
    const skin = lumpy([0.1, -0.2, 0.3, 0.05, -0.1, 0.25, 0.15])
    const piece = piecesOf(
      skin,
      50,
      forest(
        skin,
        skin.creases.map((c) => c.id),
      ),
      a4,
    )[0]!
    const motions = foldPiece(skin, piece, 1)
    const at = (i: number): Vec3 => {
      const [x, y] = piece.panels[i]!.rings[0]![0]!
      return move3(motions[i]!, [x, y, 0])
    }
    const on = (i: number): Vec3 => scale(skin.points[skin.panels[piece.panels[i]!.panel]!.rings[0]![0]!]!, 50)
    const spread = [0, 3, 9, 17]
    const volume = spanned(spread.map(on))
    expect(Math.abs(volume)).toBeGreaterThan(1)
    expect(spanned(spread.map(at))).toBeCloseTo(volume, 4)
  })

  it('leaves the net flat at 0 and keeps the chosen panel in place', () => {
    const skin = pitted()
    const piece = piecesOf(
      skin,
      50,
      forest(
        skin,
        skin.creases.map((c) => c.id),
      ),
      a4,
    )[0]!
    const ring = piece.panels[7]!.rings[0]!
    for (const m of foldPiece(skin, piece, 0)) expect(move3(m, [3, 4, 0])).toEqual([3, 4, 0])
    const still = foldPiece(skin, piece, 0.6, piece.panels[7]!.panel)[7]!
    for (const p of ring) expect(move3(still, [p[0], p[1], 0])).toEqual([p[0], p[1], 0])
  })
})

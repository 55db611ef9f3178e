import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gluingOrder, renumber } from '../../src/assembly'
import { cutIntoPieces, piecesOf } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'
import { cube, icosahedron, lumpy, pitted, smallStellated } from '../pieces/fixtures'
import { a4 } from '../pieces/plans'

const pieceOf = (pieces: readonly { id: number; panels: readonly { panel: number }[] }[]): Map<number, number> =>
  new Map(pieces.flatMap((p) => p.panels.map((q) => [q.panel, p.id] as const)))

/** Everything that an order promises, checked from the creases alone. */
const faults = (skin: Skin, pieces: ReturnType<typeof piecesOf>): string[] => {
  const { order, steps } = gluingOrder(skin, pieces)
  const out: string[] = []
  const where = pieceOf(pieces)
  const folds = new Set(pieces.flatMap((p) => p.folds))
  if ([...order].sort((a, b) => a - b).join() !== pieces.map((p) => p.id).join()) out.push('not a permutation')
  if (steps.map((s) => s.piece).join() !== order.join()) out.push('steps in another order')
  const glued = new Set<number>()
  const closed = new Set<number>()
  for (const { piece, seams, note } of steps) {
    glued.add(piece)
    const should = skin.creases.filter((c) => {
      const [a, b] = c.panels.map((p) => where.get(p)!) as [number, number]
      return !folds.has(c.id) && glued.has(a) && glued.has(b) && !closed.has(c.id)
    })
    if (should.map((c) => c.id).join() !== seams.join()) out.push(`step of piece ${piece} closes other seams`)
    for (const s of seams) closed.add(s)
    const joins = skin.creases.some((c) => {
      const [a, b] = c.panels.map((p) => where.get(p)!) as [number, number]
      return a !== b && [a, b].includes(piece) && glued.has(a) && glued.has(b)
    })
    if (glued.size > 1 && !joins && !note.startsWith('Starts a separate part')) out.push(`piece ${piece} joins nothing`)
  }
  if (closed.size !== skin.creases.length - folds.size) out.push('seams left open')
  return out
}

describe('gluingOrder', () => {
  for (const [name, make] of [
    ['cube', cube],
    ['icosahedron', icosahedron],
    ['small stellated body', smallStellated],
    ['pitted body', pitted],
  ] as const)
    it(`joins each piece to what is glued and closes every seam once: ${name}`, () => {
      const skin = make()
      expect(faults(skin, piecesOf(skin, 50, [], a4))).toEqual([])
      expect(faults(skin, [...cutIntoPieces(skin, { edgeMm: 90, fit: a4, effort: 30 }).pieces])).toEqual([])
    })

  it('holds for any cut of any body: seed 71', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: -30, max: 40 }), { minLength: 5, maxLength: 12 }),
        fc.integer({ min: 30, max: 120 }),
        (heights, edgeMm) => {
          const skin = lumpy(heights.map((h) => h / 100))
          expect(faults(skin, [...cutIntoPieces(skin, { edgeMm, fit: a4, effort: 5 }).pieces])).toEqual([])
        },
      ),
      { seed: 71, numRuns: 20 },
    )
  })

  it('grows along connected seams: six squares of a cube close as a builder would', () => {
    const { steps } = gluingOrder(cube(), piecesOf(cube(), 50, [], a4))
    // After the first, a neighbour (1 seam), the one that touches both (2), then as the count of closed edges allows.
    expect(steps.map((s) => s.seams.length)).toEqual([0, 1, 2, 2, 3, 4])
    expect(steps.at(-1)!.note).toBe('Closing piece.')
  })

  it('takes as closing piece the large plain one', () => {
    // A cube with one panel of its own and the rest in two pieces: the lone square is simplest, but small.
    const skin = cube()
    const creases = (a: number, b: number) =>
      skin.creases.filter((c) => a !== b && c.panels.includes(a) && c.panels.includes(b)).map((c) => c.id)
    const around = [1, 2, 3, 4, 5].filter((p) => creases(0, p).length > 0)
    // Five squares around panel 0 in one piece is no good closing piece: its rim is long and thin.
    const folds = around.flatMap((p) => creases(0, p)).slice(0, 3)
    const pieces = piecesOf(skin, 50, folds, a4)
    const { order } = gluingOrder(skin, pieces)
    expect(pieces.find((p) => p.id === order.at(-1))!.panels).toHaveLength(1)
  })

  it('says where a part begins that hangs together nowhere with the rest', () => {
    const one = cube()
    const far = 3
    const n = one.panels.length
    const twoBodies: Skin = {
      ...one,
      points: [...one.points, ...one.points.map(([x, y, z]) => [x + far, y, z] as const)],
      panels: [
        ...one.panels,
        ...one.panels.map((p) => ({
          ...p,
          id: p.id + n,
          rings: p.rings.map((r) => r.map((v) => v + one.points.length)),
          creases: p.creases.map((r) => r.map((c) => c + one.creases.length)),
        })),
      ],
      creases: [
        ...one.creases,
        ...one.creases.map((c) => ({
          ...c,
          id: c.id + one.creases.length,
          panels: [c.panels[0] + n, c.panels[1] + n] as const,
          ends: [c.ends[0] + one.points.length, c.ends[1] + one.points.length] as const,
        })),
      ],
      parts: 2,
    }
    const pieces = piecesOf(twoBodies, 50, [], a4)
    expect(faults(twoBodies, pieces)).toEqual([])
    const { steps } = gluingOrder(twoBodies, pieces)
    expect(steps.filter((s) => s.note.startsWith('Starts a separate part'))).toHaveLength(1)
    expect(steps[6]!.seams).toEqual([])
  })

  it('is renumbered from the first piece to the last, templates by first appearance', () => {
    const skin = smallStellated()
    const cut = cutIntoPieces(skin, { edgeMm: 60, fit: a4, effort: 30 })
    const glue = gluingOrder(skin, cut.pieces)
    const { pieces, steps } = renumber(cut.pieces, glue)
    expect(pieces.map((p) => p.id)).toEqual(pieces.map((_, i) => i))
    expect(steps.map((s) => s.piece)).toEqual(pieces.map((_, i) => i))
    const seen = [...new Set(pieces.map((p) => p.template))]
    expect(seen).toEqual(seen.map((_, i) => i))
    pieces.forEach((p, i) => {
      const before = cut.pieces.find((q) => q.id === glue.order[i])!
      expect(p.panels).toEqual(before.panels)
    })
    expect(gluingOrder(skin, pieces).order).toEqual(pieces.map((_, i) => i))
  })
})

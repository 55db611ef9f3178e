import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { intersectionArea } from '../../src/geometry/clip'
import { UnionFind } from '../../src/geometry/union-find'
import { apply, normalize, rotationAbout, type Vec3 } from '../../src/geometry/vec3'
import { cutIntoPieces, type Piece, piecesOf } from '../../src/pieces'
import { cube, hullFaces, icosahedron, icosahedronPoints, lumpy, skinOfMesh, smallStellated } from './fixtures'
import { a4 } from './plans'

const opposite = { none: 'none', left: 'right', right: 'left' } as const

describe('templates', () => {
  it('has one template for the faces of a cube, its own mirror image', () => {
    const pieces = piecesOf(cube(), 50, [], a4)
    expect(new Set(pieces.map((p) => p.template))).toEqual(new Set([0]))
    expect(pieces.every((p) => p.hand === 'none')).toBe(true)
  })

  it('gives pieces of one template the same coordinates', () => {
    const pieces = piecesOf(icosahedron(), 50, [], a4)
    const ring = (p: Piece) => p.panels[0]!.rings
    for (const p of pieces)
      expect(intersectionArea(ring(p), ring(pieces[0]!))).toBeCloseTo((Math.sqrt(3) / 4) * 2500, 3)
  })

  it('tells folds apart that only differ in place or in inner angle', () => {
    // A strip of three squares of a cube is one template, an L of three another; both are their own mirror images.
    const skin = cube()
    const crease = (a: number, b: number): number[] =>
      skin.creases.filter((c) => a !== b && c.panels.includes(a) && c.panels.includes(b)).map((c) => c.id)
    const next = (p: number): number[] => [0, 1, 2, 3, 4, 5].filter((q) => crease(p, q).length > 0)
    const faceOpposite = (p: number): number => [0, 1, 2, 3, 4, 5].find((q) => q !== p && crease(p, q).length === 0)!
    const middle = 0
    const side = next(middle)[0]!
    const strip = [...crease(middle, side), ...crease(middle, faceOpposite(side))]
    const bent = [...crease(middle, side), ...crease(middle, next(middle).find((q) => crease(side, q).length > 0)!)]
    const templates = (folds: number[]) => piecesOf(skin, 50, folds, a4).filter((p) => p.panels.length === 3)
    expect(templates(strip)[0]!.hand).toBe('none')
    expect(templates(bent)[0]!.hand).toBe('none')
    // In the stellated body, two triangles folded at a mountain or at a valley have the same angles only in one case.
    const star = smallStellated()
    const mountain = star.creases.find((c) => c.innerAngle < 180)!
    const valley = star.creases.find((c) => c.innerAngle > 180 && !c.panels.some((p) => mountain.panels.includes(p)))!
    const two = piecesOf(star, 30, [mountain.id, valley.id], a4).filter((p) => p.panels.length === 2)
    expect(two[0]!.template).not.toBe(two[1]!.template)
  })

  it('calls a net of S shape and its mirror image by opposite hands', () => {
    const skin = cube()
    const between = (a: number, b: number): number | undefined =>
      skin.creases.find((c) => c.panels.includes(a) && c.panels.includes(b))?.id
    // All chains of four faces that turn left then right, or right then left.
    const hands = new Map<number, string>()
    const all = [0, 1, 2, 3, 4, 5]
    for (const a of all)
      for (const b of all)
        for (const c of all)
          for (const d of all) {
            const folds = [between(a, b), between(b, c), between(c, d)]
            if (new Set([a, b, c, d]).size < 4 || folds.includes(undefined)) continue
            // S or Z: a and c are neighbours, b and d are neighbours, a and d are opposite.
            if (between(a, c) === undefined || between(b, d) === undefined || between(a, d) !== undefined) continue
            const piece = piecesOf(skin, 40, folds as number[], a4).find((p) => p.panels.length === 4)!
            const area = turns(piece)
            hands.set(area, piece.hand)
          }
    expect([...hands.keys()].sort()).toEqual([-1, 1])
    expect(hands.get(1)).toBe(opposite[hands.get(-1) as 'left' | 'right'])
    expect(hands.get(1)).not.toBe('none')
  })

  it('gives the two hands of a body mirrored templates, net by net: seed 41', () => {
    let handed = 0
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: -30, max: 40 }), { minLength: 5, maxLength: 12 }),
        fc.array(fc.nat({ max: 29 }), { minLength: 3, maxLength: 15 }),
        (percent, wanted) => {
          const heights = percent.map((p) => p / 100)
          const [skin, twin] = [lumpy(heights), lumpy(heights, true)]
          const folds = forest(
            wanted,
            skin.creases.map((c) => c.panels),
          )
          // The twin's panels are the same in number and order; its creases too, found by their ends.
          const byEnds = new Map(twin.creases.map((c) => [[...c.ends].sort((a, b) => a - b).join(), c.id]))
          const theirs = folds.map((f) => byEnds.get([...skin.creases[f]!.ends].sort((a, b) => a - b).join())!)
          const ours = piecesOf(skin, 50, folds, a4)
          const mirrored = piecesOf(twin, 50, theirs, a4)
          expect(mirrored.map((p) => p.hand)).toEqual(ours.map((p) => opposite[p.hand]))
          handed += ours.filter((p) => p.hand !== 'none').length
          // Within one body two pieces share a template exactly when their twins do.
          const pairs = (list: readonly Piece[]) => list.map((p) => list.map((q) => p.template === q.template))
          expect(pairs(mirrored)).toEqual(pairs(ours))
        },
      ),
      { seed: 41, numRuns: 40 },
    )
    expect(handed).toBeGreaterThan(100)
  })

  it('does not depend on how the body is turned in space or where its panels start: seed 42', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 6, noNaN: true }), fc.nat({ max: 2 }), (angle, start) => {
        const turn = rotationAbout(normalize([1, 2, 3]), angle)
        const faces = hullFaces(icosahedronPoints)
        const heights = [0.1, -0.2, 0.3, 0.05, -0.1, 0.25, 0.15]
        const points = icosahedronPoints.map((p, i): Vec3 => {
          const k = 1 + heights[i % heights.length]!
          return apply(turn, [p[0] * k, p[1] * k, p[2] * k])
        })
        const rolled = faces.map((f) => f.map((_, i) => f[(i + start) % 3]!))
        const skin = skinOfMesh(points, rolled)
        const folds = forest(
          [0, 3, 7, 9, 11, 20, 22, 25],
          skin.creases.map((c) => c.panels),
        )
        const { template, hand } = summary(piecesOf(skin, 50, folds, a4))
        const still = piecesOf(lumpy(heights), 50, forestLike(skin, folds, lumpy(heights)), a4)
        expect({ template, hand }).toEqual(summary(still))
      }),
      { seed: 42, numRuns: 10 },
    )
  })

  it('names templates in the pieces of a whole cut as well', () => {
    const { pieces } = cutIntoPieces(smallStellated(), { edgeMm: 40, fit: { widthMm: 80, heightMm: 90 }, effort: 0 })
    expect(new Set(pieces.map((p) => p.template)).size).toBeLessThan(pieces.length)
  })
})

const summary = (pieces: readonly Piece[]) => ({
  template: pieces.map((p) => p.template),
  hand: pieces.map((p) => p.hand),
})

/** The wanted creases without those that would close a ring. */
const forest = (wanted: readonly number[], panels: readonly (readonly [number, number])[]): number[] => {
  const sets = new UnionFind(1 + Math.max(...panels.flat()))
  return [...new Set(wanted)].filter((c) => sets.union(panels[c]![0], panels[c]![1]))
}

const forestLike = (
  from: ReturnType<typeof lumpy>,
  folds: readonly number[],
  to: ReturnType<typeof lumpy>,
): number[] => {
  const byPanels = new Map(to.creases.map((c) => [[...c.panels].sort((a, b) => a - b).join(), c.id]))
  return folds.map((f) => byPanels.get([...from.creases[f]!.panels].sort((a, b) => a - b).join())!)
}

/** Which way a chain of four squares first turns, seen from its end with the free edge opposite to the fold. */
const turns = (piece: Piece): number => {
  const centre = (k: number): [number, number] => {
    const ring = piece.panels[k]!.rings[0]!
    return [ring.reduce((s, p) => s + p[0], 0) / 4, ring.reduce((s, p) => s + p[1], 0) / 4]
  }
  const centres = [0, 1, 2, 3].map(centre)
  const near = (p: [number, number], q: [number, number]): boolean => Math.hypot(p[0] - q[0], p[1] - q[1]) < 41
  const start = centres.find((p) => centres.filter((q) => q !== p && near(p, q)).length === 1)!
  const second = centres.find((q) => q !== start && near(start, q))!
  const third = centres.find((q) => q !== start && q !== second && near(second, q))!
  const cross = (second[0] - start[0]) * (third[1] - second[1]) - (second[1] - start[1]) * (third[0] - second[0])
  return Math.sign(Math.round(cross))
}

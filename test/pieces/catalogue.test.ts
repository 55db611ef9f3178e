/** Pieces, order and tabs on solids of the catalogue, as the whole pipeline uses them. */
import { describe, expect, it } from 'vitest'
import { add, cross, dot, norm, sub, type Vec3 } from '../../src/geometry/vec3'
import { cutIntoPieces, type Piece, piecesOf, validatePieces } from '../../src/pieces'
import { computeSkin, type Skin } from '../../src/skin'
import { buildSolid, listFamily, type Solid } from '../../src/solids'
import { tabFaults, worstOverlap } from './by-clipping'
import { a4, planOf } from './plans'

const heightMm = 250

const skinOf = (id: string, hand: 'left' | 'right' = 'right'): { skin: Skin; edgeMm: number } => {
  const solid = buildSolid(id, hand)
  return { skin: computeSkin(solid), edgeMm: heightMm / 2 / Math.max(...solid.vertices.map(norm)) }
}

/** All vertices on one side of every face. */
const isConvex = ({ vertices, faces }: Solid): boolean =>
  faces.every(({ cycle }) => {
    const [a, b, c] = [vertices[cycle[0]!]!, vertices[cycle[1]!]!, vertices[cycle[2]!]!]
    const normal = cross(sub(b, a), sub(c, a))
    const heights = vertices.map((v) => dot(sub(v, a), normal))
    return heights.every((h) => h < 1e-9) || heights.every((h) => h > -1e-9)
  })

describe('pieces at 250 mm on A4, printable 190 × 277 mm', () => {
  // What plain greedy merging reaches; a short search must do at least as well.
  const atMost: [string, number][] = [
    ['great-icosahedron', 11],
    ['great-icosidodecahedron', 15],
    ['great-ditrigonal-icosidodecahedron', 17],
    ['snub-dodecadodecahedron', 19],
    ['great-snub-icosidodecahedron', 30],
    ['great-snub-dodecicosidodecahedron', 24],
    ['great-dirhombicosidodecahedron', 114],
  ]
  for (const [id, limit] of atMost)
    it(`${id}: at most ${limit}, every promise kept`, () => {
      const { skin, edgeMm } = skinOf(id)
      const plan = planOf(skin, edgeMm, { effort: 300 })
      expect(plan.pieces.length).toBeLessThanOrEqual(limit)
      expect(validatePieces(plan).filter((c) => !c.ok)).toEqual([])
    })

  it('great icosahedron: independent checks, and a tab on at least 95 of 100 seams', () => {
    const { skin, edgeMm } = skinOf('great-icosahedron')
    const plan = planOf(skin, edgeMm, { effort: 200 })
    expect(worstOverlap(plan.pieces)).toBeLessThan(1e-4)
    expect(tabFaults(skin, plan.pieces, plan.tabs)).toEqual([])
    const tabs = plan.tabs.flat().length
    expect(tabs / (tabs + plan.buttSeams.length)).toBeGreaterThanOrEqual(0.95)
  })

  it('one kind per piece when each colour has its own card', () => {
    const { skin, edgeMm } = skinOf('great-icosidodecahedron')
    const plan = planOf(skin, edgeMm, { effort: 100, perKind: true })
    for (const piece of plan.pieces) {
      expect(new Set(piece.panels.map((p) => skin.panels[p.panel]!.kind)).size).toBe(1)
      expect(piece.kind).toBe(skin.panels[piece.panels[0]!.panel]!.kind)
    }
    expect(validatePieces(plan).filter((c) => !c.ok)).toEqual([])
  })
})

describe('convex uniform solids', () => {
  // Density 1 holds one that is not convex as well.
  const convex = listFamily('uniform').filter((s) => s.density === 1 && isConvex(buildSolid(s.id)))
  it('are eighteen', () => {
    expect(convex).toHaveLength(18)
  })
  for (const { id } of convex)
    it(`${id} unfolds into one piece on a sheet large enough`, () => {
      const { skin, edgeMm } = skinOf(id)
      const fit = { widthMm: 1500, heightMm: 1500 }
      const { pieces } = cutIntoPieces(skin, { edgeMm, fit })
      expect(pieces).toHaveLength(1)
      expect(worstOverlap(pieces)).toBeLessThan(1e-4)
    })
})

describe('hands of chiral solids', () => {
  const opposite = { none: 'none', left: 'right', right: 'left' } as const

  for (const id of ['snub-cube', 'snub-dodecadodecahedron'])
    it(`${id}: the same folds give mirrored templates`, () => {
      const [right, left] = [skinOf(id, 'right'), skinOf(id, 'left')]
      // Crease by crease, by where its middle and its panels' middles lie after the reflection.
      const key = (skin: Skin, c: Skin['creases'][number], k: Vec3): string =>
        [
          c.ends.map((i) => skin.points[i]!),
          ...c.panels.map((p) => skin.panels[p]!.rings[0]!.map((i) => skin.points[i]!)),
        ]
          .map((points) =>
            points.reduce((s, p) => add(s, p), [0, 0, 0] as Vec3).map((v, d) => (v * k[d]!) / points.length),
          )
          .map((m, i) => ({ m, i }))
          .map(({ m }) => m.map((v) => (Math.round(v * 1e6) / 1e6 + 0).toFixed(6)).join(','))
          .sort()
          .join(' ')
      const reflection = (
        [
          [-1, 1, 1],
          [1, -1, 1],
          [1, 1, -1],
          [-1, -1, -1],
        ] as const
      ).find((k) => {
        const there = new Set(left.skin.creases.map((c) => key(left.skin, c, [1, 1, 1])))
        return right.skin.creases.every((c) => there.has(key(right.skin, c, k)))
      })
      expect(reflection).toBeDefined()
      const twin = new Map(left.skin.creases.map((c) => [key(left.skin, c, [1, 1, 1]), c.id]))
      const { folds, pieces } = cutIntoPieces(right.skin, { edgeMm: right.edgeMm, fit: a4, effort: 50 })
      const theirs = folds.map((f) => twin.get(key(right.skin, right.skin.creases[f]!, reflection!))!)
      const mirrored = piecesOf(left.skin, left.edgeMm, theirs, a4)
      const tally = (list: readonly Piece[], flip: boolean): string[] =>
        list.map((p) => `${p.panels.length} ${flip ? opposite[p.hand] : p.hand}`).sort()
      expect(tally(mirrored, true)).toEqual(tally(pieces, false))
      expect(pieces.some((p) => p.hand !== 'none')).toBe(true)
    })
})

/**
 * Nets that repeat, modules and single panels. Against the symmetry group: the pieces of a template are the images of one
 * piece, so their number divides the number of rotations, and every rotation carries the set of folds onto itself or the
 * set of pieces onto itself.
 */
import { describe, expect, test } from 'vitest'
import { norm } from '../../src/geometry/vec3'
import { cutIntoPieces, type Piece, validatePieces } from '../../src/pieces'
import { actionsOn } from '../../src/pieces/action'
import { computeSkin, type Skin, withPairing } from '../../src/skin'
import { buildSolid, type Solid } from '../../src/solids'

const fit = { widthMm: 190, heightMm: 277 }

const at = (solid: Solid, heightMm: number): number => heightMm / (2 * Math.max(...solid.vertices.map(norm)))

const counts = (pieces: readonly Piece[]): number[] => {
  const of = new Map<number, number>()
  for (const p of pieces) of.set(p.template, (of.get(p.template) ?? 0) + 1)
  return [...of.values()].sort((a, b) => b - a)
}

const faults = (skin: Skin, pieces: readonly Piece[], edgeMm: number): unknown[] =>
  validatePieces({
    skin,
    pieces,
    tabs: pieces.map(() => []),
    // No tabs yet: every seam is bare.
    buttSeams: skin.creases.map((c) => c.id).filter((id) => !pieces.some((p) => p.folds.includes(id))),
    edgeMm,
    fit,
  }).filter((c) => !c.ok)

describe('nets that repeat', () => {
  // The most templates that may be needed: what is reached today, and never more.
  const cases: readonly (readonly [id: string, pairing: 'inside' | 'outside', most: number, heightMm?: number])[] = [
    ['snub-cube', 'inside', 2],
    ['great-icosahedron', 'inside', 1],
    ['great-snub-icosidodecahedron', 'inside', 1],
    ['great-retrosnub-icosidodecahedron', 'inside', 2],
    ['great-ditrigonal-icosidodecahedron', 'inside', 1],
    ['octahemioctahedron', 'outside', 1, 150],
    ['inverted-snub-dodecadodecahedron', 'outside', 2],
    ['heptagrammic-7-3-antiprism', 'inside', 3, 200],
  ]
  for (const [id, way, most, heightMm = 250] of cases)
    test(`${id}: at most ${most} templates, explained by the group`, () => {
      const solid = buildSolid(id)
      const skin = withPairing(computeSkin(solid), () => way)
      const edgeMm = at(solid, heightMm)
      const { pieces } = cutIntoPieces(skin, { edgeMm, fit, nets: 'repeat', rotations: solid.rotations })
      expect(faults(skin, pieces, edgeMm)).toEqual([])
      const list = counts(pieces)
      expect(list.length).toBeLessThanOrEqual(most)
      const actions = actionsOn(skin, solid.rotations)
      expect(actions.length).toBe(solid.rotations.length)
      for (const n of list) expect([id, n, actions.length % n]).toEqual([id, n, 0])
      // Every rotation maps pieces, as sets of panels, to pieces.
      const pieceOf = new Map(pieces.flatMap((p) => p.panels.map(({ panel }) => [panel, p.id] as const)))
      for (const { panels } of actions)
        for (const p of pieces) {
          const homes = new Set(p.panels.map(({ panel }) => pieceOf.get(panels[panel]!)))
          expect(homes.size).toBe(1)
        }
    })

  test('a solid without rotations still gets valid nets', () => {
    const solid = buildSolid('great-icosahedron')
    const skin = computeSkin(solid)
    const edgeMm = at(solid, 250)
    const { pieces } = cutIntoPieces(skin, { edgeMm, fit, nets: 'repeat' })
    expect(faults(skin, pieces, edgeMm)).toEqual([])
    expect(pieces.length).toBeLessThan(60)
  })
})

describe('modules and single panels', () => {
  test('no fold crosses the rim of a spike', () => {
    // The twelve spikes of the small stellated dodecahedron meet along valleys.
    const solid = buildSolid('small-stellated-dodecahedron')
    const skin = computeSkin(solid)
    const edgeMm = at(solid, 150)
    const { pieces, folds } = cutIntoPieces(skin, { edgeMm, fit, nets: 'modules' })
    expect(faults(skin, pieces, edgeMm)).toEqual([])
    expect(pieces.map((p) => p.panels.length)).toEqual(Array(12).fill(5))
    for (const f of folds) expect(skin.creases[f]!.innerAngle).toBeLessThan(180)
  })

  test('the pits of the great dodecahedron', () => {
    const solid = buildSolid('great-dodecahedron')
    const skin = computeSkin(solid)
    const { pieces } = cutIntoPieces(skin, { edgeMm: at(solid, 150), fit, nets: 'modules' })
    expect(pieces.map((p) => p.panels.length)).toEqual(Array(20).fill(3))
  })

  test('one panel a piece', () => {
    const solid = buildSolid('great-icosahedron')
    const skin = computeSkin(solid)
    const { pieces, folds } = cutIntoPieces(skin, { edgeMm: at(solid, 250), fit, nets: 'single' })
    expect(folds).toEqual([])
    expect(counts(pieces).reduce((a, b) => a + b)).toBe(180)
  })

  test('a limit on panels is kept', () => {
    const solid = buildSolid('great-icosahedron')
    const skin = computeSkin(solid)
    for (const nets of ['fewest', 'repeat', 'modules'] as const) {
      const { pieces } = cutIntoPieces(skin, {
        edgeMm: at(solid, 250),
        fit,
        nets,
        rotations: solid.rotations,
        maxPanels: 4,
      })
      expect(Math.max(...pieces.map((p) => p.panels.length))).toBeLessThanOrEqual(4)
    }
  })
})

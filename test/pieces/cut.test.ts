import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gluingOrder, renumber } from '../../src/assembly'
import { Cancelled, InputError } from '../../src/errors'
import { signedArea } from '../../src/geometry/vec2'
import { assignTabs, cutIntoPieces, flattenPanels, piecesOf, validatePieces } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'
import { tabFaults, worstOverlap } from './by-clipping'
import {
  cube,
  cubeOnCube,
  icosahedron,
  icosahedronPoints,
  lumpy,
  pitted,
  smallStellated,
  withPyramids,
} from './fixtures'

const a4 = { widthMm: 190, heightMm: 277 }

const whole = (skin: Skin, edgeMm: number, fit = a4, effort = 150) => {
  const cut = cutIntoPieces(skin, { edgeMm, fit, effort })
  const { pieces, steps } = renumber(cut.pieces, gluingOrder(skin, cut.pieces))
  const { tabs, buttSeams } = assignTabs(skin, pieces, { fit })
  const checks = validatePieces({ skin, edgeMm, pieces, tabs, buttSeams: buttSeams.map((b) => b.crease), fit })
  return { cut, pieces, steps, tabs, buttSeams, failed: checks.filter((c) => !c.ok) }
}

describe('flattenPanels', () => {
  it('keeps lengths and points, counter-clockwise, in mm', () => {
    const skin = cubeOnCube()
    const flat = flattenPanels(skin, 50)
    expect(flat.map((p) => p.panel)).toEqual(skin.panels.map((p) => p.id))
    flat.forEach((p, i) => {
      expect(p.rings.map((r) => r.length)).toEqual(skin.panels[i]!.rings.map((r) => r.length))
      expect(p.rings.reduce((s, r) => s + signedArea(r), 0)).toBeCloseTo(skin.panels[i]!.area * 2500, 8)
    })
    expect(signedArea(flat[1]!.rings[1]!)).toBeCloseTo(-400, 8)
  })
})

describe('cutIntoPieces', () => {
  const bodies: [string, () => Skin, number][] = [
    ['cube', cube, 40],
    ['icosahedron', icosahedron, 60],
    ['small stellated body', smallStellated, 60],
    ['pitted body', pitted, 90],
    ['cube on cube, a panel with a hole', cubeOnCube, 70],
    ['needles', () => withPyramids(icosahedronPoints, 4, 'needles'), 40],
  ]
  for (const [name, make, edgeMm] of bodies)
    it(`keeps every promise: ${name}`, () => {
      const skin = make()
      const { pieces, tabs, failed } = whole(skin, edgeMm)
      expect(failed).toEqual([])
      expect(worstOverlap(pieces)).toBeLessThan(1e-4)
      expect(tabFaults(skin, pieces, tabs)).toEqual([])
    })

  it('unfolds convex bodies into one piece when the sheet allows', () => {
    expect(whole(cube(), 40).pieces).toHaveLength(1)
    expect(whole(icosahedron(), 40).pieces).toHaveLength(1)
    // The cross of a cube is three edges by four: 3 × 63 < 190, but 3 × 64 > 190.
    expect(whole(cube(), 62).pieces.length).toBe(1)
  })

  it('refuses panels larger than the sheet and names the greatest height', () => {
    const cut = (edgeMm: number) => cutIntoPieces(cube(), { edgeMm, fit: a4, effort: 10 })
    expect(() => cut(200)).toThrow(InputError)
    // The square just fits upright: edge 190, height (through the vertices) 190 √3 = 329.09 mm.
    expect(() => cut(200)).toThrow(/at most 329 mm/)
    expect(cut(190).pieces).toHaveLength(6)
    expect(() => cut(190.01)).toThrow(InputError)
  })

  it('keeps any random body whole: seed 31', () => {
    let panels = 0
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -0.45, max: 0.6, noNaN: true }), { minLength: 5, maxLength: 12 }),
        fc.integer({ min: 20, max: 90 }),
        (heights, edgeMm) => {
          const skin = lumpy(heights)
          const { pieces, tabs, failed } = whole(skin, edgeMm, a4, 20)
          panels += pieces.reduce((s, p) => s + p.panels.length, 0)
          expect(failed).toEqual([])
          expect(worstOverlap(pieces)).toBeLessThan(1e-4)
          expect(tabFaults(skin, pieces, tabs)).toEqual([])
        },
      ),
      { seed: 31, numRuns: 25 },
    )
    expect(panels).toBe(25 * 20)
  })

  it('gives the same bytes for the same request, and other nets for another seed', () => {
    const cut = (seed: number) =>
      JSON.stringify(cutIntoPieces(smallStellated(), { edgeMm: 60, fit: a4, effort: 60, seed }))
    expect(cut(1)).toBe(cut(1))
    expect(cut(2)).not.toBe(cut(1))
  })

  it('is never worse than plain greedy merging, and gets the pieces again from the folds alone', () => {
    const skin = smallStellated()
    const count = (effort: number) => cutIntoPieces(skin, { edgeMm: 60, fit: a4, effort }).pieces.length
    expect(count(200)).toBeLessThan(count(0))
    const cut = cutIntoPieces(skin, { edgeMm: 60, fit: a4, effort: 50 })
    expect(piecesOf(skin, 60, cut.folds, a4)).toEqual(cut.pieces)
  })

  it('holds panels of one kind only when asked to', () => {
    const skin = cubeOnCube()
    const two = { ...skin, panels: skin.panels.map((p) => ({ ...p, kind: p.id % 2 })) }
    const { pieces } = cutIntoPieces(two, { edgeMm: 50, fit: a4, perKind: true })
    for (const piece of pieces) expect(new Set(piece.panels.map((p) => p.panel % 2)).size).toBe(1)
    expect(pieces.map((p) => p.kind).sort()).toEqual([...pieces.map((p) => p.panels[0]!.panel % 2)].sort())
    expect(cutIntoPieces(two, { edgeMm: 40, fit: a4 }).pieces.some((p) => p.kind === -1)).toBe(true)
  })

  it('reports progress that never goes back, and stops when told', () => {
    const seen: number[] = []
    cutIntoPieces(pitted(), { edgeMm: 60, fit: a4, effort: 50 }, (_, fraction) => seen.push(fraction))
    expect(seen.length).toBeGreaterThan(20)
    expect([...seen].sort((a, b) => a - b)).toEqual(seen)
    const stop = () =>
      cutIntoPieces(pitted(), { edgeMm: 60, fit: a4 }, (_, fraction) => {
        if (fraction > 0.1) throw new Cancelled()
      })
    expect(stop).toThrow(Cancelled)
  })
})

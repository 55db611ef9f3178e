/** The docket against sums by hand and against what the trade says of whole models. */
import { describe, expect, test } from 'vitest'
import { leastWidth, toolForWidth, usualRates } from '../../src/docket'
import type { Ring2 } from '../../src/geometry/vec2'
import { makePlan, usualChoices } from '../../src/plan'
import { thicknessMm } from '../../src/sheets'

describe('a cube of six pieces, by hand', () => {
  const plan = makePlan({ ...usualChoices, solid: 'cube', heightMm: 250 })
  const edge = 250 / Math.sqrt(3)
  const d = plan.docket

  test('lengths and areas', () => {
    // 144.3 mm faces: one to a sheet, so every crease is a seam.
    expect([d.panels, d.pieces, d.templates, d.seams, d.sheets]).toEqual([6, 6, 1, 12, 6])
    expect(d.glueMm).toBeCloseTo(12 * edge, 3)
    expect(d.cardAreaMm2).toBe(6 * 210 * 297)
    expect(d.tightest.widthMm).toBeCloseTo(edge, 3)
    expect(d.sharpestInnerAngle).toBeCloseTo(90, 6)
    expect(d.buttSeams).toEqual([])
    // Each seam has one tab: 8 mm deep at most, ends at 45 degrees, so its three cut sides are less than edge + 16√2.
    expect(d.cutMm).toBeGreaterThan(24 * edge - 24)
    expect(d.cutMm).toBeLessThan(24 * edge + 12 * 16 * Math.SQRT2)
  })

  test('hours follow the rates', () => {
    const { hours } = d
    expect(hours.glue * 3600).toBeCloseTo(12 * usualRates.secondsPerSeam + usualRates.secondsToClose, 6)
    expect(hours.handling * 3600).toBeCloseTo(6 * usualRates.secondsPerPiece + 6 * usualRates.secondsPerSheet, 6)
    expect(hours.total).toBeCloseTo(hours.cut + hours.score + hours.fold + hours.glue + hours.handling, 9)
  })
})

test('whole models take what the trade says (common practice, no source)', () => {
  // 30 pieces 1.5 to 3 h, 60 pieces 3 to 6 h: the rates are checked on plans of one panel a piece.
  const small = makePlan({ ...usualChoices, solid: 'icosidodecahedron', heightMm: 395 }).docket
  expect(small.pieces).toBeGreaterThan(25)
  expect(small.pieces).toBeLessThanOrEqual(32)
  expect(small.hours.total).toBeGreaterThan(1.5)
  expect(small.hours.total).toBeLessThan(3.3)
})

describe('least width', () => {
  test('of an equilateral triangle is its height; of a square its side; of a thin strip its breadth', () => {
    const triangle: Ring2 = [
      [0, 0],
      [2, 0],
      [1, Math.sqrt(3)],
    ]
    expect(leastWidth(triangle)).toBeCloseTo(Math.sqrt(3), 12)
    const turned = (ring: Ring2, a: number): Ring2 =>
      ring.map(([x, y]) => [Math.cos(a) * x - Math.sin(a) * y, Math.sin(a) * x + Math.cos(a) * y])
    const strip: Ring2 = [
      [0, 0],
      [9, 0],
      [9, 0.5],
      [0, 0.5],
    ]
    expect(leastWidth(turned(strip, 0.7))).toBeCloseTo(0.5, 12)
  })

  test('says which tool it asks for', () => {
    expect([3.2, 2.1, 1.5, 0.4].map(toolForWidth)).toEqual([
      'fingers and knife',
      'tweezers',
      'a cutting machine',
      'too narrow for card',
    ])
  })
})

test('card of 160 g/m² is about 0.2 mm thick, 240 about 0.3 (craft texts)', () => {
  expect(thicknessMm(160)).toBeCloseTo(0.2, 2)
  expect(thicknessMm(240)).toBeCloseTo(0.3, 2)
})

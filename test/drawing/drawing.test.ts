/** Marks: folds drawn by convention and side, every stretch cut once, widths of text as the font has them. */
import { PDFDocument, StandardFonts } from 'pdf-lib'
import { describe, expect, test } from 'vitest'
import { type DrawingPage, drawPlan, type LineMark, textWidthMm, wrapText } from '../../src/drawing'
import { makePlan, type PlanChoices, usualChoices } from '../../src/plan'

const choices: PlanChoices = { ...usualChoices, solid: 'great-stellated-dodecahedron', heightMm: 150 }
const inside: PlanChoices = { ...choices, side: 'inside' }
const outsidePlan = makePlan(choices)
const insidePlan = makePlan(inside)

const lines = (pages: readonly DrawingPage[], kind: LineMark['kind']): LineMark[] =>
  pages.flatMap((p) =>
    p.marks.filter((m): m is LineMark => m.type === 'line' && m.kind === kind && m.piece !== undefined),
  )

describe('folds', () => {
  const out = drawPlan(outsidePlan, choices)
  const inn = drawPlan(insidePlan, inside)
  const angleOf = new Map(outsidePlan.creases.map((c) => [c.id, c.innerAngle]))

  test('mountain under 180 degrees, valley over, each crease of the plan once', () => {
    const folds = outsidePlan.creases.filter((c) => c.join === 'fold')
    const roots = outsidePlan.pieces.flatMap((p) => p.tabs)
    const mountains = lines(out, 'mountain')
    const valleys = lines(out, 'valley')
    expect(mountains.length + valleys.length).toBe(folds.length + roots.length)
    expect(mountains.length).toBeGreaterThan(0)
    expect(valleys.length).toBeGreaterThan(0)
    for (const m of mountains) expect(angleOf.get(m.crease as number)).toBeLessThan(180)
    for (const v of valleys) expect(angleOf.get(v.crease as number)).toBeGreaterThan(180)
  })

  test('printed on the inside, mountain and valley change places', () => {
    const ids = (list: LineMark[]): number[] => list.map((m) => m.crease as number).sort((a, b) => a - b)
    expect(ids(lines(inn, 'valley'))).toEqual(ids(lines(out, 'mountain')))
    expect(ids(lines(inn, 'mountain'))).toEqual(ids(lines(out, 'valley')))
  })

  test('no stretch is cut twice', () => {
    for (const page of out) {
      const cuts = page.marks.filter(
        (m): m is LineMark => m.type === 'line' && m.kind === 'cut' && m.piece !== undefined,
      )
      const middles = cuts.flatMap((m) =>
        m.points.slice(1).map((q, i) => {
          const p = m.points[i] as readonly [number, number]
          return [(p[0] + q[0]) / 2, (p[1] + q[1]) / 2, p, q] as const
        }),
      )
      for (const [i, [x, y]] of middles.entries())
        for (const [j, [, , p, q]] of middles.entries()) {
          if (i === j) continue
          const length = Math.hypot(q[0] - p[0], q[1] - p[1])
          const off = Math.abs((q[0] - p[0]) * (y - p[1]) - (q[1] - p[1]) * (x - p[0])) / length
          const along = ((x - p[0]) * (q[0] - p[0]) + (y - p[1]) * (q[1] - p[1])) / length
          expect(off < 1e-4 && along > 1e-3 && along < length - 1e-3).toBe(false)
        }
    }
  })
})

describe('the docket page', () => {
  for (const paper of ['a4', 'letter'] as const)
    test(`keeps inside the margins on ${paper}`, () => {
      const some: PlanChoices = { ...choices, solid: 'tetrahemihexahedron', paper }
      const page = drawPlan(makePlan(some), some)[0] as DrawingPage
      for (const m of page.marks) {
        if (m.type !== 'text') continue
        expect(m.at[1]).toBeGreaterThan(10)
        expect(m.at[0] + textWidthMm(m.text, m.sizePt)).toBeLessThan(page.widthMm - 10)
      }
    })
})

describe('text', () => {
  test('widths agree with the font of the PDF library', async () => {
    const doc = await PDFDocument.create()
    const font = await doc.embedFont(StandardFonts.Helvetica)
    const all = Array.from({ length: 95 }, (_, i) => String.fromCharCode(32 + i))
    for (const c of [...all, '²', '°', '·', '–', '×']) {
      const mm = (font.widthOfTextAtSize(c, 10) * 25.4) / 72
      expect([c, textWidthMm(c, 10).toFixed(6)]).toEqual([c, mm.toFixed(6)])
    }
  })

  test('wrapped lines keep to the width and lose no word', () => {
    const text =
      'Blades: keep the holding hand behind the cut, use a metal safety ruler and a mat larger than the work.'
    const rows = wrapText(text, 9, 60)
    expect(rows.join(' ')).toBe(text)
    expect(rows.length).toBeGreaterThan(2)
    for (const row of rows) expect(textWidthMm(row, 9)).toBeLessThanOrEqual(60)
  })
})

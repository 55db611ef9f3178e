/** The PDF, read back by pdf.js, against the plan: page size, bars, labels, every line in its place. */
import { beforeAll, describe, expect, test } from 'vitest'
import { drawPlan } from '../../src/drawing'
import { writePdf } from '../../src/output'
import { makePlan, type Plan, type PlanChoices, type PlanSheet, usualChoices } from '../../src/plan'
import { type ReadPage, readPdf } from './read-pdf'

type Point = readonly [number, number]

const distanceToSegment = (p: Point, a: Point, b: Point): number => {
  const dx = b[0] - a[0]
  const dy = b[1] - a[1]
  const t = Math.max(0, Math.min(1, ((p[0] - a[0]) * dx + (p[1] - a[1]) * dy) / (dx * dx + dy * dy || 1)))
  return Math.hypot(p[0] - a[0] - t * dx, p[1] - a[1] - t * dy)
}

const segmentsOf = (page: ReadPage, pick: (dash: readonly number[]) => boolean): [Point, Point][] =>
  page.paths
    .filter((p) => pick(p.dash))
    .flatMap((p) => p.points.slice(1).map((q, i): [Point, Point] => [p.points[i] as Point, q]))

/** The plan's own rule for placing, written out again here. */
const place =
  ({ x, y, rotation, mirrored }: PlanSheet['placed'][number]) =>
  ([u, v]: Point): Point => {
    const m = mirrored ? -u : u
    const a = (rotation * Math.PI) / 180
    return [Math.cos(a) * m - Math.sin(a) * v + x, Math.sin(a) * m + Math.cos(a) * v + y]
  }

const samples = (ring: readonly Point[]): Point[] =>
  ring.flatMap((a, i) => {
    const b = ring[(i + 1) % ring.length] as Point
    return [0.1, 0.5, 0.9].map((t): Point => [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])])
  })

const cases: readonly [string, Partial<PlanChoices> & { solid: string }][] = [
  ['great icosahedron, outside, A4', { solid: 'great-icosahedron' }],
  [
    'tetrahemihexahedron, inside, Letter, a sheet set per colour',
    {
      solid: 'tetrahemihexahedron',
      side: 'inside',
      paper: 'letter',
      colours: 'kind',
      heightMm: 120,
    },
  ],
  ['snub cube, left hand', { solid: 'snub-cube', hand: 'left', heightMm: 150 }],
]

for (const [name, some] of cases)
  describe(name, () => {
    const choices: PlanChoices = { ...usualChoices, ...some }
    let plan: Plan
    let bytes: Uint8Array
    let pages: ReadPage[]
    let printScaling: unknown
    beforeAll(async () => {
      plan = makePlan(choices)
      bytes = await writePdf(drawPlan(plan, choices))
      ;({ pages, printScaling } = await readPdf(bytes))
    })
    const sheets = (): [PlanSheet, ReadPage][] => plan.sheets.map((s, i) => [s, pages[i + 1] as ReadPage])

    test('one docket page, then the sheets, all of the card’s size, not to be scaled', () => {
      expect(pages.length).toBe(plan.sheets.length + 1)
      const [w, h] = choices.paper === 'a4' ? [210, 297] : [215.9, 279.4]
      for (const page of pages) {
        expect(page.widthMm).toBeCloseTo(w, 3)
        expect(page.heightMm).toBeCloseTo(h, 3)
      }
      expect(printScaling).toBe('None')
    })

    test('a bar of 100.00 mm in both directions on every part sheet', () => {
      for (const [, page] of sheets()) {
        const bars = segmentsOf(page, (d) => d.length === 0).filter(
          ([a, b]) => Math.abs(Math.hypot(b[0] - a[0], b[1] - a[1]) - 100) < 0.005,
        )
        expect(bars.some(([a, b]) => Math.abs(a[1] - b[1]) < 1e-3)).toBe(true)
        expect(bars.some(([a, b]) => Math.abs(a[0] - b[0]) < 1e-3)).toBe(true)
        expect(page.texts.filter((t) => t.text === '100 mm').length).toBe(2)
      }
    })

    test('each seam label twice, each piece label once, none under 5 points', () => {
      const count = new Map<string, number>()
      for (const [, page] of sheets())
        for (const t of page.texts) {
          count.set(t.text, (count.get(t.text) ?? 0) + 1)
          expect(t.sizePt).toBeGreaterThan(4.99)
        }
      const seams = plan.creases.filter((c) => c.join === 'seam')
      expect(seams.length).toBeGreaterThan(0)
      for (const seam of seams) expect([seam.label, count.get(seam.label as string)]).toEqual([seam.label, 2])
      for (const piece of plan.pieces) expect([piece.label, count.get(piece.label)]).toEqual([piece.label, 1])
    })

    test('every outline, hole and fold of the plan is a line of the page, to 0.01 mm', () => {
      const byId = new Map(plan.pieces.map((p) => [p.id, p]))
      let seen = 0
      for (const [sheet, page] of sheets()) {
        const solid = segmentsOf(page, (d) => d.length === 0)
        const any = segmentsOf(page, () => true)
        for (const placed of sheet.placed) {
          const piece = byId.get(placed.piece) as Plan['pieces'][number]
          const put = place(placed)
          for (const p of samples(piece.outline.map(put))) {
            expect(Math.min(...solid.map(([a, b]) => distanceToSegment(p, a, b)))).toBeLessThan(0.01)
            seen++
          }
          for (const { rings } of piece.panels)
            for (const ring of rings)
              for (const p of samples(ring.map(put)))
                expect(Math.min(...any.map(([a, b]) => distanceToSegment(p, a, b)))).toBeLessThan(0.01)
        }
      }
      expect(seen).toBeGreaterThan(20)
    })

    test('every line of the page inside the margins belongs to a piece of the plan; the rest keeps to the strip', () => {
      const byId = new Map(plan.pieces.map((p) => [p.id, p]))
      for (const [sheet, page] of sheets()) {
        const edges = sheet.placed.flatMap((placed) => {
          const piece = byId.get(placed.piece) as Plan['pieces'][number]
          const put = place(placed)
          const rings = [...piece.panels.flatMap((p) => p.rings), ...piece.tabs.map((t) => t.outline)]
          return rings.flatMap((ring) =>
            ring.map((a, i): [Point, Point] => [put(a), put(ring[(i + 1) % ring.length] as Point)]),
          )
        })
        const m = sheet.marginMm
        for (const [a, b] of segmentsOf(page, () => true)) {
          const p: Point = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2]
          const inStrip = p[0] < m || p[1] < m || p[0] > sheet.widthMm - m || p[1] > sheet.heightMm - m
          if (inStrip) {
            for (const q of [a, b]) {
              expect(Math.min(q[0], sheet.widthMm - q[0])).toBeGreaterThan(4.1)
              expect(Math.min(q[1], sheet.heightMm - q[1])).toBeGreaterThan(4.1)
            }
          } else expect(Math.min(...edges.map(([c, d]) => distanceToSegment(p, c, d)))).toBeLessThan(0.01)
        }
      }
    })

    test('solid, height, hand, sheet number and side stand on every part sheet', () => {
      sheets().forEach(([, page], i) => {
        const all = page.texts.map((t) => t.text).join(' ')
        expect(all).toContain(plan.model.name)
        expect(all).toContain(`height ${choices.heightMm} mm`)
        expect(all).toContain(`sheet ${i + 1} of ${plan.sheets.length}`)
        expect(all).toContain(choices.side === 'outside' ? 'this side out' : 'this side in')
        if (plan.model.hand !== 'none') expect(all).toContain(`${plan.model.hand} hand`)
      })
    })

    test('the same plan gives the same bytes', async () => {
      const again = await writePdf(drawPlan(makePlan(choices), choices))
      expect(Buffer.compare(Buffer.from(again), Buffer.from(bytes))).toBe(0)
    })
  })

/** The first page: the docket, with what each figure means for the builder, the plan's own checks, and cautions. */
import { cautions, cautionsEnd, holdWords, partWords, toolForWidth } from '../docket/words'
import type { Plan, PlanChoices } from '../plan/types'
import { handWords, sideWords } from './furniture'
import { textWidthMm, wrapText } from './text-width'
import type { DrawingPage, Mark, TextMark } from './types'

const left = 20
const valueColumn = 72
const meaningColumn = 112

/** Hours and minutes, in words. */
export const duration = (hours: number): string => {
  const minutes = Math.round(hours * 60)
  if (minutes < 60) return `${minutes} min`
  return minutes % 60 === 0 ? `${minutes / 60} h` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`
}

const metres = (mm: number): string => (mm < 1000 ? `${mm.toFixed(0)} mm` : `${(mm / 1000).toFixed(1)} m`)

/** Rows of name, value, meaning. */
export const docketRows = (plan: Plan, choices: PlanChoices): [string, string, string][] => {
  const d = plan.docket
  const paper = choices.paper === 'a4' ? 'A4' : 'US Letter'
  return [
    ['Height', `${plan.model.heightMm} mm`, 'diameter of the sphere through the vertices'],
    // A builder's model has no one edge: its unit is half its height.
    ...(plan.model.id.startsWith('own-')
      ? []
      : [['Edge', `${plan.model.edgeMm.toFixed(2)} mm`, 'of the whole faces'] satisfies [string, string, string]]),
    ['Card', `${choices.grammage} g/m², ${paper}`, `printed on the ${choices.side}: ${sideWords(choices.side)}`],
    [
      'Sheets',
      `${d.sheets}`,
      `${(d.cardAreaMm2 / 1e6).toFixed(2)} m² of card, ${(100 * d.utilisation).toFixed(0)} % used`,
    ],
    ['Pieces', `${d.pieces}`, `${d.templates} templates, ${d.panels} panels`],
    ['Seams', `${d.seams}`, seamWords(d.buttSeams.length)],
    ['Cutting', metres(d.cutMm), duration(d.hours.cut)],
    ['Scoring', metres(d.scoreMm), duration(d.hours.score)],
    ['Folding', '', duration(d.hours.fold)],
    ['Gluing', metres(d.glueMm), duration(d.hours.glue)],
    ['Handling', '', `${duration(d.hours.handling)}: sheets, finding and sorting pieces`],
    ['All work', duration(d.hours.total), 'at an even pace, with knife and ruler'],
    ['Narrowest panel', `${d.tightest.widthMm.toFixed(1)} mm`, toolForWidth(d.tightest.widthMm)],
    ['Sharpest inner angle', `${d.sharpestInnerAngle.toFixed(1)}°`, angleWords(d.sharpestInnerAngle)],
    ['Bodies', `${d.bodies}`, holdWords(d)],
    ...partRows(plan),
    ...closedRow(plan),
  ]
}

/** The page has room for a few parts; the steps' notes tell of all. */
const partRows = (plan: Plan): [string, string, string][] => {
  const words = partWords(plan)
  const rows = words
    .slice(0, 3)
    .map((text, i): [string, string, string] => [i === 0 ? 'Separate parts' : '', `${i + 1}`, text])
  if (words.length > 3) rows.push(['', `+ ${words.length - 3}`, 'more parts: each begins at a step with a note'])
  return rows
}

const closedRow = ({ docket }: Plan): [string, string, string][] =>
  docket.closed
    ? [
        [
          'Closed up',
          `${docket.closed.stretches} stretches`,
          `shorter than ${docket.closed.belowMm} mm; no corner moved more than ${docket.closed.movedMm.toFixed(2)} mm, panels flat within ${docket.closed.offPlaneMm.toFixed(2)} mm`,
        ],
      ]
    : []

const seamWords = (bare: number): string =>
  bare === 0 ? 'all with a tab' : `${bare} without a tab: glue bare edges or use a strip`

/** Limits for fingers and knife: warn under 20 degrees, refuse under 10 (common practice, no source). */
const angleWords = (degrees: number): string =>
  degrees >= 20
    ? 'folds and closes well'
    : degrees >= 10
      ? 'tight: use thin card'
      : 'too tight for fingers: very thin card'

/** Docket, checks and cautions on one page of the sheets' size. */
export const drawDocketPage = (plan: Plan, choices: PlanChoices): DrawingPage => {
  const { widthMm, heightMm } = plan.sheets[0] ?? { widthMm: 210, heightMm: 297 }
  const marks: Mark[] = []
  const write = (value: string, x: number, y: number, sizePt: number, more: Partial<TextMark> = {}): void => {
    marks.push({
      type: 'text',
      role: 'body',
      text: value,
      at: [x, y],
      anchor: 'start',
      sizePt,
      rotation: 0,
      bold: false,
      ...more,
    })
  }
  const rule = (y: number): void => {
    marks.push({
      type: 'line',
      kind: 'rule',
      points: [
        [left, y],
        [widthMm - left, y],
      ],
      closed: false,
    })
  }
  // The page is full on A4; shorter paper gets closer rows.
  const rowMm = heightMm < 290 ? 5 : 6.2
  let y = heightMm - 24
  const title = plan.model.name.charAt(0).toUpperCase() + plan.model.name.slice(1)
  const titleSize = Math.min(20, (20 * (widthMm - 2 * left)) / textWidthMm(title, 21))
  write(title, left, y, titleSize, { role: 'heading', bold: true })
  y -= 8
  const fill = plan.model.fill === 'nonzero' ? 'stars filled' : 'star centres open'
  write(`Docket${handWords(plan.model.hand)}, ${fill}`, left, y, 10)
  y -= 6
  rule(y)
  y -= 7
  for (const [name, value, meaning] of docketRows(plan, choices)) {
    write(name, left, y, 9.5)
    write(value, valueColumn, y, 9.5, { bold: true })
    wrapText(meaning, 8.5, widthMm - left - meaningColumn).forEach((row, i) => {
      if (i > 0) y -= 3.8
      write(row, meaningColumn, y, 8.5)
    })
    y -= rowMm
  }
  y -= 1
  rule(y)
  y -= 7
  write('Checks of this plan', left, y, 10, { role: 'heading', bold: true })
  y -= 6
  const columns = 2
  const { checks } = plan.docket
  const perColumn = Math.ceil(checks.length / columns)
  checks.forEach((check, i) => {
    const x = left + Math.floor(i / perColumn) * ((widthMm - 2 * left) / columns)
    const row = y - (i % perColumn) * 4.6
    write(check.ok ? 'ok' : 'FAILS', x, row, 7.5, { bold: true })
    write(check.name, x + (check.ok ? 6 : 12), row, 7.5)
  })
  y -= perColumn * 4.6 + 2
  rule(y)
  y -= 7
  write('Before you start', left, y, 10, { role: 'heading', bold: true })
  y -= 5.5
  for (const caution of [...cautions.map(({ title, text }) => `${title}: ${text}`), cautionsEnd]) {
    for (const row of wrapText(caution, 8.5, widthMm - 2 * left)) {
      write(row, left, y, 8.5)
      y -= 4.4
    }
    y -= 1.2
  }
  y -= 1
  for (const row of wrapText(
    'Print at 100 %, no fitting to the page. Measure the 100 mm bars on the first part sheet before cutting. Score all ' +
      'folds before cutting out: mountain dash-dot, valley dashed. Each seam carries one label on both its sides; pieces ' +
      'are numbered in gluing order.',
    8.5,
    widthMm - 2 * left,
  )) {
    write(row, left, y, 8.5)
    y -= 4.4
  }
  return { title: 'Docket', widthMm, heightMm, sheet: null, pieces: [], marks }
}

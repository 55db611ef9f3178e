/**
 * What stands in the margins of a part sheet: who it belongs to, which side it is, the legend, and a bar of 100 mm in each
 * direction to check the printer by. Pieces may fill the whole printable area, so all of it keeps to the margin strip,
 * at least 4.2 mm from the card's edge (usual printer margin).
 */
import type { Plan, PlanChoices, PlanSheet } from '../plan/types'
import { textWidthMm } from './text-width'
import type { LineKind, LineMark, Mark, TextMark } from './types'

const safe = 4.2
const barMm = 100

const text = (value: string, x: number, y: number, sizePt: number, more: Partial<TextMark> = {}): TextMark => ({
  type: 'text',
  role: 'furniture',
  text: value,
  at: [x, y],
  anchor: 'start',
  sizePt,
  rotation: 0,
  bold: false,
  ...more,
})

const line = (kind: LineKind, ...points: [number, number][]): LineMark => ({
  type: 'line',
  kind,
  points,
  closed: false,
})

/** `, left hand`, or nothing for a solid without hands. */
export const handWords = (hand: Plan['model']['hand']): string => (hand === 'none' ? '' : `, ${hand} hand`)

/** "this side out": the printed side shows on the finished model; "this side in": it does not. */
export const sideWords = (side: PlanChoices['side']): string => (side === 'outside' ? 'this side out' : 'this side in')

/** All marks in the margins of one sheet. */
export const sheetFurniture = (plan: Plan, sheet: PlanSheet, choices: PlanChoices): Mark[] => {
  const { widthMm: w, heightMm: h, marginMm } = sheet
  // Middle of the strip between the printer's reach and the pieces.
  const strip = (Math.max(marginMm, safe + 2) + safe) / 2
  const number = plan.sheets.findIndex((s) => s.id === sheet.id) + 1
  const colour = sheet.colour === 'all' ? '' : ` · card colour: ${sheet.colour}`
  const left = `${plan.model.name}${handWords(plan.model.hand)} · height ${plan.model.heightMm} mm`
  const middle = sideWords(choices.side)
  const right = `${sheet.card}${colour} · sheet ${number} of ${plan.sheets.length}`
  const marks: Mark[] = [text(left, marginMm, h - strip, 7), text(right, w - marginMm, h - strip, 7, { anchor: 'end' })]
  // The side goes between the two if there is room, else below, beside the bar.
  const free = w - 2 * marginMm - textWidthMm(left, 7) - textWidthMm(right, 7)
  const sideAtTop = free > textWidthMm(middle, 7) + 8
  const topX = marginMm + textWidthMm(left, 7) + free / 2
  if (sideAtTop) marks.push(text(middle, topX, h - strip, 7, { anchor: 'middle', bold: true }))

  marks.push(...bar(marginMm, strip, false), ...bar(strip, marginMm, true))
  let x = marginMm + barMm + 16
  if (!sideAtTop) {
    marks.push(text(middle, x, strip, 7, { bold: true }))
    x += textWidthMm(middle, 7) + 4
  }
  const legend: readonly [LineKind, string][] = [
    ['cut', 'cut'],
    ['mountain', 'mountain'],
    ['valley', 'valley'],
  ]
  for (const [kind, name] of legend) {
    const length = 8
    if (x + length + 1 + textWidthMm(name, 5.5) > w - marginMm + 1) break
    marks.push(line(kind, [x, strip], [x + length, strip]), text(name, x + length + 1, strip, 5.5))
    x += length + 3 + textWidthMm(name, 5.5)
  }
  return marks
}

/** A bar of 100 mm from (x, y), to the right or upwards, with end ticks and its length beside its far end. */
const bar = (x: number, y: number, up: boolean): Mark[] => {
  const at = (along: number, off: number): [number, number] => (up ? [x + off, y + along] : [x + along, y + off])
  const [tx, ty] = at(barMm + 1, 0)
  return [
    line('rule', at(0, 0), at(barMm, 0)),
    line('rule', at(0, -1), at(0, 1)),
    line('rule', at(barMm, -1), at(barMm, 1)),
    text('100 mm', tx, ty, 5.5, up ? { rotation: 90 } : {}),
  ]
}

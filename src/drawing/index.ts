/** From a plan to pages of neutral marks in mm. */
import type { Plan, PlanChoices } from '../plan/types'
import { drawDocketPage } from './docket-page'
import { sheetFurniture } from './furniture'
import { sheetLabels } from './labels'
import { layer } from './layout'
import { pieceLines } from './lines'
import type { DrawingPage, Mark } from './types'

export { cautions, cautionsEnd, holdWords, partWords, shortStretches, usualCloseMm } from '../docket/words'
export { docketRows, drawDocketPage, duration } from './docket-page'
export { textWidthMm, wrapText } from './text-width'
export type * from './types'

/** What the pages need to know besides the plan. */
export type PageChoices = PlanChoices

/** The docket page, then one page for each sheet. */
export const drawPlan = (plan: Plan, choices: PageChoices): DrawingPage[] => [
  drawDocketPage(plan, choices),
  ...drawSheets(plan, choices),
]

/** One page for each sheet, in order: furniture in the margins, then each piece's region, lines and labels. */
export const drawSheets = (plan: Plan, choices: PageChoices): DrawingPage[] => {
  const lay = layer(plan)
  return plan.sheets.map((sheet, i): DrawingPage => {
    const laid = sheet.placed.map(lay)
    const marks: Mark[] = sheetFurniture(plan, sheet, choices)
    for (const { piece, panels, tabs } of laid)
      marks.push({
        type: 'area',
        piece: piece.id,
        rings: [...panels.flatMap((p) => p.rings), ...tabs.map((t) => t.outline)],
      })
    for (const piece of laid) marks.push(...pieceLines(piece))
    marks.push(...sheetLabels(laid, sheet).marks)
    return {
      title: `Sheet ${i + 1} of ${plan.sheets.length}`,
      widthMm: sheet.widthMm,
      heightMm: sheet.heightMm,
      sheet: sheet.id,
      pieces: laid.map(({ piece }) => piece.id),
      marks,
    }
  })
}

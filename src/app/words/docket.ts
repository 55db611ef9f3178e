/** The docket: the same facts in the same order, each with what it means for the builder. */
import { holdWords, partWords, shortStretches, usualCloseMm } from '../../drawing'
import type { Plan, PlanChoices } from '../../plan/types'
import { papers } from '../state/choices'
import { sayMoved } from './consequences'
import { narrowest, sayAngle, sayHours, sayNarrowestAt, spareSheets } from './craft'
import { areaText, counted, degreesText, figure, hoursText, lengthText, mmText, percentText } from './figures'

export interface Fact {
  readonly id: string
  readonly name: string
  readonly value: string
  readonly meaning: string
  /** Something to look at before printing. */
  readonly caution?: boolean
  /** Panel to light when the fact is pointed at. */
  readonly panel?: number
}

const sheetCounts = (plan: Plan): string => {
  const counts = new Map<string, number>()
  for (const { colour } of plan.sheets) counts.set(colour, (counts.get(colour) ?? 0) + 1)
  return counts.size > 1 ? `${[...counts].map(([colour, n]) => `${colour} ${n}`).join(', ')}; ` : ''
}

const spares = (plan: Plan): number => {
  const counts = new Map<string, number>()
  for (const { colour } of plan.sheets) counts.set(colour, (counts.get(colour) ?? 0) + 1)
  return [...counts.values()].reduce((sum, n) => sum + n + spareSheets(n), 0)
}

/** Stretches closed up, or too short and left as they are. */
const closedFact = (plan: Plan): Fact => {
  const { closed } = plan.docket
  if (closed)
    return {
      id: 'closed',
      name: 'Closed up',
      value: counted(closed.stretches, 'stretch', 'stretches'),
      meaning: `shorter than ${figure(closed.belowMm, 2)} mm; ${sayMoved(closed)}`,
    }
  const short = shortStretches(plan)
  return {
    id: 'closed',
    name: 'Closed up',
    value: 'nothing',
    meaning:
      short > 0
        ? `${counted(short, 'stretch', 'stretches')} shorter than ${usualCloseMm} mm; the Board closes them up`
        : 'no stretch is too short to cut',
    caution: short > 0,
  }
}

/** @param choices those that the plan was made from */
export const docketFacts = (plan: Plan, choices: PlanChoices): Fact[] => {
  const { docket } = plan
  const { hours } = docket
  const failed = docket.checks.filter(({ ok }) => !ok).length
  const grams = (docket.netAreaMm2 / 1e6) * choices.grammage
  const width = docket.tightest.widthMm
  return [
    {
      id: 'sheets',
      name: 'Sheets',
      value: counted(docket.sheets, 'sheet'),
      meaning: `${sheetCounts(plan)}${papers[choices.paper].name}, ${choices.grammage} g/m²; with spares ${spares(plan)}`,
    },
    {
      id: 'card',
      name: 'Card',
      value: areaText(docket.cardAreaMm2),
      meaning: `${percentText(docket.utilisation)} of it used; the model weighs about ${figure(Math.max(1, grams))} g`,
    },
    {
      id: 'pieces',
      name: 'Pieces',
      value: counted(docket.pieces, 'piece'),
      meaning: `${counted(docket.templates, 'template')}, ${counted(docket.panels, 'panel')}`,
    },
    {
      id: 'cut',
      name: 'Cutting',
      value: lengthText(docket.cutMm),
      meaning: `${hoursText(hours.cut)} with knife and ruler`,
    },
    {
      id: 'score',
      name: 'Scoring',
      value: lengthText(docket.scoreMm),
      meaning: `${hoursText(hours.score)}, and ${hoursText(hours.fold)} to fold`,
    },
    {
      id: 'glue',
      name: 'Gluing',
      value: lengthText(docket.glueMm),
      meaning: `${counted(docket.seams, 'seam')}, ${hoursText(hours.glue)}`,
    },
    { id: 'hours', name: 'All work', value: hoursText(hours.total), meaning: sayHours(hours.total) },
    {
      id: 'narrowest',
      name: 'Narrowest panel',
      value: mmText(width),
      meaning: sayNarrowestAt(width, plan.model.heightMm),
      caution: width < narrowest.fingers,
      panel: docket.tightest.panel,
    },
    closedFact(plan),
    {
      id: 'sharpest',
      name: 'Sharpest inner angle',
      value: degreesText(docket.sharpestInnerAngle),
      meaning: sayAngle(docket.sharpestInnerAngle),
      caution: docket.sharpestInnerAngle < 20,
    },
    {
      id: 'butt',
      name: 'Bare seams',
      value: counted(docket.buttSeams.length, 'seam'),
      meaning: docket.buttSeams.length === 0 ? 'every seam has its tab' : 'no room for a tab: glued edge to edge',
      caution: docket.buttSeams.length > 0,
    },
    {
      id: 'line',
      name: 'Held along a line',
      value: counted(docket.lineContacts, 'stretch', 'stretches'),
      meaning: holdWords(docket),
      caution: docket.lineContacts > 0,
    },
    {
      id: 'bodies',
      name: 'Bodies',
      value: counted(docket.bodies, 'closed part'),
      meaning:
        partWords(plan).join('; ') ||
        (docket.bodies === 1 ? 'one hollow inside' : 'they touch along lines or at points only'),
      caution: (docket.parts?.length ?? 0) > 0,
    },
    {
      id: 'checks',
      name: 'Checks',
      value: `${docket.checks.length - failed} of ${docket.checks.length} ok`,
      meaning: failed === 0 ? 'the plan keeps all its promises' : 'do not print yet; see below',
      caution: failed > 0,
    },
  ]
}

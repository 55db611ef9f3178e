/** The docket: sums over a finished plan. Everything is read off the plan, so that the docket cannot disagree with it. */
import { distance2, type Ring2, signedArea } from '../geometry/vec2'
import { distance } from '../geometry/vec3'
import type { Plan, PlanCheck, PlanDocket } from '../plan/types'
import { leastWidth } from './panel-width'
import { type Rates, usualRates } from './rates'

export type PlanWithoutDocket = Omit<Plan, 'docket'>

/**
 * @param bodies closed parts of the skin, line contacts paired through the inside
 * @param contacts stretches held only along a line
 * @param checks of the plan, made elsewhere
 */
export const composeDocket = (
  plan: PlanWithoutDocket,
  bodies: number,
  contacts: number,
  checks: PlanCheck[],
  rates: Rates = usualRates,
): PlanDocket => {
  const seams = plan.creases.filter((c) => c.join === 'seam')
  const tabs = plan.pieces.flatMap((p) => p.tabs)
  const tabbed = new Set(tabs.map((t) => t.crease))
  const buttSeams = seams.filter((c) => !tabbed.has(c.id)).map((c) => c.id)
  const cardAreaMm2 = plan.sheets.reduce((s, x) => s + x.widthMm * x.heightMm, 0)
  const netAreaMm2 =
    plan.panels.reduce((s, p) => s + p.areaMm2, 0) + tabs.reduce((s, t) => s + signedArea(t.outline), 0)
  const work = measure(plan)
  return {
    panels: plan.panels.length,
    pieces: plan.pieces.length,
    templates: new Set(plan.pieces.map((p) => p.template)).size,
    seams: seams.length,
    bodies,
    lineContacts: contacts,
    sheets: plan.sheets.length,
    cardAreaMm2,
    netAreaMm2,
    utilisation: cardAreaMm2 > 0 ? netAreaMm2 / cardAreaMm2 : 0,
    cutMm: work.cutMm,
    scoreMm: work.scoreMm,
    glueMm: work.glueMm,
    hours: hoursOf(plan, work, seams.length - buttSeams.length, buttSeams.length, rates),
    tightest: tightestPanel(plan),
    sharpestInnerAngle: plan.creases.reduce((least, c) => Math.min(least, c.innerAngle), 360),
    buttSeams,
    checks,
  }
}

interface Work {
  readonly cutMm: number
  readonly cuts: number
  readonly scoreMm: number
  readonly folds: number
  readonly glueMm: number
}

const perimeter = (ring: Ring2): number => ring.reduce((s, p, i) => s + distance2(p, ring[(i + 1) % ring.length]!), 0)

/** All edges of panels and tabs are cut, save folds (an edge of two panels) and roots (an edge of a panel and a tab). */
const measure = (plan: PlanWithoutDocket): Work => {
  const byId = new Map(plan.creases.map((c) => [c.id, c]))
  const length = (id: number): number => {
    const { ends } = byId.get(id)!
    return distance(ends[0], ends[1])
  }
  let edges = 0
  let cuts = 0
  let folds = 0
  let foldMm = 0
  let roots = 0
  let rootMm = 0
  for (const piece of plan.pieces) {
    for (const { rings } of piece.panels)
      for (const ring of rings) {
        edges += perimeter(ring)
        cuts += ring.length
      }
    for (const id of piece.folds) {
      folds++
      foldMm += length(id)
    }
    for (const { outline } of piece.tabs) {
      edges += perimeter(outline)
      cuts += outline.length
      roots++
      rootMm += distance2(outline[0]!, outline[1]!)
    }
  }
  return {
    cutMm: edges - 2 * foldMm - 2 * rootMm,
    cuts: cuts - 2 * folds - 2 * roots,
    scoreMm: foldMm + rootMm,
    folds: folds + roots,
    glueMm: plan.creases.reduce((s, c) => (c.join === 'seam' ? s + length(c.id) : s), 0),
  }
}

const hoursOf = (
  plan: PlanWithoutDocket,
  work: Work,
  tabbed: number,
  butt: number,
  rates: Rates,
): PlanDocket['hours'] => {
  const cut = (work.cutMm / rates.cutMmPerSecond + work.cuts * rates.secondsPerCut) / 3600
  const score = (work.scoreMm / rates.scoreMmPerSecond + work.folds * rates.secondsPerScore) / 3600
  const fold = (work.folds * rates.secondsPerFold) / 3600
  const closing = plan.pieces.length > 1 ? rates.secondsToClose : 0
  const glue = (tabbed * rates.secondsPerSeam + butt * rates.secondsPerButtSeam + closing) / 3600
  const handling = (plan.pieces.length * rates.secondsPerPiece + plan.sheets.length * rates.secondsPerSheet) / 3600
  return { cut, score, fold, glue, handling, total: cut + score + fold + glue + handling }
}

const tightestPanel = (plan: PlanWithoutDocket): PlanDocket['tightest'] => {
  let tightest = { panel: plan.panels[0]?.id ?? 0, widthMm: Number.POSITIVE_INFINITY }
  for (const piece of plan.pieces)
    for (const { panel, rings } of piece.panels) {
      const widthMm = leastWidth(rings[0]!)
      if (widthMm < tightest.widthMm - 1e-9) tightest = { panel, widthMm }
    }
  return tightest
}

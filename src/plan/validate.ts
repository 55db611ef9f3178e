/**
 * The project's own check of a whole plan. It works on the plan file alone and shares nothing with the code that makes
 * plans but vector algebra and polygon clipping, so that a plan that came from elsewhere can be checked the same way.
 */
import * as nets from './check-pieces'
import * as sheets from './check-sheets'
import * as skin from './check-skin'
import { indexPlan, verdict } from './check-support'
import * as tabs from './check-tabs'
import { schemaFaults } from './conform'
import { planSchema } from './schema'
import type { Plan, PlanCheck } from './types'

const keepsToSchema = (plan: unknown): PlanCheck => {
  const faults = schemaFaults(planSchema, plan)
  return verdict('keeps to the schema', faults, 'all fields there, none other')
}

/** Every id that the plan mentions must be there, and be there once: all other checks lean on that. */
const idsLeadSomewhere = (plan: Plan): PlanCheck => {
  const faults: string[] = []
  const known = (what: string, ids: readonly number[]): ((id: number, by: string) => void) => {
    const set = new Set(ids)
    if (set.size !== ids.length) faults.push(`two ${what}s have one id`)
    return (id, by) => {
      if (!set.has(id)) faults.push(`${by} names ${what} ${id}, which is not there`)
    }
  }
  const panel = known(
    'panel',
    plan.panels.map(({ id }) => id),
  )
  const crease = known(
    'crease',
    plan.creases.map(({ id }) => id),
  )
  const piece = known(
    'piece',
    plan.pieces.map(({ id }) => id),
  )
  known(
    'sheet',
    plan.sheets.map(({ id }) => id),
  )
  for (const { id, panels } of plan.creases) for (const side of panels) panel(side, `crease ${id}`)
  for (const { label, panels, folds, tabs } of plan.pieces) {
    for (const entry of panels) panel(entry.panel, `piece ${label}`)
    for (const fold of folds) crease(fold, `piece ${label}`)
    for (const tab of tabs) {
      crease(tab.crease, `a tab of piece ${label}`)
      panel(tab.panel, `a tab of piece ${label}`)
    }
    if (panels.length === 0) faults.push(`piece ${label} has no panel`)
  }
  const laid = new Set(plan.pieces.flatMap(({ panels }) => panels.map((entry) => entry.panel)))
  for (const { id } of plan.panels) if (!laid.has(id)) faults.push(`panel ${id} is in no piece`)
  for (const { id, placed } of plan.sheets) for (const entry of placed) piece(entry.piece, `sheet ${id}`)
  for (const step of plan.steps) {
    piece(step.piece, `step ${step.step}`)
    for (const seam of step.seams) crease(seam, `step ${step.step}`)
  }
  for (const seam of plan.docket.buttSeams) crease(seam, 'the docket')
  return verdict('ids lead somewhere', faults, 'all that is named is there')
}

/**
 * Checks everything that a plan promises: the skin closes, every ring is covered by creases with true inner angles, each
 * panel is laid flat once, pieces hold together and do not overlap, tabs keep the rules, seams are paired, sheets hold
 * everything, steps join, the docket's sums are right.
 *
 * @param plan of any shape: what is no plan fails the first check
 * @returns one entry per promise, `ok` false with the first faults in `detail`. Checks that lean on one that failed (the
 *   schema, ids, panels and their flat copies) are left out.
 */
export const validatePlan = (plan: Plan): PlanCheck[] => {
  const schema = keepsToSchema(plan)
  if (!schema.ok) return [schema]
  const ids = idsLeadSomewhere(plan)
  if (!ids.ok) return [schema, ids]
  const index = indexPlan(plan)
  const first = [schema, ids, skin.panelsAreTrue(index), nets.eachPanelOnce(index)]
  const copies = nets.piecesAreCopies(index)
  // What follows maps panels onto their flat copies, which must have the same points for that.
  if (!copies.ok || !first.every(({ ok }) => ok)) return [...first, copies]
  return [
    ...first,
    skin.skinCloses(index),
    skin.creasesCover(index),
    skin.anglesAgree(index),
    skin.bodiesKeepApart(index),
    copies,
    nets.foldsHold(index),
    nets.noOverlapInPiece(index),
    nets.outlinesAreCutLines(index),
    nets.templatesAreAlike(index),
    tabs.tabsHangOnSeams(index),
    tabs.tabsClearInFlat(index),
    tabs.tabsFitBehind(index),
    tabs.seamsArePaired(index),
    tabs.buttSeamsOwnedUp(index),
    sheets.everythingOnSheets(index),
    sheets.noOverlapOnSheets(index),
    sheets.stepsJoin(index),
    sheets.docketAgrees(index),
  ]
}

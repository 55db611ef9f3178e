/** Small plans made by hand for the tests of the app. */
import type { Plan, PlanChoices, PlanPiece, Point2 } from '../../src/plan/types'
import { cubePlan } from '../plan/by-hand'

/** The cube with its five box panels as pieces of their own names, glued in the reverse order of their ids. */
export const stripPlan = (count: number): Plan => {
  const plan = cubePlan()
  const square: Point2[] = [
    [0, 0],
    [40, 0],
    [40, 40],
    [0, 40],
  ]
  const pieces = Array.from({ length: count }, (_, i): PlanPiece => {
    const step = count - i
    const panels = [{ panel: i, rings: [square] }]
    return { ...plan.pieces[1]!, id: i, label: String(step), step, panels, outline: square, tabs: [], folds: [] }
  })
  const steps = [...pieces].reverse().map(({ id, step }) => ({ step, piece: id, seams: [], note: '' }))
  return { ...plan, pieces, steps: steps.sort((a, b) => b.step - a.step), docket: { ...plan.docket, pieces: count } }
}

/** A cube plan that tells its choices, so that tests can see which one they have. */
export const planFor = (choices: PlanChoices): Plan => {
  const plan = cubePlan()
  return {
    ...plan,
    model: { ...plan.model, id: choices.solid, heightMm: choices.heightMm },
    docket: { ...plan.docket, tightest: { panel: 0, widthMm: choices.heightMm / 100 } },
  }
}

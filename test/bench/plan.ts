/** Cost of a whole plan by stage, against the number of panels. */
import { textTable } from '../../src/batch/text-table'
import { makePlan, type PlanChoices, usualChoices, validatePlan } from '../../src/plan'
import { fittedExponent, medianMs } from './measure'

const ids = [
  'icosidodecahedron',
  'great-stellated-dodecahedron',
  'great-icosahedron',
  'great-snub-icosidodecahedron',
  'nonconvex-great-rhombicuboctahedron',
  'great-snub-dodecicosidodecahedron',
  'great-truncated-icosidodecahedron',
  'great-retrosnub-icosidodecahedron',
]

/** Time in ms by stage, told by the progress that the pipeline reports. */
const byStage = (choices: PlanChoices): Map<string, number> => {
  const spent = new Map<string, number>()
  let stage = 'skin'
  let since = performance.now()
  const change = (next: string): void => {
    const now = performance.now()
    spent.set(stage, (spent.get(stage) ?? 0) + now - since)
    stage = next
    since = now
  }
  makePlan(choices, change)
  change('')
  return spent
}

export const benchPlan = (): void => {
  // Compiled before the first row is measured.
  makePlan({ ...usualChoices, solid: 'great-icosahedron' })
  const measured = ids.map((solid) => {
    const choices = { ...usualChoices, solid }
    const stages = byStage(choices)
    const plan = makePlan(choices)
    const total = [...stages.values()].reduce((sum, ms) => sum + ms, 0)
    return { solid, panels: plan.docket.panels, stages, total, check: medianMs(() => validatePlan(plan), 3, 0) }
  })
  const names = [...new Set(measured.flatMap(({ stages }) => [...stages.keys()]))]
  console.log('Plan at 250 mm on A4: share of the whole by stage in per cent; the last check by itself')
  console.log(
    textTable(
      ['solid', 'panels', 'cost', ...names, 'ms here', 'check ms'],
      measured.map(({ solid, panels, stages, total, check }) => [
        solid,
        panels,
        total / measured[0]!.total,
        ...names.map((name) => Math.round((100 * (stages.get(name) ?? 0)) / total)),
        Math.round(total),
        Math.round(check),
      ]),
    ),
  )
  const fit = fittedExponent(measured.map(({ panels, total }) => [panels, total]))
  console.log(`cost grows like panels to the power ${fit.power.toFixed(2)} (r² ${fit.r2.toFixed(2)})\n`)
}

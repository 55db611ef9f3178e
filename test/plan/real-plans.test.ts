import { beforeAll, describe, expect, test } from 'vitest'
import { makePlan, type Plan, type PlanChoices, planSchema, usualChoices, validatePlan } from '../../src/plan'
import { schemaFaults } from '../../src/plan/conform'
import { breaks, failing } from './broken'

/** Valleys and sharp angles; bodies that hang together along lines only. */
const cases: [name: string, choices: PlanChoices][] = [
  ['great stellated dodecahedron', { ...usualChoices, solid: 'great-stellated-dodecahedron', heightMm: 200 }],
  [
    'small ditrigonal icosidodecahedron with open star centres, printed on the inside',
    {
      ...usualChoices,
      solid: 'small-ditrigonal-icosidodecahedron',
      fill: 'evenodd',
      side: 'inside',
      paper: 'letter',
      heightMm: 150,
    },
  ],
]

describe.each(cases)('a real plan: %s', (_, choices) => {
  let text = ''
  beforeAll(() => {
    text = JSON.stringify(makePlan(choices))
  })
  const fresh = (): Plan => JSON.parse(text) as Plan

  test('conforms to the schema and keeps its promises', () => {
    expect(schemaFaults(planSchema, fresh())).toEqual([])
    expect(failing(validatePlan(fresh()))).toEqual([])
  })

  test.each(breaks)('%s: fails when %s', (check, _how, damage) => {
    const plan = fresh()
    damage(plan)
    expect(failing(validatePlan(plan))).toContain(check)
  })
})

import { describe, expect, test } from 'vitest'
import type { Plan } from '../../src/plan/types'
import { validatePlan } from '../../src/plan/validate'
import { breaks, failing } from './broken'
import { cubePlan } from './by-hand'

describe('validatePlan on a plan made by hand', () => {
  test('finds nothing wrong with it', () => {
    expect(failing(validatePlan(cubePlan()))).toEqual([])
  })

  test.each(breaks)('%s: fails when %s', (check, _, damage) => {
    const plan = cubePlan()
    damage(plan)
    expect(failing(validatePlan(plan))).toContain(check)
  })

  test.each([null, 'plan', 5, [], {}])('%j is no plan, which is said and not thrown', (value) => {
    expect(failing(validatePlan(value as unknown as Plan))).toEqual(['keeps to the schema'])
  })

  test('every check has been seen to fail', () => {
    const seen = new Set(breaks.map(([check]) => check))
    expect(
      validatePlan(cubePlan())
        .map(({ name }) => name)
        .filter((name) => !seen.has(name)),
    ).toEqual([])
  })
})

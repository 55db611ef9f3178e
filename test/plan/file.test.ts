import { expect, test } from 'vitest'
import { planText } from '../../src/plan/file'
import { cubePlan } from './by-hand'

test('what is read back is what was written', () => {
  const plan = cubePlan()
  expect(JSON.parse(planText(plan))).toEqual(plan)
})

test('the same plan gives the same text, one line an entry', () => {
  const text = planText(cubePlan())
  expect(planText(cubePlan())).toBe(text)
  expect(text.split('\n').filter((line) => line.startsWith('{"id":0,"normal"'))).toHaveLength(1)
})

test('whole normals are written as fractions, and nothing else is', () => {
  const plan = cubePlan()
  plan.panels[1]!.normal = [0.6, 0, -0.8]
  plan.panels[2]!.normal = [1e-12, -1, 0]
  const text = planText(plan)
  expect(text).toContain('"normal":[0.0,0.0,-1.0]')
  expect(text).toContain('"normal":[0.6,0.0,-0.8]')
  expect(text).toContain('"normal":[1e-12,-1.0,0.0]')
  expect(text).toContain('"rings":[[[20,20,-20]')
  expect(JSON.parse(text)).toEqual(plan)
})

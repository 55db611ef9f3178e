import { describe, expect, test } from 'vitest'
import { schemaFaults } from '../../src/plan/conform'
import { planSchema } from '../../src/plan/schema'
import type { Plan } from '../../src/plan/types'
import { cubePlan } from './by-hand'

/** A plan, and one place of it changed beyond what the type allows. */
const broken = (damage: (plan: Plan) => unknown): string[] => {
  const plan = cubePlan()
  damage(plan)
  return schemaFaults(planSchema, plan)
}
const loose = (value: object): Record<string, unknown> => value as Record<string, unknown>

describe('schema of the plan file', () => {
  test('a plan made by hand conforms', () => {
    expect(schemaFaults(planSchema, cubePlan())).toEqual([])
  })

  const damages: [how: string, (plan: Plan) => unknown, fault: RegExp][] = [
    ['another format', (p) => (loose(p).format = 'x'), /^plan\.format: is not facetwright-plan/],
    ['another version', (p) => (loose(p).version = 2), /^plan\.version: is not 1/],
    ['a field too few', (p) => delete loose(p.panels[0]!).areaMm2, /^plan\.panels\[0\]: has no areaMm2/],
    ['a field too many', (p) => (loose(p.docket).colour = 1), /^plan\.docket: has an extra field colour/],
    ['a text for a number', (p) => (loose(p.model).edgeMm = '40'), /^plan\.model\.edgeMm: is string, not number/],
    ['not a number', (p) => (p.model.edgeMm = Number.NaN), /edgeMm: is number, not number/],
    ['a fraction for an id', (p) => (p.pieces[0]!.id = 0.5), /pieces\[0\]\.id: is number, not integer/],
    ['an edge of nothing', (p) => (p.model.edgeMm = 0), /edgeMm: is not over 0/],
    ['an unknown hand', (p) => (loose(p.model).hand = 'both'), /hand: is none of none, left, right/],
    [
      'a point with two coordinates',
      (p) => p.panels[2]!.rings[0]![1]!.pop(),
      /panels\[2\]\.rings\[0\]\[1\]: has fewer than 3/,
    ],
    [
      'a crease of three panels',
      (p) => (p.creases[1]!.panels as number[]).push(3),
      /creases\[1\]\.panels: has more than 2/,
    ],
    ['an angle of 400 degrees', (p) => (p.creases[0]!.innerAngle = 400), /innerAngle: is over 360/],
    ['an id that is no id', (p) => (p.model.id = 'The Cube'), /model\.id: does not match/],
    ['no sheets', (p) => (p.sheets = []), /plan\.sheets: has fewer than 1/],
    ['an empty label', (p) => (p.pieces[0]!.label = ''), /label: is too short/],
  ]
  test.each(damages)('finds %s', (_, damage, fault) => {
    const faults = broken(damage)
    expect(faults).toHaveLength(1)
    expect(faults[0]).toMatch(fault)
  })

  test('a keyword that the reader does not know is an error, not passed over', () => {
    expect(() => schemaFaults({ ...planSchema, ...{ allOf: [] } }, cubePlan())).toThrow(/allOf/)
  })
})

import { describe, expect, test } from 'vitest'
import { firstChoices } from '../../src/app/state/choices'
import { glue, inOrder, type Job, nextPiece, seamsToGlue, unglue } from '../../src/app/state/job'
import { cubePlan } from '../plan/by-hand'
import { stripPlan } from './plans'

const job: Job = { id: 'j', choices: firstChoices('cube'), planKey: 'p', glued: [], started: 1, changed: 1 }

describe('a job', () => {
  test('glues a piece once and remembers the order', () => {
    const twice = glue(glue(glue(job, 4, 2), 1, 3), 4, 9)
    expect(twice).toMatchObject({ glued: [4, 1], started: 1, changed: 3 })
  })

  test('takes back the last one, or the one named; nothing where there is nothing', () => {
    const two = glue(glue(job, 4, 2), 1, 3)
    expect(unglue(two, 5).glued).toEqual([4])
    expect(unglue(two, 5, 4).glued).toEqual([1])
    expect(unglue(two, 5, 77)).toBe(two)
    expect(unglue(job, 5)).toBe(job)
  })
})

describe('the next piece', () => {
  const plan = stripPlan(5)
  test('is the first in gluing order that is not glued', () => {
    expect(nextPiece(plan, [])?.step).toBe(1)
    const [first, second, third] = inOrder(plan)
    expect(nextPiece(plan, [first!.id])?.id).toBe(second!.id)
    expect(nextPiece(plan, [second!.id])?.id).toBe(first!.id)
    expect(nextPiece(plan, [first!.id, second!.id])?.id).toBe(third!.id)
    expect(
      nextPiece(
        plan,
        plan.pieces.map(({ id }) => id),
      ),
    ).toBeNull()
  })
})

describe('seams to glue', () => {
  const plan = cubePlan()
  test('are the ones of the plan when it is the piece’s turn', () => {
    expect(seamsToGlue(plan, [], 0)).toEqual(plan.steps[0]!.seams)
    expect(seamsToGlue(plan, [0], 1)).toEqual(plan.steps[1]!.seams)
    // Looking back at a glued piece changes nothing.
    expect(seamsToGlue(plan, [0, 1], 1)).toEqual(plan.steps[1]!.seams)
  })

  test('out of turn: only those whose other side is there', () => {
    // The lid first: four seams, all to the box, which is not there.
    expect(seamsToGlue(plan, [], 1)).toEqual([])
    // Then the box: its own four, and the four to the lid.
    expect(seamsToGlue(plan, [1], 0).sort()).toEqual([...plan.steps[0]!.seams, ...plan.steps[1]!.seams].sort())
  })
})

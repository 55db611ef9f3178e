import { expose } from 'comlink'
import { expect, test } from 'vitest'
import { firstChoices } from '../../src/app/state/choices'
import { Cancelled } from '../../src/errors'
import { createPlanner } from '../../src/worker/planner'
import { planFor } from './plans'

const cube = firstChoices('cube')

/** A worker that is a channel to this same thread: `plan` answers only when it is let go on. */
const workshopOfWorkers = () => {
  const made: { ended: boolean; goOn: () => void }[] = []
  const start = (): Worker => {
    const { port1, port2 } = new MessageChannel()
    let goOn: () => void = () => {}
    const gate = new Promise<void>((resolve) => {
      goOn = resolve
    })
    expose(
      {
        plan: async (choices: typeof cube, _: null, report: (stage: string, fraction: number) => void) => {
          await report('skin', 0.25)
          await gate
          return { ok: true, value: planFor(choices) }
        },
      },
      port2 as never,
    )
    const entry = { ended: false, goOn }
    made.push(entry)
    return Object.assign(port1, {
      terminate() {
        entry.ended = true
        port1.close()
        port2.close()
      },
    }) as unknown as Worker
  }
  return { made, start }
}

test('reports, and answers', async () => {
  const { made, start } = workshopOfWorkers()
  const planner = createPlanner(start)
  const reports: [string, number][] = []
  const answer = planner.compute(cube, (...report) => {
    reports.push(report)
    made[0]!.goOn()
  })
  expect(await answer).toMatchObject({ ok: true, value: { model: { id: 'cube' } } })
  expect(reports).toEqual([['skin', 0.25]])
  planner.cancel()
  expect(made).toHaveLength(1)
  made[0]!.goOn()
  await planner.compute(cube, () => {})
  // Nothing was running, so the worker was kept, with all that it holds.
  expect(made.map(({ ended }) => ended)).toEqual([false])
})

test('cancel ends the worker at once and has a fresh one ready', async () => {
  const { made, start } = workshopOfWorkers()
  const planner = createPlanner(start)
  const answer = planner.compute(cube, () => {})
  planner.cancel()
  await expect(answer).rejects.toBeInstanceOf(Cancelled)
  expect(made.map(({ ended }) => ended)).toEqual([true, false])
  made[1]!.goOn()
  expect(await planner.compute(cube, () => {})).toMatchObject({ ok: true })
  expect(made).toHaveLength(2)
})

test('a second computation stops the first', async () => {
  const { made, start } = workshopOfWorkers()
  const planner = createPlanner(start)
  const first = planner.compute(cube, () => {})
  const second = planner.compute({ ...cube, heightMm: 99 }, () => {})
  made[1]!.goOn()
  await expect(first).rejects.toBeInstanceOf(Cancelled)
  expect(await second).toMatchObject({ value: { model: { heightMm: 99 } } })
})

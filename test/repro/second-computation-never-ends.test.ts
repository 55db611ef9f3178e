/**
 * The planner wrapped its worker anew for every computation. When the first wrapping was collected as garbage, it closed
 * the line at the worker's end, and every later computation waited for ever.
 */
import { expose } from 'comlink'
import { expect, test } from 'vitest'
import { firstChoices } from '../../src/app/state/choices'
import { createPlanner } from '../../src/worker/planner'
import { planFor } from '../app/plans'

test('one worker is wrapped once, however many plans it computes', async () => {
  const { port1, port2 } = new MessageChannel()
  expose(
    { plan: (choices: ReturnType<typeof firstChoices>) => ({ ok: true, value: planFor(choices) }) },
    port2 as never,
  )
  let wrappings = 0
  const listen = port1.addEventListener.bind(port1)
  const worker = Object.assign(port1, {
    terminate: () => {},
    addEventListener: (...args: Parameters<typeof listen>) => {
      if ((args[0] as string) === 'message') wrappings++
      listen(...args)
    },
  }) as unknown as Worker
  const planner = createPlanner(() => worker)
  for (const heightMm of [100, 200, 300])
    expect(await planner.compute({ ...firstChoices('cube'), heightMm }, () => {})).toMatchObject({
      ok: true,
      value: { model: { heightMm } },
    })
  expect(wrappings).toBe(1)
  port1.close()
  port2.close()
})

/** A planner that is told by the test when it is done. */
import { Cancelled } from '../../src/errors'
import type { Plan, PlanChoices } from '../../src/plan/types'
import type { Answer, Planner, Report, Solid } from '../../src/worker'
import { planFor } from './plans'

export interface FakePlanner extends Planner {
  /** Every computation asked for, in order. */
  readonly asked: PlanChoices[]
  /** The solids that came with them. */
  readonly models: (Solid | null)[]
  /** Computations stopped. */
  stopped: number
  readonly running: boolean
  report: Report
  finish(answer?: Answer<Plan>): Promise<void>
}

export const fakePlanner = (): FakePlanner => {
  let settle: { resolve: (answer: Answer<Plan>) => void; reject: (reason: Error) => void } | null = null
  const planner: FakePlanner = {
    asked: [],
    models: [],
    stopped: 0,
    get running() {
      return settle !== null
    },
    report: () => {},
    compute(choices, report, model = null) {
      if (settle) planner.cancel()
      planner.asked.push(choices)
      planner.models.push(model)
      planner.report = report
      return new Promise((resolve, reject) => {
        settle = { resolve, reject }
      })
    },
    cancel() {
      if (!settle) return
      planner.stopped++
      settle.reject(new Cancelled())
      settle = null
    },
    warm() {},
    close() {},
    read: () => Promise.reject(new Error('Nothing is read here.')),
    async finish(answer) {
      const last = planner.asked.at(-1)!
      settle!.resolve(answer ?? { ok: true, value: planFor(last) })
      settle = null
      await new Promise((resolve) => setTimeout(resolve, 0))
    },
  }
  return planner
}

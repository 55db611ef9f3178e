/** The page's end of the planner. */
import { proxy, type Remote, wrap } from 'comlink'
import { Cancelled } from '../errors'
import type { Plan, PlanChoices } from '../plan/types'
import type { Answer, PlannerApi, Report } from './protocol'

export interface Planner {
  /**
   * One plan at a time: a second call stops the first.
   * @throws Cancelled when stopped
   * @throws Error when the worker could not be started or died
   */
  compute(choices: PlanChoices, report: Report): Promise<Answer<Plan>>
  /** Stops at once whatever is being computed. */
  cancel(): void
  /** Loads the program ahead of its first use. */
  warm(): void
}

/**
 * Stops work by ending its worker and starting a fresh one. A flag in shared memory would spare the restart (some tens of
 * milliseconds, and the stages kept in the worker), but it needs a cross-origin isolated page, which a plain web server
 * or a folder of files does not give; and a worker that is ended stops even where a stage forgot to report.
 */
export const createPlanner = (start: () => Worker = startPlanner): Planner => {
  let worker: Worker | null = null
  // Wrapped once per worker and held: a wrapping that is thrown away takes the worker's end of the line with it.
  let remote: Remote<PlannerApi> | null = null
  let stop: ((reason: Error) => void) | null = null

  const end = (reason: Error): void => {
    worker?.terminate()
    worker = null
    remote = null
    stop?.(reason)
    stop = null
  }
  const begin = (): Remote<PlannerApi> => {
    const mine = start()
    mine.addEventListener('error', (event) => {
      if (worker === mine) end(new Error(`The computation stopped: ${event.message || 'its worker did not load'}.`))
    })
    worker = mine
    remote = wrap<PlannerApi>(mine)
    return remote
  }
  return {
    async compute(choices, report) {
      if (stop) end(new Cancelled())
      const api = remote ?? begin()
      const stopped = new Promise<never>((_, reject) => {
        stop = reject
      })
      const myStop = stop
      try {
        const relay = proxy<Report>((stage, fraction) => {
          if (stop === myStop) report(stage, fraction)
        })
        return await Promise.race([api.plan(choices, relay) as Promise<Answer<Plan>>, stopped])
      } finally {
        if (stop === myStop) stop = null
      }
    },
    cancel() {
      if (!stop) return
      end(new Cancelled())
      // The next computation need not wait for the program to load.
      begin()
    },
    warm() {
      if (!remote) begin()
    },
  }
}

const startPlanner = (): Worker =>
  new Worker(new URL('./planner.worker.ts', import.meta.url), { type: 'module', name: 'planner' })

/** The page's end of the planner. */
import { proxy, type Remote, wrap } from 'comlink'
import { Cancelled } from '../errors'
import type { Plan, PlanChoices } from '../plan/types'
import type { Answer, PlannerApi, ReadModel, Report, Solid } from './protocol'

export interface Planner {
  /**
   * One thing at a time: a second call stops the first.
   * @param model the solid itself where it is not of the catalogue
   * @throws Cancelled when stopped
   * @throws Error when the worker could not be started or died
   */
  compute(choices: PlanChoices, report: Report, model?: Solid | null): Promise<Answer<Plan>>
  /** Reads a model; as `compute`. */
  read(bytes: Uint8Array, fileName: string, report: Report): Promise<Answer<ReadModel>>
  /** Stops at once whatever is being computed. */
  cancel(): void
  /** Loads the program ahead of its first use. */
  warm(): void
  /** Stops, and gives back what the worker holds; the next call starts a new one. */
  close(): void
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
  const run = async <T>(
    report: Report,
    work: (api: Remote<PlannerApi>, relay: Report) => Promise<Answer<T>>,
  ): Promise<Answer<T>> => {
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
      return await Promise.race([work(api, relay), stopped])
    } finally {
      if (stop === myStop) stop = null
    }
  }
  return {
    compute: (choices, report, model = null) =>
      run(report, (api, relay) => api.plan(choices, model, relay) as Promise<Answer<Plan>>),
    read: (bytes, fileName, report) =>
      run(report, (api, relay) => api.read(bytes, fileName, relay) as Promise<Answer<ReadModel>>),
    cancel() {
      if (!stop) return
      end(new Cancelled())
      // The next computation need not wait for the program to load.
      begin()
    },
    close() {
      end(new Cancelled())
    },
    warm() {
      if (!remote) begin()
    },
  }
}

const startPlanner = (): Worker =>
  new Worker(new URL('./planner.worker.ts', import.meta.url), { type: 'module', name: 'planner' })

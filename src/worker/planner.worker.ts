/** Computes plans. Whoever wants it to stop ends the worker, see planner.ts. */
import { expose } from 'comlink'
import { makePlan, StageCache } from '../plan'
import { answer } from './answer'
import type { PlannerApi } from './protocol'

/** Milliseconds between two reports of one stage: more would only fill the page's queue. */
const pause = 60

/** Stages of the last plan: a change of paper does not compute the skin again. */
const cache = new StageCache()

const api: PlannerApi = {
  plan: (choices, report) => {
    let last = Number.NEGATIVE_INFINITY
    let lastStage = ''
    return answer(() =>
      makePlan(
        choices,
        (stage, fraction) => {
          const now = performance.now()
          if (stage === lastStage && now - last < pause) return
          last = now
          lastStage = stage
          report(stage, fraction)
        },
        cache,
      ),
    )
  },
}
expose(api)

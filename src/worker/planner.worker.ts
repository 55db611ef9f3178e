/** Computes plans. Whoever wants it to stop ends the worker, see planner.ts. */
import { expose } from 'comlink'
import { readModel } from '../models'
import { checkedModel, modelWithId } from '../models/stored'
import { makePlan, planSolid, StageCache } from '../plan'
import { answer } from './answer'
import type { PlannerApi, Report } from './protocol'

/** Milliseconds between two reports of one stage: more would only fill the page's queue. */
const pause = 60

/** Stages of the last plan: a change of paper does not compute the skin again. */
const cache = new StageCache()

/** Lets a report through when the stage changes, and else now and then. */
const sparse = (report: Report): Report => {
  let last = Number.NEGATIVE_INFINITY
  let lastStage = ''
  return (stage, fraction) => {
    const now = performance.now()
    if (stage === lastStage && now - last < pause) return
    last = now
    lastStage = stage
    report(stage, fraction)
  }
}

const api: PlannerApi = {
  plan: (choices, model, report) =>
    answer(() =>
      // The model comes from a store, where anything may have happened to it.
      model ? planSolid(checkedModel(model), choices, sparse(report), cache) : makePlan(choices, sparse(report), cache),
    ),
  read: (bytes, fileName, report) =>
    answer(() => {
      const { solid, farthest, notes } = readModel(bytes, fileName, sparse(report))
      return { solid: modelWithId(solid), farthest, notes }
    }),
}
expose(api)

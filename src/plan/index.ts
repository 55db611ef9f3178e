/** From choices to a plan, and the plan file. */
export {
  checkChoices,
  greatestCloseMm,
  greatestHeightMm,
  leastHeightMm,
  netsWays,
  usualChoices,
} from './choices'
export { makePlan, planSolid } from './pipeline'
export { planSchema } from './schema'
export { StageCache } from './stages'
export type * from './types'
export { validatePlan } from './validate'

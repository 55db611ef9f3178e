/** From choices to a plan, and the plan file. */
export {
  checkChoices,
  greatestCloseMm,
  greatestHeightMm,
  leastHeightMm,
  netsWays,
  usualChoices,
  usualCloseMm,
} from './choices'
export { makePlan, planSolid } from './pipeline'
export { planSchema } from './schema'
export { shortStretches } from './short-stretches'
export { StageCache } from './stages'
export type * from './types'
export { validatePlan } from './validate'

/** Stretches of a plan that no one can cut or glue. */
import { distance } from '../geometry/vec3'
import type { Plan } from '../plan/types'

/** mm. What card work can hide: with stretches below this, closing them up is proposed (common practice, no source). */
export const usualCloseMm = 0.3

/** How many creases are shorter than `belowMm`. */
export const shortStretches = (plan: Plan, belowMm = usualCloseMm): number =>
  plan.creases.filter(({ ends }) => distance(...ends) < belowMm).length

/** How many stretches of a plan no one can cut or glue. */
import { distance } from '../geometry/vec3'
import { usualCloseMm } from './choices'
import type { Plan } from './types'

/** Creases shorter than `belowMm`: with any, closing them up is proposed. */
export const shortStretches = (plan: Plan, belowMm = usualCloseMm): number =>
  plan.creases.filter(({ ends }) => distance(...ends) < belowMm).length

import { InputError } from '../errors'
import { nearestIds, solidFacts, whyNot } from '../solids'
import type { SolidFacts } from '../solids/types'

/** @throws InputError when there is no such solid: with the reason if there is one, else with the nearest ids */
export const knownSolid = (id: string): SolidFacts => {
  const found = solidFacts(id)
  if (found) return found
  const why = whyNot(id)
  if (why !== null) throw new InputError(why, 'ID')
  throw new InputError(`There is no solid ${id}; the nearest ids are ${nearestIds(id).join(', ')}.`, 'ID')
}

import { InputError } from '../errors'
import { nearestIds, solidFacts } from '../solids'
import type { SolidFacts } from '../solids/types'

/** @throws InputError with the nearest ids when there is no such solid */
export const knownSolid = (id: string): SolidFacts => {
  const found = solidFacts(id)
  if (found) return found
  throw new InputError(`There is no solid ${id}; the nearest ids are ${nearestIds(id).join(', ')}.`, 'ID')
}

import { BrokenPromise, InputError } from '../errors'
import type { Answer, Refusal } from './protocol'

const refusalOf = (error: unknown): Refusal => {
  if (error instanceof InputError) return { kind: 'input', message: error.message, place: error.place, details: '' }
  const message = error instanceof Error ? error.message : String(error)
  const details =
    error instanceof BrokenPromise ? JSON.stringify(error.details) : ((error as Error | null)?.stack ?? '')
  return { kind: 'defect', message, place: '', details }
}

/** Does the work and makes an answer of it. */
export const answer = <T>(work: () => T): Answer<T> => {
  try {
    return { ok: true, value: work() }
  } catch (error) {
    return { ok: false, refusal: refusalOf(error) }
  }
}

export const answerLater = async <T>(work: () => Promise<T>): Promise<Answer<T>> => {
  try {
    return { ok: true, value: await work() }
  } catch (error) {
    return { ok: false, refusal: refusalOf(error) }
  }
}

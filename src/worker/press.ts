/** The page's end of the press. */
import { type Remote, wrap } from 'comlink'
import type { PressApi } from './protocol'

export type Press = Remote<PressApi>

export const createPress = (): Press =>
  wrap<PressApi>(new Worker(new URL('./press.worker.ts', import.meta.url), { type: 'module', name: 'press' }))

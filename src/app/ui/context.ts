import type { ReadonlySignal, Signal } from '@preact/signals'
import { createContext } from 'preact'
import { useContext } from 'preact/hooks'
import type { Planner, Press, SolidFacts } from '../../worker'
import type { Router } from '../route'
import type { Workshop } from '../state/workshop'
import type { Prefs } from './prefs'

/** What lies under the pointer, or under the keyboard's mark: lit on sheet and model alike. */
export interface Pointed {
  readonly piece: number | null
  /** Set when it was pointed at in 3D, or named on the docket. */
  readonly panel: number | null
}
export const nothingPointed: Pointed = { piece: null, panel: null }

export interface AppContext {
  readonly workshop: Workshop
  readonly press: Press
  /** Reads models beside whatever the workshop computes. */
  readonly reader: Planner
  readonly router: Router
  readonly prefs: Prefs
  /** Family by family as the worker answers, empty before; then builders' own models. */
  readonly catalogue: ReadonlySignal<readonly SolidFacts[]>
  readonly solid: ReadonlySignal<SolidFacts | null>
  /** What was wrong with something the builder just did; shown until put away. */
  readonly trouble: Signal<string | null>
  readonly pointed: Signal<Pointed>
  /** Sheets: those of the model on the Bench, where the Board has gone on to another plan. */
  readonly sheetsOfBench: Signal<boolean>
  readonly spoken: Signal<string>
  /** Read out by screen readers; the last of several quick ones only. */
  announce(text: string): void
}

export const Context = createContext<AppContext | null>(null)
export const useApp = (): AppContext => {
  const app = useContext(Context)
  if (!app) throw new Error('useApp outside of the app')
  return app
}

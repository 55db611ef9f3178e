/** Settings of this browser, not of a build: read before the first picture, so not from the database. */
import { effect, type Signal, signal } from '@preact/signals'

export type Theme = 'system' | 'light' | 'dark'
/** How models are drawn: by whatever is fastest here, by WebGL, or without it. */
export type ViewMode = 'auto' | 'webgl' | 'plain'

const read = <T extends string>(name: string, allowed: readonly T[], otherwise: T): T => {
  try {
    const held = localStorage.getItem(`facetwright.${name}`)
    return allowed.find((value) => value === held) ?? otherwise
  } catch {
    return otherwise
  }
}
const write = (name: string, value: string): void => {
  try {
    localStorage.setItem(`facetwright.${name}`, value)
  } catch {
    // A browser that keeps nothing: the setting holds until the page is closed.
  }
}

export interface Prefs {
  readonly theme: Signal<Theme>
  readonly view: Signal<ViewMode>
  /** Whether single keys (1 to 4, G) do something; off for those whom they get in the way of. */
  readonly keys: Signal<'on' | 'off'>
  /** What `theme` comes to at the moment. */
  readonly isDark: Signal<boolean>
}

export const createPrefs = (): Prefs => {
  const theme = signal(read<Theme>('theme', ['system', 'light', 'dark'], 'system'))
  const view = signal(read<ViewMode>('view', ['auto', 'webgl', 'plain'], 'auto'))
  const keys = signal(read<'on' | 'off'>('keys', ['on', 'off'], 'on'))
  const wish = matchMedia('(prefers-color-scheme: dark)')
  const systemIsDark = signal(wish.matches)
  const isDark = signal(false)
  wish.addEventListener('change', () => {
    systemIsDark.value = wish.matches
  })
  effect(() => {
    isDark.value = theme.value === 'dark' || (theme.value === 'system' && systemIsDark.value)
    document.documentElement.dataset.theme = isDark.value ? 'dark' : 'light'
    write('theme', theme.value)
  })
  effect(() => write('view', view.value))
  effect(() => write('keys', keys.value))
  return { theme, view, keys, isDark }
}

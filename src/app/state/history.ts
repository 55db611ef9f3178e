/** Undo and redo over whole states; nothing here knows what a state is. */
export interface History<T> {
  /** Oldest first. */
  readonly past: readonly T[]
  readonly now: T
  /** Next redo first. */
  readonly future: readonly T[]
}

const longest = 200

export const newHistory = <T>(now: T): History<T> => ({ past: [], now, future: [] })

/** A change to `next`; what could be redone is forgotten, as everywhere. No entry when nothing changed. */
export const change = <T>(history: History<T>, next: T, same: (a: T, b: T) => boolean): History<T> =>
  same(history.now, next) ? history : { past: [...history.past, history.now].slice(-longest), now: next, future: [] }

export const undo = <T>(history: History<T>): History<T> => {
  const last = history.past.at(-1)
  return last === undefined
    ? history
    : { past: history.past.slice(0, -1), now: last, future: [history.now, ...history.future] }
}

export const redo = <T>(history: History<T>): History<T> => {
  const [next, ...rest] = history.future
  return next === undefined ? history : { past: [...history.past, history.now], now: next, future: rest }
}

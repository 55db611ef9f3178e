/** Where the builder is, kept in the address so that reload, back and bookmarks lead there again. */
import { type Signal, signal } from '@preact/signals'

export const stations = ['shelf', 'board', 'sheets', 'bench'] as const
export type Station = (typeof stations)[number]
export const stationNames: Record<Station, string> = {
  shelf: 'Shelf',
  board: 'Board',
  sheets: 'Sheets',
  bench: 'Bench',
}

export interface Place {
  readonly station: Station
  /** Sheets: page, counted from 1. Bench: label number of the piece looked at. 0 for none. */
  readonly at: number
}

/** `#sheets/3`; anything else leads to the Shelf. */
export const readPlace = (hash: string): Place => {
  const [, word = '', number = ''] = /^#([a-z]+)(?:\/(\d{1,6}))?$/.exec(hash) ?? []
  const station = stations.find((name) => name === word)
  return station ? { station, at: Number(number) } : { station: 'shelf', at: 0 }
}

export const writePlace = ({ station, at }: Place): string => (at > 0 ? `#${station}/${at}` : `#${station}`)

export interface Router {
  readonly place: Signal<Place>
  /** A step that "back" undoes. */
  go(station: Station, at?: number): void
  /** The same step, only more exact: no entry of its own. */
  refine(at: number): void
}

export const createRouter = (): Router => {
  const place = signal(readPlace(location.hash))
  addEventListener('hashchange', () => {
    place.value = readPlace(location.hash)
  })
  return {
    place,
    go(station, at = 0) {
      const hash = writePlace({ station, at })
      if (location.hash === hash) return
      history.pushState(null, '', hash)
      place.value = { station, at }
    },
    refine(at) {
      const next = { station: place.peek().station, at }
      if (next.at === place.peek().at) return
      history.replaceState(null, '', writePlace(next))
      place.value = next
    },
  }
}

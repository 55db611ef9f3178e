/** Finding a solid by what a builder may type: name, index, vertex configuration, Wythoff symbol. */
import type { SolidFacts } from './types'
import { canonicalConfiguration } from './vertex-configuration'
import { canonicalWythoff } from './wythoff-symbol'

const plain = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, ' ')
    .trim()

/** An entry that can be searched: its name is at hand, its facts cost a construction. */
interface Searchable {
  readonly name: string
  readonly index: number | null
  readonly wythoff: string
  readonly facts: () => SolidFacts
}

/** Spellings of the catalogue's own configurations, which every query by configuration asks for again. */
const spelt = new Map<string, string | null>()
const knownConfiguration = (text: string): string | null => {
  let found = spelt.get(text)
  if (found === undefined) spelt.set(text, (found = canonicalConfiguration(text)))
  return found
}

/** Where a part begins in a plain name, or −1. A number is no part of a longer number: 7 3 is not in 17 3. */
const placeOf = (name: string, part: string): number => {
  const digit = (c: string | undefined): boolean => c !== undefined && c >= '0' && c <= '9'
  for (let i = name.indexOf(part); i >= 0; i = name.indexOf(part, i + 1)) {
    const end = i + part.length
    const cutsNumber = (digit(name[i - 1]) && digit(name[i])) || (digit(name[end - 1]) && digit(name[end]))
    if (!cutsNumber) return i
  }
  return -1
}

/** Entries that match the query; best matches (whole name, whole word) first, then in the order of the list. */
export const search = <T extends Searchable>(all: readonly T[], query: string): T[] => {
  const text = query.trim()
  if (text === '') return [...all]
  if (/^[uU]?\d+$/.test(text)) return all.filter((e) => e.index === Number(text.replace(/^[uU]/, '')))
  if (text.includes('|')) {
    const wanted = canonicalWythoff(text)
    return wanted === null ? [] : all.filter((e) => e.wythoff !== '' && canonicalWythoff(e.wythoff) === wanted)
  }
  const configuration = canonicalConfiguration(text)
  if (configuration !== null)
    return all.filter((e) => knownConfiguration(e.facts().vertexConfiguration) === configuration)
  const wanted = plain(text)
  const words = wanted.split(' ')
  const score = (e: T): number => {
    const name = plain(e.name)
    if (name === wanted) return 0
    const where = placeOf(name, wanted)
    if (where >= 0) return where === 0 ? 1 : 2
    return words.every((w) => placeOf(name, w) >= 0) ? 3 : 4
  }
  return all
    .map((e, place) => ({ e, place, score: score(e) }))
    .filter((x) => x.score < 4)
    .sort((a, b) => a.score - b.score || a.place - b.place)
    .map((x) => x.e)
}

/** Edit distance with insertions, deletions, replacements and swaps of neighbours (optimal string alignment). */
export const editDistance = (a: string, b: string): number => {
  let before: number[] = []
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1]
      let d = Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + (same ? 0 : 1))
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) d = Math.min(d, before[j - 2]! + 1)
      next.push(d)
    }
    before = row
    row = next
  }
  return row[b.length]!
}

/** Ids nearest to a misspelt one; ids that contain it come first. */
export const nearest = (ids: readonly string[], text: string, count: number): string[] => {
  const wanted = plain(text).replaceAll(' ', '-')
  const score = (id: string): number => (wanted.length > 3 && id.includes(wanted) ? 0 : editDistance(wanted, id))
  return [...ids]
    .map((id, i) => ({ id, i, score: score(id) }))
    .sort((a, b) => a.score - b.score || a.i - b.i)
    .slice(0, count)
    .map((x) => x.id)
}

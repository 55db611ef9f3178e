/** Finding a solid by what a builder may type: name, index, vertex configuration, Wythoff symbol. */
import type { SolidFacts } from './types'
import { canonicalConfiguration } from './vertex-configuration'
import { canonicalWythoff } from './wythoff-symbol'

const plain = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, ' ')
    .trim()

/** Solids that match the query; best matches (whole name, whole word) first, then in the order of the list. */
export const search = (all: readonly SolidFacts[], query: string): SolidFacts[] => {
  const text = query.trim()
  if (text === '') return [...all]
  if (/^[uU]?\d+$/.test(text)) return all.filter((f) => f.index === Number(text.replace(/^[uU]/, '')))
  if (text.includes('|')) {
    const wanted = canonicalWythoff(text)
    return wanted === null ? [] : all.filter((f) => canonicalWythoff(f.wythoff) === wanted)
  }
  const configuration = canonicalConfiguration(text)
  if (configuration !== null) return all.filter((f) => canonicalConfiguration(f.vertexConfiguration) === configuration)
  const wanted = plain(text)
  const words = wanted.split(' ')
  const score = (f: SolidFacts): number => {
    const name = plain(f.name)
    if (name === wanted) return 0
    if (name.startsWith(wanted)) return 1
    if (name.includes(wanted)) return 2
    return words.every((w) => name.includes(w)) ? 3 : 4
  }
  return all
    .map((f, place) => ({ f, place, score: score(f) }))
    .filter((x) => x.score < 4)
    .sort((a, b) => a.score - b.score || a.place - b.place)
    .map((x) => x.f)
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

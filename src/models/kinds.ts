/** Materials and colours of the file become kinds of face, each with a name that can be printed. */
import type { FaceKind } from '../solids/types'
import type { MendedFace } from './mend'

/** More card colours than anyone buys: then the materials are left out of account. */
export const greatestKindCount = 32

/** Printable in the standard fonts of a PDF, which hold Latin letters only. */
const printable = (name: string): string =>
  name
    .replace(/[^\x20-\x7e\xa0-\xff]+/g, '?')
    .trim()
    .slice(0, 40) || 'material'

export const kindsOf = (faces: readonly MendedFace[]): { kinds: FaceKind[]; kind: number[]; tooMany: number } => {
  const names = [...new Set(faces.map((f) => f.material))]
  const tooMany = names.length > greatestKindCount ? names.length : 0
  const used = tooMany ? [null] : names
  // Names with another meaning in a plan are taken from the start.
  const taken = new Set(['all', 'mixed'])
  const shown = used.map((name) => {
    const base = name === null ? 'card' : printable(name)
    let free = base
    for (let n = 2; taken.has(free); n++) free = `${base} ${n}`
    taken.add(free)
    return free
  })
  const kind = faces.map((f) => (tooMany ? 0 : used.indexOf(f.material)))
  const kinds = shown.map((name, id): FaceKind => {
    const own = faces.filter((_, i) => kind[i] === id)
    const n = own.every((f) => f.cycle.length === own[0]!.cycle.length) ? own[0]!.cycle.length : 0
    return { id, name, n, d: 1, count: own.length }
  })
  return { kinds, kind, tooMany }
}

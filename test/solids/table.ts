/** The published table of the 75, as data; see test/data/README.md for where each row was read. */
import { readFileSync } from 'node:fs'

export interface Row {
  readonly index: number
  readonly name: string
  readonly wythoff: string
  readonly configuration: string
  readonly vertices: number
  readonly edges: number
  readonly faces: number
  /** `n/d` → count. */
  readonly byKind: ReadonlyMap<string, number>
  readonly euler: number
  readonly density: number | null
  readonly orientable: boolean
  readonly chiral: boolean
  readonly symmetry: string
}

const lines = readFileSync(new URL('../data/uniform75.tsv', import.meta.url), 'utf8')
  .trim()
  .split('\n')
  .slice(1)

export const table: readonly Row[] = lines.map((line) => {
  const c = line.split('\t') as string[]
  const byKind = new Map<string, number>()
  for (const part of (c[7] as string).split('+')) {
    const m = /^(\d+)\{([\d/]+)\}$/.exec(part)
    if (!m) throw new Error(`cannot read ${part}`)
    const key = (m[2] as string).includes('/') ? (m[2] as string) : `${m[2]}/1`
    byKind.set(key, (byKind.get(key) ?? 0) + Number(m[1]))
  }
  return {
    index: Number(c[0]),
    name: c[1] as string,
    wythoff: c[2] as string,
    configuration: c[3] as string,
    vertices: Number(c[4]),
    edges: Number(c[5]),
    faces: Number(c[6]),
    byKind,
    euler: Number(c[8]),
    density: c[9] === '-' ? null : Number(c[9]),
    orientable: c[10] === 'yes',
    chiral: c[11] === 'yes',
    symmetry: c[12] as string,
  }
})

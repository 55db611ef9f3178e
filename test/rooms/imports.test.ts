import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { projectFolder } from '../browser/cache'
import { offences } from './offences'
import { readTable } from './table'

const table = readTable(readFileSync(join(projectFolder, 'DEVELOPERS.md'), 'utf8'))

const sources = (): Map<string, string> => {
  const files = new Map<string, string>()
  const entries = readdirSync(join(projectFolder, 'src'), { recursive: true, encoding: 'utf8' })
  for (const entry of entries) {
    const path = `src/${entry.replaceAll('\\', '/')}`
    if (/\.tsx?$/.test(path) && !path.endsWith('.d.ts'))
      files.set(path, readFileSync(join(projectFolder, path), 'utf8'))
  }
  return files
}

describe('rooms', () => {
  test('every import in src keeps to the table in DEVELOPERS.md', () => {
    const files = sources()
    expect(files.size).toBeGreaterThan(10)
    expect(offences(table, files)).toEqual([])
  })

  test('every folder of src stands in the table and the other way round', () => {
    const folders = readdirSync(join(projectFolder, 'src'), { withFileTypes: true }).map((entry) => entry.name)
    expect([...table.rooms.keys()].sort()).toEqual(folders.sort())
  })

  test('a room imports only rooms above it in the table, so there is no circle', () => {
    const order = [...table.rooms.keys()]
    for (const room of table.rooms.values()) {
      for (const other of room.mayImport) {
        expect(order.indexOf(other), `${room.name} imports ${other}`).toBeGreaterThanOrEqual(0)
        expect(order.indexOf(other), `${room.name} imports ${other}`).toBeLessThan(order.indexOf(room.name))
      }
    }
  })
})

/** Made-up files and what must be found in them: the test itself tested. */
const offending: [name: string, path: string, text: string, found: RegExp][] = [
  ['a static import upward', 'src/geometry/a.ts', `import { skin } from '../skin'`, /a\.ts:1: imports src\/skin,/],
  [
    'a type import upward',
    'src/solids/a.ts',
    `\nimport type { Skin } from '../skin/types'`,
    /a\.ts:2: imports src\/skin/,
  ],
  ['an export from upward', 'src/units/a.ts', `export * from '../errors'`, /may import nothing/],
  ['a type export from upward', 'src/units/a.ts', `export type { X } from '../errors'`, /may import nothing/],
  ['a dynamic import upward', 'src/skin/a.ts', `const late = await import('../pieces')`, /imports src\/pieces/],
  ['a type in import()', 'src/skin/a.ts', `type P = import('../pieces/types').Piece`, /imports src\/pieces/],
  [
    'a worker address',
    'src/preview/a.ts',
    `new Worker(new URL('../worker/w.ts', import.meta.url))`,
    /imports src\/worker/,
  ],
  ['an import that cannot be read', 'src/app/a.ts', 'const late = await import(where)', /cannot be read/],
  ['an import from the tests', 'src/batch/a.ts', `import { x } from '../../test/x'`, /outside src/],
  ['plan types as a value', 'src/docket/a.ts', `import { x } from '../plan/types'`, /as more than types/],
  [
    'more of plan than its types',
    'src/docket/a.ts',
    `import type { x } from '../plan/pipeline'`,
    /imports src\/plan\/pip/,
  ],
  [
    'plan types too deep down',
    'src/skin/a.ts',
    `import type { Plan } from '../plan/types'`,
    /imports src\/plan\/types/,
  ],
  ['clipper-lib outside geometry', 'src/pieces/a.ts', `import Clipper from 'clipper-lib'`, /stays in geometry/],
  ['pdf-lib outside output', 'src/drawing/a.ts', `import { PDFDocument } from 'pdf-lib'`, /stays in output/],
  ['three outside preview', 'src/app/a.tsx', `import { X } from 'three/addons/controls/X.js'`, /stays in preview/],
  ['idb outside app', 'src/worker/a.ts', `import { openDB } from 'idb'`, /stays in app/],
  ['comlink outside worker and app', 'src/plan/a.ts', `import { wrap } from 'comlink'`, /stays in worker, app/],
  ['node in the pure part', 'src/plan/a.ts', `import { readFileSync } from 'node:fs'`, /stays in batch/],
  ['a package that nobody entered', 'src/app/a.ts', `import x from '@some/thing/part'`, /not in the table of packages/],
  ['a file in no room', 'src/main.ts', '', /lies in no room/],
  ['a folder that is no room', 'src/helpers/a.ts', '', /lies in no room/],
  ['the DOM', 'src/skin/a.ts', 'const f = (): number => document.body.clientWidth', /uses document/],
  ['a DOM type', 'src/drawing/a.ts', 'export const f = (c: HTMLCanvasElement): number => c.width', /uses HTMLCanvasEl/],
  ['a clock', 'src/plan/a.ts', 'const now = Date.now()', /uses Date/],
  ['another clock', 'src/sheets/a.ts', 'const now = performance.now()', /uses performance/],
  ['chance', 'src/pieces/a.ts', 'const x = Math.random()', /uses Math\.random/],
  ['chance by another way', 'src/pieces/a.ts', `const x = Math['random']()`, /uses Math\.random/],
  ['chance by a third way', 'src/pieces/a.ts', 'const { random } = Math', /uses Math\.random/],
  ['a global as a default value', 'src/docket/a.ts', 'const f = ({ t = Date.now() } = {}) => t', /uses Date/],
  [
    'the locale',
    'src/assembly/a.ts',
    'const s = names.sort((a, b) => a.localeCompare(b)); const names = []',
    /localeCom/,
  ],
  ['the environment', 'src/solids/a.ts', 'const x = process.env.X', /uses process/],
]

const allowed: [name: string, path: string, text: string][] = [
  ['downward', 'src/skin/a.ts', `import { dot } from '../geometry/vec3'\nimport { x } from './b'`],
  ['plan types as types', 'src/drawing/a.ts', `import type { Plan } from '../plan/types'`],
  [
    'types by two ways',
    'src/docket/a.ts',
    `export type { Plan } from '../plan/types'\ntype P = import('../plan/types').Plan`,
  ],
  ['a door to its package', 'src/preview/a.ts', `import { Mesh } from 'three'\nconst late = import('three/webgpu')`],
  ['the DOM where it belongs', 'src/app/a.tsx', 'document.title = String(Date.now() + Math.random())'],
  [
    'names that only look like globals',
    'src/skin/a.ts',
    'const f = (p: { Date: number }, location: number) => p.Date + location',
  ],
  [
    'patterns',
    'src/skin/a.ts',
    'const f = ({ a: window, ...self }: { a: number; b: number }, [top = 1]: number[]) => [window, self, top]',
  ],
  [
    'types of functions',
    'src/skin/a.ts',
    'export type F<Event> = (name: string) => { [key in keyof Event]: Event[key] }',
  ],
  [
    'the language itself',
    'src/skin/a.ts',
    'const m: ReadonlyMap<string, number> = new Map([["a", Math.max(1, Number.NaN)]])',
  ],
]

describe('the reading of imports is itself tested', () => {
  test.each(offending)('finds %s', (_, path, text, found) => {
    const list = offences(table, new Map([[path, text]]))
    expect(list).toHaveLength(1)
    expect(list[0]).toMatch(found)
  })

  test.each(allowed)('lets pass %s', (_, path, text) => {
    expect(offences(table, new Map([[path, text]]))).toEqual([])
  })

  test('a table that is gone is an error, not an empty table', () => {
    expect(() => readTable('# nothing')).toThrow(/no table/)
  })
})

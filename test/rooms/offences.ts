/** Compares what the files of `src` ask for with the table of rooms. */
import { posix } from 'node:path'
import { type Mention, readSource } from './read-source'
import type { Room, Table } from './table'

/** What the language itself offers, and nothing of browser, server, clock or locale. */
const pureGlobals = new Set(
  `Array ArrayBuffer BigInt Boolean DataView Error Float32Array Float64Array Infinity Int16Array Int32Array Int8Array
   JSON Map Math NaN Number Object Promise RangeError RegExp Set String Symbol TextDecoder TextEncoder TypeError
   Uint16Array Uint32Array Uint8Array Uint8ClampedArray WeakMap WeakSet isFinite isNaN parseFloat parseInt
   structuredClone undefined const
   ArrayLike Awaited Exclude Extract Generator InstanceType Iterable IterableIterator Iterator NonNullable Omit
   Parameters Partial Pick PromiseLike Readonly ReadonlyArray ReadonlyMap ReadonlySet Record Required ReturnType`.split(
    /\s+/,
  ),
)

/** Members that give another answer at another time, on another machine or in another country. */
const impureMember = (name: string): boolean => name === 'Math.random' || /^(localeCompare|toLocale\w*)$/.test(name)

const packageOf = (specifier: string): string =>
  specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/')

const packageRooms = (table: Table, specifier: string): readonly string[] | undefined => {
  for (const [name, rooms] of table.packages) {
    if (name.endsWith('*') ? specifier.startsWith(name.slice(0, -1)) : packageOf(specifier) === name) return rooms
  }
  return undefined
}

const roomOf = (path: string): string => path.split('/')[1]!

const importOffence = (
  table: Table,
  room: Room,
  path: string,
  specifier: string,
  typeOnly: boolean,
): string | undefined => {
  if (specifier === '(not a literal)') return 'imports something that cannot be read from the source'
  if (!specifier.startsWith('.')) {
    const rooms = packageRooms(table, specifier)
    if (!rooms) return `imports ${specifier}, which is not in the table of packages`
    return rooms.includes(room.name) ? undefined : `imports ${specifier}, which stays in ${rooms.join(', ')}`
  }
  const target = posix.join(posix.dirname(path), specifier.replace(/\?.*$/, ''))
  if (!target.startsWith('src/')) return `imports ${specifier}, outside src`
  const other = roomOf(target)
  if (other === room.name || room.mayImport.includes(other)) return undefined
  const types = posix.join('src', other, 'types')
  if (room.mayImportTypesOf.includes(other) && target === types) {
    return typeOnly ? undefined : `imports ${target} as more than types`
  }
  return `imports ${target}, but the room ${room.name} may import ${room.mayImport.join(', ') || 'nothing'}`
}

/** One line per offence, `file:line: what`; `files` maps `src/room/file.ts` to its text. */
export const offences = (table: Table, files: ReadonlyMap<string, string>): string[] => {
  const found: string[] = []
  for (const [path, text] of files) {
    const room = path.split('/').length > 2 ? table.rooms.get(roomOf(path)) : undefined
    if (!room) {
      found.push(`${path}: lies in no room of the table`)
      continue
    }
    const uses = readSource(path, text)
    for (const { specifier, typeOnly, line } of uses.imports) {
      const offence = importOffence(table, room, path, specifier, typeOnly)
      if (offence) found.push(`${path}:${line}: ${offence}`)
    }
    if (!room.pure) continue
    const impure: Mention[] = [
      ...uses.globals.filter(({ name }) => !pureGlobals.has(name)),
      ...uses.members.filter(({ name }) => impureMember(name)),
    ]
    for (const { name, line } of impure) found.push(`${path}:${line}: uses ${name} in a pure room`)
  }
  return found
}

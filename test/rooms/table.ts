/** Reads the two tables of DEVELOPERS.md: rooms with what they may import, and packages with the rooms they stay in. */

export interface Room {
  readonly name: string
  readonly mayImport: readonly string[]
  /** Rooms of which it may import `types.ts`, as types only. */
  readonly mayImportTypesOf: readonly string[]
  readonly pure: boolean
}

export interface Table {
  readonly rooms: ReadonlyMap<string, Room>
  /** Package name, or a prefix that ends in `*`, to the rooms that may import it. */
  readonly packages: ReadonlyMap<string, readonly string[]>
}

const cells = (line: string): string[] =>
  line
    .split('|')
    .slice(1, -1)
    .map((cell) => cell.trim())
const quoted = (text: string): string[] => [...text.matchAll(/`([^`]+)`/g)].map((match) => match[1]!)

const rowsUnder = (markdown: string, heading: RegExp): string[][] => {
  const lines = markdown.split('\n')
  const start = lines.findIndex((line) => heading.test(line))
  if (start < 0) throw new Error(`DEVELOPERS.md has no table with the heading ${heading}`)
  const rest = lines.slice(start + 2)
  const end = rest.findIndex((line) => !line.startsWith('|'))
  return (end < 0 ? rest : rest.slice(0, end)).map(cells)
}

export const readTable = (markdown: string): Table => {
  const rooms = new Map<string, Room>()
  for (const [name, , imports, pure] of rowsUnder(markdown, /^\| room \|/)) {
    const parts = imports!.split(',')
    const room = {
      name: quoted(name!)[0]!,
      mayImport: parts.filter((part) => !part.includes('types of')).flatMap(quoted),
      mayImportTypesOf: parts.filter((part) => part.includes('types of')).flatMap(quoted),
      pure: pure === 'yes',
    }
    rooms.set(room.name, room)
  }
  const packages = new Map(
    rowsUnder(markdown, /^\| package \|/).map(([name, only]) => [quoted(name!)[0]!, quoted(only!)] as const),
  )
  return { rooms, packages }
}

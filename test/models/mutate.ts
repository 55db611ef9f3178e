/** Seeded damage to model files: what a bad disk, a bad exporter or a hasty editor does. */
import type { Random } from '../../src/geometry/random'
import { seededRandom } from '../../src/geometry/random'
import { buildSolid } from '../../src/solids'
import { both, box, cubeWith } from './shapes'
import { type Mesh, meshOf, trianglesOf, writeBinaryStl, writeObj, writePly, writeTextStl } from './write'

export interface ModelFile {
  readonly name: string
  readonly bytes: Uint8Array
  readonly binary: boolean
}

/** A prism over a pentagram: two star faces and five crossing sides. */
const starPrism: Mesh = {
  vertices: [0, 1].flatMap((z) =>
    [0, 1, 2, 3, 4].map((i) => [Math.cos(0.8 * Math.PI * i), Math.sin(0.8 * Math.PI * i), z] as const),
  ),
  faces: [[0, 1, 2, 3, 4], [5, 6, 7, 8, 9], ...[0, 1, 2, 3, 4].map((i) => [i, (i + 1) % 5, 5 + ((i + 1) % 5), 5 + i])],
}

const tetrahedron = buildSolid('tetrahedron')
const cube = buildSolid('cube')
const crossing = both(box([0, 0, 0], [1, 1, 1]), box([0.5, 0.25, 0.25], [1.5, 0.75, 1]))

/** Two tetrahedra through each other; a changed number leaves all faces flat. */
const stella: Mesh = {
  vertices: [
    ...([
      [1, 1, 1],
      [1, -1, -1],
      [-1, 1, -1],
      [-1, -1, 1],
    ] as const),
    ...([
      [-1, -1, -1],
      [-1, 1, 1],
      [1, -1, 1],
      [1, 1, -1],
    ] as const),
  ],
  faces: [0, 4].flatMap((k) =>
    [
      [0, 1, 2],
      [0, 1, 3],
      [0, 2, 3],
      [1, 2, 3],
    ].map((f) => f.map((v) => v + k)),
  ),
}
const triangulated = ({ vertices, faces }: Mesh): Mesh => ({
  vertices,
  faces: faces.flatMap(([a, b, c, d]) => [
    [a!, b!, c!],
    [a!, c!, d!],
  ]),
})

export const seeds: readonly ModelFile[] = [
  { name: 'tetrahedron.obj', bytes: writeObj(meshOf(tetrahedron)), binary: false },
  {
    name: 'cube.obj',
    bytes: cubeWith({ 1: 'usemtl red', 12: ['usemtl blue', 'f -8/1/1 -7/2/1 -3/3/1 -4/4/1'] }),
    binary: false,
  },
  { name: 'star.obj', bytes: writeObj(starPrism, (x) => x.toFixed(6)), binary: false },
  { name: 'crossing.obj', bytes: writeObj(crossing), binary: false },
  { name: 'stella.obj', bytes: writeObj(stella), binary: false },
  { name: 'crossing.stl', bytes: writeBinaryStl(triangulated(crossing)), binary: true },
  { name: 'tetrahedron.stl', bytes: writeTextStl(trianglesOf(tetrahedron), (x) => x.toExponential(6)), binary: false },
  { name: 'cube.stl', bytes: writeBinaryStl(trianglesOf(cube), 'solid cube'), binary: true },
  { name: 'star.ply', bytes: writePly(starPrism, { form: 'ascii', extras: true }), binary: false },
  { name: 'cube.ply', bytes: writePly(meshOf(cube), { form: 'binary_little_endian', real: 'float' }), binary: true },
  {
    name: 'crossing.ply',
    bytes: writePly(crossing, { form: 'binary_big_endian', extras: true, colour: (i) => [i < 6 ? 255 : 0, 9, 9] }),
    binary: true,
  },
]

const oddNumbers = [
  ...['NaN', 'inf', '-Infinity', '1e999', '-1e999', '1e-999', '-1', '0', '1', '2', '3', '0.5', '-0.0', '1e30', '1e31'],
  ...[
    '4294967295',
    '2147483648',
    '99999999999999999999',
    '1e5',
    '0x10',
    '1,5',
    '1e',
    '..',
    '-',
    '+7',
    '1/2/3',
    '1//',
    '//',
  ],
  ...['0.9999999', '1.0000001', '1e-7', '0.25', '20001', '300000'],
]
const oddLines = [
  ...[
    'f 1 2 3',
    'f 1 1 1',
    'f 4 3 2 1',
    'v 0 0 0',
    'v 2 2 2',
    '\\',
    'usemtl',
    'o',
    'end_header',
    'ply',
    'solid',
    'endsolid',
  ],
  ...[
    'facet normal 0 0 1',
    'element face 1000000000',
    'element vertex 4',
    'property list uchar int vertex_indices',
    '\0\0',
  ],
  ...['format binary_little_endian 1.0', 'l 1 2', 'f -1 -2 -3', '3 0 1 2', '4 0 1 2 3', '0 0 0', 'v 1e-9 0 0', ''],
]

const pick = <T>(random: Random, list: readonly T[]): T => list[random.below(list.length)]!

/** Latin-1, so that any bytes survive the way to text and back. */
const toText = (bytes: Uint8Array): string => Buffer.from(bytes).toString('latin1')
const toBytes = (text: string): Uint8Array => Uint8Array.from(Buffer.from(text, 'latin1'))

const onText =
  (change: (lines: string[], random: Random) => void) =>
  (bytes: Uint8Array, random: Random): Uint8Array => {
    const lines = toText(bytes).split('\n')
    change(lines, random)
    return toBytes(lines.join('\n'))
  }

type Mutation = (bytes: Uint8Array, random: Random) => Uint8Array

const flipBits: Mutation = (bytes, random) => {
  const out = Uint8Array.from(bytes)
  for (let k = 1 + random.below(3); k > 0; k--) {
    const at = random.below(out.length)
    out[at] = out[at]! ^ (1 << random.below(8))
  }
  return out
}
const setBytes: Mutation = (bytes, random) => {
  const out = Uint8Array.from(bytes)
  for (let k = 1 + random.below(4); k > 0; k--)
    out[random.below(out.length)] = pick(random, [0, 255, 127, 128, 10, 32, 45, 46, 48, 57])
  return out
}
const truncate: Mutation = (bytes, random) => bytes.slice(0, random.below(bytes.length))
const cutOut: Mutation = (bytes, random) => {
  const from = random.below(bytes.length)
  const to = Math.min(bytes.length, from + 1 + random.below(60))
  return new Uint8Array([...bytes.subarray(0, from), ...bytes.subarray(to)])
}
const repeat: Mutation = (bytes, random) => {
  const from = random.below(bytes.length)
  const to = Math.min(bytes.length, from + 1 + random.below(60))
  return new Uint8Array([...bytes.subarray(0, to), ...bytes.subarray(from)])
}
const join: Mutation = (bytes, random) => new Uint8Array([...bytes, ...pick(random, seeds).bytes])
const dropLine = onText((lines, random) => lines.splice(random.below(lines.length), 1 + random.below(2)))
const doubleLine = onText((lines, random) => {
  const i = random.below(lines.length)
  lines.splice(random.below(lines.length), 0, lines[i]!)
})
const swapLines = onText((lines, random) => {
  const i = random.below(lines.length)
  const j = random.below(lines.length)
  const keep = lines[i]!
  lines[i] = lines[j]!
  lines[j] = keep
})
const oddLine = onText((lines, random) => lines.splice(random.below(lines.length + 1), 0, pick(random, oddLines)))
const oddNumber = onText((lines, random) => {
  const i = random.below(lines.length)
  const words = lines[i]!.split(' ')
  words[random.below(words.length)] = pick(random, oddNumbers)
  lines[i] = words.join(' ')
})
/** One number of the text for another one of the text: keeps the grammar and changes the shape. */
const otherNumber = onText((lines, random) => {
  const line = lines.findIndex((_, i) => i >= random.below(lines.length) && /\d/.test(lines[i]!))
  if (line < 0) return
  const words = lines[line]!.split(' ')
  const donor = pick(
    random,
    lines.filter((l) => l.split(' ')[0] === words[0] || /^[-\d.]/.test(l)),
  )
  if (donor === undefined) return
  const i = random.below(words.length)
  words[i] = donor.split(' ')[Math.min(i, donor.split(' ').length - 1)]!
  lines[line] = words.join(' ')
})
/** A field of 4 or 8 bytes set to a value, in either byte order. */
const field: Mutation = (bytes, random) => {
  const out = Uint8Array.from(bytes)
  if (out.length < 100) return flipBits(bytes, random)
  const view = new DataView(out.buffer)
  const at = random.next() < 0.2 ? 80 : random.below(out.length - 8)
  const little = random.next() < 0.5
  const value = pick(random, [
    0,
    1,
    -1,
    0.5,
    2,
    7,
    255,
    65536,
    2 ** 31,
    4294967295,
    Number.NaN,
    Infinity,
    1e30,
    1e-30,
    1e-7,
  ])
  const how = random.below(4)
  if (how === 0) view.setUint32(at, value >>> 0, little)
  else if (how === 1) view.setFloat32(at, value, little)
  else if (how === 2) view.setFloat64(at, value, little)
  else out[at] = value & 255
  return out
}
/** A whole record of a binary STL or a stretch of the same length is taken out, moved or doubled, its count kept right. */
const stlRecord: Mutation = (bytes, random) => {
  const count = Math.floor((bytes.length - 84) / 50)
  if (count < 2) return flipBits(bytes, random)
  const records = Array.from({ length: count }, (_, i) => bytes.subarray(84 + 50 * i, 134 + 50 * i))
  const i = random.below(count)
  if (random.next() < 0.5) records.splice(i, 1)
  else records.push(records[i]!)
  const out = new Uint8Array(84 + 50 * records.length)
  out.set(bytes.subarray(0, 84))
  records.forEach((r, k) => {
    out.set(r, 84 + 50 * k)
  })
  new DataView(out.buffer).setUint32(80, records.length, true)
  return out
}

const forText: readonly Mutation[] = [
  ...[dropLine, doubleLine, swapLines, oddLine, oddNumber, oddNumber, otherNumber, otherNumber, otherNumber],
  ...[flipBits, setBytes, truncate, cutOut, repeat, join],
]
const forBinary: readonly Mutation[] = [
  ...[
    flipBits,
    flipBits,
    setBytes,
    field,
    field,
    stlRecord,
    truncate,
    cutOut,
    repeat,
    join,
    oddNumber,
    dropLine,
    swapLines,
  ],
]
const names = ['a.obj', 'a.stl', 'a.ply', 'a.png', 'a']

/** The file number `i` of the run with this seed. */
export const mutant = (seed: number, i: number): ModelFile => {
  const random = seededRandom(seed + Math.imul(i, 0x9e3779b1))
  const from = pick(random, seeds)
  let bytes = from.bytes
  // Mostly one fault: it gets farthest into the reader.
  const times = 1 + (random.next() < 0.3 ? 1 + random.below(4) : 0)
  for (let k = 0; k < times && bytes.length > 0; k++)
    bytes = pick(random, from.binary ? forBinary : forText)(bytes, random)
  const name = random.next() < 0.1 ? pick(random, names) : from.name
  return { name, bytes, binary: from.binary }
}

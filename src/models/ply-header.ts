/** The header of a PLY file: which elements follow, how many of each, and what each one holds. */
import { fault, quote } from './file'

/** Scalar types by both of their usual names, with their size in bytes. */
const types = {
  char: 'int8',
  uchar: 'uint8',
  short: 'int16',
  ushort: 'uint16',
  int: 'int32',
  uint: 'uint32',
  float: 'float32',
  double: 'float64',
  int8: 'int8',
  uint8: 'uint8',
  int16: 'int16',
  uint16: 'uint16',
  int32: 'int32',
  uint32: 'uint32',
  float32: 'float32',
  float64: 'float64',
} as const
export type Scalar = (typeof types)[keyof typeof types]

export const sizeOf: Readonly<Record<Scalar, number>> = {
  int8: 1,
  uint8: 1,
  int16: 2,
  uint16: 2,
  int32: 4,
  uint32: 4,
  float32: 4,
  float64: 8,
}
export const isInteger = (type: Scalar): boolean => !type.startsWith('float')

export interface Property {
  readonly name: string
  readonly type: Scalar
  /** Type of the count, when the property is a list. */
  readonly counted: Scalar | null
}

export interface Element {
  readonly name: string
  readonly count: number
  readonly properties: Property[]
  /** Line of the header, for messages. */
  readonly line: number
}

export interface PlyHeader {
  readonly form: 'text' | 'little' | 'big'
  readonly elements: readonly Element[]
  /** Byte after the header's last line end, and its line. */
  readonly end: number
  readonly lines: number
}

const longestHeader = 100_000
const forms = { ascii: 'text', binary_little_endian: 'little', binary_big_endian: 'big' } as const
const knownElements = /^[!-~]{1,100}$/

/** @throws InputError that names the line of the header */
export const readPlyHeader = (bytes: Uint8Array, file: string): PlyHeader => {
  let form: PlyHeader['form'] | null = null
  const elements: Element[] = []
  let at = 0
  let number = 0
  const wrong = (what: string): Error => fault(file, `line ${number}`, what)
  for (;;) {
    const start = at
    while (at < bytes.length && bytes[at] !== 10 && bytes[at] !== 13 && at < longestHeader) at++
    number++
    if (at >= bytes.length || at >= longestHeader)
      throw wrong('the header does not end with "end_header"; export or copy the file again.')
    const words = String.fromCharCode(...bytes.subarray(start, Math.min(at, start + 1000)))
      .trim()
      .split(/\s+/)
    at += bytes[at] === 13 && bytes[at + 1] === 10 ? 2 : 1
    const [key, a, b, c] = words
    if (number === 1) {
      if (key !== 'ply') throw wrong('a PLY file begins with the line "ply"; correct it or export again.')
    } else if (key === 'end_header') break
    else if (key === 'format') {
      if (a === undefined || !Object.hasOwn(forms, a))
        throw wrong(`the format "${quote(a ?? '')}" is not known; export as ascii or binary.`)
      form = forms[a as keyof typeof forms]
    } else if (key === 'element') {
      if (a === undefined || !knownElements.test(a) || b === undefined || !/^\d{1,10}$/.test(b))
        throw wrong('an element needs a name and a count, for example "element vertex 8"; correct the line.')
      if (elements.some((e) => e.name === a)) throw wrong(`the element "${quote(a)}" is announced twice; correct it.`)
      elements.push({ name: a, count: Number(b), properties: [], line: number })
    } else if (key === 'property') {
      const element = elements[elements.length - 1]
      if (!element) throw wrong('a property stands before the first element; correct the header.')
      const list = a === 'list'
      const type = scalarNamed(list ? c : a)
      const counted = list ? scalarNamed(b) : null
      const name = list ? words[4] : b
      if (type === undefined || counted === undefined || name === undefined)
        throw wrong('a property needs a known type and a name, for example "property float x"; correct the line.')
      if (counted !== null && !isInteger(counted))
        throw wrong('the count of a list must be a whole number; correct it.')
      if (element.properties.length >= 1000) throw wrong('more than 1000 properties; export without them.')
      element.properties.push({ name, type, counted })
    } else if (key !== 'comment' && key !== 'obj_info' && key !== '')
      throw wrong(`"${quote(key ?? '')}" is no line of a PLY header; correct it or start it with "comment".`)
  }
  if (form === null) throw wrong('the header says no format; add a line such as "format ascii 1.0".')
  return { form, elements, end: at, lines: number }
}

const scalarNamed = (word: string | undefined): Scalar | undefined =>
  word !== undefined && Object.hasOwn(types, word) ? types[word as keyof typeof types] : undefined

/**
 * Reads PLY, text and binary of either byte order (the polygon file format of the Stanford graphics laboratory, 1994). Why
 * our own reader: see obj.ts. Elements and properties that are not needed are stepped over by their declared sizes.
 */
import type { Progress } from '../errors'
import { checkFaceBounds, checkVertexBound, fault, greatestCoordinate, greatestFaceCount, quote } from './file'
import {
  type Element,
  isInteger,
  type PlyHeader,
  type Property,
  readPlyHeader,
  type Scalar,
  sizeOf,
} from './ply-header'
import { Lines, readNumber, significantDigits, wordsOf } from './text'
import type { NumberForm, RawFace, RawModel } from './types'

/** One record at a time; how it is stored is hidden here. */
interface Source {
  /** Begins the next record of an element; for text this is the next line that is not empty. */
  begin(what: string): void
  /** The value of a scalar; NaN and infinities only where the file says so. */
  scalar(type: Scalar, what: string): number
  end(what: string): void
  /** Where the record that was begun last stands. */
  readonly at: number
  readonly place: string
  /** Most significant digits that were written, of all scalars read since the last call; text only. */
  readonly digits: number
}

/** @throws InputError */
export const readPly = (bytes: Uint8Array, file: string, progress: Progress): RawModel => {
  const header = readPlyHeader(bytes, file)
  const vertexElement = header.elements.find((e) => e.name === 'vertex')
  const faceElement = header.elements.find((e) => e.name === 'face')
  const headerPlace = `line ${header.lines}`
  if (!vertexElement)
    throw fault(file, headerPlace, 'the header announces no element "vertex"; export the model again.')
  if (!faceElement)
    throw fault(
      file,
      headerPlace,
      header.elements.some((e) => e.name === 'tristrips')
        ? 'the faces are stored as strips, which cannot be read; export with an element "face".'
        : 'the header announces no element "face"; export the model with faces, not as points.',
    )
  const axes = ['x', 'y', 'z'].map((name) => {
    const property = vertexElement.properties.find((p) => p.name === name)
    if (!property || property.counted !== null)
      throw fault(file, `line ${vertexElement.line}`, `the vertices have no number "${name}"; export the model again.`)
    return property
  })
  const list = faceElement.properties.find((p) => p.name === 'vertex_indices' || p.name === 'vertex_index')
  if (!list?.counted || !isInteger(list.type))
    throw fault(
      file,
      `line ${faceElement.line}`,
      'the faces have no list "vertex_indices" of whole numbers; export the model again.',
    )
  checkVertexBound(file, `line ${vertexElement.line}`, vertexElement.count)
  checkFaceBounds(
    file,
    `line ${faceElement.line}`,
    faceElement.count,
    3,
    3 * Math.min(faceElement.count, greatestFaceCount),
  )
  const source = header.form === 'text' ? textSource(bytes, header, file, progress) : binarySource(bytes, header, file)
  const coordinates: number[] = []
  const faces: RawFace[] = []
  let corners = 0
  let done = 0
  for (const element of header.elements) {
    if (element.properties.length === 0) continue
    // Counts are checked against the bytes present before anything is read: this bounds every loop below.
    source.ensure(element)
    for (let i = 0; i < element.count; i++) {
      if ((++done & 1023) === 0) progress('model', 0.25)
      const what = `${element.name === 'face' ? 'face' : element.name === 'vertex' ? 'vertex' : quote(element.name)} ${i + 1}`
      source.begin(what)
      if (element === vertexElement) readVertex(source, element, axes, what, file, coordinates)
      else if (element === faceElement) {
        const face = readFace(source, element, list, what, file)
        corners += face.cycle.length
        checkFaceBounds(file, source.place, i + 1, face.cycle.length, corners)
        faces.push(face)
      } else for (const p of element.properties) skip(source, p, what)
      source.end(what)
    }
  }
  source.close()
  const count = coordinates.length / 3
  faces.forEach(({ cycle, at }, i) => {
    for (const v of cycle)
      if (!(v >= 0 && v < count))
        throw fault(
          file,
          header.form === 'text' ? `line ${at}` : `byte ${at}`,
          `face ${i + 1} uses vertex ${v}, but there are ${count}, counted from 0; correct the number.`,
        )
  })
  return {
    format: 'PLY',
    binary: header.form !== 'text',
    coordinates,
    faces,
    numbers: numberForm(header, axes),
    digits: source.digits,
    notes: [],
  }
}

const numberForm = (header: PlyHeader, axes: readonly Property[]): NumberForm => {
  if (header.form === 'text') return 'text'
  if (axes.some((p) => p.type === 'float32')) return 'float32'
  return axes.some((p) => p.type === 'float64') ? 'float64' : 'integer'
}

const readVertex = (
  source: Source,
  element: Element,
  axes: readonly Property[],
  what: string,
  file: string,
  coordinates: number[],
): void => {
  const at = coordinates.length
  coordinates.push(0, 0, 0)
  for (const p of element.properties) {
    const axis = axes.indexOf(p)
    if (axis < 0) {
      skip(source, p, what)
      continue
    }
    const x = source.scalar(p.type, what)
    if (!(Math.abs(x) <= greatestCoordinate))
      throw fault(file, source.place, `${what}: ${p.name} is ${x}, no usable coordinate; export the model again.`)
    coordinates[at + axis] = x
  }
}

const listLength = (source: Source, type: Scalar, what: string, name: string, file: string): number => {
  const n = source.scalar(type, what)
  if (!(Number.isInteger(n) && n >= 0))
    throw fault(file, source.place, `${what}: the list "${quote(name)}" cannot have ${n} entries; correct the number.`)
  return n
}

const readFace = (source: Source, element: Element, list: Property, what: string, file: string): RawFace => {
  const cycle: number[] = []
  const colour = [-1, -1, -1]
  for (const p of element.properties) {
    const channel = ['red', 'green', 'blue'].indexOf(p.name)
    if (p === list) {
      const n = listLength(source, p.counted!, what, p.name, file)
      if (n < 3) throw fault(file, source.place, `${what} has ${n} corners; a face needs at least 3.`)
      checkFaceBounds(file, source.place, 0, n, 0)
      for (let k = 0; k < n; k++) {
        const v = source.scalar(p.type, what)
        if (!Number.isInteger(v)) throw fault(file, source.place, `${what}: ${v} is no vertex; correct the number.`)
        cycle.push(v)
      }
    } else if (channel >= 0 && p.counted === null) {
      const x = source.scalar(p.type, what)
      // Colours as fractions are the usual meaning of a floating type.
      colour[channel] = Math.min(255, Math.max(0, Math.round(isInteger(p.type) ? x : 255 * x)))
    } else skip(source, p, what)
  }
  const material = colour.every((c) => c >= 0)
    ? `#${colour.map((c) => c.toString(16).padStart(2, '0')).join('')}`
    : null
  return { cycle, at: source.at, material }
}

const skip = (source: Source, p: Property, what: string): void => {
  if (p.counted === null) source.scalar(p.type, what)
  else {
    const n = source.scalar(p.counted, what)
    for (let k = 0; k < n; k++) source.scalar(p.type, what)
  }
}

/** A source with its checks of the counts. */
interface Records extends Source {
  ensure(element: Element): void
  /** @throws InputError when something is left over */
  close(): void
}

/** Least bytes of a binary record: an empty list still has its count. */
const leastBytes = (element: Element): number =>
  element.properties.reduce((sum, p) => sum + sizeOf[p.counted ?? p.type], 0)

const binarySource = (bytes: Uint8Array, header: PlyHeader, file: string): Records => {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const little = header.form === 'little'
  let next = header.end
  let at = next
  const short = (what: string): Error =>
    fault(file, `byte ${bytes.length}`, `the file ends inside ${what}; export or copy it again.`)
  return {
    digits: 0,
    get at() {
      return at
    },
    get place() {
      return `byte ${at}`
    },
    begin() {
      at = next
    },
    end() {},
    scalar(type, what) {
      const from = next
      next += sizeOf[type]
      if (next > bytes.length) throw short(what)
      switch (type) {
        case 'int8':
          return view.getInt8(from)
        case 'uint8':
          return view.getUint8(from)
        case 'int16':
          return view.getInt16(from, little)
        case 'uint16':
          return view.getUint16(from, little)
        case 'int32':
          return view.getInt32(from, little)
        case 'uint32':
          return view.getUint32(from, little)
        case 'float32':
          return view.getFloat32(from, little)
        case 'float64':
          return view.getFloat64(from, little)
      }
    },
    ensure(element) {
      const least = leastBytes(element) * element.count
      if (least > bytes.length - next)
        throw fault(
          file,
          `line ${element.line}`,
          `${element.count} × "${quote(element.name)}" take at least ${least} bytes, but only ${bytes.length - next} follow; ` +
            'export or copy the file again.',
        )
    },
    close() {
      for (let i = next; i < bytes.length; i++)
        if (bytes[i] !== 10 && bytes[i] !== 13 && bytes[i] !== 32)
          throw fault(
            file,
            `byte ${next}`,
            `${bytes.length - next} bytes are left over after all elements; the counts of the header are wrong, export again.`,
          )
    },
  }
}

const textSource = (bytes: Uint8Array, header: PlyHeader, file: string, progress: Progress): Records => {
  const lines = new Lines(new TextDecoder().decode(bytes.subarray(header.end)), file, progress)
  lines.number = header.lines
  let words: string[] = []
  let place = 0
  let digits = 0
  return {
    get digits() {
      return digits
    },
    get at() {
      return lines.number
    },
    get place() {
      return lines.place
    },
    begin(what) {
      do {
        const line = lines.next()
        if (line === null) throw lines.fault(`the file ends before ${what}; export or copy it again.`)
        words = wordsOf(line)
      } while (words.length === 0)
      place = 0
    },
    scalar(type, what) {
      const word = words[place++]
      const x = readNumber(lines, word, what)
      if (!isInteger(type)) digits = Math.max(digits, significantDigits(word!))
      else if (!Number.isInteger(x))
        throw lines.fault(`${what}: "${quote(word!)}" should be a whole number; correct it.`)
      return x
    },
    end(what) {
      if (place < words.length)
        throw lines.fault(`${what} has ${words.length} numbers, ${place} belong to it; correct the line or its counts.`)
    },
    ensure(element) {
      // A number and its separator are two bytes; the last needs none.
      const least = 2 * element.properties.length * element.count - 1
      if (least > bytes.length)
        throw fault(
          file,
          `line ${element.line}`,
          `${element.count} × "${quote(element.name)}" do not fit a file of ${bytes.length} bytes; correct the count.`,
        )
    },
    close() {
      for (let line = lines.next(); line !== null; line = lines.next())
        if (line.trim() !== '')
          throw lines.fault('a line is left over after all elements; the counts of the header are wrong, correct them.')
    },
  }
}

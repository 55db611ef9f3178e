/**
 * Reads STL, text and binary (the published format of the stereolithography interface, 1988). Why our own reader: see obj.ts.
 * Normals are not used: they follow from the corners, and are often wrong.
 */
import type { Progress } from '../errors'
import { checkFaceBounds, fault, greatestCoordinate, greatestFaceCount, quote } from './file'
import { Lines, readNumber, significantDigits, wordsOf } from './text'
import type { RawFace, RawModel } from './types'

const headerBytes = 84
const triangleBytes = 50

/** Number of triangles that a binary STL of these bytes announces, or −1 when there is not even a header. */
export const announcedTriangles = (bytes: Uint8Array): number =>
  bytes.length < headerBytes ? -1 : new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(80, true)

/** The bytes that a binary STL with so many triangles has. */
export const binaryStlSize = (triangles: number): number => headerBytes + triangleBytes * triangles

/** @throws InputError when bytes are missing or left over, or a coordinate is no finite number */
export const readBinaryStl = (bytes: Uint8Array, file: string, progress: Progress): RawModel => {
  const count = announcedTriangles(bytes)
  if (count < 0)
    throw fault(
      file,
      `byte ${bytes.length}`,
      `the file ends inside the header of ${headerBytes} bytes; export or copy it again.`,
    )
  const expected = binaryStlSize(count)
  if (expected !== bytes.length) {
    const side = expected > bytes.length ? 'the rest is missing' : 'there is more than that'
    throw fault(
      file,
      'byte 80',
      `${count} triangles are announced, which take ${expected} bytes, but the file has ${bytes.length}, ${side}; ` +
        'export or copy it again.',
    )
  }
  checkFaceBounds(file, 'byte 80', count, 3, 3 * Math.min(count, greatestFaceCount))
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const coordinates: number[] = []
  const faces: RawFace[] = []
  for (let i = 0; i < count; i++) {
    if ((i & 1023) === 0) progress('model', (0.5 * i) / count)
    const at = headerBytes + triangleBytes * i
    for (let k = 0; k < 9; k++) {
      const byte = at + 12 + 4 * k
      const x = view.getFloat32(byte, true)
      if (!(Math.abs(x) <= greatestCoordinate))
        throw fault(
          file,
          `byte ${byte}`,
          `triangle ${i + 1}, corner ${Math.floor(k / 3) + 1}: ${x} is no usable coordinate; export the model again.`,
        )
      coordinates.push(x)
    }
    faces.push({ cycle: [3 * i, 3 * i + 1, 3 * i + 2], at, material: null })
  }
  return { format: 'STL', binary: true, coordinates, faces, numbers: 'float32', digits: 0, notes: [] }
}

/** @throws InputError that names the line where the grammar is broken */
export const readTextStl = (text: string, file: string, progress: Progress): RawModel => {
  const lines = new Lines(text, file, progress)
  const coordinates: number[] = []
  const faces: RawFace[] = []
  let digits = 0
  let words: string[] = []
  let place = 0
  /** The next word, lower case; the reader does not depend on how words are spread over lines. */
  const next = (wanted: string): string => {
    while (place >= words.length) {
      const line = lines.next()
      if (line === null)
        throw lines.fault(
          `the file ends after ${faces.length} facets where ${wanted} should follow; export or copy it again.`,
        )
      words = wordsOf(line)
      place = 0
    }
    return words[place++]!.toLowerCase()
  }
  const demand = (wanted: string): void => {
    const found = next(`"${wanted}"`)
    if (found !== wanted)
      throw lines.fault(
        `facet ${faces.length + 1}: "${wanted}" should stand here, not "${quote(found)}"; correct the line.`,
      )
  }
  /** False at the end of the file. */
  const more = (): boolean => {
    while (place >= words.length) {
      const line = lines.next()
      if (line === null) return false
      words = wordsOf(line)
      place = 0
    }
    return true
  }
  while (more()) {
    demandSolid(lines, words[place]!)
    // The name goes to the end of the line and may be anything.
    place = words.length
    for (let word = next('"facet" or "endsolid"'); word !== 'endsolid'; word = next('"facet" or "endsolid"')) {
      if (word !== 'facet')
        throw lines.fault(`"facet" or "endsolid" should stand here, not "${quote(word)}"; correct the line.`)
      const at = lines.number
      checkFaceBounds(file, lines.place, faces.length + 1, 3, 3 * faces.length)
      demand('normal')
      for (let k = 0; k < 3; k++) next('the normal')
      demand('outer')
      demand('loop')
      const first = coordinates.length / 3
      for (let k = 0; k < 3; k++) {
        demand('vertex')
        for (let axis = 0; axis < 3; axis++) {
          const word = next('a coordinate')
          coordinates.push(readNumber(lines, word, `facet ${faces.length + 1}, vertex ${k + 1}`))
          digits = Math.max(digits, significantDigits(word))
        }
      }
      const end = next('"endloop"')
      if (end === 'vertex')
        throw lines.fault(`facet ${faces.length + 1} has a fourth vertex; STL holds triangles only.`)
      if (end !== 'endloop')
        throw lines.fault(
          `facet ${faces.length + 1}: "endloop" should stand here, not "${quote(end)}"; correct the line.`,
        )
      demand('endfacet')
      faces.push({ cycle: [first, first + 1, first + 2], at, material: null })
    }
    place = words.length
  }
  return { format: 'STL', binary: false, coordinates, faces, numbers: 'text', digits, notes: [] }
}

const demandSolid = (lines: Lines, word: string): void => {
  if (word.toLowerCase() !== 'solid')
    throw lines.fault(`"solid" should stand here, not "${quote(word)}"; the file holds no STL, or two are mixed up.`)
}

/** Models that a builder brings: OBJ, STL and PLY files, repaired where that is safe, refused with place and remedy where not. */
import { InputError, noProgress, type Progress } from '../errors'
import { type Closed, checkCycles, checkVolume, closeUp, notClosed, type PlaceOf, short, unflatness } from './check'
import { checkFileSize, fault } from './file'
import { greatestKindCount } from './kinds'
import { type Mended, mend } from './mend'
import { readObj } from './obj'
import { readPly } from './ply'
import { roundingOf } from './rounding'
import { sniff } from './sniff'
import { solidFrom } from './solid'
import { readBinaryStl, readTextStl } from './stl'
import type { Model, RawModel } from './types'

export { checkFileSize, greatestFaceCount, greatestFileBytes } from './file'
export type { Model, ModelFormat } from './types'
export { isModelUnit, type ModelUnit, modelUnits, unitHeightMm } from './unit'

/** Corners off their face's plane by no more than this part of the model's radius still make a flat face: 0.0125 mm at 250 mm. */
const flatEnough = 1e-4
/** A body thinner than this part of its radius is a needle or a sheet: 0.025 mm at 250 mm. */
const leastThickness = 2e-4
/** Corners nearer than this part of the radius are one: 0.0025 mm at 250 mm, far below what card can show. */
const nearEnough = 2e-5

/**
 * Reads a model. Faces may cross, be stars, be triangulated, doubled or inside out.
 *
 * The model must be closed: no stretch of edge may be free, that is, end one face only without lying on another one.
 *
 * @param bytes of the whole file; see `checkFileSize`
 * @throws InputError that names file, line or byte, element and remedy
 * @throws Cancelled out of `progress`
 */
export const readModel = (bytes: Uint8Array, fileName: string, progress: Progress = noProgress): Model => {
  const file = fileName.replace(/^.*[/\\]/, '') || 'the file'
  checkFileSize(bytes.length, file)
  progress('model', 0)
  const raw = readRaw(bytes, file, progress)
  progress('model', 0.5)
  if (raw.faces.length === 0)
    throw fault(file, '', `there are no faces in it; export the model with its faces, not only points or lines.`)
  return build(raw, file, progress)
}

/** A later stage knows a face by its number only: the same error with file and line or byte; other errors stay as they are. */
export const placed = (error: unknown, { places }: Model, fileName: string): unknown => {
  if (!(error instanceof InputError)) return error
  const place = places[Number(/^face (\d+)$/.exec(error.place)?.[1] ?? 0) - 1]
  return place === undefined ? error : fault(fileName.replace(/^.*[/\\]/, ''), place, error.message)
}

const readRaw = (bytes: Uint8Array, file: string, progress: Progress): RawModel => {
  const text = (): string => new TextDecoder().decode(bytes)
  switch (sniff(bytes, file)) {
    case 'obj':
      return readObj(text(), file, progress)
    case 'stl text':
      return readTextStl(text(), file, progress)
    case 'stl binary':
      return readBinaryStl(bytes, file, progress)
    case 'ply':
      return readPly(bytes, file, progress)
  }
}

/** Greatest absolute coordinate and half the diagonal of the box round all corners of faces. */
const extentOf = (raw: RawModel): { greatest: number; size: number } => {
  const low = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY]
  const high = [Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY]
  for (const { cycle } of raw.faces)
    for (const v of cycle)
      for (let k = 0; k < 3; k++) {
        const x = raw.coordinates[3 * v + k]!
        if (x < low[k]!) low[k] = x
        if (x > high[k]!) high[k] = x
      }
  const greatest = Math.max(...low.map(Math.abs), ...high.map(Math.abs))
  return { greatest, size: Math.hypot(high[0]! - low[0]!, high[1]! - low[1]!, high[2]! - low[2]!) / 2 }
}

const build = (raw: RawModel, file: string, progress: Progress): Model => {
  const place: PlaceOf = ({ at, index }) => (raw.binary ? `face ${index + 1}, byte ${at}` : `line ${at}`)
  const { greatest, size } = extentOf(raw)
  if (!(size > 1e-30)) throw fault(file, '', 'all corners lie at one point; the model has no size, export it again.')
  const error = Math.min(roundingOf(raw, greatest, size), flatEnough * size)

  // Single-precision programs compute the same corner twice with a few last places between; text only rounds it.
  const joined = Math.max((raw.numbers === 'text' ? 3 : 8) * error, nearEnough * size)
  const reach = Math.min(joined, flatEnough * size)
  const mended = mend(raw, reach, size, () => progress('model', 0.5))
  if (mended.faces.length === 0)
    throw fault(
      file,
      '',
      'no face has any area: all corners lie on lines; the model encloses no volume, export a solid body.',
    )
  progress('model', 0.6)
  const closed = closeUp(mended, reach, () => progress('model', 0.65))
  const { points } = mended
  checkCycles(file, closed.faces, points, place)
  checkVolume(file, points, Math.max(reach, leastThickness * size))
  if (closed.open.length > 0) throw notClosed(file, points, closed.faces, closed.open, place)
  progress('model', 0.7)
  const off = unflatness(file, points, closed.faces, flatEnough * size, size, place, progress)
  const precision = Math.max(error, off, mended.widest)
  progress('model', 0.8)
  const made = solidFrom(file, points, closed.faces, precision, progress)
  const notes = [
    ...raw.notes,
    ...notesOn(raw, mended, closed, reach),
    ...(off > Math.max(3 * error, 2 * mended.widest)
      ? [`Faces up to ${short(off)} off their plane were taken as flat.`]
      : []),
    ...(made.tooManyKinds > 0
      ? [`${made.tooManyKinds} materials or colours are more than ${greatestKindCount}; all faces are of one card.`]
      : []),
  ]
  return {
    solid: made.solid,
    format: raw.format,
    farthest: made.farthest,
    notes,
    places: closed.faces.map(place),
  }
}

/** Repairs in plain sentences; corners that STL repeats by its nature are none. */
const notesOn = (raw: RawModel, mended: Mended, { repeated, walls, lying }: Closed, reach: number): string[] => {
  const notes: string[] = []
  const note = (n: number, one: string, many: string, what: string): void => {
    if (n > 0) notes.push(`${n} ${n === 1 ? `${one} was` : `${many} were`} ${what}.`)
  }
  const { near, equal, unused, shortEdges, flatFaces } = mended
  note(
    near,
    `corner less than ${short(reach)} from another one`,
    `corners less than ${short(reach)} from another one`,
    'joined with it',
  )
  if (raw.format !== 'STL')
    note(equal, 'vertex at the place of another one', 'vertices at the place of another one', 'joined with it')
  note(unused, 'vertex that no face uses', 'vertices that no face uses', 'left out')
  note(shortEdges, 'edge without length', 'edges without length', 'dropped')
  note(flatFaces, 'face without area', 'faces without area', 'dropped')
  note(repeated, 'face that repeats another one', 'faces that repeat another one', 'dropped')
  note(
    walls,
    'inner wall, given by the parts on both sides of it,',
    'inner walls, given by the parts on both sides of them,',
    'taken out',
  )
  note(
    lying,
    'stretch of edge with an odd number of faces',
    'stretches of edge with an odd number of faces',
    'accepted, since other faces close the model there',
  )
  return notes
}

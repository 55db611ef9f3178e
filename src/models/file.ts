/** Bounds on a model file, and how its faults are told: every message begins with the file's name and the place in it. */
import { InputError } from '../errors'

/** A larger file is refused before it is read. 20,000 faces need about 6 MB of text. */
export const greatestFileBytes = 64_000_000
export const greatestFaceCount = 20_000
/** Of one face: the filled region of a face costs the square of its corners. */
export const greatestCornerCount = 1000
/** Of all faces together. */
export const greatestCornerSum = 160_000
export const greatestVertexCount = 400_000
/** Coordinates beyond this, or a model smaller than its inverse, would overflow in areas and volumes. */
export const greatestCoordinate = 1e30

/** Something quoted from a file or a file name: on one line, without control characters, not too long. */
export const quote = (text: string): string => {
  const plain = text.replace(/[\p{Cc}\p{Zl}\p{Zp}\ufffd]+/gu, '?')
  return plain.length > 60 ? `${plain.slice(0, 57)}…` : plain
}

/** @param place e.g. `line 12`; empty for the file as a whole */
export const fault = (file: string, place: string, what: string): InputError =>
  new InputError(`${quote(file) || 'The file'}${place ? `, ${place}` : ''}: ${what}`, place || quote(file) || 'file')

const megabytes = (bytes: number): string => `${(bytes / 1e6).toFixed(bytes < 1e7 ? 1 : 0)} MB`

/**
 * Call it before a file is read into memory.
 * @param size in bytes
 * @throws InputError for an empty file and one over `greatestFileBytes`
 */
export const checkFileSize = (size: number, fileName: string): void => {
  if (!(size > 0)) throw fault(fileName, '', 'the file is empty; export the model again.')
  if (size > greatestFileBytes)
    throw fault(
      fileName,
      '',
      `${megabytes(size)} are too much, at most ${megabytes(greatestFileBytes)} can be read; ` +
        `reduce the model to at most ${greatestFaceCount} faces.`,
    )
}

/** @throws InputError when one more face would be too many, or the face has too many corners */
export const checkFaceBounds = (file: string, place: string, faces: number, corners: number, sum: number): void => {
  if (faces > greatestFaceCount)
    throw fault(file, place, `more than ${greatestFaceCount} faces; reduce the model before you export it.`)
  if (corners > greatestCornerCount)
    throw fault(
      file,
      place,
      `a face with ${corners} corners, at most ${greatestCornerCount} can be used; split it into smaller ones.`,
    )
  if (sum > greatestCornerSum)
    throw fault(file, place, `the faces have more than ${greatestCornerSum} corners in all; reduce the model.`)
}

/** @throws InputError when there are too many vertices */
export const checkVertexBound = (file: string, place: string, vertices: number): void => {
  if (vertices > greatestVertexCount)
    throw fault(file, place, `more than ${greatestVertexCount} vertices; leave out those that no face uses.`)
}

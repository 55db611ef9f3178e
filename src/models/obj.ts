/**
 * Reads Wavefront OBJ. The readers of the three formats are our own, since no library that we know names line (or byte)
 * and element of a fault, or promises an end on any input.
 *
 * Of the format as published (Advanced Visualizer Manual, Appendix B1) polygons are used, with vertices, materials, negative
 * indices and continued lines. Texture coordinates, normals, groups, lines and points do not matter for card; free-form
 * surfaces are refused.
 */
import type { Progress } from '../errors'
import { checkFaceBounds, checkVertexBound, fault, quote } from './file'
import { Lines, readNumber, significantDigits, wordsOf } from './text'
import type { RawFace, RawModel } from './types'

const ignored = new Set(
  (
    'vt vn vp o g s mg mtllib usemap maplib lod bevel c_interp d_interp shadow_obj trace_obj ctech stech ' +
    'deg bmat step cstype parm trim hole scrv sp end con call csh bsp bzp cdc cdp res'
  ).split(' '),
)
const freeForm = new Set(['curv', 'curv2', 'surf'])

/** A statement with its continued lines joined, comment cut off; null at the end. */
const nextStatement = (lines: Lines): string | null => {
  let line = lines.next()
  if (line === null) return null
  let whole = ''
  for (;;) {
    const bare = line.replace(/#.*$/, '')
    if (!bare.endsWith('\\') || bare.length !== line.length) return whole + bare
    whole += `${bare.slice(0, -1)} `
    if (whole.length > 200_000) throw lines.fault('a line continued for too long is no line of a model.')
    line = lines.next()
    if (line === null) return whole
  }
}

const corner = /^([+-]?\d{1,9})(?:\/[+-]?\d*){0,2}$/

/** @throws InputError */
export const readObj = (text: string, file: string, progress: Progress): RawModel => {
  const lines = new Lines(text, file, progress)
  const coordinates: number[] = []
  const faces: RawFace[] = []
  let digits = 0
  let corners = 0
  let strokes = 0
  let material: string | null = null
  for (let line = nextStatement(lines); line !== null; line = nextStatement(lines)) {
    const words = wordsOf(line)
    const key = words[0]
    if (key === undefined) continue
    if (key === 'v') {
      const vertex = coordinates.length / 3 + 1
      if (words.length < 4)
        throw lines.fault(`vertex ${vertex} has ${words.length - 1} of 3 coordinates; correct the line.`)
      checkVertexBound(file, lines.place, vertex)
      for (let k = 1; k <= 3; k++) {
        coordinates.push(readNumber(lines, words[k], `vertex ${vertex}`))
        digits = Math.max(digits, significantDigits(words[k]!))
      }
    } else if (key === 'f' || key === 'fo') {
      if (words.length < 4)
        throw lines.fault(`face ${faces.length + 1} has ${words.length - 1} corners; a face needs at least 3.`)
      corners += words.length - 1
      checkFaceBounds(file, lines.place, faces.length + 1, words.length - 1, corners)
      const count = coordinates.length / 3
      const cycle = words.slice(1).map((word) => {
        const index = Number(corner.exec(word)?.[1] ?? Number.NaN)
        if (Number.isNaN(index))
          throw lines.fault(
            `face ${faces.length + 1}: "${quote(word)}" is no corner; write numbers such as 7 or 7/1/2.`,
          )
        if (index === 0)
          throw lines.fault(`face ${faces.length + 1}: vertices are counted from 1, there is no vertex 0.`)
        if (index < 0 && -index > count)
          throw lines.fault(
            `face ${faces.length + 1}: vertex ${index} counts back before the first of ${count}; correct the number.`,
          )
        return index > 0 ? index - 1 : count + index
      })
      faces.push({ cycle, at: lines.number, material })
    } else if (key === 'usemtl') material = words.slice(1).join(' ') || null
    else if (key === 'l' || key === 'p') strokes++
    else if (freeForm.has(key))
      throw lines.fault(`"${key}" is a free-form curve or surface; export the model as flat faces.`)
    else if (!ignored.has(key))
      throw lines.fault(`"${quote(key)}" is no statement of an OBJ file; correct the line or start it with #.`)
  }
  const count = coordinates.length / 3
  faces.forEach(({ cycle, at }, i) => {
    for (const v of cycle)
      if (v >= count)
        throw fault(
          file,
          `line ${at}`,
          `face ${i + 1} uses vertex ${v + 1}, but the file has ${count}; correct the number or add the vertex.`,
        )
  })
  const notes =
    strokes > 0 ? [`${strokes} ${strokes === 1 ? 'line or point was' : 'lines or points were'} left out.`] : []
  return { format: 'OBJ', binary: false, coordinates, faces, numbers: 'text', digits, notes }
}

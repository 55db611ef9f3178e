/** Which format a file is in: by its content, and only where that leaves it open by its name. */
import { fault, quote } from './file'
import { announcedTriangles, binaryStlSize } from './stl'

export type Content = 'obj' | 'stl text' | 'stl binary' | 'ply'

/** Beginnings of files that are often taken for a model, or renamed to one. */
const signatures: readonly (readonly [begins: string, name: string])[] = [
  ['\x89PNG', 'a PNG picture'],
  ['\xff\xd8\xff', 'a JPEG picture'],
  ['GIF8', 'a GIF picture'],
  ['BM', 'a BMP picture'],
  ['II*\0', 'a TIFF picture'],
  ['MM\0*', 'a TIFF picture'],
  ['RIFF', 'a picture, a sound or a film'],
  ['%PDF', 'a PDF document'],
  ['PK\x03\x04', 'a packed archive'],
  ['\x1f\x8b', 'a packed file'],
  ['7z\xbc\xaf', 'a packed archive'],
  ['Rar!', 'a packed archive'],
  ['glTF', 'a glTF scene'],
  ['Kaydara FBX', 'an FBX scene'],
  ['BLENDER', 'a scene of a modelling program'],
  ['\x7fELF', 'a program'],
  ['MZ', 'a program'],
  ['<', 'a page or scene in XML'],
  ['{', 'data in JSON'],
]

const remedy = 'export the model as OBJ, STL or PLY.'

/** @throws InputError when it is none of the three formats */
export const sniff = (bytes: Uint8Array, file: string): Content => {
  const ending = /\.([a-z0-9]+)$/i.exec(file)?.[1]?.toLowerCase() ?? ''
  const head = String.fromCharCode(...bytes.subarray(0, 2000))
  const words = head.replace(/^\xef\xbb\xbf/, '')
  if (/^ply\s/.test(words)) return 'ply'
  const triangles = announcedTriangles(bytes)
  // A header may hold anything, "solid" and the signature of a picture included: only the size tells.
  if (triangles > 0 && binaryStlSize(triangles) === bytes.length) return 'stl binary'
  const text = !looksBinary(bytes)
  const known = signatures.find(([begins]) => words.startsWith(begins))
  // Two letters alone may begin a text as well.
  if (known && !(text && /^[A-Z]+$/.test(known[0]))) throw fault(file, 'byte 0', `this is ${known[1]}; ${remedy}`)
  if (/^(\xff\xfe|\xfe\xff)/.test(head))
    throw fault(file, 'byte 0', 'the text is in UTF-16; save it as plain text (UTF-8).')
  if (!text) {
    if (ending === 'stl') return 'stl binary'
    throw fault(file, 'byte 0', `this is binary and no model that can be read; ${remedy}`)
  }
  if (/^\s*solid\b/i.test(words) && (ending === 'stl' || /facet|endsolid/i.test(words))) return 'stl text'
  if (/(^|[\r\n])[ \t]*(v|f)[ \t]+[-+.\d]/.test(words)) return 'obj'
  if (ending === 'obj') return 'obj'
  if (ending === 'stl') return 'stl text'
  if (ending === 'ply') return 'ply'
  throw fault(file, 'line 1', `neither the text nor the ending "${quote(ending)}" is that of a model; ${remedy}`)
}

/** NULs or many other control characters in the first part of the file. */
const looksBinary = (bytes: Uint8Array): boolean => {
  const part = bytes.subarray(0, 65536)
  let control = 0
  for (const b of part) {
    if (b === 0) return true
    if (b < 9 || (b > 13 && b < 32)) control++
  }
  return control > part.length / 50
}

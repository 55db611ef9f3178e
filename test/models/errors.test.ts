/** What cannot be used is refused with file, place, element and remedy, in one line. */
import { describe, expect, test } from 'vitest'
import { InputError } from '../../src/errors'
import { checkFileSize, greatestFileBytes, readModel } from '../../src/models'
import { buildSolid } from '../../src/solids'
import { box, bumpy, cubeWith } from './shapes'
import { bytesOf, trianglesOf, writeBinaryStl, writeObj, writePly, writeTextStl } from './write'

const refusal = (bytes: Uint8Array, name: string): InputError => {
  try {
    readModel(bytes, name)
  } catch (error) {
    expect(error).toBeInstanceOf(InputError)
    const said = error as InputError
    expect(said.message).not.toContain('\n')
    expect(said.message.startsWith(`${name.replace(/^.*\//, '')}`)).toBe(true)
    expect(said.place).not.toBe('')
    return said
  }
  throw new Error('was accepted')
}

const many = 20_001

describe('OBJ', () => {
  const cases: [name: string, changes: Parameters<typeof cubeWith>[0], said: RegExp][] = [
    [
      'a face is missing',
      { 12: null },
      /line 10: not closed: the edge from \(0, 0, 0\) to \(1, 0, 0\) has this face only\. There are 4 such edges; add/,
    ],
    [
      'a corner off its faces',
      { 9: 'v 1 1 1.01' },
      /line 1[135]: face [246] is not flat: its corner at \(.*\) is 0\.00\d+ off its plane \(0\.\d+ % .*split the face/,
    ],
    ['a word for a number', { 3: 'v 1 zero 0' }, /line 3: vertex 2: "zero" is not a number/],
    ['a decimal comma', { 3: 'v 1 0,5 0' }, /line 3: vertex 2: "0,5" has a decimal comma; write a point/],
    ['not a number', { 3: 'v 1 nan 0' }, /line 3: vertex 2: "nan" is not a finite number/],
    ['infinite', { 3: 'v 1 -inf 0' }, /line 3: vertex 2: "-inf" is not a finite number/],
    ['too large', { 3: 'v 1 1e999 0' }, /line 3: vertex 2: "1e999" is too large/],
    ['two coordinates', { 3: 'v 1 0' }, /line 3: vertex 2 has 2 of 3 coordinates/],
    ['two corners', { 10: 'f 1 2' }, /line 10: face 1 has 2 corners; a face needs at least 3/],
    ['an index too high', { 11: 'f 5 6 9 7' }, /line 11: face 2 uses vertex 9, but the file has 8/],
    ['an index too low', { 11: 'f 5 6 -9 7' }, /line 11: face 2: vertex -9 counts back before the first of 8/],
    ['vertex zero', { 11: 'f 0 6 8 7' }, /line 11: face 2: vertices are counted from 1/],
    ['an odd corner', { 11: 'f 5 6 x 7' }, /line 11: face 2: "x" is no corner; write numbers such as 7/],
    ['a huge index', { 11: 'f 5 6 99999999999999999999 7' }, /line 11: face 2: "9+" is no corner/],
    ['an edge twice', { 10: 'f 1 2 4 3 1 2 4 3' }, /line 10: face 1 repeats the edge that begins at \(0, 0, 0\)/],
    ['an unknown statement', { 11: 'face 5 6 8 7' }, /line 11: "face" is no statement of an OBJ file/],
    ['a free-form surface', { 11: 'surf 0 1 0 1 1 2 3 4' }, /line 11: "surf" is a free-form/],
    ['no faces', { 10: null, 11: null, 12: null, 13: null, 14: null, 15: null }, /: there are no faces in it; export/],
    [
      'flat',
      { 6: 'v 0 0 0', 7: 'v 1 0 0', 8: 'v 0 1 0', 9: 'v 1 1 0' },
      /all corners lie in one plane, within 0: .* no volume/,
    ],
    [
      'a line',
      { 4: 'v 2 0 0', 5: 'v 3 0 0', 6: 'v 4 0 0', 7: 'v 5 0 0', 8: 'v 6 0 0', 9: 'v 7 0 0' },
      /no face has any area/,
    ],
    [
      'a wall in the open',
      { 15: ['f 2 4 8 6', 'v 2 0 0', 'v 2 1 0', 'f 2 9 10 4'] },
      /line 18: not closed: .* has this face only\. There are 3 such edges/,
    ],
  ]
  test.each(cases)('%s', (_, changes, said) => {
    expect(refusal(cubeWith(changes), 'some/cube.obj').message).toMatch(said)
  })

  test('one point, no size', () => {
    const point = bytesOf('v 1 2 3\nv 1 2 3\nv 1 2 3\nf 1 2 3\n')
    expect(refusal(point, 'a.obj').message).toMatch(/all corners lie at one point/)
  })

  test('too many faces, corners and vertices are refused where they become too many', () => {
    const fan = `v 0 0 0\nv 1 0 0\nv 0 1 0\n${'f 1 2 3\n'.repeat(many)}`
    expect(refusal(bytesOf(fan), 'a.obj').message).toMatch(/line 20004: more than 20000 faces; reduce/)
    const ring = `v 0 0 0\nf ${'1 '.repeat(1001)}\n`
    expect(refusal(bytesOf(ring), 'a.obj').message).toMatch(/line 2: a face with 1001 corners, at most 1000/)
    const cloud = 'v 0 0 0\n'.repeat(400_001)
    expect(refusal(bytesOf(cloud), 'a.obj').message).toMatch(/line 400001: more than 400000 vertices/)
  })

  test('an endless line and an endless continuation', () => {
    expect(refusal(bytesOf(`v ${'1 '.repeat(200_000)}`), 'a.obj').message).toMatch(/line 1: a line of 400002 char/)
    expect(refusal(bytesOf(`v \\\n${'1 \\\n'.repeat(200_000)}`), 'a.obj').message).toMatch(/continued for too long/)
  })
})

describe('STL', () => {
  const cube = trianglesOf(buildSolid('cube'))
  const binary = writeBinaryStl(cube)
  const text = new TextDecoder().decode(writeTextStl(cube))
  const textWith = (line: number, change: string | null): Uint8Array => {
    const lines = text.split('\n')
    if (change === null) lines.splice(line - 1)
    else lines[line - 1] = change
    return bytesOf(lines.join('\n'))
  }
  const changed = (at: number, value: number, size = binary.length): Uint8Array => {
    const bytes = new Uint8Array(size)
    bytes.set(binary.subarray(0, size))
    if (at >= 0) new DataView(bytes.buffer).setFloat32(at, value, true)
    return bytes
  }
  const cases: [name: string, bytes: Uint8Array, said: RegExp][] = [
    [
      'truncated',
      changed(-1, 0, 400),
      /byte 80: 12 triangles are announced, which take 684 bytes, but the file has 400, the rest is missing/,
    ],
    ['cut in the header', changed(-1, 0, 50), /byte 50: the file ends inside the header of 84 bytes/],
    ['too long', changed(-1, 0, 700), /byte 80: 12 triangles .* 700, there is more than that/],
    ['not a number', changed(96, Number.NaN), /byte 96: triangle 1, corner 1: NaN is no usable coordinate/],
    ['infinite', changed(96 + 50 + 28, Number.POSITIVE_INFINITY), /byte 174: triangle 2, corner 3: Infinity/],
    [
      'one triangle missing',
      writeBinaryStl({ ...cube, faces: cube.faces.slice(1) }),
      /face \d+, byte \d+: not closed: .* There are 3 such edges/,
    ],
    [
      'text without end',
      textWith(30, null),
      /line 29: the file ends after 3 facets where "facet" or "endsolid" should follow|line \d+: the file ends after/,
    ],
    [
      'text with a fourth vertex',
      textWith(7, '  vertex 1 1 1'),
      /line 7: facet 1 has a fourth vertex; STL holds triangles only/,
    ],
    ['text with a bad word', textWith(4, 'vertx 0 0 0'), /line 4: facet 1: "vertex" should stand here, not "vertx"/],
    ['text with a bad number', textWith(4, 'vertex 0 0 1e400'), /line 4: facet 1, vertex 1: "1e400" is too large/],
    ['text that begins otherwise', textWith(1, 'body'), /line 1: "solid" should stand here, not "body"/],
  ]
  test.each(cases)('%s', (_, bytes, said) => {
    expect(refusal(bytes, 'cube.stl').message).toMatch(said)
  })

  test('a header that announces two billion triangles is refused at once', () => {
    const bytes = Uint8Array.from(binary)
    new DataView(bytes.buffer).setUint32(80, 2_000_000_000, true)
    expect(refusal(bytes, 'cube.stl').message).toMatch(/2000000000 triangles are announced/)
    const large = new Uint8Array(84 + 50 * many)
    new DataView(large.buffer).setUint32(80, many, true)
    expect(refusal(large, 'cube.stl').message).toMatch(/byte 80: more than 20000 faces/)
  })
})

describe('PLY', () => {
  const ascii = new TextDecoder().decode(writePly(box([0, 0, 0], [1, 1, 1]), { form: 'ascii' })).split('\n')
  const textWith = (line: number, change: string | null): Uint8Array =>
    bytesOf(ascii.flatMap((l, i) => (i + 1 === line ? (change === null ? [] : [change]) : [l])).join('\n'))
  const binary = writePly(box([0, 0, 0], [1, 1, 1]), { form: 'binary_little_endian', real: 'float' })
  const header = new TextDecoder('latin1').decode(binary).indexOf('end_header\n') + 11
  const patched = (at: number, byte: number): Uint8Array => {
    const bytes = Uint8Array.from(binary)
    bytes[header + at] = byte
    return bytes
  }
  const firstFace = 8 * 12
  const cases: [name: string, bytes: Uint8Array, said: RegExp][] = [
    ['no format', textWith(2, null), /line \d+: the header says no format/],
    ['an unknown format', textWith(2, 'format ebcdic 1.0'), /line 2: the format "ebcdic" is not known/],
    ['no end of header', bytesOf('ply\nformat ascii 1.0\n'), /line 3: the header does not end with "end_header"/],
    ['an unknown line', textWith(3, 'colours many'), /line 3: "colours" is no line of a PLY header/],
    ['a bad count', textWith(4, 'element vertex many'), /line 4: an element needs a name and a count/],
    ['an unknown type', textWith(5, 'property real x'), /line 5: a property needs a known type/],
    ['no z', textWith(7, null), /line 4: the vertices have no number "z"/],
    ['no faces', textWith(8, 'element edge 6'), /the header announces no element "face"/],
    ['faces as strips', textWith(8, 'element tristrips 6'), /stored as strips/],
    ['no list of corners', textWith(9, 'property int material'), /line 8: the faces have no list "vertex_indices"/],
    [
      'too many vertices announced',
      textWith(4, 'element vertex 300000'),
      /line 4: 300000 × "vertex" do not fit a file of/,
    ],
    ['a billion faces announced', textWith(8, 'element face 1000000000'), /line 8: more than 20000 faces/],
    [
      'one vertex too many announced',
      textWith(4, 'element vertex 9'),
      /line 19: vertex 9 has 5 numbers, 3 belong to it/,
    ],
    ['one face too few announced', textWith(8, 'element face 5'), /line 24: a line is left over/],
    ['one face too many announced', textWith(8, 'element face 7'), /the file ends before face 7/],
    [
      'a corner out of range',
      textWith(20, '4 4 5 8 6'),
      /line 20: face 2 uses vertex 8, but there are 8, counted from 0/,
    ],
    ['a negative corner', textWith(20, '4 4 5 -1 6'), /line 20: face 2 uses vertex -1/],
    ['a fraction for a corner', textWith(20, '4 4 5 6.5 6'), /line 20: face 2: "6.5" should be a whole number/],
    ['a count that is not true', textWith(20, '5 4 5 7 6'), /line 20: face 2 is missing a number/],
    ['a huge list', textWith(20, '100000000 4 5 7 6'), /line 20: a face with 100000000 corners/],
    ['a missing number', textWith(11, '0 0'), /line 11: vertex 1 is missing a number/],
    ['not a number', textWith(11, '0 nan 0'), /line 11: vertex 1: "nan" is not a finite number/],
    ['binary, truncated', binary.subarray(0, binary.length - 5), /byte \d+: the file ends inside face 6/],
    [
      'binary, most is missing',
      binary.subarray(0, header + 20),
      /line 4: 8 × "vertex" take at least 96 bytes, but only 20 follow/,
    ],
    ['binary, left over', new Uint8Array([...binary, 1, 2, 3]), /byte \d+: 3 bytes are left over/],
    ['binary, corner out of range', patched(firstFace + 1, 77), /byte \d+: face 1 uses vertex 77/],
    ['binary, two corners', patched(firstFace, 2), /byte \d+: face 1 has 2 corners/],
    ['binary, a list that runs out of the file', patched(firstFace, 255), /the file ends inside face 1/],
    [
      'binary, not a number',
      (() => {
        const bytes = Uint8Array.from(binary)
        new DataView(bytes.buffer).setFloat32(header + 4, Number.NaN, true)
        return bytes
      })(),
      /byte \d+: vertex 1: y is NaN/,
    ],
  ]
  test.each(cases)('%s', (_, bytes, said) => {
    expect(refusal(bytes, 'cube.ply').message).toMatch(said)
  })
})

describe('no model at all', () => {
  const cases: [name: string, file: string, bytes: Uint8Array, said: RegExp][] = [
    [
      'a PNG renamed',
      'a.obj',
      Uint8Array.from([0x89, 80, 78, 71, 13, 10, 26, 10, 0, 0, 0, 13]),
      /byte 0: this is a PNG picture; export the model as OBJ, STL or PLY/,
    ],
    ['a JPEG renamed', 'a.stl', Uint8Array.from([0xff, 0xd8, 0xff, 0xe0, 0, 16]), /this is a JPEG picture/],
    ['an archive', 'a.ply', Uint8Array.from([80, 75, 3, 4, 20, 0, 0, 0]), /this is a packed archive/],
    ['binary', 'a.obj', Uint8Array.from([1, 2, 3, 0, 0, 200, 9]), /this is binary and no model/],
    ['a page', 'a.obj', bytesOf('<!doctype html><p>404'), /this is a page or scene in XML/],
    ['UTF-16', 'a.obj', Uint8Array.from([0xff, 0xfe, 118, 0, 32, 0]), /in UTF-16; save it as plain text/],
    ['prose', 'a.txt', bytesOf('Dear friend, here is my model.'), /line 1: neither the text nor the ending "txt"/],
    ['prose as OBJ', 'a.obj', bytesOf('Dear friend, here is my model.'), /line 1: "Dear" is no statement/],
    ['empty', 'a.obj', new Uint8Array(0), /the file is empty/],
  ]
  test.each(cases)('%s', (_, file, bytes, said) => {
    expect(refusal(bytes, file).message).toMatch(said)
  })

  test('the size is refused before anything is read', () => {
    expect(() => checkFileSize(2 ** 31, 'huge.stl')).toThrow(/huge\.stl: 2147 MB are too much, at most 64 MB/)
    expect(() => checkFileSize(greatestFileBytes, 'a.stl')).not.toThrow()
    expect(() => checkFileSize(Number.NaN, 'a.stl')).toThrow(InputError)
  })

  test('a file name cannot break the line', () => {
    const name = `a\nb\u2028${'c'.repeat(200)}.obj`
    try {
      readModel(bytesOf('f'), name)
    } catch (error) {
      expect((error as InputError).message).toMatch(/^a\?b\?c+…/)
      return
    }
    throw new Error('was accepted')
  })
})

describe('large models', () => {
  test('a soup of 2,000 unconnected triangles is named open', () => {
    const { vertices, faces } = bumpy(32, 32, 7)
    const soup = {
      vertices: faces.flatMap((cycle, i) => cycle.map((v) => vertices[v]!.map((x) => x + i / 50) as never)),
      faces: faces.map((_, i) => [3 * i, 3 * i + 1, 3 * i + 2]),
    }
    expect(refusal(writeObj(soup), 'soup.obj').message).toMatch(/not closed: .* There are \d{4} such edges/)
  })

  test('progress may stop the reading', () => {
    const bytes = writeTextStl(bumpy(40, 40, 3))
    let calls = 0
    readModel(bytes, 'a.stl', () => calls++)
    expect(calls).toBeGreaterThan(20)
    const stop = new Error('stop')
    for (const at of [1, 5, 20, calls - 1]) {
      let left = at
      const progress = (): void => {
        if (left-- === 0) throw stop
      }
      expect(() => readModel(bytes, 'a.stl', progress)).toThrow(stop)
    }
  })
})

/** What is repaired, joined or accepted, and that it is said. */
import { describe, expect, test } from 'vitest'
import { InputError } from '../../src/errors'
import { seededRandom } from '../../src/geometry/random'
import { type Model, placed, readModel, unitHeightMm } from '../../src/models'
import { planSolid, usualChoices } from '../../src/plan'
import { computeSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
import { both, box, cubeWith } from './shapes'
import { bytesOf, type Mesh, meshOf, trianglesOf, writeBinaryStl, writeObj, writePly, writeTextStl } from './write'

const cube = box([0, 0, 0], [1, 1, 1])

/** Area and volume of the skin in file units. */
const measure = (model: Model): { panels: number; area: number; volume: number } => {
  const skin = computeSkin(model.solid)
  return {
    panels: skin.panels.length,
    area: skin.area * model.farthest ** 2,
    volume: skin.volume * model.farthest ** 3,
  }
}
const expectUnitCube = (model: Model): void => {
  const { panels, area, volume } = measure(model)
  expect(panels).toBe(6)
  expect(area).toBeCloseTo(6, 4)
  expect(volume).toBeCloseTo(1, 4)
}

describe('read as it stands, nothing to say', () => {
  const cases: [name: string, file: string, bytes: Uint8Array][] = [
    [
      'comments, CR LF, blank lines, indents',
      'a.obj',
      bytesOf(
        new TextDecoder()
          .decode(cubeWith({ 1: '#', 2: '  v 0 0 0 # first', 3: ['', '\tv  1\t0 0 '] }))
          .replaceAll('\n', '\r\n'),
      ),
    ],
    ['lone carriage returns', 'a.obj', bytesOf(new TextDecoder().decode(cubeWith({})).replaceAll('\n', '\r'))],
    ['continued lines', 'a.obj', cubeWith({ 10: ['f 1 \\', '2 4\\', ' 3'], 3: ['v 1 \\', '0 0'] })],
    [
      'texture coordinates and normals',
      'a.obj',
      cubeWith({
        1: ['vt 0 0', 'vn 0 0 1', 'o x', 'g y', 's off', 'mtllib z.mtl'],
        10: 'f 1/1/1 2/1/1 4/1 3//1',
        11: 'f 5// 6/1/ 8 7',
      }),
    ],
    ['indices counted back', 'a.obj', cubeWith({ 15: 'f -7 -5 -1 -3' })],
    ['faces before their vertices', 'a.obj', cubeWith({ 1: 'f 1 2 4 3', 10: null })],
    ['colours and weights behind vertices', 'a.obj', cubeWith({ 2: 'v 0 0 0 1', 3: 'v 1 0 0 0.5 0.5 0.5' })],
    ['an unknown ending', 'model.txt', cubeWith({})],
    ['a wrong ending', 'model.stl', cubeWith({})],
    [
      'two solids in one STL, on one line, in capitals',
      'a.stl',
      (() => {
        const parts = cube.faces.map((_, i) =>
          new TextDecoder().decode(
            writeTextStl({
              ...cube,
              faces: [
                [cube.faces[i]![0]!, cube.faces[i]![1]!, cube.faces[i]![2]!],
                [cube.faces[i]![0]!, cube.faces[i]![2]!, cube.faces[i]![3]!],
              ],
            }),
          ),
        )
        return bytesOf(
          parts
            .map((p) => p.toUpperCase().replace('SOLID MODEL\n', 'solid a name facet\n').replaceAll('\n    ', ' '))
            .join('\n'),
        )
      })(),
    ],
    [
      'PLY with CR LF header',
      'a.ply',
      bytesOf(new TextDecoder().decode(writePly(cube, { form: 'ascii' })).replaceAll('\n', '\r\n')),
    ],
    [
      'turned inside out',
      'a.obj',
      writeObj({ ...cube, faces: cube.faces.map((c, i) => (i % 2 ? [...c].reverse() : c)) }),
    ],
    [
      'triangles',
      'a.stl',
      writeBinaryStl({
        ...cube,
        faces: cube.faces.flatMap(([a, b, c, d]) => [
          [a!, b!, c!],
          [a!, c!, d!],
        ]),
      }),
    ],
  ]
  test.each(cases)('%s', (_, file, bytes) => {
    const model = readModel(bytes, file)
    expect(model.notes).toEqual([])
    expectUnitCube(model)
  })
})

describe('repaired, and said', () => {
  const separate: Mesh = {
    vertices: cube.faces.flatMap((c) => c.map((v) => cube.vertices[v]!)),
    faces: cube.faces.map((_, i) => [0, 1, 2, 3].map((k) => 4 * i + k)),
  }
  const random = seededRandom(11)
  const shaken: Mesh = {
    ...separate,
    vertices: separate.vertices.map((p) => p.map((x) => x + 2e-6 * (random.next() - 0.5)) as never),
  }
  const cases: [name: string, bytes: Uint8Array, said: readonly RegExp[]][] = [
    ['equal vertices', writeObj(separate), [/^16 vertices at the place of another one were joined with it\.$/]],
    ['nearly equal vertices', writeObj(shaken), [/^16 corners less than .* from another one were joined with it\.$/]],
    [
      'unused vertices',
      cubeWith({
        1: ['v 9 9 9', 'v 8 8 8'],
        10: 'f 3 4 6 5',
        11: 'f 7 8 10 9',
        12: 'f 3 4 8 7',
        13: 'f 5 6 10 9',
        14: 'f 3 5 9 7',
        15: 'f 4 6 10 8',
      }),
      [/^2 vertices that no face uses were left out\.$/],
    ],
    ['a corner named twice running', cubeWith({ 10: 'f 1 2 2 4 3' }), [/^1 edge without length was dropped\.$/]],
    [
      'the first corner named again at the end',
      cubeWith({ 10: 'f 1 2 4 3 1' }),
      [/^1 edge without length was dropped\.$/],
    ],
    ['a spike', cubeWith({ 10: ['v 2 2 0', 'f 1 2 4 9 4 3'] }), [/^2 edges without length were dropped\.$/]],
    [
      'a face without area',
      cubeWith({
        1: ['v 0.5 0 0'],
        10: ['f 2 1 3', 'f 2 1 3 5 4'],
        11: 'f 6 7 9 8',
        12: 'f 2 3 7 6',
        13: 'f 4 5 9 8',
        14: 'f 2 4 8 6',
        15: 'f 3 5 9 7',
      }),
      [/^1 face without area was dropped\.$/],
    ],
    [
      'one face given twice',
      cubeWith({ 10: ['f 1 2 4 3', 'f 4 2 1 3'] }),
      [/^1 face that repeats another one was dropped\.$/],
    ],
    [
      'every face given twice',
      writeObj({ ...cube, faces: [...cube.faces, ...cube.faces.map((c) => [...c].reverse())] }),
      [/^6 faces that repeat another one were dropped\.$/],
    ],
    ['lines and points', cubeWith({ 1: ['l 1 2', 'p 3', 'l 1 2 3'] }), [/^3 lines or points were left out\.$/]],
  ]
  test.each(cases)('%s', (_, bytes, said) => {
    const model = readModel(bytes, 'a.obj')
    expect(model.notes).toHaveLength(said.length)
    said.forEach((pattern, i) => {
      expect(model.notes[i]).toMatch(pattern)
    })
    expectUnitCube(model)
  })

  test('a wall between two parts, given by both, goes', () => {
    const far = box([1, 0, 0], [2, 1, 1])
    const model = readModel(writeObj(both(cube, far)), 'a.obj')
    expect(model.notes).toEqual([
      '4 vertices at the place of another one were joined with it.',
      '1 inner wall, given by the parts on both sides of it, was taken out.',
    ])
    expect(model.solid.faces).toHaveLength(10)
    expect(measure(model)).toMatchObject({ panels: 6 })
    expect(measure(model).volume).toBeCloseTo(2, 6)
  })

  test('a wall between two parts, given once, may stay', () => {
    const far = box([1, 0, 0], [2, 1, 1])
    const mesh = both(cube, { ...far, faces: far.faces.filter((_, i) => i !== 4) })
    const model = readModel(writeObj(mesh), 'a.obj')
    expect(model.notes[1]).toMatch(/^4 stretches of edge with an odd number of faces were accepted/)
    expect(measure(model)).toMatchObject({ panels: 6 })
    expect(measure(model).area).toBeCloseTo(10, 6)
  })

  test('a house without a floor on a table', () => {
    const house = box([0.25, 0.25, 1], [0.5, 0.5, 1.5])
    const model = readModel(writeObj(both(cube, { ...house, faces: house.faces.slice(1) })), 'a.obj')
    expect(model.notes).toEqual([
      '4 stretches of edge with an odd number of faces were accepted, since other faces close the model there.',
    ])
    const { panels, area, volume } = measure(model)
    expect(panels).toBe(11)
    expect(area).toBeCloseTo(6 + 4 * 0.25 * 0.5, 6)
    expect(volume).toBeCloseTo(1 + 0.25 * 0.25 * 0.5, 6)
  })

  test('a sliver whose corner lies on its long edge is dropped, and the corner is no gap', () => {
    // The top is cut at (0.5, 0, 1) by its faces, the front is not.
    const v = [...cube.vertices, [0.5, 0, 1] as const]
    const top = [
      [4, 8, 6],
      [8, 7, 6],
      [8, 5, 7],
    ]
    const mesh = { vertices: v, faces: [cube.faces[0]!, ...cube.faces.slice(2), ...top] }
    expect(readModel(writeObj(mesh), 'a.obj').notes).toEqual([])
    expectUnitCube(readModel(writeObj(mesh), 'a.obj'))
    const withSliver = readModel(writeObj({ ...mesh, faces: [...mesh.faces, [4, 5, 8]] }), 'a.obj')
    expect(withSliver.notes).toEqual(['1 face without area was dropped.'])
    expectUnitCube(withSliver)
  })
})

describe('flat enough', () => {
  const lifted = (by: number): Uint8Array => {
    const mesh = box([0, 0, 0], [10, 10, 10])
    return writeObj({ ...mesh, vertices: mesh.vertices.map((p, i) => (i === 7 ? [10, 10, 10 + by] : p)) }, (x) =>
      x.toFixed(9),
    )
  }
  test('corners off by less than 1e-4 of the radius are taken as flat, with the precision that follows', () => {
    const model = readModel(lifted(5e-4), 'a.obj')
    expect(model.notes).toEqual([expect.stringMatching(/^Faces up to 0\.000125 off their plane were taken as flat\.$/)])
    expect(model.solid.precision! * model.farthest).toBeGreaterThan(1.2e-4)
    expect(measure(model).panels).toBe(6)
  })
  test('more is an error', () => {
    expect(() => readModel(lifted(2e-2), 'a.obj')).toThrow(/not flat/)
  })
})

describe('materials, components, holes', () => {
  test('OBJ materials become kinds with names that can be printed', () => {
    const names = ['red', 'red', '青', 'mixed', null, 'red']
    const { solid } = readModel(
      writeObj(cube, String, (i) => names[i]!),
      'a.obj',
    )
    // usemtl holds on: the fifth face is of the last material named.
    expect(solid.kinds.map(({ name, n, d, count }) => [name, n, d, count])).toEqual([
      ['red', 4, 1, 3],
      ['?', 4, 1, 1],
      ['mixed 2', 4, 1, 2],
    ])
    expect(solid.kinds.map((k) => k.id)).toEqual([0, 1, 2])
  })

  test('PLY colours become kinds; too many are left out of account', () => {
    const two = writePly(cube, { form: 'binary_big_endian', colour: (i) => (i < 2 ? [255, 0, 0] : [0, 16, 255]) })
    expect(readModel(two, 'a.ply').solid.kinds.map((k) => k.name)).toEqual(['#ff0000', '#0010ff'])
    const fine: Mesh = {
      ...cube,
      faces: cube.faces.flatMap(([a, b, c, d]) => [
        [a!, b!, c!],
        [a!, c!, d!],
      ]),
    }
    const parts = [0, 1, 2].map((i) => ({
      ...fine,
      vertices: fine.vertices.map(([x, y, z]) => [x + 2 * i, y, z] as const),
    }))
    const mesh = both(both(parts[0]!, parts[1]!), parts[2]!)
    const model = readModel(writePly(mesh, { form: 'ascii', colour: (i) => [i, i, i] }), 'a.ply')
    expect(model.solid.kinds.map((k) => [k.name, k.n, k.count])).toEqual([['card', 3, 36]])
    expect(model.notes).toEqual([expect.stringMatching(/^36 materials or colours are more than 32/)])
    expect(model.solid.components).toEqual(Array.from({ length: 36 }, (_, i) => Math.floor(i / 12)))
  })

  test('mixed corner counts have none in common', () => {
    const { solid } = readModel(writeObj(meshOf(buildSolid('cuboctahedron'))), 'Mein schönes  Modell.OBJ')
    expect(solid.kinds).toEqual([{ id: 0, name: 'card', n: 0, d: 1, count: 14 }])
    expect(solid.id).toBe('own-mein-schones-modell')
    expect(solid.name).toBe('Mein schönes  Modell')
  })

  test('a panel with a hole, by bridge edges', () => {
    // A square tube: two rings of eight corners, top and bottom with a bridge from outer to inner corner.
    const level = (z: number): [number, number, number][] => [
      [0, 0, z],
      [3, 0, z],
      [3, 3, z],
      [0, 3, z],
      [1, 1, z],
      [2, 1, z],
      [2, 2, z],
      [1, 2, z],
    ]
    const lid = (k: number): number[] => [0, 1, 2, 3, 0, 4, 7, 6, 5, 4].map((v) => v + k)
    const sides = [0, 1, 2, 3].flatMap((i) => {
      const j = (i + 1) % 4
      return [
        [i, j, j + 8, i + 8],
        [4 + i, 4 + j, 12 + j, 12 + i],
      ]
    })
    const model = readModel(
      writeObj({ vertices: [...level(0), ...level(1)], faces: [lid(0), lid(8), ...sides] }),
      'a.obj',
    )
    expect(model.notes).toEqual([])
    const { panels, area, volume } = measure(model)
    expect(panels).toBe(10)
    expect(area).toBeCloseTo(2 * 8 + 12 + 4, 9)
    expect(volume).toBeCloseTo(8, 9)
    const plan = planSolid(model.solid, { ...usualChoices, solid: model.solid.id, heightMm: 150 })
    expect(plan.docket.checks.filter((c) => !c.ok)).toEqual([])
  })
})

describe('walls that close off nothing', () => {
  const frame = [
    box([-2, -2, 0], [2, -1, 1]),
    box([-2, 1, 0], [2, 2, 1]),
    box([-2, -1, 0], [-1, 1, 1]),
    box([1, -1, 0], [2, 1, 1]),
  ].reduce(both)
  const pane: Mesh = {
    vertices: [
      [-1, -1, 0.5],
      [1, -1, 0.5],
      [1, 1, 0.5],
      [-1, 1, 0.5],
    ],
    faces: [[0, 1, 2, 3]],
  }

  test('a pane in a frame closes the model, but is refused before it becomes a plan, with its line', () => {
    const model = readModel(writeObj(both(frame, pane)), 'frame.obj')
    const plan = (): unknown => planSolid(model.solid, { ...usualChoices, solid: model.solid.id, heightMm: 150 })
    expect(plan).toThrow(InputError)
    try {
      plan()
    } catch (error) {
      expect((placed(error, model, 'x/frame.obj') as Error).message).toMatch(
        /^frame\.obj, line 62: Face \d+ is a loose wall/,
      )
    }
    expect(placed(new InputError('Too high.', 'heightMm'), model, 'frame.obj')).toMatchObject({ message: 'Too high.' })
  })

  test('without the pane it is planned', () => {
    const model = readModel(writeObj(frame), 'frame.obj')
    const plan = planSolid(model.solid, { ...usualChoices, solid: model.solid.id, heightMm: 150 })
    expect(plan.docket.checks.filter((c) => !c.ok)).toEqual([])
  })
})

test('units', () => {
  const { farthest } = readModel(writeObj(cube), 'a.obj')
  expect(unitHeightMm(farthest, 'in')).toBeCloseTo(25.4 * Math.sqrt(3), 12)
  expect(unitHeightMm(farthest, 'm')).toBeCloseTo(1000 * Math.sqrt(3), 9)
  const star = readModel(writeBinaryStl(trianglesOf(buildSolid('great-icosahedron'))), 'a.stl')
  expect(star.farthest).toBeCloseTo(0.5877852522924731, 6)
})

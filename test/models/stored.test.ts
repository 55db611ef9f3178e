/** Models that come back from a store or a saved file, where anything may have happened to them. */
import { describe, expect, test } from 'vitest'
import type { Vec3 } from '../../src/geometry/vec3'
import { readModel } from '../../src/models'
import { checkedModel, modelFacts, modelWithId } from '../../src/models/stored'
import type { Solid } from '../../src/solids'
import { cubeLines } from './shapes'

const bytes = new TextEncoder().encode(cubeLines.join('\n'))
const cube = modelWithId(readModel(bytes, 'Box 1.obj').solid)
/** As it comes out of a file. */
const stored = (): Record<string, unknown> => JSON.parse(JSON.stringify(cube)) as Record<string, unknown>

test('what was kept comes back as it was', () => {
  expect(checkedModel(stored())).toEqual(cube)
  expect(modelFacts(cube)).toMatchObject({
    id: cube.id,
    family: 'own',
    vertices: 8,
    edges: 12,
    faces: 6,
    components: 1,
  })
})

test('minus zero, which a saved file turns into zero, is the same shape', () => {
  const at = (height: number): Solid => ({ ...cube, vertices: cube.vertices.map(([x, y]): Vec3 => [x, y, height]) })
  expect(modelWithId(at(-0)).id).toBe(modelWithId(at(0)).id)
})

test('the id belongs to name and shape', () => {
  expect(modelWithId(readModel(bytes, 'Box 1.obj').solid).id).toBe(cube.id)
  expect(modelWithId(readModel(bytes, 'Box 2.obj').solid).id).not.toBe(cube.id)
  const longer = cubeLines.map((line) =>
    line.replace(/^(v .*) (\S+)$/, (_, xy: string, z: string) => `${xy} ${2 * Number(z)}`),
  )
  expect(modelWithId(readModel(new TextEncoder().encode(longer.join('\n')), 'Box 1.obj').solid).id).not.toBe(cube.id)
})

describe('damage is refused with what it is', () => {
  type Loose = Record<string, unknown> & { faces: { cycle: unknown[] }[]; vertices: unknown[][] }
  const damage: Readonly<Record<string, [(model: Loose) => void, RegExp]>> = {
    'no name': [(m) => void (m.name = ''), /no name/],
    'an id of the catalogue': [(m) => void (m.id = 'cube'), /no name/],
    'another family': [(m) => void (m.family = 'uniform'), /not marked/],
    'a coarse precision': [(m) => void (m.precision = 0.5), /not marked/],
    'no vertices': [(m) => void (m.vertices = []), /vertices are damaged/],
    'a vertex that is no number': [(m) => void (m.vertices[3]![1] = null), /vertices are damaged/],
    'kinds without names': [(m) => void (m.kinds = [{}]), /face kinds/],
    'few faces': [(m) => void (m.faces.length = 3), /4 to 20000 faces/],
    'more faces than can be': [(m) => void (m.faces = Array(20_001).fill(m.faces[0])), /4 to 20000 faces/],
    'a corner that is not there': [(m) => void (m.faces[4]!.cycle[0] = 8), /face 5/],
    'a face of two corners': [(m) => void (m.faces[1]!.cycle.length = 2), /face 2/],
    'no rotations': [(m) => void (m.rotations = []), /rotations/],
    'components of other faces': [(m) => void (m.components = [0]), /components/],
    'another size': [(m) => void (m.vertices = m.vertices.map((p) => p.map((x) => 2 * Number(x)))), /size/],
    'a corner moved': [(m) => void (m.vertices[0]![0] = Number(m.vertices[0]![0]) * 0.9), /./],
    'another shape under the same name': [
      (m) => void (m.vertices = m.vertices.map(([x, y, z]) => [y, z, x])),
      /shape has been changed/,
    ],
    'a face left out': [(m) => void m.faces.pop(), /./],
  }
  test.each(Object.entries(damage))('%s', (_, [break_, why]) => {
    const model = stored() as Loose
    break_(model)
    const check = (): Solid => checkedModel(model)
    expect(check).toThrow(/^The model kept with this build cannot be used: .*Open its file again\.$/)
    expect(check).toThrow(why)
  })
  test.each([null, 5, 'model', [], undefined])('%j', (value) => {
    expect(() => checkedModel(value)).toThrow(/cannot be used/)
  })
})

/** Solids of the catalogue written in every format and read back: the same solid, the same skin, the same plan. */
import { describe, expect, test } from 'vitest'
import { readModel } from '../../src/models'
import { planSolid, usualChoices } from '../../src/plan'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily, listSolids } from '../../src/solids'
import type { Solid } from '../../src/solids/types'
import { type Mesh, meshOf, trianglesOf, writeBinaryStl, writeObj, writePly, writeTextStl } from './write'

const formats: readonly (readonly [name: string, ending: string, write: (solid: Solid) => Uint8Array])[] = [
  ['OBJ, all digits', 'obj', (s) => writeObj(meshOf(s))],
  ['OBJ, 7 decimals', 'obj', (s) => writeObj(meshOf(s), (x) => x.toFixed(7))],
  ['OBJ of triangles', 'obj', (s) => writeObj(trianglesOf(s))],
  ['STL text, 7 digits', 'stl', (s) => writeTextStl(trianglesOf(s), (x) => x.toExponential(6))],
  ['STL binary', 'stl', (s) => writeBinaryStl(trianglesOf(s), 'solid by its header only')],
  ['PLY text', 'ply', (s) => writePly(meshOf(s), { form: 'ascii', extras: true })],
  ['PLY little-endian', 'ply', (s) => writePly(meshOf(s), { form: 'binary_little_endian', real: 'float' })],
  ['PLY big-endian', 'ply', (s) => writePly(meshOf(s), { form: 'binary_big_endian', extras: true })],
]

// Platonic, star, hemi (faces through the centre), overlapping star and polygon, snub: all with stars of their own.
const withSkin = [
  'cube',
  'tetrahemihexahedron',
  'octahemioctahedron',
  'small-stellated-dodecahedron',
  'great-dodecahedron',
  'great-icosahedron',
  'dodecadodecahedron',
  'stellated-truncated-hexahedron',
  'great-cubicuboctahedron',
]

describe.each(withSkin)('%s', (id) => {
  const solid = buildSolid(id)
  const built = computeSkin(solid)
  test.each(formats)('%s', (_, ending, write) => {
    const model = readModel(write(solid), `${id}.${ending}`)
    const read = computeSkin(model.solid)
    expect(read.panels).toHaveLength(built.panels.length)
    expect((read.area * model.farthest ** 2) / built.area).toBeCloseTo(1, 6)
    expect((read.volume * model.farthest ** 3) / built.volume).toBeCloseTo(1, 5)
    expect(read.bodies).toBe(built.bodies)
    expect(read.contacts).toHaveLength(built.contacts.length)
  })
})

test.each(formats)('all 75 as %s are read, with the published circumradius', (_, ending, write) => {
  for (const { id, circumradius, faces } of listFamily('uniform')) {
    const solid = buildSolid(id)
    const { solid: read, farthest } = readModel(write(solid), `${id}.${ending}`)
    expect(farthest / circumradius!).toBeCloseTo(1, 6)
    expect(read.family).toBe('own')
    expect(read.id).toBe(`own-${id}`)
    expect(read.name).toBe(id)
    // Corners of stars that the triangles add may coincide; the faces of the solid may not.
    if (!/triangles|STL/.test(_)) {
      expect(read.faces).toHaveLength(faces)
      expect(read.vertices).toHaveLength(solid.vertices.length)
    }
    expect(Math.max(...read.vertices.map((p) => Math.hypot(...p)))).toBeCloseTo(1, 12)
  }
})

test('all rotations are found again where every digit is written, and one per face orbit', () => {
  for (const id of ['cube', 'snub-cube', 'great-icosahedron', 'dodecadodecahedron']) {
    const solid = buildSolid(id)
    const { solid: read } = readModel(writeObj(meshOf(solid)), 'a.obj')
    expect(read.rotations).toHaveLength(solid.rotations.length)
    // All faces are of one kind of card, so orbits may not be mixed up between pentagons and pentagrams.
    for (const f of read.faces)
      for (const g of read.faces) if (f.orbit === g.orbit) expect(g.cycle).toHaveLength(f.cycle.length)
  }
})

test('every family: the centre of symmetry is found, and with it all rotations', () => {
  for (const { id, family } of listSolids()) {
    if (family === 'uniform') continue
    const solid = buildSolid(id)
    const { solid: read, farthest, notes } = readModel(writeObj(meshOf(solid)), `${id}.obj`)
    expect(farthest / Math.max(...solid.vertices.map((p) => Math.hypot(...p))), id).toBeCloseTo(1, 9)
    expect(read.rotations.length, id).toBe(solid.rotations.length)
    expect(notes, id).toEqual([])
  }
})

test('precision follows the digits, and single precision is recognised in a text of many digits', () => {
  const solid = buildSolid('icosahedron')
  const precisionWith = (show: (x: number) => string): number =>
    readModel(writeObj(meshOf(solid), show), 'a.obj').solid.precision!
  expect(precisionWith(String)).toBeLessThan(1e-11)
  const six = precisionWith((x) => x.toFixed(6))
  expect(six).toBeGreaterThan(4e-7)
  expect(six).toBeLessThan(3e-6)
  const single = precisionWith((x) => String(Math.fround(x)))
  expect(single).toBeGreaterThan(3e-8)
  expect(single).toBeLessThan(3e-7)
})

const shifted = (mesh: Mesh, by: number, k: number): Mesh => ({
  ...mesh,
  vertices: mesh.vertices.map(([x, y, z]) => [k * x + by, k * y - by, k * z + by / 2]),
})

test.each([
  [1000, 1],
  [-3, 1e-3],
  [0, 1e12],
  [0, 1e-12],
])('moved by %d and scaled by %d it is the same solid', (by, k) => {
  const solid = buildSolid('small-stellated-dodecahedron')
  const { solid: read, farthest } = readModel(writeObj(shifted(meshOf(solid), by, k)), 'a.obj')
  const home = readModel(writeObj(meshOf(solid)), 'a.obj')
  expect(farthest / home.farthest / k).toBeCloseTo(1, 9)
  read.vertices.forEach((p, i) => {
    p.forEach((x, axis) => {
      expect(x).toBeCloseTo(home.solid.vertices[i]![axis]!, 9)
    })
  })
})

test('a plan of a model read from single precision keeps all its promises and equals that of the built solid', () => {
  const solid = buildSolid('small-stellated-dodecahedron')
  const { solid: read } = readModel(writeBinaryStl(trianglesOf(solid)), 'stars.stl')
  const choices = { ...usualChoices, solid: read.id, heightMm: 150 }
  const plan = planSolid(read, choices)
  expect(plan.docket.checks.filter((c) => !c.ok)).toEqual([])
  expect(plan.docket.panels).toBe(60)
  const area = (p: typeof plan): number => p.panels.reduce((sum, panel) => sum + panel.areaMm2, 0)
  const usual = planSolid(solid, choices)
  expect(area(plan) / area(usual)).toBeCloseTo(1, 6)
  expect(plan.model).toMatchObject({ id: 'own-stars', name: 'stars', heightMm: 150 })
})

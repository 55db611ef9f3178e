/** Builders' models after they are read: as they are kept, looked over when they come back, and told of. */
import { InputError } from '../errors'
import { distance, norm } from '../geometry/vec3'
import { validateSolid } from '../solids'
import { shapeHash } from '../solids/shape-hash'
import type { Solid, SolidFacts } from '../solids/types'
import { greatestFaceCount } from './file'

/** The solid with its shape in its id: two files of one name are two models, one file read twice is one. */
export const modelWithId = (solid: Solid): Solid => ({ ...solid, id: `${solid.id}-${shapeHash(solid).toString(36)}` })

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null
const isNumber = (value: unknown): value is number => typeof value === 'number' && Number.isFinite(value)
const isTriple = (value: unknown): boolean => Array.isArray(value) && value.length === 3 && value.every(isNumber)

/**
 * A model that comes from a store or a saved file, where anything may have happened to it.
 * @throws InputError that says what is wrong with it
 */
export const checkedModel = (value: unknown): Solid => {
  const refuse = (why: string): never => {
    throw new InputError(`The model kept with this build cannot be used: ${why}. Open its file again.`, 'model')
  }
  if (!isRecord(value)) return refuse('it is missing')
  const { id, name, hand, vertices, faces, kinds, rotations, family, precision, components } = value
  if (typeof id !== 'string' || !/^own(-[a-z0-9]+)+$/.test(id) || typeof name !== 'string' || name === '')
    return refuse('it has no name')
  if (hand !== 'none' || family !== 'own' || !isNumber(precision) || precision <= 0 || precision > 1e-2)
    return refuse('it is not marked as a model from a file')
  if (!Array.isArray(vertices) || vertices.length < 4 || !vertices.every(isTriple))
    return refuse('its vertices are damaged')
  if (!Array.isArray(kinds) || kinds.length === 0 || !kinds.every((k) => isRecord(k) && typeof k.name === 'string'))
    return refuse('its face kinds are damaged')
  if (!Array.isArray(faces) || faces.length < 4 || faces.length > greatestFaceCount)
    return refuse(`it must have 4 to ${greatestFaceCount} faces`)
  for (const [i, face] of faces.entries()) {
    const sound =
      isRecord(face) &&
      Number.isInteger(face.kind) &&
      kinds[face.kind as number] !== undefined &&
      Number.isInteger(face.orbit) &&
      Array.isArray(face.cycle) &&
      face.cycle.length >= 3 &&
      face.cycle.every((v) => Number.isInteger(v) && vertices[v as number] !== undefined)
    if (!sound) return refuse(`face ${i + 1} is damaged`)
  }
  const turns =
    Array.isArray(rotations) &&
    rotations.length > 0 &&
    rotations.every((m) => Array.isArray(m) && m.length === 3 && m.every(isTriple))
  if (!turns) return refuse('its rotations are damaged')
  if (
    components !== undefined &&
    !(Array.isArray(components) && components.length === faces.length && components.every(Number.isInteger))
  )
    return refuse('its components are damaged')
  const solid = value as unknown as Solid
  const reach = solid.vertices.reduce((most, p) => Math.max(most, norm(p)), 0)
  if (Math.abs(reach - 1) > 1e-6) return refuse(`its size is ${reach}, not 1`)
  if (modelWithId({ ...solid, id: id.replace(/-[a-z0-9]+$/, '') }).id !== id)
    return refuse('its shape has been changed')
  const failed = validateSolid(solid).find((c) => !c.ok)
  // A star that was cut into triangles has edges with four faces; the reader has let it pass, and so has the skin's check.
  if (failed && !/two faces/.test(failed.name)) return refuse(`${failed.name}: ${failed.detail}`)
  return solid
}

/** What the catalogue says of its own solids, as far as it can be said of a model; lengths with the reach as unit. */
export const modelFacts = (solid: Solid): SolidFacts => {
  const edges = new Set<string>()
  let longest = 0
  for (const { cycle } of solid.faces)
    cycle.forEach((a, i) => {
      const b = cycle[(i + 1) % cycle.length]!
      edges.add(a < b ? `${a} ${b}` : `${b} ${a}`)
      longest = Math.max(longest, distance(solid.vertices[a]!, solid.vertices[b]!))
    })
  const components = solid.components ? new Set(solid.components).size : 1
  return {
    id: solid.id,
    index: null,
    family: 'own',
    name: solid.name,
    wythoff: '',
    vertexConfiguration: '',
    vertices: solid.vertices.length,
    edges: edges.size,
    faces: solid.faces.length,
    facesByKind: solid.kinds,
    euler: null,
    density: null,
    chiral: false,
    orientable: true,
    symmetry: '',
    circumradius: 1,
    dual: null,
    components,
    notes: [],
    dihedralAngles: [],
  }
}

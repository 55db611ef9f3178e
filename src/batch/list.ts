/** The command `list`: the solids and their facts. */
import { listSolids } from '../solids'
import { textTable } from './text-table'

export const list = (json: boolean): string => {
  const facts = listSolids().map((f) => ({
    id: f.id,
    index: f.index,
    family: f.family,
    name: f.name,
    wythoff: f.wythoff,
    vertexConfiguration: f.vertexConfiguration,
    vertices: f.vertices,
    edges: f.edges,
    faces: f.faces,
    euler: f.euler,
    density: f.density,
    chiral: f.chiral,
    orientable: f.orientable,
    symmetry: f.symmetry,
    circumradius: f.circumradius,
    dual: f.dual,
    components: f.components,
    notes: f.notes,
  }))
  if (json) return JSON.stringify(facts, undefined, 1)
  const head = [
    'index',
    'family',
    'id',
    'Wythoff',
    'vertex',
    'V',
    'E',
    'F',
    'density',
    'chiral',
    'symmetry',
    'circumradius',
  ]
  const rows = facts.map((f) => [
    ...[f.index, f.family, f.id, f.wythoff, f.vertexConfiguration, f.vertices, f.edges, f.faces, f.density, f.chiral],
    ...[f.symmetry, f.circumradius],
  ])
  return textTable(head, rows)
}

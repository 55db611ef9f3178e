/** Every row and column of the published table of the 75 against what the construction gives. */
import { describe, expect, test } from 'vitest'
import { buildSolid, listFamily, validateSolid } from '../../src/solids'
import { canonicalConfiguration } from '../../src/solids/vertex-configuration'
import { table } from './table'

test('the table is whole', () => {
  expect(table.map((r) => r.index)).toEqual(Array.from({ length: 75 }, (_, i) => i + 1))
})

describe('the 75 against the published table', () => {
  for (const row of table)
    test(`${row.index} ${row.name}`, () => {
      const facts = listFamily('uniform')[row.index - 1]
      if (!facts) throw new Error('missing')
      expect({
        name: facts.name,
        id: facts.id,
        wythoff: facts.wythoff,
        vertices: facts.vertices,
        edges: facts.edges,
        faces: facts.faces,
        euler: facts.euler,
        density: facts.density,
        orientable: facts.orientable,
        chiral: facts.chiral,
        symmetry: facts.symmetry,
        byKind: new Map(facts.facesByKind.map((k) => [`${k.n}/${k.d}`, k.count])),
        configuration: canonicalConfiguration(facts.vertexConfiguration),
      }).toEqual({
        name: row.name,
        id: row.name.replaceAll(' ', '-'),
        wythoff: row.wythoff,
        vertices: row.vertices,
        edges: row.edges,
        faces: row.faces,
        euler: row.euler,
        density: row.density,
        orientable: row.orientable,
        chiral: row.chiral,
        symmetry: row.symmetry,
        byKind: row.byKind,
        configuration: canonicalConfiguration(row.configuration),
      })
      expect(validateSolid(buildSolid(facts.id)).filter((c) => !c.ok)).toEqual([])
    })
})

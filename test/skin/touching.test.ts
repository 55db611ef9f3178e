/** Where bodies touch at a point or along a line that no crease tells of: small arrangements worked out by hand. */
import { describe, expect, test } from 'vitest'
import type { Vec3 } from '../../src/geometry/vec3'
import { computeSkin, type Touch } from '../../src/skin'
import { buildSolid, listSolids } from '../../src/solids'
import { asSolid, box, type Part } from '../support/clusters'

/** A prism that stands on its edge from (from, 0.5, 1) to (to, 0.5, 1). */
const wedge = (from: number, to: number): Part => ({
  vertices: [from, to].flatMap((x): Vec3[] => [
    [x, 0.5, 1],
    [x, 0.3, 1.5],
    [x, 0.7, 1.5],
  ]),
  faces: [
    [0, 1, 2],
    [3, 5, 4],
    [0, 3, 4, 1],
    [0, 2, 5, 3],
    [1, 4, 5, 2],
  ],
})

/** A tetrahedron that stands on its tip. */
const spike = (tip: Vec3): Part => ({
  vertices: [
    tip,
    [tip[0] - 0.2, tip[1] - 0.2, tip[2] + 0.5],
    [tip[0] + 0.2, tip[1] - 0.2, tip[2] + 0.5],
    [tip[0], tip[1] + 0.3, tip[2] + 0.5],
  ],
  faces: [
    [0, 1, 2],
    [0, 2, 3],
    [0, 3, 1],
    [1, 3, 2],
  ],
})

const cube = box([0, 0, 0], [1, 1, 1])

/** Kind, bodies, ends to two digits. */
const told = (touches: readonly Touch[]): unknown[] =>
  touches.map((t) => [t.kind, t.bodies, ...t.ends.map((e) => e.map((x) => Math.round(100 * x) / 100))])

describe('touches', () => {
  const cases: [string, Part, number, unknown[]][] = [
    ['apart', box([2, 2, 2], [3, 3, 3]), 2, []],
    ['corner on corner', box([1, 1, 1], [2, 2, 2]), 2, [['point', [0, 1], [1, 1, 1]]]],
    ['edge on edge is a line contact', box([1, 1, 0], [2, 2, 1]), 1, []],
    ['tip on the middle of a face', spike([0.5, 0.5, 1]), 2, [['point', [0, 1], [0.5, 0.5, 1]]]],
    ['tip on the middle of an edge', spike([1, 0.5, 1]), 2, [['point', [0, 1], [1, 0.5, 1]]]],
    ['edge on the middle of a face', wedge(0.3, 0.7), 2, [['line', [0, 1], [0.3, 0.5, 1], [0.7, 0.5, 1]]]],
    ['edge that runs over the rim', wedge(0.3, 1.6), 2, [['line', [0, 1], [0.3, 0.5, 1], [1, 0.5, 1]]]],
  ]
  for (const [name, other, parts, expected] of cases)
    test(name, () => {
      const skin = computeSkin(asSolid([cube, other]))
      expect(skin.bodies).toBe(2)
      expect(skin.parts).toBe(parts)
      const touches = told(skin.touches).map((t) => JSON.stringify(t))
      const reversed = expected.map((t) => {
        const [kind, bodies, ...ends] = t as [string, number[], ...unknown[]]
        return JSON.stringify([kind, bodies, ...ends.reverse()])
      })
      const forward = expected.map((t) => JSON.stringify(t))
      expect(touches.length).toBe(expected.length)
      touches.forEach((t, i) => {
        expect([forward[i], reversed[i]]).toContain(t)
      })
    })

  test('the uniform polyhedra hang together along creases and line contacts alone', () => {
    for (const { id } of listSolids().filter((s) => s.index !== null)) {
      const skin = computeSkin(buildSolid(id))
      expect([id, skin.parts, skin.touches]).toEqual([id, 1, []])
    }
  })
})

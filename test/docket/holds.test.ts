/** What the docket says of bodies that touch: two cubes, placed by hand in the ways that two bodies can touch. */
import { describe, expect, test } from 'vitest'
import { partWords } from '../../src/docket/words'
import type { Vec3 } from '../../src/geometry/vec3'
import { makePlan, planSolid, usualChoices } from '../../src/plan'
import type { Solid } from '../../src/solids'
import { asSolid, box } from '../support/clusters'

const cubes = (...lows: Vec3[]): Solid => ({
  ...asSolid(lows.map((low) => box(low, [low[0] + 1, low[1] + 1, low[2] + 1]))),
  id: 'cubes',
})

const docketOf = (solid: Solid): ReturnType<typeof planSolid> =>
  planSolid(solid, { ...usualChoices, solid: 'cubes', heightMm: 100 })

describe('what holds the bodies', () => {
  test('corner on corner: two parts, a gusset', () => {
    const plan = docketOf(cubes([0, 0, 0], [1, 1, 1]))
    expect(plan.docket.contacts?.map((c) => [c.kind, c.held, c.bodies])).toEqual([['point', 'gusset', [0, 1]]])
    expect(plan.docket.parts?.map((p) => [p.joint, p.pieces])).toEqual([
      ['first', [0]],
      ['gusset', [1]],
    ])
    expect(partWords(plan)[1]).toContain('gusset')
    expect(plan.docket.checks.filter((c) => !c.ok)).toEqual([])
  })

  test('edge on edge: one part, the skin folds or is glued across', () => {
    const plan = docketOf(cubes([0, 0, 0], [1, 1, 0]))
    expect(plan.docket.contacts?.length).toBe(1)
    expect(['fold', 'seam']).toContain(plan.docket.contacts?.[0]?.held)
    expect(plan.docket.parts).toEqual([])
  })

  test('apart: two parts, nothing joins them', () => {
    const plan = docketOf(cubes([0, 0, 0], [3, 0, 0]))
    expect(plan.docket.contacts).toEqual([])
    expect(plan.docket.parts?.map((p) => p.joint)).toEqual(['first', 'apart'])
  })

  test('three in a chain of corners need two gussets, a ring of three no third', () => {
    const chain = docketOf(cubes([0, 0, 0], [1, 1, 1], [2, 2, 2]))
    expect(chain.docket.contacts?.map((c) => c.held)).toEqual(['gusset', 'gusset'])
    expect(chain.docket.parts?.map((p) => p.joint)).toEqual(['first', 'gusset', 'gusset'])
  })

  test('a hemipolyhedron: eight bodies, seven of twelve stretches carry the skin across', () => {
    const { docket } = makePlan({ ...usualChoices, solid: 'octahemioctahedron' })
    const held = docket.contacts?.map((c) => c.held) ?? []
    expect(held.length).toBe(12)
    expect(held.filter((h) => h === 'fold' || h === 'seam').length).toBe(7)
    expect(docket.parts).toEqual([])
  })
})

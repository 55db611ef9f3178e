/**
 * Closing up stretches that no one can cut. Outside measures: no point moves farther than the bound, the surface still
 * closes (validateSkin), the volume changes by no more than area × bound, no stretch below the bound is left.
 */
import { describe, expect, test } from 'vitest'
import { distance, norm } from '../../src/geometry/vec3'
import { makePlan, usualChoices } from '../../src/plan'
import { closeSlivers, computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
import { asSolid, part } from '../support/clusters'
import { seeded } from '../support/random'

const unitOf = (skin: Skin, heightMm: number): number => heightMm / (2 * Math.max(...skin.points.map(norm)))

/** Distance of every point of `a` to the nearest point of `b`, the greatest of them. */
const farthest = (a: Skin, b: Skin): number =>
  Math.max(...a.points.map((p) => Math.min(...b.points.map((q) => distance(p, q)))))

describe('closing up slivers', () => {
  // [id, height mm, stretches below 0.3 mm at that height]; the counts are those of creases in the whole skin.
  const cases = [
    ['inverted-snub-dodecadodecahedron', 250],
    ['great-retrosnub-icosidodecahedron', 250],
    ['great-inverted-snub-icosidodecahedron', 100],
    ['small-retrosnub-icosicosidodecahedron', 80],
  ] as const
  for (const [id, heightMm] of cases)
    test(`${id} at ${heightMm} mm`, () => {
      const skin = computeSkin(buildSolid(id))
      const below = 0.3 / unitOf(skin, heightMm)
      const short = skin.creases.filter((c) => c.length < below).length
      expect(short).toBeGreaterThan(0)
      const closed = closeSlivers(skin, below)
      expect(validateSkin(closed.skin).filter((c) => !c.ok)).toEqual([])
      expect(closed.stretches).toBeGreaterThanOrEqual(short - closed.panels)
      expect(closed.skin.creases.filter((c) => c.length < below)).toEqual([])
      expect(closed.moved).toBeGreaterThan(0)
      expect(closed.moved).toBeLessThanOrEqual(below)
      expect(farthest(skin, closed.skin)).toBeLessThanOrEqual(below)
      expect(closed.skin.slack).toBeLessThanOrEqual(below)
      expect(Math.abs(closed.skin.volume - skin.volume)).toBeLessThan(skin.area * below)
      expect(closed.skin.bodies).toBe(skin.bodies)
      expect(closed.skin.parts).toBe(1)
      // Euler's formula for what is left: vertices − edges + panels changes only with what was closed.
      const again = closeSlivers(closed.skin, below)
      expect(again.stretches).toBe(0)
    })

  test('a solid without slivers stays the very same', () => {
    const skin = computeSkin(buildSolid('great-icosahedron'))
    expect(closeSlivers(skin, 1e-3).skin).toBe(skin)
  })

  test('the plan keeps its checks, says what was closed, and closes nothing unless asked', () => {
    const choices = { ...usualChoices, solid: 'inverted-snub-dodecadodecahedron' }
    const plain = makePlan(choices)
    expect(plain.docket.closed).toBeUndefined()
    const plan = makePlan({ ...choices, closeBelowMm: 0.3 })
    expect(plan.docket.checks.filter((c) => !c.ok)).toEqual([])
    expect(plan.docket.closed?.stretches).toBe(60)
    expect(plan.docket.closed?.movedMm).toBeLessThanOrEqual(0.3)
    expect(plan.docket.seams).toBeLessThan(plain.docket.seams)
    expect(() => makePlan({ ...choices, closeBelowMm: 3 })).toThrow('Closing up below 3 mm is out of range')
  })

  const seed = 6100
  test(`clusters with a wide bound are closed up soundly or refused by name, seed ${seed}`, () => {
    const random = seeded(seed)
    let closed = 0
    for (let i = 0; i < 120; i++) {
      const solid = asSolid(Array.from({ length: 2 + Math.floor(random() * 5) }, () => part(random)))
      const skin = computeSkin(solid)
      const below = 0.02 + 0.2 * random()
      try {
        const result = closeSlivers(skin, below)
        if (result.stretches > 0) closed++
        expect([i, validateSkin(result.skin).filter((c) => !c.ok)]).toEqual([i, []])
        expect(result.moved).toBeLessThanOrEqual(below)
      } catch (error) {
        expect([i, (error as Error).name, (error as Error).message]).toEqual([
          i,
          'InputError',
          expect.stringContaining('cannot all be closed up'),
        ])
      }
    }
    // Most of them have something to close, and most of those can be.
    expect(closed).toBeGreaterThan(30)
  })
})

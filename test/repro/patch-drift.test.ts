/**
 * Nets overlapped after a long search: every join moved a patch by a motion whose cosine and sine were a little off the
 * unit circle, and each inverse doubled the error, so that after some hundred rounds patches lay wrong by millimetres.
 */
import { describe, expect, it } from 'vitest'
import { seededRandom } from '../../src/geometry/random'
import { distance2, type Motion2, move2, type Vec2 } from '../../src/geometry/vec2'
import { edgeEnds, panelGraph } from '../../src/pieces/panel-graph'
import { joinPatches, type Patch, singlePatch, splitPatch } from '../../src/pieces/patch'
import { smallStellated } from '../pieces/fixtures'

describe('patches joined and split many times', () => {
  it('still lie edge to edge at every fold: seed 5', () => {
    const graph = panelGraph(smallStellated(), 60)
    const fit = { widthMm: 190, heightMm: 277 }
    const singles = graph.flat.map((_, i) => singlePatch(graph, i, fit))
    const random = seededRandom(5)
    const of: Patch[] = [...singles]
    const motion = (p: Patch, panel: number): Motion2 => {
      const i = 4 * p.panels.indexOf(panel)
      return { c: p.motions[i]!, s: p.motions[i + 1]!, x: p.motions[i + 2]!, y: p.motions[i + 3]! }
    }
    let worst = 0
    for (let round = 0; round < 1500; round++) {
      for (let k = 0; k < 40; k++) {
        const link = graph.links[random.below(graph.links.length)]!
        const [a, b] = [of[link.sides[0].panel]!, of[link.sides[1].panel]!]
        const joined = a === b ? null : joinPatches(graph, a, b, link, fit)
        if (joined) for (const p of joined.panels) of[p] = joined
      }
      const patch = of[random.below(of.length)]!
      for (const id of patch.folds) {
        const { sides } = graph.links[id]!
        const [p, q] = sides.map((s) => edgeEnds(graph.flat, s).map((z) => move2(motion(patch, s.panel), z)))
        worst = Math.max(worst, distance2(p![0] as Vec2, q![1] as Vec2), distance2(p![1] as Vec2, q![0] as Vec2))
      }
      for (const part of splitPatch(patch, () => random.next() > 0.3, graph, singles))
        for (const p of part.panels) of[p] = part
    }
    expect(worst).toBeGreaterThan(0)
    expect(worst).toBeLessThan(1e-9)
  })
})

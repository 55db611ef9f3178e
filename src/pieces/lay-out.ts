/** From a set of folds to nets: the panels that folds join, laid flat in one plane. */
import { BrokenPromise } from '../errors'
import { UnionFind } from '../geometry/union-find'
import { compose2, identity2, type Motion2, move2 } from '../geometry/vec2'
import type { PanelGraph } from './panel-graph'
import { inverse2 } from './patch'

/** A net before it has a template: panel ids, ascending, and how each lies in the plane of the first. */
export interface Net {
  readonly panels: readonly number[]
  readonly motions: readonly Motion2[]
  /** Ascending. */
  readonly folds: readonly number[]
}

/**
 * Lays the nets of a fold set flat, by smallest panel id. Nothing is said about overlap or fit: see `validatePieces`.
 * @param folds crease ids
 * @throws BrokenPromise when folds close a ring, which cannot lie flat
 */
export const layOutNets = (graph: PanelGraph, folds: readonly number[]): Net[] => {
  const n = graph.flat.length
  const sets = new UnionFind(n)
  const foldSet = new Set(folds)
  for (const id of foldSet) {
    const [a, b] = graph.links[id]!.sides
    if (!sets.union(a.panel, b.panel)) throw new BrokenPromise('Folds run round in a ring.', { crease: id })
  }
  const motions: (Motion2 | undefined)[] = new Array(n)
  const nets: Net[] = []
  for (let root = 0; root < n; root++) {
    if (motions[root]) continue
    motions[root] = identity2
    const panels = [root]
    const own: number[] = []
    for (let i = 0; i < panels.length; i++) {
      const panel = panels[i]!
      for (const id of graph.linksOf[panel]!) {
        if (!foldSet.has(id)) continue
        const { sides, motion } = graph.links[id]!
        const forward = sides[0].panel === panel
        const other = sides[forward ? 1 : 0].panel
        if (motions[other]) continue
        motions[other] = compose2(motions[panel]!, forward ? motion : inverse2(motion))
        panels.push(other)
        own.push(id)
      }
    }
    panels.sort((a, b) => a - b)
    nets.push({ panels, motions: panels.map((p) => motions[p]!), folds: own.sort((a, b) => a - b) })
  }
  return nets
}

/** The rings of a net's panels in its plane, moved further by `m`. */
export const placedRings = (graph: PanelGraph, net: Net, m: Motion2 = identity2) =>
  net.panels.map((panel, i) => {
    const motion = compose2(m, net.motions[i]!)
    return { panel, rings: graph.flat[panel]!.rings.map((ring) => ring.map((p) => move2(motion, p))) }
  })

/**
 * Spikes and pits as units. A spike is a set of panels that mountain folds hold together, a pit one that valley folds do;
 * modules meet along their rims, which stay seams. A pit or a spike is a module: common practice, no source.
 */
import { UnionFind } from '../geometry/union-find'
import type { PanelGraph } from './panel-graph'

/** @returns by panel, the number of its module */
export const moduleOf = (graph: PanelGraph): Int32Array => {
  const spikes = joined(graph, (angle) => angle < 180)
  const pits = joined(graph, (angle) => angle > 180)
  const count = (labels: Int32Array): number => new Set(labels).size
  const single = (labels: Int32Array): number => {
    const size = new Map<number, number>()
    for (const l of labels) size.set(l, (size.get(l) ?? 0) + 1)
    return [...size.values()].filter((n) => n === 1).length
  }
  // A skin of spikes falls apart along its valleys, and along its mountains into one or into mere pairs; a skin of pits
  // the other way round. So the coarser way is taken, unless it is no cut at all; panels by themselves speak against it.
  const worth = (labels: Int32Array): number => {
    const n = count(labels)
    return n === 1 ? Number.NEGATIVE_INFINITY : -n - 2 * single(labels)
  }
  return worth(spikes) >= worth(pits) ? spikes : pits
}

const joined = (graph: PanelGraph, holds: (innerAngle: number) => boolean): Int32Array => {
  const sets = new UnionFind(graph.flat.length)
  for (const l of graph.links) if (holds(l.innerAngle)) sets.union(l.sides[0].panel, l.sides[1].panel)
  return Int32Array.from(graph.flat, (_, p) => sets.find(p))
}

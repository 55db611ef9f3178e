/**
 * Which creases fold: the search for few nets.
 *
 * A start by greedy merging (Kruskal's spanning forest over the creases, Proc. Am. Math. Soc. 7, 1956, with the extra
 * condition that the two nets that a fold would join lie flat without overlap and fit the sheet), then large
 * neighbourhood search (Shaw, Lecture Notes in Computer Science 1520, 1998): a few neighbouring nets are taken apart,
 * wholly or at some folds, and merged again in another order; what is no worse, or a little worse while it is early
 * (simulated annealing, Kirkpatrick, Gelatt and Vecchi, Science 220, 1983), is kept. Bounded by a number of rounds and
 * seeded, so that the same request always gives the same nets.
 */
import type { Progress } from '../errors'
import { type Random, seededRandom } from '../geometry/random'
import type { Link, PanelGraph } from './panel-graph'
import { type FitRectangle, joinPatches, type Patch, singlePatch, splitPatch } from './patch'

export interface SearchOptions {
  readonly fit: FitRectangle
  /** Only creases between panels of one face kind may fold. */
  readonly perKind: boolean
  /** Rounds of local search after the greedy start; 0 leaves plain greedy merging. */
  readonly rounds: number
  readonly seed: number
}

/** Inner angles (or gaps of a valley) sharper than this are awkward to glue and better folded: common practice, no source. */
const sharpDegrees = 20

/** How much a crease wants to be a fold, in mm of length; the greedy order goes from high to low. */
export const foldWish = (link: Link): number => {
  const opening = Math.min(link.innerAngle, 360 - link.innerAngle)
  return link.lengthMm * (opening < sharpDegrees ? 3 : 1)
}

interface State {
  /** By panel. */
  readonly of: Patch[]
}

/** Merges along the given creases, in this order, whatever lies flat and fits. */
const mergeAlong = (
  of: Patch[],
  links: readonly Link[],
  fit: FitRectangle,
  joining: (a: Patch, b: Patch, joined: Patch) => void = () => {},
): void => {
  for (const link of links) {
    const a = of[link.sides[0].panel]!
    const b = of[link.sides[1].panel]!
    if (a === b) continue
    const joined = joinPatches(a, b, link, fit)
    if (!joined) continue
    joining(a, b, joined)
    for (const p of joined.panels) of[p] = joined
  }
}

const shapeCost = (patch: Patch, full: number): number => 1 + 0.5 * Math.sqrt(patch.area / full)

/** @returns crease ids that fold, ascending */
export const searchFolds = (graph: PanelGraph, options: SearchOptions, progress: Progress): number[] => {
  const { fit, perKind, rounds, seed } = options
  const allowed = graph.links.filter((l) => !perKind || graph.kinds[l.sides[0].panel] === graph.kinds[l.sides[1].panel])
  const byWish = [...allowed].sort((a, b) => foldWish(b) - foldWish(a) || a.id - b.id)
  const state: State = { of: graph.flat.map((_, i) => singlePatch(graph, i)) }
  mergeAlong(state.of, byWish, fit)
  const usable = new Set(allowed.map((l) => l.id))
  const random = seededRandom(seed)
  const full = fit.widthMm * fit.heightMm
  const costOf = (patches: Iterable<Patch>): number => {
    let sum = 0
    for (const p of patches) sum += shapeCost(p, full)
    return sum
  }
  let best = [...state.of]
  let cost = costOf(new Set(state.of))
  let bestCost = cost
  for (let round = 0; round < rounds; round++) {
    if (round % 16 === 0) progress('pieces', round / rounds)
    const heat = 0.3 * (1 - round / rounds) ** 2
    const patches = [...new Set(state.of)]
    if (patches.length < 2) break
    const group = chooseGroup(patches, state.of, graph, random)
    const undo = [...group]
    const fresh = takeApart(group, state.of, graph, random)
    const links = new Set<Link>()
    for (const patch of group)
      for (const p of patch.panels) for (const l of graph.linksOf[p]!) if (usable.has(l)) links.add(graph.links[l]!)
    const order = [...links]
      .map((link) => ({ link, key: foldWish(link) ** 0.5 * (0.2 + random.next()) }))
      .sort((a, b) => b.key - a.key || a.link.id - b.link.id)
      .map(({ link }) => link)
    mergeAlong(state.of, order, fit, (a, b, joined) => {
      // A net from beside the group may be drawn in.
      for (const patch of [a, b]) if (!fresh.delete(patch)) undo.push(patch)
      fresh.add(joined)
    })
    const change = costOf(fresh) - costOf(undo)
    if (change <= 0 || random.next() < Math.exp(-change / (heat + 1e-9))) {
      cost += change
      if (cost < bestCost - 1e-9) {
        bestCost = cost
        best = [...state.of]
      }
    } else for (const patch of undo) for (const p of patch.panels) state.of[p] = patch
  }
  progress('pieces', 1)
  return [...new Set(best)].flatMap((p) => p.folds).sort((a, b) => a - b)
}

/** A net, small ones more likely, and a few of its neighbours. */
const chooseGroup = (patches: readonly Patch[], of: readonly Patch[], graph: PanelGraph, random: Random): Patch[] => {
  let first = patches[random.below(patches.length)]!
  for (let i = 0; i < 2; i++) {
    const other = patches[random.below(patches.length)]!
    if (other.area < first.area) first = other
  }
  const group = [first]
  const size = 2 + random.below(3)
  for (let tries = 0; tries < 12 && group.length < size; tries++) {
    const from = group[random.below(group.length)]!
    const panel = from.panels[random.below(from.panels.length)]!
    const links = graph.linksOf[panel]!
    const link = graph.links[links[random.below(links.length)]!]!
    const other = of[link.sides[link.sides[0].panel === panel ? 1 : 0].panel]!
    if (!group.includes(other)) group.push(other)
  }
  return group
}

const takeApart = (group: readonly Patch[], of: Patch[], graph: PanelGraph, random: Random): Set<Patch> => {
  const fresh = new Set<Patch>()
  const wholly = random.next() < 0.3
  for (const patch of group) {
    const lose = wholly ? 1 : 0.1 + 0.5 * random.next()
    for (const part of splitPatch(patch, () => random.next() >= lose, graph)) {
      fresh.add(part)
      for (const p of part.panels) of[p] = part
    }
  }
  return fresh
}

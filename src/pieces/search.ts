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
  /** By panel: only creases between panels of one group may fold; missing: all may. */
  readonly groups?: Int32Array | undefined
  readonly maxPanels?: number
  /**
   * How long to search after the greedy start, in thousands of panels laid beside others (about 1 ms each); 0 leaves
   * plain greedy merging.
   */
  readonly effort: number
  readonly seed: number
}

/** Inner angles (or gaps of a valley) sharper than this are awkward to glue and better folded: common practice, no source. */
const sharpDegrees = 20

/** How much a crease wants to be a fold, in mm of length; the greedy order goes from high to low. */
export const foldWish = (link: Link): number => {
  const opening = Math.min(link.innerAngle, 360 - link.innerAngle)
  return link.lengthMm * (opening < sharpDegrees ? 3 : 1)
}

/** The nets at one moment of the search. */
class Nets {
  /** By panel. */
  readonly of: Patch[]
  /** All nets, in no particular but reproducible order. */
  readonly list: Patch[]
  private readonly place: Map<Patch, number>

  constructor(patches: readonly Patch[]) {
    this.of = []
    this.list = [...patches]
    this.place = new Map(patches.map((p, i) => [p, i]))
    for (const patch of patches) for (const p of patch.panels) this.of[p] = patch
  }

  replace(old: Iterable<Patch>, by: Iterable<Patch>): void {
    for (const patch of old) {
      const i = this.place.get(patch)!
      const last = this.list.pop()!
      this.place.delete(patch)
      if (last === patch) continue
      this.list[i] = last
      this.place.set(last, i)
    }
    for (const patch of by) {
      this.place.set(patch, this.list.push(patch) - 1)
      for (const p of patch.panels) this.of[p] = patch
    }
  }
}

/**
 * Few nets; with as many, better one large and one small than two middling ones, as the small one may go next; and the
 * creases that want it most as folds, which saves glue.
 */
const costOf = (patches: Iterable<Patch>, full: number, wishes: Float64Array): number => {
  let sum = 0
  for (const p of patches) {
    sum += 1 + sizeWeight * Math.sqrt(p.area / full)
    for (const fold of p.folds) sum -= wishes[fold]!
  }
  return sum
}
const sizeWeight = 0.5
/** What a crease of mean wish is worth as a fold, in nets. */
const foldWeight = 0.05

/** @returns crease ids that fold, ascending */
export const searchFolds = (graph: PanelGraph, options: SearchOptions, progress: Progress): number[] => {
  const { fit, perKind, groups, maxPanels = Number.POSITIVE_INFINITY, effort, seed } = options
  const allowed = graph.links.filter(({ sides: [a, b] }) => {
    if (perKind && graph.kinds[a.panel] !== graph.kinds[b.panel]) return false
    return !groups || groups[a.panel] === groups[b.panel]
  })
  const singles = graph.flat.map((_, i) => singlePatch(graph, i, fit))
  const nets = new Nets(singles)
  const merge = (links: readonly Link[], joining: (a: Patch, b: Patch, joined: Patch) => void): void => {
    links.forEach((link, i) => {
      if (i % 64 === 0) progress('pieces', done)
      const a = nets.of[link.sides[0].panel]!
      const b = nets.of[link.sides[1].panel]!
      if (a === b || a.panels.length + b.panels.length > maxPanels) return
      laid += 10 + Math.min(a.panels.length, b.panels.length) + Math.max(a.panels.length, b.panels.length) / 8
      const joined = joinPatches(graph, a, b, link, fit)
      if (!joined) return
      joining(a, b, joined)
      nets.replace([a, b], [joined])
    })
  }
  let done = 0
  let laid = 0
  merge(
    [...allowed].sort((a, b) => foldWish(b) - foldWish(a) || a.id - b.id),
    () => {},
  )

  const random = seededRandom(seed)
  const full = fit.widthMm * fit.heightMm
  const floor = Math.max(1, Math.ceil(graph.areas.reduce((a, b) => a + b, 0) / full - 1e-9))
  const usable = graph.links.map(() => false)
  for (const l of allowed) usable[l.id] = true
  const wishes = Float64Array.from(graph.links, foldWish)
  const mean = wishes.reduce((a, b) => a + b, 0) / Math.max(1, wishes.length)
  wishes.forEach((w, i) => {
    wishes[i] = (foldWeight * w) / mean
  })
  let cost = costOf(nets.list, full, wishes)
  let best = [...nets.list]
  let bestCost = cost
  const limit = 1000 * effort
  laid = 0
  while (laid < limit && best.length > floor) {
    done = laid / limit
    const heat = startHeat * (1 - done) ** 2
    const undo = chooseGroup(nets, graph, random)
    const fresh = new Set(takeApart(undo, graph, singles, random))
    nets.replace(undo, fresh)
    const links = linksAround(undo, graph, usable, random)
    merge(links, (a, b, joined) => {
      // A net from beside the group may be drawn in.
      for (const patch of [a, b]) if (!fresh.delete(patch)) undo.push(patch)
      fresh.add(joined)
    })
    const change = costOf(fresh, full, wishes) - costOf(undo, full, wishes)
    if (change <= 0 || random.next() < Math.exp(-change / (heat + 1e-9))) {
      cost += change
      if (cost < bestCost - 1e-9) {
        bestCost = cost
        best = [...nets.list]
      }
    } else nets.replace(fresh, undo)
  }
  progress('pieces', 1)
  return best.flatMap((p) => p.folds).sort((a, b) => a - b)
}
const startHeat = 0.3

/** All creases of the group's panels that may fold, in a random order that still prefers those that want to. */
const linksAround = (
  group: readonly Patch[],
  graph: PanelGraph,
  usable: readonly boolean[],
  random: Random,
): Link[] => {
  const ids = new Set<number>()
  for (const patch of group) for (const p of patch.panels) for (const l of graph.linksOf[p]!) if (usable[l]) ids.add(l)
  return [...ids]
    .map((id) => ({ link: graph.links[id]!, key: Math.sqrt(foldWish(graph.links[id]!)) * (0.2 + random.next()) }))
    .sort((a, b) => b.key - a.key)
    .map(({ link }) => link)
}

/** A net, small ones more likely, and a few of its neighbours. */
const chooseGroup = ({ list, of }: Nets, graph: PanelGraph, random: Random): Patch[] => {
  let first = list[random.below(list.length)]!
  for (let i = 0; i < 2; i++) {
    const other = list[random.below(list.length)]!
    if (other.area < first.area) first = other
  }
  const group = [first]
  const size = 2 + random.below(2)
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

/** The group's nets, cut at some of their folds. */
const takeApart = (group: readonly Patch[], graph: PanelGraph, singles: readonly Patch[], random: Random): Patch[] => {
  return group.flatMap((patch) => {
    const lose = 0.05 + 0.25 * random.next()
    return splitPatch(patch, () => random.next() >= lose, graph, singles)
  })
}

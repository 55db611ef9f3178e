/**
 * Nets that repeat: as few templates as possible. The creases of one orbit under the rotations are folded or cut alike, so
 * the nets fall into orbits, and a net's images are all of one template. Orbits of creases are merged greedily (Kruskal's
 * spanning forest, Proc. Am. Math. Soc. 7, 1956, one level up), from many seeded starts. At last a net is joined with its
 * own images round an axis, which leaves the templates as many and the pieces fewer.
 */
import type { Progress } from '../errors'
import { seededRandom } from '../geometry/random'
import { UnionFind } from '../geometry/union-find'
import type { Action } from './action'
import type { PanelGraph } from './panel-graph'
import { type FitRectangle, joinPatches, type Patch, singlePatch } from './patch'
import { foldWish } from './search'

export interface RepeatOptions {
  readonly fit: FitRectangle
  readonly perKind: boolean
  readonly maxPanels: number
  readonly seed: number
  /** Greedy starts; the best is kept. */
  readonly starts: number
}

/** A net that stands for all its images. `stabilizer`: rotations (by number) that carry it, folds and all, onto itself. */
interface Unit {
  readonly patch: Patch
  readonly stabilizer: readonly number[]
}

/** Where a panel is: in the image of a unit under a rotation. */
interface Home {
  readonly unit: number
  readonly rotation: number
}

/** @returns crease ids that fold, ascending */
export const searchRepeats = (
  graph: PanelGraph,
  actions: readonly Action[],
  options: RepeatOptions,
  progress: Progress,
): number[] => {
  const group = tablesOf(actions)
  const orbits = orbitsOf(actions, graph.links.length)
    .map((list) => graph.links[list[0]!]!)
    .filter((l) => !options.perKind || graph.kinds[l.sides[0].panel] === graph.kinds[l.sides[1].panel])
  const random = seededRandom(options.seed)
  let best: { units: Unit[]; score: number } | null = null
  for (let start = 0; start < options.starts; start++) {
    progress('pieces', start / options.starts)
    const order = orbits
      .map((link) => ({ link, key: Math.sqrt(foldWish(link)) * (start === 0 ? 1 : 0.15 + random.next()) }))
      .sort((a, b) => b.key - a.key || a.link.id - b.link.id)
    const state = new Units(graph, actions, group, options)
    for (const { link } of order) state.merge(link.id)
    const units = state.units()
    const pieces = units.reduce((sum, u) => sum + actions.length / u.stabilizer.length, 0)
    const score = 1000 * units.length + pieces / actions.length
    if (!best || score < best.score) best = { units, score }
    if (units.length === 1) break
  }
  const folds = new Set<number>()
  for (const unit of best!.units) for (const f of aroundAxis(graph, actions, group, unit, options)) folds.add(f)
  progress('pieces', 1)
  return [...folds].sort((a, b) => a - b)
}

interface Tables {
  /** product[a][b]: first b, then a. */
  readonly product: readonly Int32Array[]
  readonly inverse: Int32Array
}

const tablesOf = (actions: readonly Action[]): Tables => {
  // A rotation other than the identity moves some crease or panel; the images of a few panels tell it from the others.
  const key = (panels: (p: number) => number): string => {
    const out: number[] = []
    for (let p = 0; p < actions[0]!.panels.length && out.length < 24; p++) out.push(panels(p))
    return out.join(' ')
  }
  const number = new Map(actions.map((a, i) => [key((p) => a.panels[p]!), i]))
  const product = actions.map((a) =>
    Int32Array.from(actions, (b) => number.get(key((p) => a.panels[b.panels[p]!]!)) ?? -1),
  )
  return { product, inverse: Int32Array.from(actions, (_, i) => product[i]!.indexOf(0)) }
}

const orbitsOf = (actions: readonly Action[], creases: number): number[][] => {
  const sets = new UnionFind(creases)
  for (const { creases: map } of actions) for (let c = 0; c < creases; c++) sets.union(c, map[c]!)
  const lists = new Map<number, number[]>()
  for (let c = 0; c < creases; c++) {
    const root = sets.find(c)
    const list = lists.get(root)
    if (list) list.push(c)
    else lists.set(root, [c])
  }
  return [...lists.values()]
}

/** A patch carried by a rotation: the images of its panels, laid out anew by the images of its folds. */
const imageOf = (graph: PanelGraph, patch: Patch, action: Action, fit: FitRectangle): Patch => {
  const joined = new Map<number, Patch>()
  for (const p of patch.panels) joined.set(action.panels[p]!, singlePatch(graph, action.panels[p]!, fit))
  // Folds come in the order in which the patch grew; any order gives the same net.
  let whole = joined.get(action.panels[patch.panels[0]!]!)!
  for (const fold of patch.folds) {
    const link = graph.links[action.creases[fold]!]!
    const a = joined.get(link.sides[0].panel)!
    const b = joined.get(link.sides[1].panel)!
    whole = joinPatches(graph, a, b, link, unlimited)!
    if (!whole) return patch
    for (const p of whole.panels) joined.set(p, whole)
  }
  return whole
}
const unlimited: FitRectangle = { widthMm: 1e6, heightMm: 1e6 }

class Units {
  private readonly home: Home[] = []
  private readonly made: (Unit | null)[] = []

  constructor(
    private readonly graph: PanelGraph,
    private readonly actions: readonly Action[],
    private readonly group: Tables,
    private readonly options: RepeatOptions,
  ) {
    graph.flat.forEach((_, p) => {
      if (this.home[p]) return
      const stabilizer = actions.flatMap((a, g) => (a.panels[p] === p ? [g] : []))
      this.add({ patch: singlePatch(graph, p, options.fit), stabilizer })
    })
  }

  units(): Unit[] {
    return this.made.filter((u): u is Unit => u !== null)
  }

  private add(unit: Unit): void {
    const id = this.made.push(unit) - 1
    this.actions.forEach((action, rotation) => {
      for (const p of unit.patch.panels) this.home[action.panels[p]!] = { unit: id, rotation }
    })
  }

  /** Folds the whole orbit of a crease, if the nets that come of it lie flat and fit. */
  merge(crease: number): void {
    const { graph, actions, group, options } = this
    const { sides } = graph.links[crease]!
    let [here, there] = [this.home[sides[0].panel]!, this.home[sides[1].panel]!]
    let [u, v] = [this.made[here.unit]!, this.made[there.unit]!]
    if (here.unit === there.unit) {
      this.double(crease, here, there)
      return
    }
    // The unit that is multiplied must have no symmetry of its own, or the orbit would close rings of folds.
    if (v.stabilizer.length > 1) {
      ;[here, there] = [there, here]
      ;[u, v] = [v, u]
    }
    if (v.stabilizer.length > 1) return
    if (u.patch.panels.length + u.stabilizer.length * v.patch.panels.length > options.maxPanels) return
    const back = group.inverse[here.rotation]!
    let whole: Patch | null = u.patch
    for (const k of u.stabilizer) {
      const link = actions[k]!.creases[actions[back]!.creases[crease]!]!
      const turn = group.product[k]![group.product[back]![there.rotation]!]!
      const image = imageOf(graph, v.patch, actions[turn]!, options.fit)
      whole = joinPatches(graph, whole, image, graph.links[link]!, options.fit)
      if (!whole) return
    }
    this.made[here.unit] = null
    this.made[there.unit] = null
    this.add({ patch: whole, stabilizer: u.stabilizer })
  }

  /** A crease between a net and its own image under a half turn that keeps the crease. */
  private double(crease: number, here: Home, there: Home): void {
    const { graph, actions, group, options } = this
    const unit = this.made[here.unit]!
    if (unit.stabilizer.length > 1 || 2 * unit.patch.panels.length > options.maxPanels) return
    const back = group.inverse[here.rotation]!
    const turn = group.product[back]![there.rotation]!
    const link = actions[back]!.creases[crease]!
    if (turn === 0 || group.product[turn]![turn] !== 0 || actions[turn]!.creases[link] !== link) return
    const image = imageOf(graph, unit.patch, actions[turn]!, options.fit)
    const whole = joinPatches(graph, unit.patch, image, graph.links[link]!, options.fit)
    if (!whole) return
    this.made[here.unit] = null
    this.add({ patch: whole, stabilizer: [0, turn] })
  }
}

/** The folds of all images of a unit, first joined with its own images round an axis where that lies flat and fits. */
const aroundAxis = (
  graph: PanelGraph,
  actions: readonly Action[],
  { product }: Tables,
  unit: Unit,
  options: RepeatOptions,
): number[] => {
  const everywhere = (folds: readonly number[], rotations: readonly number[]): number[] =>
    rotations.flatMap((g) => folds.map((f) => actions[g]!.creases[f]!))
  const all = actions.map((_, g) => g)
  let best: { folds: number[]; rotations: number[]; order: number; length: number } | null = null
  if (unit.stabilizer.length === 1) {
    const own = new Set(unit.patch.panels)
    for (const [g, action] of actions.entries()) {
      const powers = [0]
      for (let k = g; k !== 0; k = product[g]![k]!) powers.push(k)
      const order = powers.length
      if (g === 0 || order * unit.patch.panels.length > options.maxPanels) continue
      if (best && order < best.order) continue
      const beside = new Set(Array.from(unit.patch.panels, (p) => action.panels[p]!))
      for (const p of unit.patch.panels)
        for (const id of graph.linksOf[p]!) {
          const link = graph.links[id]!
          const other = link.sides[link.sides[0].panel === p ? 1 : 0].panel
          if (!beside.has(other) || own.has(other)) continue
          if (options.perKind && graph.kinds[p] !== graph.kinds[other]) continue
          if (best && order === best.order && link.lengthMm <= best.length + 1e-9) continue
          let whole: Patch | null = unit.patch
          for (let k = 1; k < order && whole; k++) {
            const image = imageOf(graph, unit.patch, actions[powers[k]!]!, options.fit)
            const joint = graph.links[actions[powers[k - 1]!]!.creases[id]!]!
            whole = joinPatches(graph, whole, image, joint, options.fit)
          }
          if (!whole) continue
          best = { folds: [...whole.folds], rotations: cosets(all, powers, product), order, length: link.lengthMm }
        }
    }
  }
  return best ? everywhere(best.folds, best.rotations) : everywhere(unit.patch.folds, all)
}

/** One rotation of each left coset of a subgroup. */
const cosets = (all: readonly number[], subgroup: readonly number[], product: readonly Int32Array[]): number[] => {
  const seen = new Set<number>()
  return all.filter((g) => {
    if (seen.has(g)) return false
    for (const k of subgroup) seen.add(product[g]![k]!)
    return true
  })
}

/**
 * Tabs for gluing. A single tab hangs on one side of a seam and is glued behind the panel across it:
 *
 * 1. in the flat it overlaps no panel and no other tab, with a gap;
 * 2. folded over it stays inside the outline of the panel that receives it, and off other tabs glued to that back;
 * 3. its end angles are no wider than the receiving panel's corners;
 * 4. it is carried by the piece that is glued earlier, so that a new piece lands on open tabs.
 *
 * Depth 12 % of the edge between 3 and 8 mm, end angle 45 degrees, at most 30 at sharp corners, none on edges under 6 mm:
 * common practice, no source. Where no such tab fits, the seam is a butt seam.
 */
import { noProgress, type Progress } from '../errors'
import { distance2 } from '../geometry/vec2'
import type { Skin } from '../skin/types'
import { Bench, type Side, type TabOptions } from './tab-bench'
import { type Obstacle, tabArea } from './tab-shape'
import type { Piece, Tab } from './types'

export type { TabOptions } from './tab-bench'

/** Why a seam has no tab: short edge; no room in the flat net, behind the other panel, or on the sheet. */
export type ButtReason = 'short' | 'flat' | 'behind' | 'sheet'

export interface ButtSeam {
  readonly crease: number
  readonly reason: ButtReason
}

export interface Tabs {
  /** By piece index. */
  readonly tabs: readonly (readonly Tab[])[]
  /** By crease id, ascending. */
  readonly buttSeams: readonly ButtSeam[]
}

/**
 * Gives every seam a single tab, or says why it has none.
 * @param pieces in gluing order; a seam between two of them gets its tab on the earlier one, a seam inside one piece on
 *   the side where the tab is larger
 */
export const assignTabs = (
  skin: Skin,
  pieces: readonly Piece[],
  options: TabOptions,
  progress: Progress = noProgress,
): Tabs => {
  const bench = new Bench(skin, pieces, options)
  const folds = new Set(pieces.flatMap((p) => p.folds))
  const seams = skin.creases.filter((c) => !folds.has(c.id))
  const butt: ButtSeam[] = []
  const sides = new Map<number, (readonly [Side, Side])[]>()
  for (const c of seams) {
    const [p, q] = c.panels.map((panel) => bench.side(panel, c.id)) as [Side, Side]
    sides.set(
      c.id,
      p.piece < q.piece
        ? [[p, q]]
        : p.piece > q.piece
          ? [[q, p]]
          : [
              [p, q],
              [q, p],
            ],
    )
  }
  const lengthOf = (crease: number): number => {
    const { a, b } = sides.get(crease)![0]![0]
    return distance2(a, b)
  }
  const least = bench.set.leastEdgeMm
  const open = seams.map((c) => c.id).filter((id) => lengthOf(id) >= least)
  // Long seams first: they matter most.
  open.sort((a, b) => (Math.abs(lengthOf(a) - lengthOf(b)) > 1e-6 ? lengthOf(b) - lengthOf(a) : a - b))
  // Everyone first gets a small tab, so that neighbours share narrow places; then each grows as far as the others let it.
  const rounds = [true, false, false]
  rounds.forEach((small, round) => {
    open.forEach((crease, i) => {
      if (i % 16 === 0) progress('tabs', (round + i / open.length) / rounds.length)
      const old = bench.placed.get(crease)
      const choices = sides.get(crease)!.filter(([s]) => !old || round > 1 || s === old.side)
      let best = old
      for (const [side, receiver] of choices) {
        const tab = bench.find(crease, side, receiver, small)
        if (tab && (!best || tabArea(tab.shape) > tabArea(best.shape) + 1e-6)) best = tab
      }
      if (best && best !== old) bench.put(crease, best)
    })
  })
  for (const c of seams) {
    if (lengthOf(c.id) < least) butt.push({ crease: c.id, reason: 'short' })
    else if (!bench.placed.has(c.id)) butt.push({ crease: c.id, reason: whyNot(bench, c.id, sides.get(c.id)!) })
  }
  progress('tabs', 1)
  const tabs = pieces.map((_, i) =>
    [...bench.byPiece[i]!]
      .sort((a, b) => a - b)
      .map((crease): Tab => {
        const { side, outline } = bench.placed.get(crease)!
        return { crease, panel: side.panel, kind: 'single', outline }
      }),
  )
  return { tabs, buttSeams: butt.sort((a, b) => a.crease - b.crease) }
}

/** What would have to give way for a tab to fit. */
const whyNot = (bench: Bench, crease: number, choices: readonly (readonly [Side, Side])[]): ButtReason => {
  const would = (ignore: (o: Obstacle) => boolean, anySheet: boolean): boolean =>
    choices.some(([side, receiver]) => bench.find(crease, side, receiver, false, ignore, anySheet) !== undefined)
  if (would(() => false, true)) return 'sheet'
  if (would((o) => o.why === 'flat', true)) return 'flat'
  return 'behind'
}

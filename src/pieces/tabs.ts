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
import type { ConvexPart } from '../geometry/convex'
import { convexParts } from '../geometry/convex'
import { convexHull, fittingAngle } from '../geometry/hull'
import { distance2, type Ring2, type Vec2 } from '../geometry/vec2'
import type { Skin } from '../skin/types'
import type { FitRectangle } from './patch'
import { type Obstacle, type TabShape, tabArea, tabCorners, tabShapes } from './tab-shape'
import type { Piece, Tab } from './types'

export interface TabOptions {
  /** Each piece with its tabs fits this, at some angle. */
  readonly fit: FitRectangle
  /** Depth as a part of the edge, and its bounds in mm. */
  readonly depthShare?: number
  readonly depthMm?: readonly [number, number]
  /** What depth may come down to where nothing deeper fits. */
  readonly leastDepthMm?: number
  readonly endAngle?: number
  /** At corners of the receiving panel under 60 degrees. */
  readonly sharpEndAngle?: number
  /** Seams shorter than this get none. */
  readonly leastEdgeMm?: number
  /** In the flat, and between tabs on one back. */
  readonly gapMm?: number
  /** How far a folded tab stays inside the outline of the panel that receives it. */
  readonly insetMm?: number
}

const usual: Required<Omit<TabOptions, 'fit'>> = {
  depthShare: 0.12,
  depthMm: [3, 8],
  leastDepthMm: 2,
  endAngle: 45,
  sharpEndAngle: 30,
  leastEdgeMm: 6,
  gapMm: 0.3,
  insetMm: 0.1,
}

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

/** One side of a seam: the ring edge a → b of a panel in its piece's plane, the panel to its left. */
interface Side {
  readonly piece: number
  readonly panel: number
  readonly a: Vec2
  readonly b: Vec2
}

interface Placed {
  readonly shape: TabShape
  readonly side: Side
  readonly receiver: Side
  /** In the carrier's plane, and in the plane of the receiver's piece as it lies folded over. */
  readonly outline: readonly Vec2[]
  readonly behind: readonly Vec2[]
}

/** Coordinates in the frame of a side: along a → b, and to its right. */
const into = ({ a, b }: Side, x: number, y: number): [number, number] => {
  const length = distance2(a, b)
  const tx = (b[0] - a[0]) / length
  const ty = (b[1] - a[1]) / length
  const dx = x - a[0]
  const dy = y - a[1]
  return [dx * tx + dy * ty, dx * ty - dy * tx]
}
const outOf = ({ a, b }: Side, [x, y]: readonly [number, number]): Vec2 => {
  const length = distance2(a, b)
  const tx = (b[0] - a[0]) / length
  const ty = (b[1] - a[1]) / length
  return [a[0] + x * tx + y * ty, a[1] + x * ty - y * tx]
}
const intoAll = (side: Side, points: ArrayLike<number>): Float64Array => {
  const out = new Float64Array(points.length)
  for (let i = 0; i < points.length; i += 2) out.set(into(side, points[i]!, points[i + 1]!), i)
  return out
}
/** The receiver seen from the carrier's end: its edge backwards, so that its inside has positive y. */
const turned = (side: Side): Side => ({ ...side, a: side.b, b: side.a })

class Bench {
  /** By panel: where it lies. */
  readonly rings = new Map<number, readonly Ring2[]>()
  readonly parts = new Map<number, readonly ConvexPart[]>()
  readonly pieceOf = new Map<number, number>()
  readonly hulls: readonly Float64Array[]
  /** By crease. */
  readonly placed = new Map<number, Placed>()
  readonly byPiece: Set<number>[]
  /** By panel: creases of tabs glued to its back. */
  readonly onBack = new Map<number, Set<number>>()
  readonly set: Required<TabOptions>

  constructor(
    readonly skin: Skin,
    readonly pieces: readonly Piece[],
    options: TabOptions,
  ) {
    this.set = { ...usual, ...options }
    pieces.forEach((piece, i) => {
      for (const { panel, rings } of piece.panels) {
        this.rings.set(panel, rings)
        this.parts.set(panel, convexParts(rings))
        this.pieceOf.set(panel, i)
      }
    })
    this.hulls = pieces.map((p) => convexHull(p.panels.flatMap((q) => q.rings[0]!.flat())))
    this.byPiece = pieces.map(() => new Set())
  }

  side(panel: number, crease: number): Side {
    const lists = this.skin.panels[panel]!.creases
    const r = lists.findIndex((list) => list.includes(crease))
    const i = lists[r]!.indexOf(crease)
    const ring = this.rings.get(panel)![r]!
    return { piece: this.pieceOf.get(panel)!, panel, a: ring[i]!, b: ring[(i + 1) % ring.length]! }
  }

  /** Interior angles in degrees of the receiving panel at the crease's ends, seen from the carrier: at its a, at its b. */
  corners(panel: number, crease: number): [number, number] {
    const lists = this.skin.panels[panel]!.creases
    const r = lists.findIndex((list) => list.includes(crease))
    const i = lists[r]!.indexOf(crease)
    const ring = this.rings.get(panel)![r]!
    const at = (k: number): number => {
      const n = ring.length
      const [p, q, s] = [ring[(k + n - 1) % n]!, ring[k % n]!, ring[(k + 1) % n]!]
      const angle = Math.atan2(p[1] - q[1], p[0] - q[0]) - Math.atan2(s[1] - q[1], s[0] - q[0])
      return ((angle + 4 * Math.PI) % (2 * Math.PI)) * (180 / Math.PI)
    }
    return [at(i + 1), at(i)]
  }

  obstacles(crease: number, side: Side, receiver: Side, reach: number): Obstacle[] {
    const { gapMm, insetMm } = this.set
    const out: Obstacle[] = []
    const length = distance2(side.a, side.b)
    const near = (points: ArrayLike<number>): boolean => {
      let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity]
      for (let i = 0; i < points.length; i += 2) {
        minX = Math.min(minX, points[i]!)
        maxX = Math.max(maxX, points[i]!)
        minY = Math.min(minY, points[i + 1]!)
        maxY = Math.max(maxY, points[i + 1]!)
      }
      return maxY > -gapMm && minY < reach && maxX > -gapMm && minX < length + gapMm
    }
    for (const { panel } of this.pieces[side.piece]!.panels)
      for (const part of this.parts.get(panel)!) {
        const points = intoAll(side, part)
        if (!near(points)) continue
        // The carrying panel itself is in the way only where it juts out beyond the crease's line.
        if (panel === side.panel) {
          const above = clipAbove(points, 1e-6)
          if (above.length > 0) out.push({ points: above, gap: gapMm, why: 'flat' })
        } else out.push({ points, gap: gapMm, why: 'flat' })
      }
    for (const other of this.byPiece[side.piece]!) {
      if (other === crease) continue
      const points = intoAll(side, this.placed.get(other)!.outline.flat())
      if (near(points)) out.push({ points, gap: gapMm, why: 'flat' })
    }
    const back = turned(receiver)
    const lists = this.skin.panels[receiver.panel]!.creases
    this.rings.get(receiver.panel)!.forEach((ring, r) => {
      ring.forEach((p, i) => {
        if (lists[r]![i] === crease) return
        const q = ring[(i + 1) % ring.length]!
        out.push({ points: intoAll(back, [p[0], p[1], q[0], q[1]]), gap: insetMm, why: 'behind' })
      })
    })
    for (const other of this.onBack.get(receiver.panel) ?? []) {
      if (other === crease) continue
      const points = intoAll(back, this.placed.get(other)!.behind.flat())
      if (near(points)) out.push({ points, gap: gapMm, why: 'behind' })
    }
    return out
  }

  onSheet(crease: number, side: Side, outline: readonly Vec2[]): boolean {
    const points = [...this.hulls[side.piece]!, ...outline.flat()]
    for (const other of this.byPiece[side.piece]!)
      if (other !== crease) points.push(...this.placed.get(other)!.outline.flat())
    return fittingAngle(convexHull(points), this.set.fit.widthMm, this.set.fit.heightMm) !== null
  }

  /** The best tab on one side of a seam, all other tabs as they are. `small`: only a beginning, to share the room. */
  find(
    crease: number,
    side: Side,
    receiver: Side,
    small: boolean,
    ignore: (o: Obstacle) => boolean = () => false,
    anySheet = false,
  ): Placed | undefined {
    const { depthShare, depthMm, leastDepthMm, endAngle, sharpEndAngle } = this.set
    const length = distance2(side.a, side.b)
    const usualDepth = Math.min(depthMm[1], Math.max(depthMm[0], depthShare * length))
    const depth = small ? leastDepthMm : usualDepth
    const widest = this.corners(receiver.panel, crease).map((corner) =>
      small ? Math.min(corner / 2, sharpEndAngle) : Math.min(corner, corner < 60 ? sharpEndAngle : endAngle),
    )
    const obstacles = this.obstacles(crease, side, receiver, depth + this.set.gapMm).filter((o) => !ignore(o))
    const limits = {
      depth,
      leastDepth: leastDepthMm,
      startAngle: widest[0]!,
      endAngle: widest[1]!,
      leastRoot: Math.max(3, 0.25 * length),
      leastTop: 1,
    }
    for (const shape of tabShapes(length, obstacles, limits)) {
      const corners = tabCorners(shape)
      const outline = corners.map((c) => outOf(side, c))
      if (!anySheet && !this.onSheet(crease, side, outline)) continue
      return { shape, side, receiver, outline, behind: corners.map((c) => outOf(turned(receiver), c)) }
    }
    return undefined
  }

  put(crease: number, tab: Placed): void {
    this.remove(crease)
    this.placed.set(crease, tab)
    this.byPiece[tab.side.piece]!.add(crease)
    const back = this.onBack.get(tab.receiver.panel) ?? new Set()
    this.onBack.set(tab.receiver.panel, back.add(crease))
  }

  private remove(crease: number): void {
    const old = this.placed.get(crease)
    if (!old) return
    this.placed.delete(crease)
    this.byPiece[old.side.piece]!.delete(crease)
    this.onBack.get(old.receiver.panel)!.delete(crease)
  }
}

const clipAbove = (points: ArrayLike<number>, low: number): number[] => {
  const out: number[] = []
  for (let i = points.length - 2, j = 0; j < points.length; i = j, j += 2) {
    const [ax, ay, bx, by] = [points[i]!, points[i + 1]!, points[j]!, points[j + 1]!]
    if (ay < low !== by < low) out.push(ax + ((low - ay) / (by - ay)) * (bx - ax), low)
    if (by >= low) out.push(bx, by)
  }
  return out
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

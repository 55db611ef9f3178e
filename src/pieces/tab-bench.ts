/**
 * The bench on which tabs are fitted: all pieces as they lie flat, the tabs so far, and what stands in the way of one
 * more, in the flat and behind the panel that receives it. The rules are told in `tabs.ts`.
 */
import { type ConvexPart, convexParts } from '../geometry/convex'
import { convexHull, fitsAt, fittingAngle, roomiestAngle } from '../geometry/hull'
import { distance2, type Ring2, type Vec2 } from '../geometry/vec2'
import type { Skin } from '../skin/types'
import type { FitRectangle } from './patch'
import { type Obstacle, type TabShape, tabCorners, tabShapes } from './tab-shape'
import type { Piece } from './types'

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

/** One side of a seam: the ring edge a → b of a panel in its piece's plane, the panel to its left. */
export interface Side {
  readonly piece: number
  readonly panel: number
  readonly a: Vec2
  readonly b: Vec2
}

export interface Placed {
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

type Box = readonly [number, number, number, number]

const boxOf = (points: readonly number[]): Box => {
  let [minX, minY, maxX, maxY] = [Infinity, Infinity, -Infinity, -Infinity]
  for (let i = 0; i < points.length; i += 2) {
    minX = Math.min(minX, points[i]!)
    minY = Math.min(minY, points[i + 1]!)
    maxX = Math.max(maxX, points[i]!)
    maxY = Math.max(maxY, points[i + 1]!)
  }
  return [minX, minY, maxX, maxY]
}
const boxesApart = (a: Box, b: Box): boolean => a[0] > b[2] || b[0] > a[2] || a[1] > b[3] || b[1] > a[3]

export class Bench {
  /** By panel: where it lies. */
  readonly rings = new Map<number, readonly Ring2[]>()
  readonly parts = new Map<number, readonly ConvexPart[]>()
  readonly pieceOf = new Map<number, number>()
  private readonly boxes = new Map<number, Box>()
  /** By piece: the hull of the bare net, and an angle at which it was last seen to fit. */
  readonly hulls: readonly Float64Array[]
  private readonly angles: number[]
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
        this.boxes.set(panel, boxOf(rings[0]!.flat()))
        this.pieceOf.set(panel, i)
      }
    })
    this.hulls = pieces.map((p) => convexHull(p.panels.flatMap((q) => q.rings[0]!.flat())))
    const { widthMm, heightMm } = this.set.fit
    this.angles = this.hulls.map((hull) => roomiestAngle(hull, widthMm, heightMm))
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
  private corners(panel: number, crease: number): [number, number] {
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

  private obstacles(crease: number, side: Side, receiver: Side, reach: number): Obstacle[] {
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
    const window = this.windowOf(side, reach)
    for (const { panel } of this.pieces[side.piece]!.panels) {
      if (boxesApart(window, this.boxes.get(panel)!)) continue
      for (const part of this.parts.get(panel)!) {
        const points = intoAll(side, part)
        if (!near(points)) continue
        // The carrying panel itself is in the way only where it juts out beyond the crease's line.
        if (panel === side.panel) {
          const above = clipAbove(points, 1e-6)
          if (above.length > 0) out.push({ points: above, gap: gapMm, why: 'flat' })
        } else out.push({ points, gap: gapMm, why: 'flat' })
      }
    }
    for (const other of this.byPiece[side.piece]!) {
      if (other === crease) continue
      const outline = this.placed.get(other)!.outline.flat()
      if (boxesApart(window, boxOf(outline))) continue
      const points = intoAll(side, outline)
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

  /** A box that holds every place where a tab on this side could be, and its gap. */
  private windowOf({ a, b }: Side, reach: number): Box {
    const far = reach + this.set.gapMm
    return [
      Math.min(a[0], b[0]) - far,
      Math.min(a[1], b[1]) - far,
      Math.max(a[0], b[0]) + far,
      Math.max(a[1], b[1]) + far,
    ]
  }

  private onSheet(crease: number, side: Side, outline: readonly Vec2[]): boolean {
    const points = [...this.hulls[side.piece]!, ...outline.flat()]
    for (const other of this.byPiece[side.piece]!)
      if (other !== crease) points.push(...this.placed.get(other)!.outline.flat())
    const { widthMm, heightMm } = this.set.fit
    if (fitsAt(points, this.angles[side.piece]!, widthMm, heightMm)) return true
    const angle = fittingAngle(convexHull(points), widthMm, heightMm)
    if (angle !== null) this.angles[side.piece] = angle
    return angle !== null
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

/**
 * Nesting true outlines on sheets: bottom-left fill on a raster, largest first, over several turns of every part, each
 * sheet tried in turn (first-fit decreasing). Methods: bottom-left placement as in "Orthogonal packings in two
 * dimensions", SIAM Journal on Computing 9 (1980); first-fit decreasing as in "Worst-case performance bounds for simple
 * one-dimensional packing algorithms", SIAM Journal on Computing 3 (1974); raster overlap tests are usual practice.
 */
import { BrokenPromise, noProgress, type Progress } from '../errors'
import { offset, regionArea, union } from '../geometry/clip'
import { convexHull, roomiestAngle } from '../geometry/hull'
import { type Ring2, signedArea, type Vec2 } from '../geometry/vec2'
import { Board, type Mask, rasterize } from './raster'

/** What is to be laid on card. */
export interface NestItem {
  readonly id: number
  /** Region to keep free, mm, in the item's own plane: its panels and tabs, which may overlap and touch. */
  readonly rings: readonly Ring2[]
  /** Items of different groups never share a sheet (colours). */
  readonly group: string
  /** Items with the same key have the same rings: found placements and failures carry over. */
  readonly shape?: string
}

export interface NestOptions {
  readonly widthMm: number
  readonly heightMm: number
  readonly marginMm: number
  /** Between outlines; margins are kept by the outline itself. */
  readonly gapMm: number
  /** Mirror every item in u before it is turned (printing on the inside). */
  readonly mirrored: boolean
  /** Turns tried for each item besides those that lay a side of its hull along the sheet; default 16. */
  readonly turns?: number
  /** Side of a raster cell; default 1 mm for large parts, 0.5 mm where small parts are the rule. */
  readonly cellMm?: number
}

/** House rule: mirror u if mirrored, turn counter-clockwise by `rotation` degrees, add (x, y); origin bottom left. */
export interface Placed {
  readonly item: number
  readonly x: number
  readonly y: number
  readonly rotation: number
  readonly mirrored: boolean
}

export interface NestedSheet {
  readonly group: string
  readonly placed: readonly Placed[]
}

/** Placements are tried with all turns, and with those alone that lay a side of the hull along the sheet. */
type Turns = 'all' | 'flush'

/** One item turned one way, as a mask; (dx, dy) takes the turned item's lower left corner to the origin. */
interface Pose {
  readonly rotation: number
  /** A side of the hull lies along the sheet, or this is the roomiest turn. */
  readonly flush: boolean
  readonly mask: Mask
  readonly dx: number
  readonly dy: number
  readonly widthMm: number
  readonly heightMm: number
}

interface Shape {
  readonly key: string
  readonly areaMm2: number
  readonly poses: readonly Pose[]
}

/**
 * Lays all items on as few sheets as this method finds. Deterministic.
 * @throws BrokenPromise when an item does not fit an empty sheet at any of the turns tried
 */
export const nest = (
  items: readonly NestItem[],
  options: NestOptions,
  progress: Progress = noProgress,
): NestedSheet[] => {
  const cell = options.cellMm ?? usualCell(items)
  const half = options.gapMm / 2
  const inner = { w: options.widthMm - 2 * options.marginMm, h: options.heightMm - 2 * options.marginMm }
  const shapes = new Map<string, Shape>()
  const shapeOf = items.map((item, i) => {
    progress('sheets', (0.3 * i) / items.length)
    const key = item.shape ?? `item ${item.id}`
    let shape = shapes.get(key)
    if (!shape) shapes.set(key, (shape = prepare(item, key, options, inner, cell, half)))
    return shape
  })
  // The board reaches half a gap over the margins, since masks are grown by half a gap on every side.
  const size = { w: Math.ceil((inner.w + 2 * half) / cell) + 1, h: Math.ceil((inner.h + 2 * half) / cell) + 1 }
  let best: Sheet[] | null = null
  for (const [k, turns] of (['flush', 'all'] as const).entries()) {
    const report = (done: number): void => progress('sheets', 0.3 + 0.35 * (k + done / items.length))
    const made = fill(items, shapeOf, options, { inner, cell, size, turns }, report)
    if (!best || made.length < best.length) best = made
  }
  return best!.map(({ group, placed }) => ({ group, placed: placed.sort((a, b) => a.item - b.item) }))
}

/**
 * A millimetre lost beside a large part costs nothing, and a coarse raster is eight times faster; small parts are worth
 * the finer one. The border is at a mean of 1500 mm² a part, about 40 mm square.
 */
const usualCell = (items: readonly NestItem[]): number => {
  const area = items.reduce((sum, { rings }) => sum + rings.reduce((s, ring) => s + signedArea(ring), 0), 0)
  return area >= 1500 * items.length ? 1 : 0.5
}

interface Sheet {
  readonly group: string
  readonly board: Board
  readonly placed: Placed[]
  /** Shapes that found no place: as nothing is ever taken off, they need not be tried again. */
  readonly refused: Set<string>
}

interface Frame {
  readonly inner: { w: number; h: number }
  readonly cell: number
  readonly size: { w: number; h: number }
  readonly turns: Turns
}

const fill = (
  items: readonly NestItem[],
  shapeOf: readonly Shape[],
  options: NestOptions,
  frame: Frame,
  report: (done: number) => void,
): Sheet[] => {
  const { cell, size } = frame
  const sheets: Sheet[] = []
  let done = 0
  for (const group of new Set(items.map((i) => i.group))) {
    const order = items.map((_, i) => i).filter((i) => items[i]!.group === group)
    // Equal areas keep gluing order, so that neighbours in the order tend to share a sheet.
    order.sort((a, b) => Math.round(shapeOf[b]!.areaMm2) - Math.round(shapeOf[a]!.areaMm2) || a - b)
    for (const i of order) {
      report(done++)
      const shape = shapeOf[i]!
      let spot: Spot | null = null
      let home: Sheet | null = null
      for (const sheet of sheets) {
        if (sheet.group !== group || sheet.refused.has(shape.key)) continue
        if (sheet.board.free * cell * cell >= shape.areaMm2) spot = bestSpot(sheet.board, shape, frame)
        if (spot) {
          home = sheet
          break
        }
        sheet.refused.add(shape.key)
      }
      if (!home || !spot) {
        home = { group, board: new Board(size.w, size.h), placed: [], refused: new Set() }
        spot = bestSpot(home.board, shape, frame)
        if (!spot) throw new BrokenPromise('A piece does not fit an empty sheet.', { item: items[i]!.id })
        sheets.push(home)
      }
      const { pose, x, y } = spot
      home.board.put(pose.mask, x, y)
      home.placed.push({
        item: items[i]!.id,
        x: options.marginMm + x * cell + pose.dx,
        y: options.marginMm + y * cell + pose.dy,
        rotation: pose.rotation,
        mirrored: options.mirrored,
      })
    }
  }
  return sheets
}

interface Spot {
  readonly pose: Pose
  readonly x: number
  readonly y: number
}

/** The lowest free place over all poses: least upper rim, then leftmost. */
const bestSpot = (board: Board, shape: Shape, { inner, cell, turns }: Frame): Spot | null => {
  let best: Spot | null = null
  let bestTop = Number.POSITIVE_INFINITY
  for (const pose of shape.poses) {
    if (turns === 'flush' && !pose.flush) continue
    const lastX = Math.floor((inner.w - pose.widthMm) / cell + 1e-6)
    const lastY = Math.floor((inner.h - pose.heightMm) / cell + 1e-6)
    if (lastX < 0) continue
    for (let y = 0; y <= lastY; y++) {
      const top = y * cell + pose.heightMm
      if (top > bestTop - 1e-9) break
      const x = board.firstFree(pose.mask, y, lastX)
      if (x < 0) continue
      best = { pose, x, y }
      bestTop = top
      break
    }
  }
  return best
}

const prepare = (
  item: NestItem,
  key: string,
  options: NestOptions,
  inner: { w: number; h: number },
  cell: number,
  half: number,
): Shape => {
  const rings = options.mirrored ? item.rings.map((ring) => ring.map(([x, y]): Vec2 => [-x, y]).reverse()) : item.rings
  const region = union(rings)
  const grown = half > 0 ? offset(region, half) : region
  const flat: number[] = []
  for (const ring of region) for (const [x, y] of ring) flat.push(x, y)
  const hull = convexHull(flat)
  const roomiest = (roomiestAngle(hull, inner.w, inner.h) * 180) / Math.PI
  const poses: Pose[] = []
  for (const { rotation, flush } of turnsOf(hull, options.turns ?? 16, [roomiest, roomiest + 180])) {
    const c = Math.cos((rotation * Math.PI) / 180)
    const s = Math.sin((rotation * Math.PI) / 180)
    const turn = ([x, y]: Vec2): Vec2 => [c * x - s * y, s * x + c * y]
    let [left, bottom, right, top] = [Infinity, Infinity, -Infinity, -Infinity]
    for (let i = 0; i < hull.length; i += 2) {
      const [x, y] = turn([hull[i]!, hull[i + 1]!])
      left = Math.min(left, x)
      right = Math.max(right, x)
      bottom = Math.min(bottom, y)
      top = Math.max(top, y)
    }
    if (right - left > inner.w + 1e-6 || top - bottom > inner.h + 1e-6) continue
    const placed = grown.map((ring) =>
      ring.map((p): Vec2 => {
        const [x, y] = turn(p)
        return [x - left + half, y - bottom + half]
      }),
    )
    poses.push({
      flush,
      rotation: ((rotation % 360) + 360) % 360,
      mask: rasterize(placed, cell),
      dx: -left,
      dy: -bottom,
      widthMm: right - left,
      heightMm: top - bottom,
    })
  }
  return { key, areaMm2: regionArea(region), poses }
}

const turnApart = (a: number, b: number): number => {
  const d = Math.abs(a - b) % 360
  return Math.min(d, 360 - d)
}

/** Degrees: the given ones, turns that lay the longest sides of the hull along the sheet, and even steps between. */
const turnsOf = (
  hull: ArrayLike<number>,
  steps: number,
  first: readonly number[],
): { rotation: number; flush: boolean }[] => {
  const sides: { angle: number; length: number }[] = []
  const n = hull.length
  for (let i = 0; i < n; i += 2) {
    const dx = hull[(i + 2) % n]! - hull[i]!
    const dy = hull[(i + 3) % n]! - hull[i + 1]!
    sides.push({ angle: (-Math.atan2(dy, dx) * 180) / Math.PI, length: Math.hypot(dx, dy) })
  }
  sides.sort((a, b) => b.length - a.length || a.angle - b.angle)
  const turns: { rotation: number; flush: boolean }[] = []
  const consider = (angle: number, flush: boolean, apart: number): void => {
    const rotation = ((angle % 360) + 360) % 360
    if (!turns.some((t) => turnApart(rotation, t.rotation) < apart)) turns.push({ rotation, flush })
  }
  for (const angle of first) consider(angle, true, 1e-9)
  for (const { angle } of sides.slice(0, 4))
    for (const quarter of [0, 90, 180, 270]) consider(angle + quarter, true, 0.01)
  for (let k = 0; k < steps; k++) consider((360 * k) / steps, false, 2)
  return turns
}

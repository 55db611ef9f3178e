/** What the checks of a plan share: look-ups by id, the flat copy of each panel, tolerances, and how faults are told. */
import type { Ring2, Vec2 } from '../geometry/vec2'
import { sub2 } from '../geometry/vec2'
import type { Plan, PlanCheck, PlanCrease, PlanPanel, PlanPiece, Point2 } from './types'

/** A panel where it lies in its piece. */
export interface Laid {
  readonly piece: PlanPiece
  readonly rings: readonly Ring2[]
}

export interface PlanIndex {
  readonly plan: Plan
  readonly panels: ReadonlyMap<number, PlanPanel>
  readonly creases: ReadonlyMap<number, PlanCrease>
  readonly pieces: ReadonlyMap<number, PlanPiece>
  /** By panel id; the first place if a panel was laid twice. */
  readonly laid: ReadonlyMap<number, Laid>
  /** By crease id, with the piece that carries it. */
  readonly tabs: ReadonlyMap<number, readonly { readonly piece: PlanPiece; readonly tab: PlanPiece['tabs'][number] }[]>
  /** Two points closer than this, in mm, are the same point: a millionth of the model, far below a knife's width.
   * Where slivers were closed up, panels are flat within what that moved. */
  readonly near: number
}

export const indexPlan = (plan: Plan): PlanIndex => {
  const laid = new Map<number, Laid>()
  const tabs = new Map<number, { piece: PlanPiece; tab: PlanPiece['tabs'][number] }[]>()
  for (const piece of plan.pieces) {
    for (const { panel, rings } of piece.panels) if (!laid.has(panel)) laid.set(panel, { piece, rings })
    for (const tab of piece.tabs) {
      const list = tabs.get(tab.crease)
      if (list) list.push({ piece, tab })
      else tabs.set(tab.crease, [{ piece, tab }])
    }
  }
  return {
    plan,
    panels: new Map(plan.panels.map((panel) => [panel.id, panel])),
    creases: new Map(plan.creases.map((crease) => [crease.id, crease])),
    pieces: new Map(plan.pieces.map((piece) => [piece.id, piece])),
    laid,
    tabs,
    near: 1e-6 * plan.model.heightMm + offPlaneMm(plan),
  }
}

/**
 * How far points may be off their panels' planes, as the plan itself says: closed slivers, rounded coordinates. For the
 * latter never more than a thousandth of the height, whatever a file may claim.
 */
export const offPlaneMm = ({ model, docket }: Plan): number =>
  Math.min(model.offPlaneMm ?? 0, 1e-3 * model.heightMm) + (docket.closed?.offPlaneMm ?? 0)

/** A check's verdict: its first faults, and how many more there are. */
export const verdict = (name: string, faults: readonly string[], fine: string): PlanCheck => {
  const shown = faults.slice(0, 4).join('; ')
  const more = faults.length > 4 ? `; and ${faults.length - 4} more` : ''
  return { name, ok: faults.length === 0, detail: faults.length === 0 ? fine : shown + more }
}

/** Is x within `by` of y? Written so that NaN is not. */
export const within = (x: number, y: number, by: number): boolean => Math.abs(x - y) <= by

/** Least and greatest coordinates. */
export interface Box {
  readonly x0: number
  readonly y0: number
  readonly x1: number
  readonly y1: number
}

export const boxOf = (rings: readonly (readonly (Vec2 | Point2)[])[]): Box => {
  let [x0, y0, x1, y1] = [Infinity, Infinity, -Infinity, -Infinity]
  for (const ring of rings)
    for (const [x, y] of ring) {
      x0 = Math.min(x0, x)
      y0 = Math.min(y0, y)
      x1 = Math.max(x1, x)
      y1 = Math.max(y1, y)
    }
  return { x0, y0, x1, y1 }
}

export const boxesMeet = (a: Box, b: Box): boolean => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1

/** Pairs of boxes that meet, found by sweeping along x. */
export const meetingPairs = (boxes: readonly Box[]): [number, number][] => {
  const order = boxes.map((_, i) => i).sort((i, j) => boxes[i]!.x0 - boxes[j]!.x0)
  const open: number[] = []
  const pairs: [number, number][] = []
  for (const i of order) {
    const box = boxes[i]!
    let kept = 0
    for (const j of open) {
      if (boxes[j]!.x1 <= box.x0) continue
      open[kept++] = j
      if (boxesMeet(box, boxes[j]!)) pairs.push(i < j ? [i, j] : [j, i])
    }
    open.length = kept
    open.push(i)
  }
  return pairs
}

export const perimeter = (ring: Ring2): number =>
  ring.reduce((sum, p, i) => sum + Math.hypot(...sub2(ring[(i + 1) % ring.length]!, p)), 0)

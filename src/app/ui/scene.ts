/** From a plan to what the view draws. */
import type { Plan } from '../../plan/types'
import type { SceneItem } from '../../preview'
import { colourOf } from '../palette'

/** Piece id by panel id. */
export const pieceByPanel = (plan: Plan): ReadonlyMap<number, number> =>
  new Map(plan.pieces.flatMap(({ id, panels }) => panels.map(({ panel }) => [panel, id] as const)))

/** Panels as scene items: id = panel, group = piece, kind = colour name. */
export const planItems = (plan: Plan, tints: Readonly<Record<string, string>>): SceneItem[] => {
  const pieceOf = pieceByPanel(plan)
  return plan.panels.map(({ id, normal, rings, colour }) => ({
    id,
    group: pieceOf.get(id) ?? -1,
    kind: colour,
    colour: colourOf(colour, tints),
    normal,
    rings,
  }))
}

/** Outward direction from which a piece is seen best: its panels' normals by area. Null when they cancel out. */
export const facing = (plan: Plan, piece: number): [number, number, number] | null => {
  const mine = new Set(plan.pieces.find(({ id }) => id === piece)?.panels.map(({ panel }) => panel))
  const sum: [number, number, number] = [0, 0, 0]
  let area = 0
  for (const { id, normal, areaMm2 } of plan.panels) {
    if (!mine.has(id)) continue
    area += areaMm2
    for (let k = 0; k < 3; k++) sum[k]! += normal[k]! * areaMm2
  }
  const length = Math.hypot(...sum)
  return length > 1e-6 * area ? [sum[0] / length, sum[1] / length, sum[2] / length] : null
}

export interface KindShown {
  readonly kind: string
  readonly panels: number
}
/** Face kinds of a scene, in the order of first appearance. */
export const kindsOf = (items: readonly SceneItem[]): KindShown[] => {
  const counts = new Map<string, number>()
  for (const { kind } of items) counts.set(kind, (counts.get(kind) ?? 0) + 1)
  return [...counts].map(([kind, panels]) => ({ kind, panels }))
}

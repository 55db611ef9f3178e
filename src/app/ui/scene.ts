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

export interface KindShown {
  readonly kind: string
  readonly panels: number
  readonly colour: string
}
/** Face kinds of a scene, in the order of first appearance. */
export const kindsOf = (items: readonly SceneItem[]): KindShown[] => {
  const kinds = new Map<string, KindShown>()
  for (const { kind, colour } of items) kinds.set(kind, { kind, panels: (kinds.get(kind)?.panels ?? 0) + 1, colour })
  return [...kinds.values()]
}

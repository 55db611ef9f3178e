/**
 * A model on the Bench: one plan, frozen, and what has been glued of it. Changing choices on the Board makes another plan
 * and leaves this one alone.
 */
import type { Plan, PlanChoices, PlanPiece } from '../../plan/types'

export interface Job {
  readonly id: string
  readonly choices: PlanChoices
  /** Where the plan lies in the store. */
  readonly planKey: string
  /** Piece ids in the order in which they were glued; no piece twice. */
  readonly glued: readonly number[]
  /** Milliseconds since 1970. */
  readonly started: number
  readonly changed: number
}

export const glue = (job: Job, piece: number, now: number): Job =>
  job.glued.includes(piece) ? job : { ...job, glued: [...job.glued, piece], changed: now }

/** Takes a piece off the list, by default the last one glued. */
export const unglue = (job: Job, now: number, piece = job.glued.at(-1)): Job =>
  piece === undefined || !job.glued.includes(piece)
    ? job
    : { ...job, glued: job.glued.filter((id) => id !== piece), changed: now }

/** Pieces in gluing order. */
export const inOrder = (plan: Plan): PlanPiece[] => {
  const byId = new Map(plan.pieces.map((piece) => [piece.id, piece]))
  return [...plan.steps].sort((a, b) => a.step - b.step).flatMap(({ piece }) => byId.get(piece) ?? [])
}

/** The first piece in gluing order that is not glued; null when the model is done. */
export const nextPiece = (plan: Plan, glued: readonly number[]): PlanPiece | null => {
  const done = new Set(glued)
  return inOrder(plan).find(({ id }) => !done.has(id)) ?? null
}

/**
 * Seams to close with a piece: as the plan says when it is this piece's turn, else those whose other side is on the model
 * by now, or on the piece itself.
 */
export const seamsToGlue = (plan: Plan, glued: readonly number[], piece: number): number[] => {
  const step = plan.steps.find((entry) => entry.piece === piece)
  const before = new Set(plan.steps.filter((entry) => step && entry.step < step.step).map((entry) => entry.piece))
  const others = new Set(glued.filter((id) => id !== piece))
  const isItsTurn = before.size === others.size && [...before].every((id) => others.has(id))
  if (step && isItsTurn) return [...step.seams]
  const pieceOf = new Map(plan.pieces.flatMap(({ id, panels }) => panels.map(({ panel }) => [panel, id] as const)))
  return plan.creases
    .filter(({ join, panels }) => {
      const [a, b] = panels.map((panel) => pieceOf.get(panel)!) as [number, number]
      if (join !== 'seam' || (a !== piece && b !== piece)) return false
      const other = a === piece ? b : a
      return other === piece || others.has(other)
    })
    .map(({ id }) => id)
}

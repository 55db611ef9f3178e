/** The one sentence of the Bench. */
import type { Plan, PlanPiece } from '../../plan/types'
import { counted, listed } from './figures'

/** Labels of the pieces across some seams; '' for the piece itself. */
const across = (plan: Plan, piece: PlanPiece, seams: readonly number[]): string[] => {
  const mine = new Set(piece.panels.map(({ panel }) => panel))
  const labelOf = new Map(
    plan.pieces.flatMap(({ label, panels }) => panels.map(({ panel }) => [panel, label] as const)),
  )
  const steps = new Map(plan.pieces.map(({ label, step }) => [label, step]))
  const wanted = new Set(seams)
  const labels = new Set<string>()
  for (const { id, panels } of plan.creases) {
    if (!wanted.has(id)) continue
    const other = panels.find((panel) => !mine.has(panel))
    labels.add(other === undefined ? '' : (labelOf.get(other) ?? ''))
  }
  return [...labels].sort((a, b) => (steps.get(a) ?? 0) - (steps.get(b) ?? 0))
}

/** What lies across one seam of a piece, in words. */
export const sayAcross = (plan: Plan, piece: PlanPiece, seam: number): string => {
  const [label] = across(plan, piece, [seam])
  return label ? `to piece ${label}` : 'to itself'
}

/** @param sheet 1-based, 0 if unknown */
export const sayStep = (plan: Plan, piece: PlanPiece, seams: readonly number[], sheet: number): string => {
  const from = sheet > 0 ? ` from sheet ${sheet}` : ''
  const fold = piece.folds.length > 0 ? `fold it along ${counted(piece.folds.length, 'line')}` : 'it has no folds'
  const labels = across(plan, piece, seams)
  const others = labels.filter((label) => label !== '')
  const itself = labels.includes('') ? 'to itself' : ''
  const many = others.length > 6
  const pieces = many
    ? `to ${others.length} pieces`
    : others.length > 0
      ? `to ${others.length === 1 ? 'piece' : 'pieces'} ${listed(others)}`
      : ''
  const where = [itself, pieces].filter((text) => text !== '').join(' and ')
  const glue = seams.length > 0 ? `glue ${counted(seams.length, 'seam')} ${where}` : 'lay it ready: nothing to glue yet'
  return `Take piece ${piece.label}${from}, ${fold}, and ${glue}.`
}

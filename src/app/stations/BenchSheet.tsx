import { useEffect, useRef } from 'preact/hooks'
import type { Plan, PlanPiece } from '../../plan/types'
import { lightPiece } from '../ui/lit-page'
import { type Pages, usePageInto } from '../ui/pages'

/** 1-based; 0 if the piece is on none. */
export const sheetOf = (plan: Plan, piece: number): number =>
  plan.sheets.findIndex(({ placed }) => placed.some((entry) => entry.piece === piece)) + 1

/** The sheet with the piece lit. */
export const OnSheet = ({ pages, plan, piece }: { pages: Pages; plan: Plan; piece: PlanPiece }) => {
  const host = useRef<HTMLDivElement>(null)
  const index = pages.list.value.length > 0 ? pages.pageOf(piece.id) : -1
  const light = (): void => lightPiece(host.current, piece.id)
  usePageInto(host, pages, index, light)
  useEffect(light, [piece.id])
  const page = pages.list.value[index]
  return (
    <figure class="take-sheet">
      <div
        class="paper"
        ref={host}
        data-testid="take-page"
        role="img"
        aria-label={`Sheet ${sheetOf(plan, piece.id)} with piece ${piece.label} lit`}
        style={{ aspectRatio: page ? `${page.widthMm} / ${page.heightMm}` : '210 / 297' }}
      />
      <figcaption class="figures">
        Sheet {sheetOf(plan, piece.id)} of {plan.sheets.length}
      </figcaption>
    </figure>
  )
}

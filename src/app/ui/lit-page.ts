/** Lighting pieces on a drawn page. */

/** Marks the parts of one piece; by class, so that the styles decide how. */
export const lightPiece = (page: HTMLElement | null, piece: number | null): void => {
  if (!page) return
  for (const old of page.querySelectorAll('.lit')) old.classList.remove('lit')
  if (piece === null) return
  for (const part of page.querySelectorAll(`[data-piece="${piece}"]`)) part.classList.add('lit')
}

/** Piece id at an element of a page, null beside all pieces. */
export const pieceAt = (target: EventTarget | null): number | null => {
  const part = target instanceof Element ? target.closest('[data-piece]') : null
  return part ? Number((part as SVGElement).dataset.piece) : null
}

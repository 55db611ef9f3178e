/** A whole plan of pieces and tabs in one call, for tests. */
import { gluingOrder, renumber } from '../../src/assembly'
import { assignTabs, type CutOptions, cutIntoPieces, type PiecesPlan } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'

export const a4 = { widthMm: 190, heightMm: 277 }

export const planOf = (skin: Skin, edgeMm: number, options: Partial<CutOptions> = {}): PiecesPlan => {
  const fit = options.fit ?? a4
  const cut = cutIntoPieces(skin, { edgeMm, fit, effort: 100, ...options })
  const { pieces } = renumber(cut.pieces, gluingOrder(skin, cut.pieces))
  const { tabs, buttSeams } = assignTabs(skin, pieces, { fit })
  return { skin, edgeMm, pieces, tabs, buttSeams: buttSeams.map((b) => b.crease), fit }
}

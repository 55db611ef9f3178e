/** What to look at before printing, marked on the page on the screen; nothing of it prints. */
import type { Plan } from '../../plan/types'
import { narrowest } from '../words/craft'
import { drawPiece } from './piece-drawing'

export interface Problems {
  /** Labels of seams without a tab. */
  readonly bare: readonly string[]
  /** Whether the narrowest panel is here, and too narrow for fingers. */
  readonly narrow: boolean
  /** SVG text in the page's coordinates: mm, y down. */
  readonly marks: string
}

const at = (x: number, y: number): string => `${x.toFixed(2)} ${y.toFixed(2)}`

/** @param heightMm of the page */
export const problemsOn = (plan: Plan, pieces: readonly number[], heightMm: number): Problems => {
  const bareIds = new Set(plan.docket.buttSeams)
  const { panel: tightest, widthMm } = plan.docket.tightest
  const bare = new Set<string>()
  let narrow = false
  let marks = ''
  for (const id of pieces) {
    const piece = plan.pieces.find((entry) => entry.id === id)
    const isNarrow = widthMm < narrowest.fingers && (piece?.panels.some(({ panel }) => panel === tightest) ?? false)
    if (!piece || (!isNarrow && bareIds.size === 0)) continue
    const drawn = drawPiece(plan, piece)
    const [x, y] = [drawn.origin[0], heightMm - drawn.origin[1]]
    for (const { crease, label, from, to } of drawn.seams) {
      if (!bareIds.has(crease)) continue
      bare.add(label)
      marks += `<path class="bare" d="M${at(x + from[0], y + from[1])}L${at(x + to[0], y + to[1])}"/>`
    }
    if (!isNarrow) continue
    narrow = true
    for (const ring of drawn.panels.find(({ panel }) => panel === tightest)?.rings ?? [])
      marks += `<path class="narrow" d="M${ring.map((p) => at(x + p[0], y + p[1])).join('L')}Z"/>`
  }
  return { bare: [...bare], narrow, marks: marks === '' ? '' : `<g class="problems">${marks}</g>` }
}

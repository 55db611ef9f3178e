/** What a choice on the Board leads to, said beside it: only what is known, from the catalogue or from a plan. */
import type { Plan, PlanChoices } from '../../plan/types'
import type { SolidFacts } from '../../worker'
import { papers } from '../state/choices'
import type { KnownFacts } from '../storage/types'
import { heightForWidth, narrowest, sayNarrowest } from './craft'
import { counted, figure, listed, mmText, plural } from './figures'

export const sayHeight = (solid: SolidFacts | null, choices: PlanChoices, known: KnownFacts | undefined): string => {
  const parts: string[] = []
  // A dual's edges differ in length; a model's own scale means nothing here.
  if (solid && solid.family !== 'dual' && solid.family !== 'own')
    parts.push(`Edge ${mmText(choices.heightMm / (2 * solid.circumradius))}.`)
  if (known) {
    const width = known.narrowest * choices.heightMm
    parts.push(`Narrowest panel ${mmText(width)}: ${sayNarrowest(width)}.`)
    if (width < narrowest.fingers) {
      const [fingers, tweezers] = [narrowest.fingers, narrowest.tweezers].map((w) => heightForWidth(w, known.narrowest))
      parts.push(
        width < narrowest.tweezers
          ? `From ${tweezers} mm tweezers will do, from ${fingers} mm fingers.`
          : `From ${fingers} mm fingers will do.`,
      )
    }
  }
  return parts.join(' ')
}

export const sayPaper = ({ paper, marginMm }: PlanChoices): string => {
  const { widthMm, heightMm } = papers[paper]
  return `${figure(widthMm, 1)} × ${figure(heightMm, 1)} mm; room for pieces ${figure(widthMm - 2 * marginMm, 1)} × ${figure(heightMm - 2 * marginMm, 1)} mm.`
}

export const sayFill = (fill: PlanChoices['fill']): string =>
  fill === 'nonzero'
    ? 'A star face is one filled sheet of card.'
    : 'The middle of a star face is left out; one looks through it.'

export const sayHand = (hand: PlanChoices['hand']): string =>
  `The ${hand}-handed form. Its pieces do not fit the other.`

export const sayColours = (colours: PlanChoices['colours'], solid: SolidFacts | null): string => {
  const kinds = solid?.facesByKind.map(({ name }) => name) ?? []
  if (kinds.length === 1)
    return solid?.family === 'own'
      ? 'The model has one colour.'
      : `All faces are ${plural(kinds[0]!)}: one card either way.`
  if (colours === 'one') return 'Face kinds may hang together in one piece: fewer pieces and seams.'
  return `Sheets of ${listed(kinds.map(plural))} on their own card; every piece is of one kind.`
}

export const saySide = (side: PlanChoices['side']): string =>
  side === 'outside'
    ? 'Lines show on the finished model: for white card printed in colour.'
    : 'Sheets are mirror images; lines and labels end up inside. For card that is dyed through.'

/** Each seam has a tab on the piece that is glued earlier, whatever the way. */
export const sayCut = (nets: NonNullable<PlanChoices['nets']>): string =>
  ({
    fewest:
      'Panels stay joined as long as the net lies flat, does not overlap itself and fits the sheet: least gluing.',
    repeat: 'One net, or a few, many times over by symmetry: cut them alike and learn one fold.',
    modules: 'Each spike or pit is cut for itself; they meet along their rims.',
    single: 'Every panel for itself: for card of many colours.',
  })[nets]

/** By how much closing up has changed the skin. */
export const sayMoved = ({ movedMm, offPlaneMm }: NonNullable<Plan['docket']['closed']>): string =>
  `no corner moved more than ${figure(movedMm, 2)} mm, panels are flat within ${figure(offPlaneMm, 2)} mm`

/** What closing up has done, or would do. */
export const sayClosed = (plan: Plan | null, below: number): string => {
  if (below === 0) return '0 closes none.'
  const closed = plan?.docket.closed
  if (!closed || closed.belowMm !== below) return 'Short edges are drawn together to a point; the skin stays closed.'
  return `${counted(closed.stretches, 'stretch', 'stretches')} closed up; ${sayMoved(closed)}.`
}

/** What the nets came to; null without a plan. */
export const sayNets = (plan: Plan | null): string | null => {
  if (!plan) return null
  const { docket, pieces } = plan
  const largest = pieces.reduce((most, piece) => Math.max(most, piece.panels.length), 0)
  const bare = docket.buttSeams.length
  return [
    `${counted(docket.pieces, 'piece')} of ${counted(docket.templates, 'template')}; the largest has ${counted(largest, 'panel')}.`,
    bare > 0 ? `${counted(bare, 'seam')} without room for a tab.` : 'Every seam has its tab.',
  ].join(' ')
}

/**
 * What a figure means at the bench. Limits and uses are common practice, no source, unless said otherwise; they are
 * advice and never stop anybody.
 */

/** Narrowest panel, mm, from which a way of working is comfortable. */
export const narrowest = { fingers: 3, tweezers: 2, machine: 1 } as const

export const sayNarrowest = (widthMm: number): string => {
  if (widthMm >= narrowest.fingers) return 'fingers and a knife will do'
  if (widthMm >= narrowest.tweezers) return 'tweezers'
  if (widthMm >= narrowest.machine) return 'a cutting machine, or build it taller'
  return 'too narrow even for a cutting machine; build it taller'
}

/** Height at which the narrowest panel is as wide as `widthMm`: panels grow with the model. */
export const heightForWidth = (widthMm: number, narrowestOverHeight: number): number =>
  Math.ceil(widthMm / narrowestOverHeight)

/** The same, with the height from which fingers would do. */
export const sayNarrowestAt = (widthMm: number, heightMm: number): string =>
  widthMm >= narrowest.fingers
    ? sayNarrowest(widthMm)
    : `${sayNarrowest(widthMm)}; fingers from ${heightForWidth(narrowest.fingers, widthMm / heightMm)} mm height`

/** Sharpest inner angle, degrees: warn and refuse limits for fingers, tweezers and machine. */
export const sayAngle = (degrees: number): string => {
  if (degrees >= 20) return 'folds close without trouble'
  if (degrees >= 15) return 'thin card, and tweezers to close it'
  if (degrees >= 10) return 'very sharp: 90 to 120 g/m² card'
  return 'hardly to be closed by hand; fold it, do not glue it'
}

/** Thickness in µm for common weights; read in published craft texts, those marked ~ by common practice. */
const cards: readonly { grammage: number; micrometres: string; use: string }[] = [
  { grammage: 80, micrometres: '100', use: 'trial models' },
  { grammage: 120, micrometres: '~150', use: 'tiny parts and very sharp folds' },
  { grammage: 160, micrometres: '200', use: 'models of 80 to 200 mm, and general work' },
  { grammage: 180, micrometres: '230', use: 'general work' },
  { grammage: 220, micrometres: '~290', use: 'models of 200 to 350 mm with few large parts' },
  { grammage: 280, micrometres: '~365', use: 'large faces and braces' },
]
export const cardWeights = cards.map(({ grammage }) => grammage)

export const sayCard = (grammage: number): string => {
  const nearest = cards.reduce((best, card) =>
    Math.abs(card.grammage - grammage) < Math.abs(best.grammage - grammage) ? card : best,
  )
  const printer = grammage > 160 ? ' Many home printers stop at 160 to 220 g/m².' : ''
  const { micrometres, use } = nearest
  const thick = nearest.grammage === grammage ? `${micrometres} µm thick; ` : ''
  const about = micrometres.startsWith('~') ? thick.replace('~', 'about ') : thick
  return `${capital(`${about}for ${use}.`)}${printer}`
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

/** Evenings of two hours. */
export const sayHours = (hours: number): string => {
  if (hours <= 2) return 'one evening'
  return `about ${Math.ceil(hours / 2)} evenings of 2 hours`
}

/** Spares: at least one sheet, 5 % of the rest. */
export const spareSheets = (sheets: number): number => Math.max(1, Math.ceil(sheets * 0.05))

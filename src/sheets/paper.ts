/** Sheets of card: sizes, margins, and what a grammage means in thickness. */

export interface Paper {
  readonly id: string
  readonly name: string
  readonly widthMm: number
  readonly heightMm: number
}

/** ISO 216 and the North American sizes, upright. */
export const papers = {
  a4: { id: 'a4', name: 'A4', widthMm: 210, heightMm: 297 },
  letter: { id: 'letter', name: 'US Letter', widthMm: 215.9, heightMm: 279.4 },
} as const satisfies Record<string, Paper>

export type PaperId = keyof typeof papers

/** Thickness in mm of card of a grammage in g/m², at a bulk of 1.27 cm³/g (common practice, 1.2 to 1.35). */
export const thicknessMm = (grammage: number): number => (grammage * 1.27) / 1000

/** How a card is named on sheets and dockets. */
export const cardName = (grammage: number): string => `${grammage} g/m²`

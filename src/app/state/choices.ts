/** What the builder decides, its limits (the plan room's own, held together by a test), and how a choice is said in words. */
import type { PlanChoices } from '../../plan/types'

export const limits = {
  heightMm: { least: 10, most: 2000, unit: 'mm', name: 'Height' },
  marginMm: { least: 4, most: 40, unit: 'mm', name: 'Margin' },
  gapMm: { least: 0, most: 20, unit: 'mm', name: 'Gap' },
  grammage: { least: 60, most: 400, unit: 'g/m²', name: 'Card weight' },
  closeBelowMm: { least: 0, most: 2, unit: 'mm', name: 'Closing up below' },
} as const
export type NumberChoice = keyof typeof limits

/** Height 250 mm on A4, margins 10 mm: the everyday case. */
export const firstChoices = (solid: string): PlanChoices => ({
  solid,
  hand: 'right',
  fill: 'nonzero',
  heightMm: 250,
  paper: 'a4',
  side: 'outside',
  colours: 'one',
  marginMm: 10,
  gapMm: 2,
  grammage: 160,
  nets: 'fewest',
  closeBelowMm: 0,
})

const choiceNames = Object.keys(firstChoices('')) as (keyof PlanChoices)[]
/** A choice that an older build does not know stands as it would for a new one. */
export const sameChoices = (a: PlanChoices, b: PlanChoices): boolean => {
  const usual = firstChoices('')
  return choiceNames.every((name) => (a[name] ?? usual[name]) === (b[name] ?? usual[name]))
}

/**
 * Reads a number as people type it (a comma for the decimal point is fine).
 * @returns the value, or what is wrong and what would be right
 */
export const readNumber = (name: NumberChoice, text: string): { value: number } | { error: string } => {
  const { least, most, unit, name: word } = limits[name]
  const range = `${least} to ${most} ${unit}`
  const trimmed = text.trim().replace(',', '.')
  if (!/^\d+(\.\d+)?$|^\.\d+$/.test(trimmed)) return { error: `${word} must be a number from ${range}.` }
  const value = Number(trimmed)
  if (value < least || value > most) return { error: `${word} must be from ${range}; ${trimmed} ${unit} is outside.` }
  return { value }
}

/** Paper sizes by ISO 216 and ANSI/ASME Y14.1, in mm. */
export const papers = {
  a4: { name: 'A4', widthMm: 210, heightMm: 297 },
  letter: { name: 'US Letter', widthMm: 215.9, heightMm: 279.4 },
} as const

/** Choices in one line, for "as of …". */
export const sayChoices = (choices: PlanChoices, isChiral: boolean): string =>
  [
    `${choices.heightMm} mm`,
    papers[choices.paper].name,
    `${choices.grammage} g/m²`,
    ...(isChiral ? [`${choices.hand} hand`] : []),
    ...(choices.fill === 'evenodd' ? ['star centres open'] : []),
    choices.colours === 'one' ? 'one card' : 'card by face kind',
    ...(choices.nets && choices.nets !== 'fewest' ? [`nets: ${choices.nets}`] : []),
    ...(choices.closeBelowMm ? [`closed up below ${choices.closeBelowMm} mm`] : []),
    `printed ${choices.side}`,
  ].join(', ')

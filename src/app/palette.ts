/**
 * Card colours by face kind: quiet tones of stained and dyed card, told apart by lightness as well as hue, each with a
 * pattern for its swatch so that none is told by colour alone.
 */
export type Pattern = 'plain' | 'stripes' | 'dots' | 'grid' | 'steep' | 'bricks' | 'rings' | 'waves' | 'checks'

interface Tint {
  readonly colour: string
  readonly pattern: Pattern
}

const tints: Readonly<Record<string, Tint>> = {
  triangle: { colour: '#d9a441', pattern: 'stripes' },
  square: { colour: '#5f8fb4', pattern: 'grid' },
  pentagon: { colour: '#7fa36b', pattern: 'dots' },
  pentagram: { colour: '#c0604a', pattern: 'steep' },
  hexagon: { colour: '#8d79a8', pattern: 'bricks' },
  octagon: { colour: '#4f9a94', pattern: 'rings' },
  octagram: { colour: '#b77a95', pattern: 'waves' },
  decagon: { colour: '#a9926f', pattern: 'checks' },
  decagram: { colour: '#6f7f96', pattern: 'plain' },
}
const other: Tint = { colour: '#b9b2a6', pattern: 'plain' }

export const tintOf = (kind: string): Tint => tints[kind] ?? other
export const patternOf = (kind: string): Pattern => tintOf(kind).pattern

/** CSS hex by face kind: the builder's own where there is one. */
export const colourOf = (kind: string, own: Readonly<Record<string, string>>): string =>
  own[kind] ?? tintOf(kind).colour
export const defaultColours: Readonly<Record<string, string>> = Object.fromEntries(
  Object.entries(tints).map(([kind, { colour }]) => [kind, colour]),
)

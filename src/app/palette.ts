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
/** For all other kinds and for materials: one of these, always the same for the same name; never that of squares or
 * triangles, which stand beside the ends of prisms and antiprisms. */
const others = ['pentagon', 'pentagram', 'hexagon', 'octagon', 'octagram', 'decagon', 'decagram'] as const

export const tintOf = (kind: string): Tint => {
  let sum = 0
  for (const letter of kind) sum = (31 * sum + letter.codePointAt(0)!) % 9973
  return tints[kind] ?? tints[others[sum % others.length]!]!
}
export const patternOf = (kind: string): Pattern => tintOf(kind).pattern

/** CSS hex by face kind: the builder's own where there is one. */
export const colourOf = (kind: string, own: Readonly<Record<string, string>>): string =>
  own[kind] ?? tintOf(kind).colour
/** Names of face kinds that the catalogue has besides; a picture needs its colours before the facts are there. */
const rarer = [
  'kite',
  'dart',
  'rhombus',
  'antiparallelogram',
  'isosceles triangle',
  'scalene triangle',
  'irregular pentagon',
  'concave pentagon',
  'irregular pentagram',
  'irregular hexagon',
  'concave hexagon',
  'crossed hexagon',
  'irregular hexagram',
  'heptagon',
  'enneagon',
  'dodecagon',
  'dodecagram',
  'card',
]
const numbered = Array.from({ length: 24 }, (_, i) => i + 1).flatMap((n) => [
  `${n}-gon`,
  ...Array.from({ length: Math.floor(n / 2) }, (_, d) => `${n}/${d + 1}-gram`),
])
export const defaultColours: Readonly<Record<string, string>> = Object.fromEntries(
  [...Object.keys(tints), ...rarer, ...numbered].map((kind) => [kind, tintOf(kind).colour]),
)

import { colourOf, type Pattern, patternOf } from '../palette'

/** Marks of each pattern in a square of 12. */
const marks: Record<Pattern, string> = {
  plain: '',
  stripes: 'M0 3H12M0 9H12',
  dots: 'M3 3h.01M9 3h.01M6 6h.01M3 9h.01M9 9h.01',
  grid: 'M4 0V12M8 0V12M0 4H12M0 8H12',
  steep: 'M-2 12L6 0M4 12L12 0M10 12L14 6',
  bricks: 'M0 4H12M0 8H12M6 0V4M3 4V8M9 4V8M6 8V12',
  rings: 'M6 3.2a2.8 2.8 0 1 0 .01 0',
  waves: 'M0 4q3-3 6 0t6 0M0 9q3-3 6 0t6 0',
  checks: 'M0 0h6v6H0zM6 6h6v6H6z',
}

/** A chip of card in a face kind's colour and pattern; the word stands beside it, so it is silent. */
export const Swatch = ({ kind, tints }: { kind: string; tints: Readonly<Record<string, string>> }) => (
  <svg class="swatch" viewBox="0 0 12 12" aria-hidden="true">
    <rect width="12" height="12" fill={colourOf(kind, tints)} />
    <path
      d={marks[patternOf(kind)]}
      fill={patternOf(kind) === 'checks' ? '#00000055' : 'none'}
      stroke={patternOf(kind) === 'checks' ? 'none' : '#00000088'}
      stroke-width={patternOf(kind) === 'dots' ? 2.2 : 1.1}
      stroke-linecap="round"
    />
  </svg>
)

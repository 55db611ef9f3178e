/** Figures as a builder reads them: rounded to what matters on the bench, always with a unit. */

/** `plain` without trailing zeros; up to `digits` after the point. */
export const figure = (value: number, digits = 0): string => {
  const text = value.toFixed(digits)
  return digits === 0 ? text : text.replace(/\.?0+$/, '')
}

/** Millimetres with what a rule can show: a tenth below 100 mm. */
export const mmText = (mm: number): string => `${figure(mm, mm < 100 ? 1 : 0)} mm`

/** Long lengths: metres from one metre on. */
export const lengthText = (mm: number): string =>
  mm < 1000 ? mmText(mm) : `${figure(mm / 1000, mm < 100_000 ? 1 : 0)} m`

/** `9 h 20 min`, as the printed docket says it. */
export { duration as hoursText } from '../../drawing'

export const areaText = (mm2: number): string =>
  mm2 < 100_000 ? `${figure(mm2 / 100)} cm²` : `${figure(mm2 / 1e6, 2)} m²`

export const percentText = (fraction: number): string => `${Math.round(fraction * 100)} %`
export const degreesText = (degrees: number): string => `${figure(degrees, degrees < 100 ? 1 : 0)}°`

/** More than one of a face kind: triangles, rhombi, crossed hexagons. */
export const plural = (kind: string): string => (kind.endsWith('rhombus') ? `${kind.slice(0, -2)}i` : `${kind}s`)

/** `1 sheet`, `2 sheets`. */
export const counted = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

/** `a, b and c`. */
export const listed = (items: readonly string[]): string =>
  items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} and ${items.at(-1)}`

const units: [Intl.RelativeTimeFormatUnit, number][] = [
  ['day', 86_400_000],
  ['hour', 3_600_000],
  ['minute', 60_000],
]
/** `3 days ago`; both in milliseconds since 1970. */
export const agoText = (then: number, now: number): string => {
  const words = new Intl.RelativeTimeFormat('en', { numeric: 'auto' })
  for (const [unit, size] of units) if (now - then >= size) return words.format(-Math.floor((now - then) / size), unit)
  return 'just now'
}

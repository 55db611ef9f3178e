/** How far the coordinates of a file may be off, from how it writes numbers. */
import type { RawModel } from './types'

/**
 * So few digits are taken as exact: a cube with corners at 1 and -1 is not rounded to a whole number, and what is rounded
 * to three digits is too rough to be flat anyway.
 */
const exactDigits = 3

/**
 * Greatest error of a point in file units: the half unit in the last place of the greatest coordinate, times √3 for a
 * point in space. A text with many digits may still repeat single-precision numbers: it does when every coordinate is
 * one, rounded to these digits.
 * @param greatest absolute coordinate, above 0
 * @param size radius of the model, in file units
 */
export const roundingOf = ({ numbers, digits, coordinates }: RawModel, greatest: number, size: number): number => {
  const point = Math.sqrt(3)
  const single = greatest * 2 ** -24
  // Nobody computes a model to the last bit of double precision.
  const double = greatest * 1e-14
  if (numbers === 'float32') return point * single
  if (numbers !== 'float64' && digits <= exactDigits) return Math.max(1e-7 * size, point * double)
  const written = numbers === 'float64' ? double : 0.5 * 10 ** (Math.floor(Math.log10(greatest)) + 1 - digits)
  const slack = Math.max(written, double) * 1.001
  const fromSingle = slack < single && coordinates.every((x) => Math.abs(x - Math.fround(x)) <= slack)
  return point * Math.max(fromSingle ? single : written, double)
}

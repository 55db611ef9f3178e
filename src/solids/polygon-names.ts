/** English names of polygons: regular ones by {n/d}, irregular ones by their shape. */
import { type Vec2, windingNumber } from '../geometry/vec2'

const regularNames: Readonly<Record<string, string>> = {
  '3/1': 'triangle',
  '4/1': 'square',
  '5/1': 'pentagon',
  '5/2': 'pentagram',
  '6/1': 'hexagon',
  '7/1': 'heptagon',
  '8/1': 'octagon',
  '8/3': 'octagram',
  '9/1': 'enneagon',
  '10/1': 'decagon',
  '10/3': 'decagram',
  '12/1': 'dodecagon',
  '12/5': 'dodecagram',
}

/** English name of {n/d}; d is the polygon's density, under n/2. */
export const polygonName = (n: number, d: number): string =>
  regularNames[`${n}/${d}`] ?? (d === 1 ? `${n}-gon` : `${n}/${d}-gram`)

/** Greek numerals as in "heptagonal", for n from 3 to 24. */
const greek: readonly string[] = [
  'tri',
  'tetra',
  'penta',
  'hexa',
  'hepta',
  'octa',
  'ennea',
  'deca',
  'hendeca',
  'dodeca',
  'trideca',
  'tetradeca',
  'pentadeca',
  'hexadeca',
  'heptadeca',
  'octadeca',
  'enneadeca',
  'icosa',
  'icosihena',
  'icosidi',
  'icositri',
  'icositetra',
]

/** "triangular", "square", "heptagonal", "heptagrammic 7/3": what goes before prism or antiprism. n from 3 to 24. */
export const polygonAdjective = (n: number, d: number): string => {
  if (d > 1) return `${greek[n - 3]!}grammic ${n}/${d}`
  return n === 3 ? 'triangular' : n === 4 ? 'square' : `${greek[n - 3]!}gonal`
}

const equal = (a: number, b: number): boolean => Math.abs(a - b) < 1e-7 * (Math.abs(a) + Math.abs(b))

/** Whether two edges that are no neighbours meet. */
const selfCrossing = (ring: readonly Vec2[]): boolean => {
  const n = ring.length
  const side = (a: Vec2, b: Vec2, p: Vec2): number =>
    Math.sign((b[0] - a[0]) * (p[1] - a[1]) - (b[1] - a[1]) * (p[0] - a[0]))
  for (let i = 0; i < n; i++)
    for (let j = i + 2; j < n; j++) {
      if (i === 0 && j === n - 1) continue
      const [a, b, c, d] = [ring[i]!, ring[i + 1]!, ring[j]!, ring[(j + 1) % n]!]
      if (side(a, b, c) * side(a, b, d) <= 0 && side(c, d, a) * side(c, d, b) <= 0) return true
    }
  return false
}

/**
 * What a builder would call an irregular polygon: rhombus, kite, dart, isosceles triangle, concave pentagon, crossed hexagon …
 * An irregular polygon that winds evenly round its middle more than once is a pentagram, hexagram and so on.
 *
 * @param ring its corners in order, in its plane
 */
export const shapeName = (ring: readonly Vec2[]): string => {
  const n = ring.length
  const at = (i: number): Vec2 => ring[((i % n) + n) % n]!
  const sides = ring.map((a, i) => Math.hypot(at(i + 1)[0] - a[0], at(i + 1)[1] - a[1]))
  const turns = ring.map((b, i) => {
    const [a, c] = [at(i - 1), at(i + 1)]
    return Math.sign((b[0] - a[0]) * (c[1] - b[1]) - (b[1] - a[1]) * (c[0] - b[0]))
  })
  const allOneWay = turns.every((t) => t === turns[0])
  const crossed = selfCrossing(ring)
  if (n === 3) {
    const pairs = [0, 1, 2].filter((i) => equal(sides[i]!, sides[(i + 1) % 3]!)).length
    return pairs === 3 ? 'triangle' : pairs === 1 ? 'isosceles triangle' : 'scalene triangle'
  }
  if (n === 4) {
    const [a, b, c, d] = sides as [number, number, number, number]
    const opposite = equal(a, c) && equal(b, d)
    if (crossed) return opposite ? 'antiparallelogram' : 'crossed quadrilateral'
    const kite = (equal(a, b) && equal(c, d)) || (equal(b, c) && equal(d, a))
    if (!allOneWay) return kite ? 'dart' : 'concave quadrilateral'
    if (kite) return equal(a, c) ? 'rhombus' : 'kite'
    return opposite ? 'parallelogram' : 'quadrilateral'
  }
  const name = n - 3 < greek.length ? greek[n - 3]! : `${n}-`
  if (!crossed) return `${allOneWay ? 'irregular' : 'concave'} ${name}gon`
  const middle: Vec2 = [ring.reduce((s, p) => s + p[0], 0) / n, ring.reduce((s, p) => s + p[1], 0) / n]
  return allOneWay && Math.abs(windingNumber(ring, middle)) > 1 ? `irregular ${name}gram` : `crossed ${name}gon`
}

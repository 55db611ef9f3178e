/**
 * Prisms and antiprisms over regular polygons {n/d}, unit edge, centred, with the axis upright. Symbols and conditions of
 * existence: "Uniform polyhedra", Phil. Trans. R. Soc. A 246 (1954).
 */
import { BrokenPromise } from '../errors'
import type { Vec3 } from '../geometry/vec3'
import { polygonAdjective } from './polygon-names'
import type { RawFace, RawSolid } from './raw'

/** The family's bounds: polygons have 3 to 24 corners. */
export const leastCorners = 3
export const mostCorners = 24

const divisor = (a: number, b: number): number => (b === 0 ? a : divisor(b, a % b))

/** All {n/d} with n from 3 to 24, d prime to n and under n/2. */
const polygons: readonly (readonly [n: number, d: number])[] = Array.from(
  { length: mostCorners - leastCorners + 1 },
  (_, i) => i + leastCorners,
).flatMap((n) =>
  Array.from({ length: Math.ceil(n / 2) - 1 }, (_, i) => i + 1)
    .filter((d) => divisor(n, d) === 1)
    .map((d) => [n, d] as const),
)

export interface PrismName {
  readonly name: string
  readonly wythoff: string
  readonly n: number
  /** Of antiprisms also over n/2: the crossed ones. */
  readonly d: number
}

const fraction = (n: number, d: number): string => (d === 1 ? `${n}` : `${n}/${d}`)

/** Without {4}: its prism is the cube. */
export const prismNames: readonly PrismName[] = polygons
  .filter(([n]) => n !== 4)
  .map(([n, d]) => ({ name: `${polygonAdjective(n, d)} prism`, wythoff: `2 ${fraction(n, d)} | 2`, n, d }))

/**
 * Without {3}: its antiprism is the octahedron. A crossed antiprism {n/(n − d)} has the same two polygons, one of them turned
 * half a step farther, so that the triangles cross the axis; it exists while n/(n − d) is over 3/2, where it goes flat.
 */
export const antiprismNames: readonly PrismName[] = polygons
  .filter(([n]) => n !== 3)
  .flatMap(([n, d]) => [
    { name: `${polygonAdjective(n, d)} antiprism`, wythoff: `| 2 2 ${fraction(n, d)}`, n, d },
    ...(2 * n > 3 * (n - d)
      ? [{ name: `${polygonAdjective(n, n - d)} crossed antiprism`, wythoff: `| 2 2 ${n}/${n - d}`, n, d: n - d }]
      : []),
  ])

/** Two rings of n vertices: 0 to n − 1 above, n to 2n − 1 below; each steps by 2πd/n, so neighbours are a unit apart. */
const rings = (n: number, d: number, height: number, twist: number): Vec3[] => {
  const radius = 0.5 / Math.sin((Math.PI * d) / n)
  const ring = (z: number, start: number): Vec3[] =>
    Array.from({ length: n }, (_, k): Vec3 => {
      // The multiple of a turn goes out in whole numbers, for full precision.
      const angle = (Math.PI * ((2 * k * d) % (2 * n))) / n + start
      return [radius * Math.cos(angle), radius * Math.sin(angle), z]
    })
  return [...ring(height / 2, 0), ...ring(-height / 2, twist)]
}

const indices = (n: number): number[] => Array.from({ length: n }, (_, k) => k)

/** The two polygons; `d` may be over n/2, the polygon itself has the lesser density. */
const ends = (n: number, d: number): RawFace[] => {
  const density = Math.min(d, n - d)
  return [
    { cycle: indices(n), d: density },
    { cycle: indices(n).map((k) => k + n), d: density },
  ]
}

/** The uniform prism of {n/d}: 4.4.n/d. */
export const constructPrism = (n: number, d: number): RawSolid => ({
  vertices: rings(n, d, 1, 0),
  faces: [...ends(n, d), ...indices(n).map((k) => ({ cycle: [k, (k + 1) % n, ((k + 1) % n) + n, k + n], d: 1 }))],
})

/**
 * The uniform antiprism of {n/d}: 3.3.3.n/d, crossed where d is over n/2. The lower ring is turned half a step πd/n; the
 * height follows from the unit edge between the rings.
 *
 * @throws BrokenPromise where n/d is 3/2 or less, which leaves no height
 */
export const constructAntiprism = (n: number, d: number): RawSolid => {
  const half = (Math.PI * d) / n
  const height = Math.sqrt(1 - 0.25 / Math.cos(half / 2) ** 2)
  if (!(height > 1e-6)) throw new BrokenPromise('There is no antiprism over this polygon.', { n, d })
  const triangles = indices(n).flatMap((k) => [
    { cycle: [k, (k + 1) % n, k + n], d: 1 },
    { cycle: [k + n, ((k + 1) % n) + n, (k + 1) % n], d: 1 },
  ])
  return { vertices: rings(n, d, height, half), faces: [...ends(n, d), ...triangles] }
}

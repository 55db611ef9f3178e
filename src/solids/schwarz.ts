/** Schwarz triangles: spherical triangles with angles π/p, π/q, π/r whose reflections cover the sphere a whole number of times. */
import { BrokenPromise } from '../errors'
import {
  cross,
  distance,
  dot,
  identity3,
  type Mat3,
  multiply,
  normalize,
  rotationAbout,
  scale,
  sub,
  type Vec3,
} from '../geometry/vec3'
import { type Rational, ratio } from './wythoff-symbol'

export interface SchwarzTriangle {
  readonly numbers: readonly [Rational, Rational, Rational]
  /** Unit vectors, counter-clockwise seen from outside. */
  readonly corners: readonly [Vec3, Vec3, Vec3]
  /** Unit normals of the mirrors opposite the corners, pointing to the triangle's inside. */
  readonly mirrors: readonly [Vec3, Vec3, Vec3]
  /** Turns by 2π/p, 2π/q, 2π/r about the corners; their product in this order is the identity. */
  readonly turns: readonly [Mat3, Mat3, Mat3]
}

/** Law of cosines for sides of a spherical triangle given by its angles. */
const sideCosine = (opposite: number, a: number, b: number): number =>
  (Math.cos(opposite) + Math.cos(a) * Math.cos(b)) / (Math.sin(a) * Math.sin(b))

/** Corners by the spherical law of cosines, the first at the north pole. */
export const schwarzTriangle = (numbers: readonly [Rational, Rational, Rational]): SchwarzTriangle => {
  const [a, b, c] = numbers.map((x) => Math.PI / ratio(x)) as [number, number, number]
  const cosPQ = sideCosine(c, a, b)
  const cosPR = sideCosine(b, a, c)
  const sinPQ = Math.sqrt(1 - cosPQ * cosPQ)
  const sinPR = Math.sqrt(1 - cosPR * cosPR)
  const p: Vec3 = [0, 0, 1]
  const q: Vec3 = [sinPQ, 0, cosPQ]
  const r: Vec3 = [sinPR * Math.cos(a), sinPR * Math.sin(a), cosPR]
  const mirror = (x: Vec3, y: Vec3): Vec3 => normalize(cross(x, y))
  const turn = (axis: Vec3, x: Rational): Mat3 => rotationAbout(axis, (2 * Math.PI) / ratio(x))
  return {
    numbers,
    corners: [p, q, r],
    mirrors: [mirror(q, r), mirror(r, p), mirror(p, q)],
    turns: [turn(p, numbers[0]), turn(q, numbers[1]), turn(r, numbers[2])],
  }
}

/** Mirror image of p in the plane through the centre with this unit normal. */
export const reflect = (normal: Vec3, p: Vec3): Vec3 => sub(p, scale(normal, 2 * dot(normal, p)))

const near = (a: Mat3, b: Mat3): boolean =>
  distance(a[0], b[0]) < 1e-6 && distance(a[1], b[1]) < 1e-6 && distance(a[2], b[2]) < 1e-6

/** The finite group that the turns generate, identity first. @throws BrokenPromise when it has more than 60 elements */
export const generateGroup = (generators: readonly Mat3[]): Mat3[] => {
  const elements: Mat3[] = [identity3]
  for (let i = 0; i < elements.length; i++)
    for (const g of generators) {
      const m = multiply(g, elements[i]!)
      if (elements.some((e) => near(e, m))) continue
      elements.push(m)
      if (elements.length > 60) throw new BrokenPromise('The turns generate no finite polyhedral group.')
    }
  return elements
}

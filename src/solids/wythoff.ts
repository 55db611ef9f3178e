/**
 * Wythoff's construction: a point of a Schwarz triangle, its images under the group, and the polygons round the corners.
 * Method: "Uniform polyhedra", Phil. Trans. R. Soc. A 246 (1954); the snub point is found from a single equation.
 */
import { BrokenPromise } from '../errors'
import { SnapGrid } from '../geometry/snap'
import { add, apply, cross, distance, dot, type Mat3, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import type { RawSolid } from './raw'
import { generateGroup, reflect, type SchwarzTriangle, schwarzTriangle } from './schwarz'
import { type Rational, readWythoff, type WythoffSymbol } from './wythoff-symbol'

/** A face before it is spread by the group: its corners in space. */
type Polygon = readonly Vec3[]

/**
 * Constructs the uniform polyhedron of a Wythoff symbol.
 * @throws BrokenPromise when the symbol is none that this construction knows
 */
export const constructWythoff = (text: string): RawSolid => {
  const symbol = readWythoff(text)
  if (symbol.after.length === 4) return doubleSnub(symbol)
  const numbers = [...symbol.before, ...symbol.after]
  if (numbers.length !== 3) throw new BrokenPromise('This Wythoff symbol is not known.', { text })
  const triangle = schwarzTriangle(numbers as [Rational, Rational, Rational])
  const group = generateGroup(triangle.turns)
  if (symbol.before.length === 0) {
    const point = snubPoint(triangle)
    const round = triangle.numbers.flatMap((x, i) => (x.n === 2 ? [] : [orbitPolygon(triangle.turns[i]!, x.n, point)]))
    const snub: Polygon = [
      point,
      apply(triangle.turns[0], point),
      apply(triangle.turns[0], apply(triangle.turns[1], point)),
    ]
    return spread([...round, snub], group, [])
  }
  const point = activePoint(triangle, symbol)
  const polygons = [0, 1, 2].flatMap((i) => cornerPolygon(triangle, i, point))
  return spread(polygons, group, [(p) => reflect(triangle.mirrors[0], p)])
}

/** The point for the symbols with one, two or three numbers before the bar. */
const activePoint = (triangle: SchwarzTriangle, symbol: WythoffSymbol): Vec3 => {
  const { corners, mirrors } = triangle
  if (symbol.before.length === 1) return corners[0]
  // p q | r: on the side PQ, as far from RP as from QR. p q r |: as far from all three sides.
  const toward = symbol.before.length === 2 ? mirrors[2] : sub(mirrors[1], mirrors[2])
  const point = normalize(cross(toward, sub(mirrors[0], mirrors[1])))
  return dot(point, mirrors[0]) < 0 ? scale(point, -1) : point
}

/** The polygon round corner i: images of the point under the two mirrors there, taken in turn. None if it is degenerate. */
const cornerPolygon = (triangle: SchwarzTriangle, i: number, point: Vec3): Polygon[] => {
  const turn = triangle.turns[i]!
  const mirror = triangle.mirrors[(i + 1) % 3]!
  const other = triangle.mirrors[(i + 2) % 3]!
  // The turn is one reflection after the other; the polygon's first edge crosses the mirror that reflects last.
  const probe: Vec3 = [0.36, 0.48, 0.8]
  const lastIsMirror = distance(reflect(mirror, reflect(other, probe)), apply(turn, probe)) < 1e-9
  let p = point
  let q = reflect(lastIsMirror ? mirror : other, point)
  const cycle: Vec3[] = []
  for (let k = 0; k < triangle.numbers[i]!.n; k++) {
    for (const x of [p, q]) if (cycle.length === 0 || distance(cycle[cycle.length - 1]!, x) > 1e-9) cycle.push(x)
    p = apply(turn, p)
    q = apply(turn, q)
  }
  if (cycle.length > 1 && distance(cycle[0]!, cycle[cycle.length - 1]!) < 1e-9) cycle.pop()
  // Points and digons are no faces; a polygon that comes back to a corner is wound twice round and drops out.
  const twice = cycle.some((x, j) => cycle.some((y, k) => k > j && distance(x, y) < 1e-9))
  return cycle.length < 3 || twice ? [] : [cycle]
}

const orbitPolygon = (turn: Mat3, n: number, point: Vec3): Polygon => {
  const cycle = [point]
  while (cycle.length < n) cycle.push(apply(turn, cycle[cycle.length - 1]!))
  return cycle
}

/**
 * The point with |v − Pv| = |v − Qv| = |v − Rv| for the turns about the corners. A turn by 2π/p moves v by
 * 2 sin(π/p) sin(angle to P), so with c the common square, v · P = ±√(1 − c/sin²(π/p)), and the Gram matrix of the corners
 * turns |v| = 1 into one equation in c for each choice of signs. Of its roots, the snub point is the one inside the Schwarz
 * triangle: all three coordinates with respect to the corners are positive. There is exactly one.
 */
export const snubPoint = (triangle: SchwarzTriangle): Vec3 => {
  const { corners, numbers } = triangle
  const sines = numbers.map(({ n, d }) => Math.sin((Math.PI * d) / n) ** 2)
  const volume = dot(corners[0], cross(corners[1], corners[2]))
  const dual = [cross(corners[1], corners[2]), cross(corners[2], corners[0]), cross(corners[0], corners[1])].map((x) =>
    scale(x, 1 / volume),
  ) as [Vec3, Vec3, Vec3]
  const gram = dual.flatMap((a) => dual.map((b) => dot(a, b)))
  const pointAt = (c: number, signs: readonly number[]): Vec3 => {
    let v: Vec3 = [0, 0, 0]
    for (let i = 0; i < 3; i++) v = add(v, scale(dual[i]!, signs[i]! * Math.sqrt(Math.max(0, 1 - c / sines[i]!))))
    return v
  }
  const greatest = Math.min(...sines)
  const steps = 4000
  const found: Vec3[] = []
  for (let mask = 0; mask < 8; mask++) {
    const signs = [1, 2, 4].map((bit) => (mask & bit ? -1 : 1))
    const off = (c: number): number => norm(pointAt(c, signs)) - 1
    // The search looks at the sign alone, thousands of times: |v|² − 1 from the Gram matrix, without vectors.
    const tooLong = (c: number): boolean => {
      let square = 0
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++) {
          const product = Math.max(0, 1 - c / sines[i]!) * Math.max(0, 1 - c / sines[j]!)
          square += signs[i]! * signs[j]! * Math.sqrt(product) * gram[3 * i + j]!
        }
      return square > 1
    }
    for (let k = 0; k < steps; k++) {
      let low = (greatest * (k + 1e-6)) / steps
      let high = (greatest * (k + 1)) / steps
      if (tooLong(low) === tooLong(high)) continue
      for (let i = 0; i < 80; i++) {
        const middle = (low + high) / 2
        if (off(middle) > 0 === off(low) > 0) low = middle
        else high = middle
      }
      const v = pointAt((low + high) / 2, signs)
      const inside = ([0, 1, 2] as const).every((i) => dot(v, triangle.mirrors[i]) * Math.sign(volume) > 1e-6)
      if (inside && !found.some((f) => distance(f, v) < 1e-6)) found.push(normalize(v))
    }
  }
  if (found.length !== 1) throw new BrokenPromise('Not exactly one snub point in a Schwarz triangle.', { found })
  return found[0]!
}

/**
 * `| p q r s`: the snub point of three of the four numbers lies on a mirror. That mirror swaps the two turns of order five
 * and gives the third corner a second image, whose turn has the fourth number. Each edge then bounds, besides its
 * pentagram or triangle, a square through the centre, in place of the snub triangles.
 */
const doubleSnub = (symbol: WythoffSymbol): RawSolid => {
  const byNumerator = (n: number): Rational[] => symbol.after.filter((x) => x.n === n)
  const [a, b] = byNumerator(5)
  const c = byNumerator(3).find((x) => x.d === 1)
  if (!a || !b || !c) throw new BrokenPromise('This Wythoff symbol is not known.', { symbol })
  const triangle = schwarzTriangle([a, b, c])
  const point = snubPoint(triangle)
  const group = generateGroup(triangle.turns)
  const round = triangle.numbers.map((x, i) => orbitPolygon(triangle.turns[i]!, x.n, point))
  const mirror = normalize(sub(triangle.corners[0], triangle.corners[1]))
  if (Math.abs(dot(mirror, point)) > 1e-9) throw new BrokenPromise('The snub point does not lie on a mirror.')
  const squares = round.flatMap((polygon) =>
    [polygon[1]!, polygon[polygon.length - 1]!].map((q): Polygon => [point, q, scale(point, -1), scale(q, -1)]),
  )
  return spread([...round, ...squares], group, [(p) => reflect(mirror, p)])
}

/** All images of the polygons under the rotations, and under one reflection followed by each rotation if given. */
const spread = (
  polygons: readonly Polygon[],
  group: readonly Mat3[],
  mirrors: readonly ((p: Vec3) => Vec3)[],
): RawSolid => {
  const edge = distance(polygons[0]![0]!, polygons[0]![1]!)
  const grid = new SnapGrid(1e-7, 1e-7, 1e-2)
  const seen = new Set<string>()
  const faces: { cycle: number[]; d: number }[] = []
  const before: ((p: Vec3) => Vec3)[] = [(p) => p, ...mirrors]
  for (const polygon of polygons) {
    const d = densityOf(polygon)
    for (const first of before)
      for (const g of group) {
        const cycle = polygon.map((p) => {
          const [x, y, z] = scale(apply(g, first(p)), 1 / edge)
          return grid.add(x, y, z)
        })
        const key = `${d}:${[...cycle].sort((x, y) => x - y).join(' ')}`
        if (seen.has(key)) continue
        seen.add(key)
        faces.push({ cycle, d })
      }
  }
  const vertices = Array.from({ length: grid.size }, (_, i): Vec3 => [grid.x[i]!, grid.y[i]!, grid.z[i]!])
  return { vertices, faces }
}

/** How many times a regular polygon winds about its centre: the d of {n/d} with d < n/2. */
export const densityOf = (polygon: Polygon): number => {
  const n = polygon.length
  const centre = scale(
    polygon.reduce((s, p) => add(s, p), [0, 0, 0] as Vec3),
    1 / n,
  )
  const a = sub(polygon[0]!, centre)
  const b = sub(polygon[1]!, centre)
  const angle = Math.atan2(norm(cross(a, b)), dot(a, b))
  return Math.round((angle * n) / (2 * Math.PI))
}

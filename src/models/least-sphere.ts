/** The least sphere that holds a set of points. */
import { add, cross, distance, dot, norm, scale, sub, type Vec3 } from '../geometry/vec3'

export interface Sphere {
  readonly centre: Vec3
  readonly radius: number
}

/** Least sphere with these 1 to 4 points on its surface, its centre in their span; null if they are not independent. */
const through = (points: readonly Vec3[]): Sphere | null => {
  const o = points[0]!
  const edges = points.slice(1).map((p) => sub(p, o))
  const [a, b, c] = edges
  let offset: Vec3 = [0, 0, 0]
  if (a && !b) offset = scale(a, 0.5)
  else if (a && b && !c) {
    // Circumcentre of a triangle, from the usual vector formula.
    const n = cross(a, b)
    const n2 = dot(n, n)
    if (!(n2 > 1e-24 * dot(a, a) * dot(b, b))) return null
    offset = scale(add(scale(cross(n, a), dot(b, b)), scale(cross(b, n), dot(a, a))), 0.5 / n2)
  } else if (a && b && c) {
    const det = dot(a, cross(b, c))
    if (!(Math.abs(det) > 1e-12 * norm(a) * norm(b) * norm(c))) return null
    const sum = add(add(scale(cross(b, c), dot(a, a)), scale(cross(c, a), dot(b, b))), scale(cross(a, b), dot(c, c)))
    offset = scale(sum, 0.5 / det)
  }
  return { centre: add(o, offset), radius: norm(offset) }
}

/** All choices of two to four out of at most five. */
const subsets = (list: readonly Vec3[]): Vec3[][] => {
  const found: Vec3[][] = []
  for (let bits = 0; bits < 1 << list.length; bits++) {
    const set = list.filter((_, i) => bits & (1 << i))
    if (set.length >= 2 && set.length <= 4) found.push(set)
  }
  return found
}

/**
 * Exact up to rounding: the farthest point is taken into a support of at most four, of which the least sphere is found by
 * trying all; the radius grows at every step (an LP-type problem: Welzl, New Results and New Trends in Computer Science,
 * LNCS 555, 1991; the choice of the farthest point: Gärtner, ESA 1999). The steps are bounded as well.
 * @param points at least one
 */
export const leastSphere = (points: readonly Vec3[]): Sphere => {
  const farthestFrom = (from: Vec3): Vec3 => {
    let best = points[0]!
    let most = -1
    for (const p of points) {
      const d = distance(p, from)
      if (d > most) {
        most = d
        best = p
      }
    }
    return best
  }
  const first = farthestFrom(points[0]!)
  let support: Vec3[] = [first, farthestFrom(first)]
  let sphere = through(support)!
  for (let step = 0; step < 200; step++) {
    const p = farthestFrom(sphere.centre)
    if (distance(p, sphere.centre) <= sphere.radius * (1 + 1e-13)) break
    const candidates = [...support, p]
    let best: { sphere: Sphere; support: Vec3[] } | null = null
    for (const set of subsets(candidates)) {
      const s = through(set)
      if (!s || (best && s.radius >= best.sphere.radius)) continue
      if (candidates.every((q) => distance(q, s.centre) <= s.radius * (1 + 1e-12))) best = { sphere: s, support: set }
    }
    if (!best || best.sphere.radius <= sphere.radius) break
    sphere = best.sphere
    support = best.support
  }
  return sphere
}

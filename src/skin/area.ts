/** Area vectors of polygons in space. */
import { add, cross, norm, scale, sub, type Vec3 } from '../geometry/vec3'

/** Area vector of a closed polygon in space (half the sum of cross products), star polygons counted by winding. */
export const areaVector = (points: readonly Vec3[]): Vec3 => {
  let sum: Vec3 = [0, 0, 0]
  const o = points[0]!
  for (let i = 1; i + 1 < points.length; i++) sum = add(sum, cross(sub(points[i]!, o), sub(points[i + 1]!, o)))
  return scale(sum, 0.5)
}

/**
 * A vector across the face, about as long as its area: the area vector, or, where that cancels out (a crossed
 * quadrilateral whose two lobes are alike), the area vector of its largest corner triangle.
 */
export const acrossFace = (points: readonly Vec3[]): Vec3 => {
  const whole = areaVector(points)
  const n = points.length
  let best: Vec3 = [0, 0, 0]
  for (let i = 0; i < n; i++) {
    const p = points[i]!
    const corner = scale(cross(sub(points[(i + 1) % n]!, p), sub(points[(i + n - 1) % n]!, p)), 0.5)
    if (norm(corner) > norm(best)) best = corner
  }
  return norm(whole) > 1e-3 * norm(best) ? whole : best
}

/** How narrow a panel is: the least distance between two parallel lines that hold it (rotating calipers on its hull). */
import { convexHull } from '../geometry/hull'
import type { Ring2 } from '../geometry/vec2'

/** Least width in mm of a flat ring. Notches are not seen: a star is as wide as its hull. */
export const leastWidth = (ring: Ring2): number => {
  const hull = convexHull(ring.flat())
  const n = hull.length / 2
  let least = Number.POSITIVE_INFINITY
  for (let i = 0; i < n; i++) {
    const j = (i + 1) % n
    const dx = hull[2 * j]! - hull[2 * i]!
    const dy = hull[2 * j + 1]! - hull[2 * i + 1]!
    const length = Math.hypot(dx, dy)
    if (length === 0) continue
    let farthest = 0
    for (let k = 0; k < n; k++) {
      const off = (dx * (hull[2 * k + 1]! - hull[2 * i + 1]!) - dy * (hull[2 * k]! - hull[2 * i]!)) / length
      if (off > farthest) farthest = off
    }
    if (farthest < least) least = farthest
  }
  return Number.isFinite(least) ? least : 0
}

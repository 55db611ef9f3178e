/**
 * An independent way to tell what a line of sight meets first: every ring of every item as a fan about its plane, in
 * model space, without projection, triangulation or depth buffer. Triangles by Möller and Trumbore, "Fast, minimum
 * storage ray-triangle intersection", Journal of Graphics Tools 2(1), 1997; other rings by the winding number of the
 * point where the line meets the plane.
 */
import { type Vec2, windingNumber } from '../../src/geometry/vec2'
import { add, cross, dot, planeFrame, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import type { SceneItem } from '../../src/preview/types'

export interface Ray {
  readonly origin: Vec3
  readonly direction: Vec3
}

export interface Met {
  readonly index: number
  /** In lengths of the ray's direction. */
  readonly t: number
}

export interface Cast {
  readonly nearest: Met | null
  /** The ray all but touches an outline. */
  readonly grazed: boolean
  /** The answer hangs on rounding: grazed, or two items are met at the same depth. */
  readonly doubtful: boolean
}

type Meet = (ray: Ray) => { t: number; isHit: boolean; grazed: boolean }

const triangle =
  ([a, b, c]: readonly [Vec3, Vec3, Vec3], margin: number): Meet =>
  (ray) => {
    const e1 = sub(b, a)
    const e2 = sub(c, a)
    const p = cross(ray.direction, e2)
    const det = dot(e1, p)
    if (det === 0) return { t: 0, isHit: false, grazed: true }
    const s = sub(ray.origin, a)
    const u = dot(s, p) / det
    const q = cross(s, e1)
    const v = dot(ray.direction, q) / det
    const least = Math.min(u, v, 1 - u - v)
    return { t: dot(e2, q) / det, isHit: least >= 0, grazed: Math.abs(least) < margin }
  }

const polygon = (item: SceneItem, margin: number): Meet => {
  const { u, v } = planeFrame(item.normal)
  const corner = item.rings[0]![0]!
  const flat = (p: Vec3): Vec2 => [dot(sub(p, corner), u), dot(sub(p, corner), v)]
  const rings = [item.rings, ...(item.moreRings ?? [])].flat().map((ring) => ring.map(flat))
  const reach = Math.max(...rings.flat().map(([x, y]) => Math.hypot(x, y)))
  const inside = (p: Vec2): boolean => rings.reduce((sum, ring) => sum + windingNumber(ring, p), 0) !== 0
  return (ray) => {
    const t = dot(sub(corner, ray.origin), item.normal) / dot(ray.direction, item.normal)
    const [x, y] = flat(add(ray.origin, scale(ray.direction, t)))
    if (!(Math.hypot(x, y) < 1.01 * reach)) return { t, isHit: false, grazed: false }
    const isHit = inside([x, y])
    const grazed = [0, 1, 2, 3, 4].some((k) => {
      const angle = (k * 2 * Math.PI) / 5
      return inside([x + margin * Math.cos(angle), y + margin * Math.sin(angle)]) !== isHit
    })
    return { t, isHit, grazed }
  }
}

/** @param margin closeness to an outline that makes the answer doubtful */
export const rayCaster = (items: readonly SceneItem[], margin = 1e-6): ((ray: Ray) => Cast) => {
  const meets = items.map((item): Meet => {
    const [a, b, c] = item.rings[0]!
    const isTriangle = item.rings.length === 1 && item.rings[0]!.length === 3 && !item.moreRings?.length
    return isTriangle ? triangle([a!, b!, c!], margin) : polygon(item, margin)
  })
  return (ray) => {
    const hits: Met[] = []
    let grazed = false
    meets.forEach((meet, index) => {
      const met = meet(ray)
      if (met.grazed) grazed = true
      if (met.isHit) hits.push({ index, t: met.t })
    })
    hits.sort((a, b) => a.t - b.t)
    const [first, second] = hits
    // Wider than the depth biases that decide between coincident panels.
    const level = first !== undefined && second !== undefined && second.t - first.t < 1e-4 * first.t
    return { nearest: first ?? null, grazed, doubtful: grazed || level }
  }
}

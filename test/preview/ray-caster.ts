/**
 * An independent way to tell what a line of sight meets first: every ring of every item as a fan about its plane, in
 * model space, without projection, triangulation or depth buffer. Triangles by Möller and Trumbore, "Fast, minimum
 * storage ray-triangle intersection", Journal of Graphics Tools 2(1), 1997; other rings by the winding number of the
 * point where the line meets the plane.
 */
import { windingNumber } from '../../src/geometry/vec2'
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

/** @param margin relative closeness to an outline or to another hit that makes the answer doubtful */
export const castRay = (items: readonly SceneItem[], ray: Ray, margin = 1e-6): Cast => {
  const hits: Met[] = []
  let grazed = false
  items.forEach((item, index) => {
    const ring = item.rings[0]!
    if (ring.length === 3 && item.rings.length === 1 && !item.moreRings?.length) {
      const [a, b, c] = ring as [Vec3, Vec3, Vec3]
      const e1 = sub(b, a)
      const e2 = sub(c, a)
      const p = cross(ray.direction, e2)
      const det = dot(e1, p)
      if (det === 0) return
      const s = sub(ray.origin, a)
      const u = dot(s, p) / det
      const q = cross(s, e1)
      const v = dot(ray.direction, q) / det
      const least = Math.min(u, v, 1 - u - v)
      if (Math.abs(least) < margin) grazed = true
      if (least >= 0) hits.push({ index, t: dot(e2, q) / det })
      return
    }
    const { u, v } = planeFrame(item.normal)
    const t = dot(sub(ring[0]!, ray.origin), item.normal) / dot(ray.direction, item.normal)
    const at = add(ray.origin, scale(ray.direction, t))
    const flat = (p: Vec3): [number, number] => [dot(p, u), dot(p, v)]
    const inside = ([x, y]: [number, number]): boolean =>
      [item.rings, ...(item.moreRings ?? [])].flat().reduce((sum, r) => sum + windingNumber(r.map(flat), [x, y]), 0) !==
      0
    const [x, y] = flat(at)
    const here = inside([x, y])
    for (let k = 0; k < 8; k++) {
      const angle = (k * Math.PI) / 4
      if (inside([x + margin * Math.cos(angle), y + margin * Math.sin(angle)]) !== here) grazed = true
    }
    if (here) hits.push({ index, t })
  })
  hits.sort((a, b) => a.t - b.t)
  const [first, second] = hits
  // Wider than the depth biases that decide between coincident panels.
  const level = first !== undefined && second !== undefined && second.t - first.t < 1e-4 * first.t
  return { nearest: first ?? null, grazed, doubtful: grazed || level }
}

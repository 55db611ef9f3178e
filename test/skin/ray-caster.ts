/**
 * A second, independent way to see a solid from outside: plain rays against whole faces, with no arrangement, no
 * symmetry and none of the skin's code. A point lies in a filled face when the angles under which it sees the edges add
 * up to a non-zero (or odd) number of turns.
 */
import type { FillRule, Solid } from '../../src/solids/types'

type V = readonly [number, number, number]
const sub = (a: V, b: V): V => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
const dot = (a: V, b: V): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
const cross = (a: V, b: V): V => [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]

export interface Polygon3 {
  /** Closed rings; a solid's face has one (maybe a star), a panel its outer ring and holes. */
  readonly rings: readonly (readonly V[])[]
  readonly rule: FillRule
}

interface Prepared {
  readonly polygon: Polygon3
  readonly normal: V
  readonly point: V
  readonly centre: V
  readonly reach: number
}

export const prepare = (polygon: Polygon3): Prepared => {
  const ring = polygon.rings[0] as readonly V[]
  // The largest of the corner cross products gives the plane: no Newell sum, so that stars are no special case.
  let normal: V = [0, 0, 0]
  for (let i = 0; i < ring.length; i++)
    for (let j = i + 1; j < ring.length; j++) {
      const n = cross(sub(ring[i] as V, ring[0] as V), sub(ring[j] as V, ring[0] as V))
      if (dot(n, n) > dot(normal, normal)) normal = n
    }
  const length = Math.sqrt(dot(normal, normal))
  normal = [normal[0] / length, normal[1] / length, normal[2] / length]
  const centre: V = [
    ring.reduce((s, p) => s + p[0], 0) / ring.length,
    ring.reduce((s, p) => s + p[1], 0) / ring.length,
    ring.reduce((s, p) => s + p[2], 0) / ring.length,
  ]
  const reach = Math.max(...ring.map((p) => dot(sub(p, centre), sub(p, centre)))) * 1.0001
  return { polygon, normal, point: ring[0] as V, centre, reach }
}

const turns = (ring: readonly V[], normal: V, p: V): number => {
  let angle = 0
  for (let i = 0; i < ring.length; i++) {
    const a = sub(ring[i] as V, p)
    const b = sub(ring[(i + 1) % ring.length] as V, p)
    angle += Math.atan2(dot(cross(a, b), normal), dot(a, b))
  }
  return Math.round(angle / (2 * Math.PI))
}

/** Distance at which a ray meets a filled polygon, or null. */
const meets = ({ polygon, normal, point, centre, reach }: Prepared, from: V, direction: V): number | null => {
  const slope = dot(normal, direction)
  if (slope === 0) return null
  const distance = dot(normal, sub(point, from)) / slope
  if (distance <= 0) return null
  const p: V = [from[0] + distance * direction[0], from[1] + distance * direction[1], from[2] + distance * direction[2]]
  const away = sub(p, centre)
  if (dot(away, away) > reach) return null
  const w = polygon.rings.reduce((sum, ring) => sum + turns(ring, normal, p), 0)
  return (polygon.rule === 'nonzero' ? w !== 0 : w % 2 !== 0) ? distance : null
}

/** Index and distance of the first polygon that the ray meets, or null. */
export const cast = (list: readonly Prepared[], from: V, direction: V): { index: number; distance: number } | null => {
  let best: { index: number; distance: number } | null = null
  for (let index = 0; index < list.length; index++) {
    const prepared = list[index] as Prepared
    const slope = dot(prepared.normal, direction)
    if (best && dot(prepared.normal, sub(prepared.point, from)) / slope >= best.distance) continue
    const distance = meets(prepared, from, direction)
    if (distance !== null) best = { index, distance }
  }
  return best
}

/** How often a ray crosses the polygons. */
export const crossings = (list: readonly Prepared[], from: V, direction: V): number =>
  list.reduce((n, polygon) => (meets(polygon, from, direction) === null ? n : n + 1), 0)

export const facesAsPolygons = (solid: Solid, rule: FillRule): Polygon3[] =>
  solid.faces.map((f) => ({ rings: [f.cycle.map((i) => solid.vertices[i] as V)], rule }))

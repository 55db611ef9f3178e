/**
 * Where an odd number of faces ends. If that is nowhere, a ray that misses the edges passes from one parity to the other at
 * every face, so no face has the unbounded outside on both of its sides, unless faces lie on one another.
 *
 * Edges are compared as stretches of a line, not as pairs of corners: a corner of one face in the middle of another's edge
 * is no gap.
 */
import { cross, dot, norm, sub, type Vec3 } from '../geometry/vec3'

interface Cycled {
  readonly cycle: readonly number[]
}

export interface OpenStretch {
  readonly ends: readonly [number, number]
  /** Positions in the list of faces, of those that end here. */
  readonly faces: readonly number[]
}

/** Cells and corners looked at; a soup of unconnected long triangles would cost the square of its size. */
const workBound = 8_000_000

/**
 * @param reach how far a corner may lie from an edge and still divide it
 * @param beat called often
 * @returns stretches with an odd number of faces
 */
export const openStretches = (
  points: readonly Vec3[],
  faces: readonly Cycled[],
  reach: number,
  beat: () => void,
): OpenStretch[] => {
  beat()
  const odd = oddStretches(
    faces.flatMap(({ cycle }, face) => cycle.map((a, i) => ({ a, b: cycle[(i + 1) % cycle.length]!, faces: [face] }))),
    points.length,
  )
  beat()
  if (odd.length === 0) return []
  const divide = dividerOf(points, odd, reach)
  const parts = odd.flatMap((s, i) => {
    if ((i & 127) === 0) beat()
    const stops = [s.ends[0], ...divide(s.ends), s.ends[1]]
    return stops.slice(1).map((b, i) => ({ a: stops[i]!, b, faces: s.faces }))
  })
  return oddStretches(parts, points.length)
}

const oddStretches = (
  parts: readonly { readonly a: number; readonly b: number; readonly faces: readonly number[] }[],
  count: number,
): OpenStretch[] => {
  const found = new Map<number, { ends: [number, number]; times: number; faces: number[] }>()
  for (const { a, b, faces } of parts) {
    if (a === b) continue
    const key = Math.min(a, b) * count + Math.max(a, b)
    const s = found.get(key)
    if (s) {
      s.times++
      s.faces.push(...faces)
    } else found.set(key, { ends: [Math.min(a, b), Math.max(a, b)], times: 1, faces: [...faces] })
  }
  return [...found.values()].filter((s) => s.times % 2 === 1)
}

/** For an edge: the ends of other odd edges that lie between its ends, in order. */
const dividerOf = (
  points: readonly Vec3[],
  odd: readonly OpenStretch[],
  reach: number,
): ((ends: readonly [number, number]) => number[]) => {
  const corners = [...new Set(odd.flatMap((s) => s.ends))]
  const low = [0, 1, 2].map((k) => corners.reduce((m, v) => Math.min(m, points[v]![k]!), Number.POSITIVE_INFINITY))
  const high = [0, 1, 2].map((k) => corners.reduce((m, v) => Math.max(m, points[v]![k]!), Number.NEGATIVE_INFINITY))
  const side = Math.max(...[0, 1, 2].map((k) => high[k]! - low[k]!)) / 64 + 4 * reach
  const cellOf = (k: number, x: number): number => Math.floor((x - low[k]!) / side) + 1
  const keyOf = (i: number, j: number, k: number): number => (i * 128 + j) * 128 + k
  const cells = new Map<number, number[]>()
  for (const v of corners) {
    const p = points[v]!
    const key = keyOf(cellOf(0, p[0]), cellOf(1, p[1]), cellOf(2, p[2]))
    const list = cells.get(key)
    if (list) list.push(v)
    else cells.set(key, [v])
  }
  let work = 0
  return ([a, b]) => {
    const p = points[a]!
    const d = sub(points[b]!, p)
    const length = norm(d)
    // The edge in steps of half a cell; round each step all neighbouring cells.
    const steps = Math.ceil((2 * length) / side)
    const seen = new Set<number>()
    const hits: { v: number; t: number }[] = []
    for (let s = 0; s <= steps; s++) {
      const t = steps === 0 ? 0 : s / steps
      const at = [0, 1, 2].map((k) => cellOf(k, p[k]! + t * d[k]!)) as [number, number, number]
      for (let i = at[0] - 1; i <= at[0] + 1; i++)
        for (let j = at[1] - 1; j <= at[1] + 1; j++)
          for (let k = at[2] - 1; k <= at[2] + 1; k++) {
            if (++work > workBound) return []
            const key = keyOf(i, j, k)
            if (seen.has(key)) continue
            seen.add(key)
            for (const v of cells.get(key) ?? []) {
              if (++work > workBound) return []
              if (v === a || v === b) continue
              const e = sub(points[v]!, p)
              const along = dot(e, d) / length
              if (along <= 0 || along >= length || norm(cross(e, d)) > reach * length) continue
              hits.push({ v, t: along })
            }
          }
    }
    return hits.sort((x, y) => x.t - y.t).map((h) => h.v)
  }
}

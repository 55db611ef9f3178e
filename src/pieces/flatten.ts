/** From the skin in space (unit edges) to flat panels in mm. */
import { BrokenPromise } from '../errors'
import { distance2, dot2, normalize2, sub2, type Vec2 } from '../geometry/vec2'
import { distance, dot, planeFrame, sub } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import type { FlatPanel } from './types'

/**
 * Every panel in a frame of its own plane, seen from outside: origin at its first ring point, millimetres, outer rings
 * counter-clockwise. Rings keep their points and their order, so ring edge i still is crease `panel.creases[r][i]`.
 *
 * @param edgeMm length of the solid's edge in mm
 */
export const flattenPanels = (skin: Skin, edgeMm: number): FlatPanel[] =>
  skin.panels.map((panel) => {
    const { u, v } = planeFrame(panel.normal)
    const origin = skin.points[panel.rings[0]?.[0] ?? -1]
    if (!origin) throw new BrokenPromise('A panel has no outer ring.', { panel: panel.id })
    const rings = panel.rings.map((ring) =>
      ring.map((i): Vec2 => {
        const d = sub(skin.points[i]!, origin)
        return [dot(d, u) * edgeMm, dot(d, v) * edgeMm]
      }),
    )
    // A panel that is not quite flat is a little short in projection; a shared edge must be as long on both its panels.
    if (skin.slack > 0)
      for (const [r, ring] of panel.rings.entries())
        rings[r] = withLengths(
          rings[r]!,
          ring.map((v, i) => edgeMm * distance(skin.points[v]!, skin.points[ring[(i + 1) % ring.length]!]!)),
        )
    return { panel: panel.id, rings }
  })

/** The ring with side i of length `lengths[i]`, every point moved as little as will do (Gauss–Newton, least norm). */
const withLengths = (ring: readonly Vec2[], lengths: readonly number[]): Vec2[] => {
  const n = ring.length
  let points = [...ring]
  for (let pass = 0; pass < 4; pass++) {
    const along = points.map((p, i): Vec2 => normalize2(sub2(points[(i + 1) % n]!, p)))
    const short = lengths.map((l, i) => l - distance2(points[i]!, points[(i + 1) % n]!))
    if (short.every((s) => Math.abs(s) < 1e-12)) break
    // Each side pulls its two ends; neighbouring sides share a point, so the system is cyclic and tridiagonal.
    const m = along.map((d, i) => {
      const row = new Array<number>(n).fill(0)
      row[i]! += 2
      row[(i + 1) % n]! -= dot2(d, along[(i + 1) % n]!)
      row[(i + n - 1) % n]! -= dot2(d, along[(i + n - 1) % n]!)
      return row
    })
    const pull = solve(m, short)
    if (!pull) break
    points = points.map((p, i): Vec2 => {
      const before = (i + n - 1) % n
      return [
        p[0] + pull[before]! * along[before]![0] - pull[i]! * along[i]![0],
        p[1] + pull[before]! * along[before]![1] - pull[i]! * along[i]![1],
      ]
    })
  }
  return points
}

/** Gaussian elimination with row exchange; null for a singular matrix. */
const solve = (m: number[][], rhs: readonly number[]): number[] | null => {
  const n = rhs.length
  const a = m.map((row, i) => [...row, rhs[i]!])
  for (let k = 0; k < n; k++) {
    let best = k
    for (let i = k + 1; i < n; i++) if (Math.abs(a[i]![k]!) > Math.abs(a[best]![k]!)) best = i
    if (Math.abs(a[best]![k]!) < 1e-12) return null
    ;[a[k], a[best]] = [a[best]!, a[k]!]
    for (let i = k + 1; i < n; i++) {
      const f = a[i]![k]! / a[k]![k]!
      if (f !== 0) for (let j = k; j <= n; j++) a[i]![j]! -= f * a[k]![j]!
    }
  }
  const x = new Array<number>(n).fill(0)
  for (let k = n - 1; k >= 0; k--) {
    let sum = a[k]![n]!
    for (let j = k + 1; j < n; j++) sum -= a[k]![j]! * x[j]!
    x[k] = sum / a[k]![k]!
  }
  return x
}

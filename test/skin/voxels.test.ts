/**
 * The enclosed volume against a grid of cubes: cubes that a face passes through are walls, the outside is what a flood
 * from a corner reaches, and the cubes of the wall next to the flood are what the grid cannot tell: its error bound.
 * Shares no code with the skin.
 */
import { describe, expect, test } from 'vitest'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily } from '../../src/solids'
import type { Solid } from '../../src/solids/types'

type V = readonly [number, number, number]
const sub = (a: V, b: V): V => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
const dot = (a: V, b: V): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
const cross = (a: V, b: V): V => [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]

/** Is p (in the face's plane) within `near` of the face's filled region (nonzero)? */
const reaches = (ring: readonly V[], normal: V, p: V, near: number): boolean => {
  let angle = 0
  for (let i = 0; i < ring.length; i++) {
    const a = sub(ring[i]!, p)
    const b = sub(ring[(i + 1) % ring.length]!, p)
    const d = sub(b, a)
    const t = Math.max(0, Math.min(1, -dot(a, d) / dot(d, d)))
    const foot: V = [a[0] + t * d[0], a[1] + t * d[1], a[2] + t * d[2]]
    if (dot(foot, foot) <= near * near) return true
    angle += Math.atan2(dot(cross(a, b), normal), dot(a, b))
  }
  return Math.round(angle / (2 * Math.PI)) !== 0
}

const enclosed = (solid: Solid, n: number): { least: number; most: number } => {
  const reach = 1.03 * Math.max(...solid.vertices.map((v) => Math.hypot(...v)))
  const h = (2 * reach) / n
  const at = (i: number): number => -reach + (i + 0.5) * h
  const cellOf = (x: number): number => Math.floor((x + reach) / h)
  const wall = new Uint8Array(n ** 3)
  const index = (c: readonly number[]): number => (c[0]! * n + c[1]!) * n + c[2]!
  for (const { cycle } of solid.faces) {
    const ring = cycle.map((v) => solid.vertices[v] as V)
    let normal: V = [0, 0, 0]
    for (let i = 1; i + 1 < ring.length; i++) {
      const c = cross(sub(ring[i]!, ring[0]!), sub(ring[i + 1]!, ring[0]!))
      if (dot(c, c) > dot(normal, normal)) normal = c
    }
    const length = Math.sqrt(dot(normal, normal))
    normal = [normal[0] / length, normal[1] / length, normal[2] / length]
    const offset = dot(normal, ring[0]!)
    // Along the axis that the face looks at most, a column of cubes is crossed in few of them.
    const size = normal.map(Math.abs)
    const w = size.indexOf(Math.max(...size))
    const [u, v] = [(w + 1) % 3, (w + 2) % 3]
    const thick = (h / 2) * (size[0]! + size[1]! + size[2]!)
    const range = (axis: number): [number, number] => {
      const xs = ring.map((p) => p[axis]!)
      return [cellOf(Math.min(...xs)) - 1, cellOf(Math.max(...xs)) + 1]
    }
    const [ru, rv] = [range(u), range(v)]
    for (let i = ru[0]; i <= ru[1]; i++)
      for (let j = rv[0]; j <= rv[1]; j++) {
        const rest = offset - normal[u]! * at(i) - normal[v]! * at(j)
        const ends = [(rest - thick) / normal[w]!, (rest + thick) / normal[w]!].sort((a, b) => a - b)
        for (let k = cellOf(ends[0]!) - 1; k <= cellOf(ends[1]!) + 1; k++) {
          const cell = [0, 0, 0]
          cell[u] = i
          cell[v] = j
          cell[w] = k
          if (cell.some((c) => c < 0 || c >= n)) continue
          const centre = cell.map(at) as unknown as V
          const off = dot(normal, centre) - offset
          if (Math.abs(off) > thick) continue
          const foot: V = [centre[0] - off * normal[0], centre[1] - off * normal[1], centre[2] - off * normal[2]]
          if (!wall[index(cell)] && reaches(ring, normal, foot, 0.87 * h)) wall[index(cell)] = 1
        }
      }
  }
  // Flood from the corner through whatever is no wall, by faces of cubes.
  const outside = new Uint8Array(n ** 3)
  const queue = [0]
  outside[0] = 1
  const steps = [n * n, -n * n, n, -n, 1, -1]
  for (let c = queue.pop(); c !== undefined; c = queue.pop()) {
    const [i, j, k] = [Math.floor(c / (n * n)), Math.floor(c / n) % n, c % n]
    const free = [i + 1 < n, i > 0, j + 1 < n, j > 0, k + 1 < n, k > 0]
    steps.forEach((step, s) => {
      const next = c + step
      if (!free[s] || wall[next] || outside[next]) return
      outside[next] = 1
      queue.push(next)
    })
  }
  let sure = 0
  let unsure = 0
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++)
      for (let k = 0; k < n; k++) {
        const c = (i * n + j) * n + k
        if (outside[c]) continue
        let near = false
        // Within two cubes of the flood: there the true surface may run.
        for (let a = Math.max(0, i - 2); a <= Math.min(n - 1, i + 2) && !near; a++)
          for (let b = Math.max(0, j - 2); b <= Math.min(n - 1, j + 2) && !near; b++)
            for (let d = Math.max(0, k - 2); d <= Math.min(n - 1, k + 2) && !near; d++)
              near = outside[(a * n + b) * n + d] === 1
        if (near && wall[c]) unsure++
        else sure++
      }
  return { least: sure * h ** 3, most: (sure + unsure) * h ** 3 }
}

describe('enclosed volume against a grid of cubes', () => {
  test('the grid itself: a cube of unit edge', () => {
    const { least, most } = enclosed(buildSolid('cube'), 60)
    expect(least).toBeLessThan(1)
    expect(most).toBeGreaterThan(1)
    expect(most - least).toBeLessThan(0.7)
  })
  for (const family of ['uniform', 'compound'] as const)
    test(`all of family ${family}`, () => {
      for (const { id } of listFamily(family)) {
        const solid = buildSolid(id)
        const { volume } = computeSkin(solid)
        const { least, most } = enclosed(solid, 72)
        expect([id, least <= volume && volume <= most ? 'within' : `${least} … ${volume} … ${most}`]).toEqual([
          id,
          'within',
        ])
      }
    }, 120_000)
})

/**
 * Volume and area against manifold-3d (a general-purpose Boolean library). Compounds: the union of their convex
 * components. Solids whose every panel faces away from the centre: seen from the centre their surface is crossed once in
 * every direction, so what they enclose is the union of the pyramids from the centre over their filled faces.
 */
import Module from 'manifold-3d'
import { beforeAll, describe, expect, test } from 'vitest'
import { dot, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily, type Solid } from '../../src/solids'

let wasm: Awaited<ReturnType<typeof Module>>
beforeAll(async () => {
  wasm = await Module()
  wasm.setup()
})

type Manifold = InstanceType<typeof wasm.Manifold>

const meet = (a: Vec3, b: Vec3, c: Vec3, d: Vec3): Vec3 | null => {
  const u = b.map((x, i) => x - a[i]!)
  const v = d.map((x, i) => x - c[i]!)
  const w = c.map((x, i) => x - a[i]!)
  const cross = (p: number[], q: number[]): number[] => [
    p[1]! * q[2]! - p[2]! * q[1]!,
    p[2]! * q[0]! - p[0]! * q[2]!,
    p[0]! * q[1]! - p[1]! * q[0]!,
  ]
  const n = cross(u, v)
  const nn = n.reduce((s, x) => s + x * x, 0)
  if (nn < 1e-18) return null
  const det = (p: number[], q: number[]): number => cross(p, q).reduce((s, x, i) => s + x * n[i]!, 0) / nn
  const t = det(w, v)
  const s = det(w, u)
  if (t <= 1e-9 || t >= 1 - 1e-9 || s <= 1e-9 || s >= 1 - 1e-9) return null
  return a.map((x, i) => x + t * u[i]!) as unknown as Vec3
}

/** The outline of a regular face's filled region: for a star, tips and the crossings next to them in turn. */
const outlineOf = (solid: Solid, face: number): Vec3[] => {
  const ring = solid.faces[face]!.cycle.map((v) => solid.vertices[v]!)
  const n = ring.length
  const centre = [0, 1, 2].map((k) => ring.reduce((s, p) => s + p[k]!, 0) / n) as unknown as Vec3
  const points = [...ring]
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++) {
      const p = meet(ring[i]!, ring[(i + 1) % n]!, ring[j]!, ring[(j + 1) % n]!)
      if (p) points.push(p)
    }
  if (points.length === n) return ring
  // Per direction the outermost point: tips, and the outermost ring of crossings, one between two tips.
  const far = (p: Vec3): number => Math.hypot(p[0] - centre[0], p[1] - centre[1], p[2] - centre[2])
  const crossings = points.slice(n)
  const outer = Math.max(...crossings.map(far))
  const rim = [...ring, ...crossings.filter((p) => far(p) > outer - 1e-9)]
  const u = ring[0]!.map((x, i) => x - centre[i]!)
  const w = ring[1]!.map((x, i) => x - centre[i]!)
  const k = u.reduce((s, x, i) => s + x * w[i]!, 0) / u.reduce((s, x) => s + x * x, 0)
  const v = w.map((x, i) => x - k * u[i]!)
  const [lu, lv] = [Math.hypot(...u), Math.hypot(...v)]
  const angle = (p: Vec3): number => {
    const d = p.map((x, i) => x - centre[i]!)
    return Math.atan2(
      d.reduce((s, x, i) => s + (x * v[i]!) / lv, 0),
      d.reduce((s, x, i) => s + (x * u[i]!) / lu, 0),
    )
  }
  return rim.sort((a, b) => angle(a) - angle(b))
}

const meshOf = (vertices: readonly Vec3[], triangles: readonly number[][]): Manifold =>
  new wasm.Manifold(
    new wasm.Mesh({
      numProp: 3,
      vertProperties: Float32Array.from(vertices.flat()),
      triVerts: Uint32Array.from(triangles.flat()),
    }),
  )

/** The pyramid from the centre over an outline that is star-shaped about its own middle. */
const pyramid = (outline: readonly Vec3[]): Manifold => {
  const n = outline.length
  const middle = [0, 1, 2].map((k) => outline.reduce((s, p) => s + p[k]!, 0) / n) as unknown as Vec3
  const [a, b] = [outline[0]!, outline[1]!]
  const cross: Vec3 = [
    (a[1] - middle[1]) * (b[2] - middle[2]) - (a[2] - middle[2]) * (b[1] - middle[1]),
    (a[2] - middle[2]) * (b[0] - middle[0]) - (a[0] - middle[0]) * (b[2] - middle[2]),
    (a[0] - middle[0]) * (b[1] - middle[1]) - (a[1] - middle[1]) * (b[0] - middle[0]),
  ]
  const ring = dot(cross, middle) > 0 ? outline : [...outline].reverse()
  const triangles: number[][] = []
  for (let i = 0; i < n; i++) {
    const j = (i + 1) % n
    triangles.push([n, i, j], [n + 1, j, i])
  }
  return meshOf([...ring, middle, [0, 0, 0]], triangles)
}

const unite = (parts: Manifold[]): { volume: number; area: number } => {
  const united = wasm.Manifold.union(parts)
  const result = { volume: united.volume(), area: united.surfaceArea() }
  for (const m of [...parts, united]) m.delete()
  return result
}

const relative = (a: number, b: number): number => Math.abs(a / b - 1)

describe('against the Boolean library', () => {
  for (const { id } of listFamily('compound'))
    test(`${id}: the union of its components`, () => {
      const solid = buildSolid(id)
      const skin = computeSkin(solid)
      const components = solid.components ?? []
      const parts = [...new Set(components)].map((k) => {
        const vertices = [...new Set(solid.faces.flatMap((f, i) => (components[i] === k ? [...f.cycle] : [])))].map(
          (v) => solid.vertices[v]!,
        )
        return wasm.Manifold.hull(vertices.map((p) => [...p] as [number, number, number]))
      })
      const united = unite(parts)
      expect(relative(skin.volume, united.volume)).toBeLessThan(1e-6)
      expect(relative(skin.area, united.area)).toBeLessThan(1e-6)
    })

  test('solids that are star-shaped about the centre: the union of pyramids over their faces', () => {
    const compared: string[] = []
    for (const { id } of listFamily('uniform')) {
      const solid = buildSolid(id)
      const skin = computeSkin(solid)
      if (skin.panels.some((p) => dot(p.normal, skin.points[p.rings[0]![0]!]!) < 1e-6)) continue
      const united = unite(solid.faces.map((_, face) => pyramid(outlineOf(solid, face))))
      compared.push(id)
      const told = `${skin.volume} against ${united.volume}`
      expect([id, relative(skin.volume, united.volume) < 1e-6 ? 'same' : told]).toEqual([id, 'same'])
    }
    // All 18 convex ones, and a good number of stars.
    expect(compared.length).toBeGreaterThan(30)
    expect(compared).toContain('great-icosahedron')
  }, 120_000)
})

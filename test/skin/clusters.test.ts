/**
 * The skin of things that no catalogue knows: clusters of boxes, tetrahedra and prisms that cross, touch along edges and
 * share planes, without any symmetry. Volumes against manifold-3d (a general-purpose Boolean library), which unites the
 * parts; cavities that the parts enclose are inside for the skin, so their shells are left out of the sum.
 */
import Module from 'manifold-3d'
import { beforeAll, describe, expect, test } from 'vitest'
import { identity3, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin, validateSkin } from '../../src/skin'
import type { Solid } from '../../src/solids'
import { type Random, seeded } from '../support/random'

interface Part {
  readonly vertices: Vec3[]
  /** Counter-clockwise seen from outside. */
  readonly faces: number[][]
}

const box = (low: Vec3, high: Vec3): Part => {
  const vertices: Vec3[] = []
  for (let i = 0; i < 8; i++) vertices.push([(i & 1 ? high : low)[0], (i & 2 ? high : low)[1], (i & 4 ? high : low)[2]])
  return {
    vertices,
    faces: [
      [0, 2, 3, 1],
      [4, 5, 7, 6],
      [0, 1, 5, 4],
      [2, 6, 7, 3],
      [0, 4, 6, 2],
      [1, 3, 7, 5],
    ],
  }
}

const tetrahedron = (p: readonly [Vec3, Vec3, Vec3, Vec3]): Part => {
  const [a, b, c, d] = p
  const u = [b[0] - a[0], b[1] - a[1], b[2] - a[2]] as const
  const v = [c[0] - a[0], c[1] - a[1], c[2] - a[2]] as const
  const w = [d[0] - a[0], d[1] - a[1], d[2] - a[2]] as const
  const six =
    u[0] * (v[1] * w[2] - v[2] * w[1]) - u[1] * (v[0] * w[2] - v[2] * w[0]) + u[2] * (v[0] * w[1] - v[1] * w[0])
  const vertices = six > 0 ? [a, b, c, d] : [a, c, b, d]
  return {
    vertices,
    faces: [
      [0, 2, 1],
      [0, 1, 3],
      [1, 2, 3],
      [2, 0, 3],
    ],
  }
}

/** A lattice with steps of a half: planes, edges and corners coincide exactly and often. */
const lattice = (random: Random): number => Math.floor(random() * 7) / 2

const part = (random: Random): Part => {
  const kind = random()
  if (kind < 0.5) {
    const low: Vec3 = [lattice(random), lattice(random), lattice(random)]
    const size = (): number => 0.5 + Math.floor(random() * 4) / 2
    return box(low, [low[0] + size(), low[1] + size(), low[2] + size()])
  }
  const coordinate = kind < 0.75 ? lattice : (r: Random): number => 3.5 * r()
  for (;;) {
    const point = (): Vec3 => [coordinate(random), coordinate(random), coordinate(random)]
    const corners = [point(), point(), point(), point()] as const
    const [a, b, c, d] = corners
    const u = [b[0] - a[0], b[1] - a[1], b[2] - a[2]] as const
    const v = [c[0] - a[0], c[1] - a[1], c[2] - a[2]] as const
    const w = [d[0] - a[0], d[1] - a[1], d[2] - a[2]] as const
    const six =
      u[0] * (v[1] * w[2] - v[2] * w[1]) - u[1] * (v[0] * w[2] - v[2] * w[0]) + u[2] * (v[0] * w[1] - v[1] * w[0])
    if (Math.abs(six) > 0.5) return tetrahedron(corners)
  }
}

const asSolid = (parts: readonly Part[]): Solid => {
  const vertices: Vec3[] = []
  const faces = parts.flatMap((p) => {
    const base = vertices.length
    vertices.push(...p.vertices)
    return p.faces.map((f) => ({ cycle: f.map((i) => base + i), kind: 0, orbit: 0 }))
  })
  const kinds = [{ id: 0, name: 'face', n: 0, d: 1, count: faces.length }]
  return { id: 'cluster', name: 'cluster', hand: 'none', vertices, faces, kinds, rotations: [identity3] }
}

/** Coordinates are exact here, so no gap is promised and a much narrower tolerance serves. */
const tolerance = { merge: 1e-9, gap: 1e-9, cell: 2e-2, on: 1e-9 }

let wasm: Awaited<ReturnType<typeof Module>>
beforeAll(async () => {
  wasm = await Module()
  wasm.setup()
})

const unitedVolume = (parts: readonly Part[]): { volume: number; shells: number } => {
  const { Manifold, Mesh } = wasm
  const solids = parts.map((p) => {
    const triangles = p.faces.flatMap((f) =>
      f.slice(2).map((_, i) => [f[0] as number, f[i + 1] as number, f[i + 2] as number]),
    )
    return new Manifold(
      new Mesh({
        numProp: 3,
        vertProperties: Float32Array.from(p.vertices.flat()),
        triVerts: Uint32Array.from(triangles.flat()),
      }),
    )
  })
  const united = Manifold.union(solids)
  const shells = united.decompose()
  // A cavity's shell has negative volume.
  const volume = shells.reduce((sum, s) => sum + Math.max(0, s.volume()), 0)
  const count = shells.length
  for (const m of [...solids, ...shells, united]) m.delete()
  return { volume, shells: count }
}

describe('clusters against manifold-3d', () => {
  const rounds = 12
  for (let k = 0; k < 10; k++) {
    const seed = 9000 + k
    test(`${rounds} clusters of 2 to 7 parts, seed ${seed}`, () => {
      const random = seeded(seed)
      for (let i = 0; i < rounds; i++) {
        const parts = Array.from({ length: 2 + Math.floor(random() * 6) }, () => part(random))
        const skin = computeSkin(asSolid(parts), 'nonzero', () => {}, tolerance)
        const where = `cluster ${i}`
        expect([where, validateSkin(skin).filter((c) => !c.ok)]).toEqual([where, []])
        const { volume } = unitedVolume(parts)
        // manifold-3d holds coordinates in single precision.
        expect([
          where,
          Math.abs(skin.volume - volume) < 2e-5 * (1 + volume) ? 'same volume' : `${skin.volume} against ${volume}`,
        ]).toEqual([where, 'same volume'])
      }
    })
  }
})

/**
 * The skin of things that no catalogue knows: clusters of boxes, tetrahedra and star prisms that cross, touch along edges and
 * share planes, without any symmetry. Volumes against manifold-3d (a general-purpose Boolean library), which unites the
 * parts; cavities that the parts enclose are inside for the skin, so their shells are left out of the sum.
 */
import Module from 'manifold-3d'
import { beforeAll, describe, expect, test } from 'vitest'
import { computeSkin, validateSkin } from '../../src/skin'
import { asSolid, type Part, part } from '../support/clusters'
import { seeded } from '../support/random'

let wasm: Awaited<ReturnType<typeof Module>>
beforeAll(async () => {
  wasm = await Module()
  wasm.setup()
})

/** Volume that the union encloses, cavities and what floats in them counted as inside. */
const unitedVolume = (parts: readonly Part[]): number => {
  const { Manifold, Mesh } = wasm
  const solids = parts.map((p) => {
    const vertices = p.plain?.vertices ?? p.vertices
    const triangles =
      p.plain?.triangles ??
      p.faces.flatMap((f) => f.slice(2).map((_, i) => [f[0] as number, f[i + 1] as number, f[i + 2] as number]))
    return new Manifold(
      new Mesh({
        numProp: 3,
        vertProperties: Float32Array.from(vertices.flat()),
        triVerts: Uint32Array.from(triangles.flat()),
      }),
    )
  })
  const united = Manifold.union(solids)
  const shells = united.decompose()
  // A cavity's shell has negative volume.
  const full = shells.filter((s) => s.volume() > 0)
  let volume = 0
  for (const shell of full) {
    const within = full.some((other) => {
      if (other === shell || other.volume() < shell.volume()) return false
      const common = shell.intersect(other)
      const inside = common.volume() > 0.5 * shell.volume()
      common.delete()
      return inside
    })
    if (!within) volume += shell.volume()
  }
  for (const m of [...solids, ...shells, united]) m.delete()
  return volume
}

describe('clusters against manifold-3d', () => {
  const rounds = 52
  for (let k = 0; k < 10; k++) {
    const seed = 9000 + k
    test(`${rounds} clusters of 2 to 7 parts, seed ${seed}`, () => {
      const random = seeded(seed)
      for (let i = 0; i < rounds; i++) {
        const parts = Array.from({ length: 2 + Math.floor(random() * 6) }, () => part(random))
        const skin = computeSkin(asSolid(parts))
        const where = `cluster ${i}`
        expect([where, validateSkin(skin).filter((c) => !c.ok)]).toEqual([where, []])
        const volume = unitedVolume(parts)
        // A star prism's inner corners are rounded to single precision on their way to the library.
        const close = parts.some((p) => p.plain) ? 3e-6 : 1e-6
        expect([
          where,
          Math.abs(skin.volume - volume) < close * (1 + volume) ? 'same volume' : `${skin.volume} against ${volume}`,
        ]).toEqual([where, 'same volume'])
      }
    })
  }
})

/**
 * Models as they come from files: the same clusters turned by a random rotation and rounded to single precision, so that
 * planes, edges and corners which coincide do so only nearly. The skin must be that of the exact cluster.
 */
import { describe, expect, test } from 'vitest'
import { apply, norm, normalize, rotationAbout, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { asSolid, part } from '../support/clusters'
import { seeded } from '../support/random'

describe('clusters in single precision', () => {
  for (let k = 0; k < 4; k++) {
    const seed = 400 + k
    test(`60 clusters, seed ${seed}`, () => {
      const random = seeded(seed)
      for (let i = 0; i < 60; i++) {
        const exact = asSolid(Array.from({ length: 2 + Math.floor(random() * 6) }, () => part(random)))
        const size = Math.max(...exact.vertices.map(norm))
        const turn = rotationAbout(normalize([random() - 0.5, random() - 0.5, random() - 0.5]), 6 * random())
        const vertices = exact.vertices.map((v) => apply(turn, v).map((x) => Math.fround(x / size)) as unknown as Vec3)
        const skin = computeSkin({ ...exact, vertices, precision: 2.5e-7 })
        const expected = computeSkin(exact)
        const volume = skin.volume * size ** 3
        const where = `cluster ${i}`
        expect([
          where,
          Math.abs(volume - expected.volume) < 3e-6 * (1 + volume) ? 'same volume' : `${volume}, ${expected.volume}`,
        ]).toEqual([where, 'same volume'])
        expect([where, Math.abs(skin.area * size ** 2 - expected.area) < 2e-5 * (1 + expected.area)]).toEqual([
          where,
          true,
        ])
      }
    })
  }
})

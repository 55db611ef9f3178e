import { describe, expect, test } from 'vitest'
import { Camera } from '../../src/preview/camera'
import { Picker } from '../../src/preview/pick'
import { Picture } from '../../src/preview/picture'
import { itemOf } from '../../src/preview/raster'
import { Stage } from '../../src/preview/stage'
import { faceItems } from '../../src/preview/thumbnail'
import type { SceneItem } from '../../src/preview/types'
import { randomDirection, randomRotation, seeded } from '../support/random'
import { type Ray, rayCaster } from './ray-caster'
import {
  backToBack,
  cubeItems,
  greatDodecahedron,
  randomItems,
  smallStellatedDodecahedron,
  twoTetrahedra,
  windowItems,
} from './shapes'

const colours = ['#cc8844', '#4488cc']
const scenes: [string, (seed: number) => SceneItem[]][] = [
  ['60 random triangles through each other', (seed) => randomItems(60, seeded(seed))],
  ['a cube with windows', () => windowItems()],
  ['two tetrahedra through each other', () => faceItems(twoTetrahedra, colours)],
  ['pentagons through each other', () => faceItems(greatDodecahedron, colours)],
  ['pentagrams through each other, whole', () => faceItems(smallStellatedDodecahedron, colours)],
  ['pentagrams through each other, centres open', () => faceItems(smallStellatedDodecahedron, colours, 'evenodd')],
]

const setUp = (items: SceneItem[], seed: number, width: number, height: number): { stage: Stage; camera: Camera } => {
  const random = seeded(seed)
  const stage = new Stage()
  stage.setScene(items, { backs: 'same' })
  stage.update()
  const camera = new Camera(randomDirection(random))
  camera.setRotation(randomRotation(random))
  camera.resize(width, height)
  camera.setSpread(stage.spread)
  camera.zoomAt(1 + random(), width * random(), height * random())
  return { stage, camera }
}

/** The line of sight through a place, in the items' own units. */
const rayThrough = (stage: Stage, camera: Camera, x: number, y: number): Ray => {
  const { origin, direction } = camera.ray(x, y)
  const { centre, radius } = stage.model
  return {
    origin: [centre[0] + radius * origin[0], centre[1] + radius * origin[1], centre[2] + radius * origin[2]],
    direction: [radius * direction[0], radius * direction[1], radius * direction[2]],
  }
}

describe('the z-buffer shows what an independent ray caster meets', () => {
  for (const [name, make] of scenes)
    test.each([1, 2])(`${name}, seed %i`, (seed) => {
      const items = make(seed)
      const cast = rayCaster(items)
      const { stage, camera } = setUp(items, seed, 64, 50)
      const picture = new Picture()
      picture.render(stage, camera, { scale: 1, samples: 1 })
      const wrong: unknown[] = []
      let compared = 0
      let met = 0
      for (let y = 0; y < 50; y++)
        for (let x = 0; x < 64; x++) {
          const { nearest, doubtful } = cast(rayThrough(stage, camera, x + 0.5, y + 0.5))
          if (doubtful) continue
          compared++
          const at = y * 64 + x
          const code = picture.samples.code[at]!
          const shown = code === 0 ? -1 : itemOf(code)
          if (shown !== (nearest?.index ?? -1)) wrong.push({ x, y, shown, met: nearest?.index })
          if (!nearest) continue
          met++
          // Direction has length 1 along the line of sight, so t is the distance that the buffer holds inverted.
          const distance = 1 / picture.samples.depth[at]!
          if (!(Math.abs(distance - nearest.t) < 5e-4)) wrong.push({ x, y, distance, met: nearest.t })
          const normal = items[nearest.index]!.normal
          const { direction } = camera.ray(x + 0.5, y + 0.5)
          const isInside = normal[0] * direction[0] + normal[1] * direction[1] + normal[2] * direction[2] > 0
          if (((code - 1) & 1) !== (isInside ? 1 : 0)) wrong.push({ x, y, code, isInside })
        }
      expect(wrong).toEqual([])
      expect(compared).toBeGreaterThan(0.95 * 64 * 50)
      expect(met).toBeGreaterThan(400)
    })
})

describe('a pick is what an independent ray caster meets', () => {
  for (const [name, make] of scenes)
    test.each([4, 5])(`${name}, seed %i`, (seed) => {
      const items = make(seed)
      const cast = rayCaster(items)
      const { stage, camera } = setUp(items, seed, 640, 480)
      const random = seeded(seed)
      const picker = new Picker()
      const wrong: unknown[] = []
      let met = 0
      for (let i = 0; i < 1500; i++) {
        const [x, y] = [640 * random(), 480 * random()]
        const { nearest, doubtful } = cast(rayThrough(stage, camera, x, y))
        if (doubtful) continue
        const item = picker.itemAt(stage, camera, x, y)
        if (item !== (nearest?.index ?? -1)) wrong.push({ x, y, item, met: nearest?.index })
        if (nearest) met++
      }
      expect(wrong).toEqual([])
      expect(met).toBeGreaterThan(300)
    })

  test('is what the z-buffer shows, also where two sides lie back to back, seed 6', () => {
    const items = backToBack(randomItems(20, seeded(6))).map((item) => ({ ...item, kind: 'all' }))
    const { stage, camera } = setUp(items, 6, 120, 100)
    const picture = new Picture()
    picture.render(stage, camera, { scale: 1, samples: 1 })
    const picker = new Picker()
    let met = 0
    let wrong = 0
    for (let y = 0; y < 100; y++)
      for (let x = 0; x < 120; x++) {
        const code = picture.samples.code[120 * y + x]!
        const item = picker.itemAt(stage, camera, x + 0.5, y + 0.5)
        if (item >= 0) met++
        // Only an outline may fall to either side.
        if (item !== (code === 0 ? -1 : itemOf(code))) wrong++
      }
    expect(met).toBeGreaterThan(2000)
    expect(wrong).toBe(0)
  })

  test('follows when panels are pulled apart', () => {
    const stage = new Stage()
    stage.setScene(cubeItems())
    stage.update()
    const camera = new Camera([0, 0, 1])
    camera.resize(400, 400)
    camera.setSpread(2.5)
    const picker = new Picker()
    // Just inside the rim of the front side once it has come nearer, beside the closed cube.
    stage.setExplode(1)
    stage.update()
    const { x, y } = camera.project(stage.place([0.99, 0, 1], 4))
    const picks = [0, 1, 0].map((fraction) => {
      stage.setExplode(fraction)
      stage.update()
      return picker.itemAt(stage, camera, x, y)
    })
    expect(picks).toEqual([-1, 4, -1])
  })

  test('hidden kinds, hidden items and ghosts are looked through', () => {
    const stage = new Stage()
    stage.setScene(cubeItems())
    const camera = new Camera([0, 0, 1])
    camera.resize(200, 200)
    const picker = new Picker()
    const at = (): number => {
      stage.update()
      return picker.itemAt(stage, camera, 100, 100)
    }
    expect(at()).toBe(4)
    stage.setVisibleItems(new Set([0, 5]))
    expect(at()).toBe(5)
    stage.setVisibleItems(null)
    stage.setGhost(new Set([4]))
    expect(at()).toBe(5)
    stage.setVisibleKinds(new Set(['x', 'y']))
    expect(at()).toBe(-1)
  })
})

describe('shared edges', () => {
  test('leave no gap and no sample twice: a triangulated square is filled exactly, seed 9', () => {
    const random = seeded(9)
    for (let round = 0; round < 20; round++) {
      const stage = new Stage()
      stage.setScene([cubeItems()[4]!, cubeItems()[5]!])
      stage.update()
      const camera = new Camera([0, 0, 1])
      camera.resize(101, 103)
      camera.orbit(0.4 * random(), 0.4 * random(), 6 * random())
      const picture = new Picture()
      picture.render(stage, camera, { scale: 1, samples: 1 })
      // Along every row the filled samples of the front side form one run.
      const { code } = picture.samples
      for (let y = 0; y < 103; y++) {
        let runs = 0
        for (let x = 0; x < 101; x++) {
          const isFront = itemOf(code[y * 101 + x]!) === 0 && code[y * 101 + x] !== 0
          const wasFront = x > 0 && itemOf(code[y * 101 + x - 1]!) === 0 && code[y * 101 + x - 1] !== 0
          if (isFront && !wasFront) runs++
        }
        expect(runs).toBeLessThanOrEqual(1)
      }
    }
  })

  test('of two sides back to back in one plane, the one that faces the viewer is seen', () => {
    const [front] = cubeItems().slice(4)
    const back: SceneItem = {
      ...front!,
      id: 9,
      normal: [0, 0, -1],
      rings: [[...front!.rings[0]!].reverse()],
    }
    for (const items of [
      [front!, back],
      [back, front!],
    ]) {
      const stage = new Stage()
      stage.setScene(items)
      stage.update()
      const camera = new Camera([0.3, 0.2, 0.9])
      camera.resize(80, 80)
      const picture = new Picture()
      picture.render(stage, camera, { scale: 1, samples: 1 })
      const seen = new Set([...picture.samples.code].filter((c) => c !== 0).map((c) => items[itemOf(c)]!.id))
      expect([...seen]).toEqual([front!.id])
      expect(items[new Picker().itemAt(stage, camera, 40, 40)]!.id).toBe(front!.id)
    }
  })
})

describe('lines', () => {
  test('edges in front are drawn, edges behind are not', () => {
    const stage = new Stage()
    stage.setScene(cubeItems())
    stage.update()
    const camera = new Camera([0.5, 0.4, 0.8])
    camera.resize(300, 300)
    const picture = new Picture()
    picture.render(stage, camera, { scale: 1, samples: 2 })
    const signs = [-1, 1] as const
    let front = 0
    let behind = 0
    for (const axis of [0, 1, 2])
      for (const a of signs)
        for (const b of signs) {
          const middle: [number, number, number] = [0, 0, 0]
          middle[(axis + 1) % 3] = a
          middle[(axis + 2) % 3] = b
          const { x, y } = camera.project(stage.place(middle))
          const near: number[] = []
          for (let j = -2; j <= 2; j++)
            for (let i = -2; i <= 2; i++)
              near.push(picture.samples.line[(Math.floor(2 * y) + j) * picture.width + Math.floor(2 * x) + i]!)
          // Seen from (+, +, +), the edges with both offsets negative lie behind the cube.
          const isBehind = a < 0 && b < 0
          expect(near.some((mark) => mark !== 0)).toBe(!isBehind)
          if (isBehind) behind++
          else front++
        }
    expect([front, behind]).toEqual([9, 3])
  })
})

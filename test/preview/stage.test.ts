import { describe, expect, test } from 'vitest'
import { InputError } from '../../src/errors'
import { identity3, norm, sub, type Vec3 } from '../../src/geometry/vec3'
import { Camera } from '../../src/preview/camera'
import type { LineSet } from '../../src/preview/lines'
import { buildModel } from '../../src/preview/model'
import { Picture } from '../../src/preview/picture'
import { Stage, tonesPerItem } from '../../src/preview/stage'
import { faceItems } from '../../src/preview/thumbnail'
import type { SceneItem } from '../../src/preview/types'
import { randomRotation, seeded } from '../support/random'
import { cubeItems, randomItems, smallStellatedDodecahedron, windowItems } from './shapes'

const staged = (items: readonly SceneItem[], set: (stage: Stage) => void = () => {}, options = {}): Stage => {
  const stage = new Stage()
  stage.setScene(items, options)
  set(stage)
  stage.update()
  return stage
}

const lineCount = (sets: readonly LineSet[]): number => sets.reduce((sum, set) => sum + set.ends.length / 6, 0)
const edges = (stage: Stage): LineSet[] => stage.lines.filter((set) => set.style.thins)
const marks = (stage: Stage): LineSet[] => stage.lines.filter((set) => !set.style.thins)
const vertex = (positions: Float64Array, v: number): Vec3 => [
  positions[3 * v]!,
  positions[3 * v + 1]!,
  positions[3 * v + 2]!,
]

describe('a scene made ready', () => {
  test('is centred and scaled, wherever it lies and however large it is, seed 1', () => {
    const random = seeded(1)
    const turn = randomRotation(random)
    const move = (p: Vec3): Vec3 => {
      const q = turn.map((row) => row[0] * p[0] + row[1] * p[1] + row[2] * p[2]) as [number, number, number]
      return [700 + 250 * q[0], -90 + 250 * q[1], 15 + 250 * q[2]]
    }
    const items = windowItems().map((item) => ({
      ...item,
      normal: turn.map((row) => row[0] * item.normal[0] + row[1] * item.normal[1] + row[2] * item.normal[2]) as never,
      rings: item.rings.map((ring) => ring.map(move)),
    }))
    const model = buildModel(items)
    expect(norm(sub(model.centre, [700, -90, 15]))).toBeLessThan(1e-9)
    expect(model.radius).toBeCloseTo(250 * Math.sqrt(3), 9)
  })

  test('every triangle faces outwards and the areas add up, holes left open', () => {
    for (const [items, area] of [
      [cubeItems(), 6 * 4],
      [windowItems(), 6 * 3],
    ] as const) {
      const { closed, triangles, radius } = buildModel(items)
      let sum = 0
      let flux = 0
      for (let t = 0; t < triangles.length; t += 3) {
        const [a, b, c] = [0, 1, 2].map((k) => vertex(closed, triangles[t + k]!)) as [Vec3, Vec3, Vec3]
        const [p, q] = [sub(b, a), sub(c, a)]
        const n: Vec3 = [p[1] * q[2] - p[2] * q[1], p[2] * q[0] - p[0] * q[2], p[0] * q[1] - p[1] * q[0]]
        sum += norm(n) / 2
        flux += (n[0] * a[0] + n[1] * a[1] + n[2] * a[2]) / 2
      }
      expect(sum * radius ** 2).toBeCloseTo(area, 10)
      // All sides lie at distance 1 from the middle, so ∮ x·n dA = area if all normals point outwards.
      expect(flux * radius ** 3).toBeCloseTo(area, 10)
    }
  })

  test('an unreadable colour is told with its kind; a shape of NaN or an id used twice is a defect', () => {
    const [item] = cubeItems()
    expect(() => buildModel([{ ...item!, colour: 'reddish' }])).toThrow(InputError)
    expect(() => buildModel([{ ...item!, colour: 'reddish' }])).toThrow(/reddish.*#rrggbb/)
    expect(() => buildModel([{ ...item!, normal: [Number.NaN, 0, 0] }])).toThrow(/no usable shape.*"item":0/)
    expect(() => buildModel([item!, item!])).toThrow(/same id/)
    expect(() => new Stage().setTheme({ accent: 'rgb(1, 2, 3)' })).toThrow(/rgb\(1, 2, 3\).*#rrggbb/)
    expect(() => new Stage().setLit([{ items: new Set(), accent: '' }])).toThrow(InputError)
  })

  test('an empty scene draws an empty picture', () => {
    const stage = staged([])
    const camera = new Camera()
    camera.resize(20, 10)
    const { data } = new Picture().render(stage, camera, { scale: 1, samples: 2 })
    expect(data.length).toBe(800)
    expect(data.every((v) => v === 0)).toBe(true)
  })
})

test('a picture drawn again after any change is that of a fresh start, seed 5', () => {
  const stage = new Stage()
  stage.setScene(randomItems(25, seeded(5)))
  const camera = new Camera()
  camera.resize(60, 50)
  const used = new Picture()
  const changes: (() => void)[] = [
    () => stage.setLit([{ groups: new Set([1, 2]) }]),
    () => stage.setGhost(new Set([101, 102, 103])),
    () => stage.setLit([]),
    () => camera.orbit(0.3, 0.1),
    () => stage.setExplode(0.4),
    () => stage.setGhost(null),
    () => stage.setVisibleKinds(new Set(['k1', 'k2'])),
    () =>
      stage.setSeams([
        {
          id: 1,
          ends: [
            [0, 0, 0],
            [1, 1, 1],
          ],
        },
      ]),
    () => stage.setTheme({ accent: '#00ff00', edge: '#ff00ff' }),
    () => stage.setScene(cubeItems()),
    () => camera.resize(40, 44),
  ]
  const pictures = changes.map((change) => {
    change()
    stage.update()
    camera.setSpread(stage.spread)
    const again = used.render(stage, camera, { scale: 1, samples: 2 }).data.slice()
    expect(again).toEqual(new Picture().render(stage, camera, { scale: 1, samples: 2 }).data)
    return Buffer.from(again).toString('base64')
  })
  expect(new Set(pictures).size).toBe(changes.length)
})

describe('pulling apart', () => {
  const scenes: [string, SceneItem[]][] = [
    ['windows', windowItems()],
    ['random', randomItems(30, seeded(2))],
    ['stars', faceItems(smallStellatedDodecahedron, ['#ccc'], 'evenodd')],
  ]
  for (const explodeBy of ['items', 'groups'] as const)
    test.each(scenes)(`moves each of ${explodeBy} as a whole, without turning it: %s`, (_, items) => {
      const stage = staged(items, (s) => s.setExplode(0.7), { explodeBy })
      const { closed, vertexItem } = stage.model
      const shifts = new Map<number, Vec3>()
      let moved = 0
      for (let v = 0; v < vertexItem.length; v++) {
        const { id, group } = items[vertexItem[v]!]!
        const mover = explodeBy === 'groups' && group >= 0 ? group : 1000 + id
        const shift = sub(vertex(stage.positions, v), vertex(closed, v))
        const known = shifts.get(mover)
        if (known) expect(norm(sub(shift, known))).toBeLessThan(1e-12)
        else shifts.set(mover, shift)
        if (norm(shift) > 0.05) moved++
      }
      expect(shifts.size).toBe(
        explodeBy === 'items' || items[0]!.group < 0 ? items.length : new Set(items.map((i) => i.group)).size,
      )
      expect(moved > 0 || (explodeBy === 'groups' && items.length === 6)).toBe(true)
      for (let v = 0; v < vertexItem.length; v++)
        expect(norm(vertex(stage.positions, v))).toBeLessThanOrEqual(stage.spread + 1e-12)
    })

  test('the sides of a cube go straight outwards, and back again exactly', () => {
    const stage = staged(cubeItems(), (s) => s.setExplode(1))
    const shift = sub(vertex(stage.positions, 0), vertex(stage.model.closed, 0))
    expect(shift[0]).toBeGreaterThan(0.3)
    expect([shift[1], shift[2]]).toEqual([0, 0])
    const at = stage.place([1, 1, 1], 0)
    expect(at[0]).toBeCloseTo(1 / Math.sqrt(3) + shift[0], 12)
    stage.setExplode(0)
    stage.update()
    expect([...stage.positions]).toEqual([...stage.model.closed])
  })
})

describe('what is shown', () => {
  test('solid, ghost or hidden, by kind, id and ghosts', () => {
    const stage = staged(cubeItems())
    const shown = (): string => {
      stage.update()
      return stage.model.items.map((_, i) => (stage.isSolid(i) ? 's' : stage.isGhost(i) ? 'g' : '-')).join('')
    }
    expect(shown()).toBe('ssssss')
    stage.setVisibleItems(new Set([0, 2]))
    expect(shown()).toBe('s-s---')
    stage.setGhost(new Set([2, 3, 4]))
    expect(shown()).toBe('s-ggg-')
    stage.setVisibleKinds(new Set(['x', 'z']))
    expect(shown()).toBe('s---g-')
    expect([stage.solid.length, stage.ghost.length]).toEqual([6, 6])
    stage.setVisibleItems(null)
    stage.setVisibleKinds(null)
    stage.setGhost(null)
    expect(shown()).toBe('ssssss')
  })

  test('a shared edge is one line, two once the sides are apart', () => {
    expect(lineCount(edges(staged(cubeItems())))).toBe(12)
    expect(lineCount(edges(staged(cubeItems(), (s) => s.setExplode(0.5))))).toBe(24)
    // Opposite sides move as one group here, so nothing changes for edges, which no two of one group share.
    expect(lineCount(edges(staged(cubeItems(), (s) => s.setExplode(0.5), { explodeBy: 'groups' })))).toBe(24)
    expect(lineCount(edges(staged(cubeItems(), (s) => s.setVisibleItems(new Set([0])))))).toBe(4)
  })

  test('folds of a piece are drawn lighter than its rim', () => {
    const items = cubeItems().map((item) => ({ ...item, group: item.id === 5 ? 1 : 0 }))
    const [folds, rims] = edges(staged(items))
    expect([folds!, rims!].map((set) => set.ends.length / 6)).toEqual([8, 4])
    expect(folds!.style.alpha).toBeLessThan(rims!.style.alpha)
  })
})

describe('what is lit', () => {
  test('has the rim of all lit sides as outline, not the edges between them', () => {
    const two = staged(cubeItems(), (s) => s.setLit([{ items: new Set([0, 2]) }]))
    // Two sides with a common edge: 6 lines, drawn dashed through, as casing and as accent.
    expect(marks(two).map((set) => set.ends.length / 6)).toEqual([6, 6, 6])
    expect(marks(two).map((set) => set.style.depth)).toEqual(['through', 'surface', 'surface'])
    const apart = staged(cubeItems(), (s) => {
      s.setLit([{ items: new Set([0, 2]) }])
      s.setExplode(0.4)
    })
    expect(marks(apart).map((set) => set.ends.length / 6)).toEqual([8, 8, 8])
    const all = staged(cubeItems(), (s) => s.setLit([{ groups: new Set([0, 1, 2]) }]))
    expect(marks(all)).toEqual([])
  })

  test('is hatched in its accent; what is not lit is not; ghosts get an outline only', () => {
    const stage = staged(cubeItems(), (s) => {
      s.setGhost(new Set([3]))
      s.setLit([{ items: new Set([0, 3]), accent: '#00ff00' }])
    })
    expect([...stage.hatched]).toEqual([1, 0, 0, 0, 0, 0])
    const tones = stage.tones(identity3)
    const tone = (item: number, k: number): number[] => [
      ...tones.subarray(4 * (tonesPerItem * item + k), 4 * (tonesPerItem * item + k) + 3),
    ]
    expect(tone(0, 2)[1]!).toBeGreaterThan(tone(0, 0)[1]! + 80)
    expect(tone(1, 2)).toEqual(tone(1, 0))
    // Sides 0 and 3 have one edge in common.
    expect(marks(stage)[0]!.ends.length / 6).toBe(6)
  })

  test('seams lie where they are told to, move with their item, and the strong one is wider', () => {
    const stage = staged(cubeItems(), (s) => {
      s.setExplode(1)
      s.setSeams([
        {
          id: 1,
          ends: [
            [1, 1, -1],
            [1, 1, 1],
          ],
          item: 0,
          label: '7',
        },
        {
          id: 2,
          ends: [
            [1, 1, -1],
            [1, 1, 1],
          ],
          strong: true,
        },
      ])
    })
    const sets = marks(stage)
    expect(sets.length).toBe(6)
    const [plain, strong] = [sets[2]!, sets[5]!]
    expect(strong.style.width).toBeGreaterThan(plain.style.width)
    expect([...strong.ends.subarray(0, 3)].map((v) => Math.abs(v) * Math.sqrt(3))).toEqual(
      [1, 1, 1].map((v) => expect.closeTo(v, 12)),
    )
    expect(plain.ends[0]!).toBeGreaterThan(strong.ends[0]! + 0.3)
    expect(stage.labels().map((l) => l.text)).toEqual(['7'])
  })

  test('a label stands in the middle of what is lit', () => {
    const stage = staged(cubeItems(), (s) => s.setLit([{ items: new Set([4]), label: 'P 4' }]))
    const [label] = stage.labels()
    expect(label!.text).toBe('P 4')
    expect(label!.at.map((v) => v * Math.sqrt(3))).toEqual([0, 0, 1].map((v) => expect.closeTo(v, 12)))
  })
})

describe('light', () => {
  test('sides that face different ways differ in tone, and the inside is duller than the outside', () => {
    const stage = staged(cubeItems(['#d08040', '#d08040', '#d08040']))
    const camera = new Camera([1, 1, 1])
    const tones = stage.tones(camera.rotation)
    const red = (item: number, k: number): number => tones[4 * (tonesPerItem * item + k)]!
    const seen = [0, 2, 4].map((item) => red(item, 0))
    expect(new Set(seen).size).toBe(3)
    for (const item of [0, 1, 2, 3, 4, 5]) expect(red(item, 1)).toBeLessThan(red(item ^ 1, 0))
    const same = staged(cubeItems(), () => {}, { backs: 'same' }).tones(camera.rotation)
    // The inside of one side faces like the outside of the opposite one.
    expect(same[4 * (tonesPerItem * 0 + 1)]).toBe(same[4 * (tonesPerItem * 1)])
  })
})

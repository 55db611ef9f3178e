import { describe, expect, test } from 'vitest'
import { cross, dot, norm, sub } from '../../src/geometry/vec3'
import { Camera } from '../../src/preview/camera'
import type { Pixels } from '../../src/preview/picture'
import { faceItems, renderThumbnail } from '../../src/preview/thumbnail'
import { buildSolid, listFamily } from '../../src/solids'
import { rayCaster } from './ray-caster'
import { cubeItems, greatDodecahedron, smallStellatedDodecahedron, twoTetrahedra } from './shapes'

const colours = ['#d98c3f', '#4f81bd']
const solids = { greatDodecahedron, smallStellatedDodecahedron, twoTetrahedra }

const alphaAt = ({ width, data }: Pixels, x: number, y: number): number => data[4 * (y * width + x) + 3]!

describe('thumbnails', () => {
  test.each(Object.entries(solids))('%s covers what an independent ray caster meets', (_, solid) => {
    const items = faceItems(solid, colours)
    const castFrom = rayCaster(items)
    const size = 48
    const picture = renderThumbnail(items, { size, samples: 1 })
    expect([picture.width, picture.height, picture.data.length]).toEqual([size, size, 4 * size * size])
    const camera = new Camera()
    camera.resize(size, size)
    // The models are centred at the origin already; rays come in units of the radius.
    const radius = Math.hypot(...solid.vertices[0]!)
    const wrong: unknown[] = []
    let met = 0
    for (let y = 0; y < size; y++)
      for (let x = 0; x < size; x++) {
        const { origin, direction } = camera.ray(x + 0.5, y + 0.5)
        const scaled = (v: readonly number[]): [number, number, number] => [
          v[0]! * radius,
          v[1]! * radius,
          v[2]! * radius,
        ]
        const cast = castFrom({ origin: scaled(origin), direction: scaled(direction) })
        if (cast.doubtful) continue
        if (alphaAt(picture, x, y) !== (cast.nearest ? 255 : 0)) wrong.push({ x, y, cast })
        if (cast.nearest) met++
      }
    expect(wrong).toEqual([])
    expect(met).toBeGreaterThan(400)
  })

  test('the same input gives the same bytes, and no picture is changed by the next', () => {
    const items = faceItems(greatDodecahedron, colours)
    const first = renderThumbnail(items, { size: 40 })
    const copy = first.data.slice()
    renderThumbnail(cubeItems(), { size: 40 })
    expect(first.data).toEqual(copy)
    expect(renderThumbnail(items, { size: 40 }).data).toEqual(copy)
  })

  test('both colours of two tetrahedra are seen, and dark lines where they cut through each other', () => {
    const { data } = renderThumbnail(faceItems(twoTetrahedra, ['#ff0000', '#0000ff']), { size: 120, samples: 3 })
    let [red, blue, dark] = [0, 0, 0]
    for (let i = 0; i < data.length; i += 4) {
      if (data[i + 3]! < 255) continue
      const [r, b] = [data[i]!, data[i + 2]!]
      if (r > 140 && b < 10) red++
      if (b > 140 && r < 10) blue++
      if (r < 130 && b < 130) dark++
    }
    expect(red).toBeGreaterThan(500)
    expect(blue).toBeGreaterThan(500)
    expect(dark).toBeGreaterThan(50)
  })

  test('coplanar faces of two kinds do not flicker: the earlier kind wins', () => {
    const [square] = cubeItems().slice(4)
    const large = { ...square!, id: 1, kind: 'a', colour: '#ff0000' }
    const small = {
      ...square!,
      id: 2,
      kind: 'b',
      colour: '#0000ff',
      rings: [square!.rings[0]!.map(([x, y, z]) => [0.9 * x + 0.02, 0.8 * y, z] as const)],
    }
    const blueIn = (items: (typeof large)[]): number => {
      const { data } = renderThumbnail(items, { size: 100, samples: 1, direction: [0.2, 0.3, 0.9] })
      let blue = 0
      for (let i = 0; i < data.length; i += 4) if (data[i + 2]! > data[i]! && data[i + 3]! > 0) blue++
      return blue
    }
    expect(blueIn([large, small])).toBe(0)
    expect(blueIn([small, large])).toBeGreaterThan(2000)
  })
})

describe('duals whose faces cross themselves', () => {
  const ids = listFamily('dual')
    .filter(({ facesByKind }) => facesByKind.some(({ name }) => /crossed|antiparallelogram/.test(name)))
    .map((facts) => facts.id)

  test.each(ids)('%s: every face lies in its plane and keeps its outline', (id) => {
    const solid = buildSolid(id)
    const torn: unknown[] = []
    for (const { id: face, normal, rings, moreRings } of faceItems(solid, colours)) {
      const cycle = solid.faces[face]!.cycle.map((v) => solid.vertices[v]!)
      const drawn = [rings, ...(moreRings ?? [])].flat(2)
      const off = Math.max(...cycle.map((p) => Math.abs(dot(normal, p) - dot(normal, cycle[0]!))))
      const most = Math.max(...cycle.map((p) => Math.min(...drawn.map((q) => Math.hypot(...sub(p, q))))))
      // Corners of a crossed polygon of more sides may lie inside the filled part.
      if (!(off < 1e-9 && (most < 1e-9 || cycle.length > 4))) torn.push({ face, normal, off, most })
    }
    expect(torn).toEqual([])
  })

  test('some have no signed area at all', () => {
    expect(ids.length).toBeGreaterThan(3)
    const flat = ids.filter((id) => {
      const solid = buildSolid(id)
      const cycle = solid.faces[0]!.cycle.map((v) => solid.vertices[v]!)
      const sum = cycle.reduce<readonly number[]>(
        (s, p, i) => {
          const c = cross(p, cycle[(i + 1) % cycle.length]!)
          return [s[0]! + c[0], s[1]! + c[1], s[2]! + c[2]]
        },
        [0, 0, 0],
      )
      return Math.hypot(...sum) < 1e-9
    })
    expect(flat).not.toEqual([])
  })
})

describe('all 75 uniform polyhedra', () => {
  const ids = listFamily('uniform').map((facts) => facts.id)

  test('raw faces become items with outward normals and rings counter-clockwise about them', () => {
    for (const id of ids)
      for (const { normal, rings } of faceItems(buildSolid(id), colours)) {
        const [outer] = rings
        let area = 0
        outer!.forEach((p, i) => {
          const q = outer![(i + 1) % outer!.length]!
          area += dot(cross(p, q), normal)
        })
        expect(norm(normal)).toBeCloseTo(1, 12)
        expect(dot(normal, outer![0]!)).toBeGreaterThan(-1e-9)
        expect(area).toBeGreaterThan(0.1)
      }
  })

  test('there are 75', () => {
    expect(ids.length).toBe(75)
  })

  test.each(['nonzero', 'evenodd'] as const)('each has its own picture that fills the square, fill %s', (fill) => {
    const seen = new Set<string>()
    for (const id of ids) {
      const size = 64
      const picture = renderThumbnail(faceItems(buildSolid(id), [...colours, '#9bbb59', '#c9b458'], fill), { size })
      let covered = 0
      let reach = 0
      for (let y = 0; y < size; y++)
        for (let x = 0; x < size; x++)
          if (alphaAt(picture, x, y) > 0) {
            covered++
            reach = Math.max(reach, Math.hypot(x + 0.5 - size / 2, y + 0.5 - size / 2))
          }
      // The tetrahedron covers least; no vertex of any solid leaves the circle that the view allows it.
      expect({ id, covered: covered > 0.15 * size * size, reach: reach > 0.3 * size && reach < 0.5 * size }).toEqual({
        id,
        covered: true,
        reach: true,
      })
      seen.add(Buffer.from(picture.data).toString('base64'))
    }
    expect(seen.size).toBe(75)
  })

  // Two that look through themselves, one with coplanar faces, one of density 37, one with faces through the centre.
  const hard = [
    'great-retrosnub-icosidodecahedron',
    'great-dirhombicosidodecahedron',
    'small-retrosnub-icosicosidodecahedron',
    'octahemioctahedron',
    'great-truncated-icosidodecahedron',
  ]
  test.each(hard)('%s covers what an independent ray caster meets, both fill rules', (id) => {
    for (const fill of ['nonzero', 'evenodd'] as const) {
      const solid = buildSolid(id)
      const items = faceItems(solid, colours, fill)
      const castFrom = rayCaster(items)
      const size = 24
      const picture = renderThumbnail(items, { size, samples: 1 })
      const camera = new Camera()
      camera.resize(size, size)
      const radius = Math.hypot(...solid.vertices[0]!)
      const scaled = (v: readonly number[]): [number, number, number] => [
        v[0]! * radius,
        v[1]! * radius,
        v[2]! * radius,
      ]
      const wrong: unknown[] = []
      let compared = 0
      for (let y = 0; y < size; y++)
        for (let x = 0; x < size; x++) {
          const { origin, direction } = camera.ray(x + 0.5, y + 0.5)
          const { nearest, grazed } = castFrom({ origin: scaled(origin), direction: scaled(direction) })
          if (grazed) continue
          compared++
          if (alphaAt(picture, x, y) !== (nearest ? 255 : 0)) wrong.push({ x, y, nearest })
        }
      expect(wrong).toEqual([])
      expect(compared).toBeGreaterThan(0.9 * size * size)
    }
  })
})

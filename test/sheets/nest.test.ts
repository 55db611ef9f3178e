/** Nesting: random outlines against an independent check by clipping; exact fits; the raster against winding numbers. */
import { describe, expect, test } from 'vitest'
import { type Ring2, type Vec2, windingNumber } from '../../src/geometry/vec2'
import { type NestedSheet, type NestItem, type NestOptions, nest, papers, validateSheets } from '../../src/sheets'
import { rasterize } from '../../src/sheets/raster'
import { type Random, seeded } from '../support/random'

const a4: NestOptions = { widthMm: 210, heightMm: 297, marginMm: 10, gapMm: 2, mirrored: false }

/** A star-shaped polygon with arms and notches. */
const blob = (random: Random, size: number): Ring2 => {
  const n = 3 + Math.floor(random() * 9)
  return Array.from({ length: n }, (_, i): Vec2 => {
    const a = (2 * Math.PI * (i + 0.8 * random())) / n
    const r = size * (0.25 + 0.75 * random())
    return [r * Math.cos(a) + 17, r * Math.sin(a) - 5]
  })
}

const items = (seed: number, count: number, size: number): NestItem[] => {
  const random = seeded(seed)
  return Array.from({ length: count }, (_, id) => ({
    id,
    rings: [blob(random, size * (0.4 + 0.6 * random()))],
    group: id % 3 === 0 ? 'red' : 'blue',
  }))
}

const failing = (list: readonly NestItem[], sheets: readonly NestedSheet[], options: NestOptions): string[] =>
  validateSheets(list, sheets, options)
    .filter((c) => !c.ok)
    .map((c) => c.name)

describe('nesting', () => {
  for (const [seed, count, size, options] of [
    [11, 30, 60, a4],
    [12, 80, 25, a4],
    [13, 25, 50, { ...a4, mirrored: true }],
    [14, 25, 50, { ...a4, widthMm: 215.9, heightMm: 279.4, marginMm: 6.35, gapMm: 0.5 }],
  ] as const)
    test(`${count} random outlines keep margins, gaps and groups, seed ${seed}`, () => {
      const list = items(seed, count, size)
      const sheets = nest(list, options)
      expect(failing(list, sheets, options)).toEqual([])
      expect(sheets.flatMap((s) => s.placed).every((p) => p.mirrored === options.mirrored)).toBe(true)
      expect(nest(list, options)).toEqual(sheets)
    })

  test('true outlines, not boxes: two right triangles share the box of one', () => {
    const triangle: Ring2 = [
      [0, 0],
      [180, 0],
      [0, 260],
    ]
    const list = [0, 1].map((id): NestItem => ({ id, rings: [triangle], group: 'all' }))
    const sheets = nest(list, a4)
    expect(sheets.length).toBe(1)
    expect(failing(list, sheets, a4)).toEqual([])
  })

  test('a part that fits the printable area at one angle only is laid at it', () => {
    // A strip of 25 × 300 mm is too long for 277 mm; it fits 190 × 277 mm only near the diagonal of 336 mm.
    const strip: Ring2 = [
      [0, 0],
      [300, 0],
      [300, 25],
      [0, 25],
    ]
    const list: NestItem[] = [{ id: 0, rings: [strip], group: 'all' }]
    const sheets = nest(list, a4)
    expect(failing(list, sheets, a4)).toEqual([])
    const exact: Ring2 = [
      [0, 0],
      [277, 0],
      [277, 190],
      [0, 190],
    ]
    const whole: NestItem[] = [{ id: 0, rings: [exact], group: 'all' }]
    expect(failing(whole, nest(whole, a4), a4)).toEqual([])
  })

  test('a flat bottom that rounding puts a hair below zero is held by the first row', () => {
    const mask = rasterize(
      [
        [
          [0, -1e-17],
          [20, -1e-17],
          [20, 10],
          [0, 10],
        ],
      ],
      0.5,
    )
    expect(mask.cells).toBe(mask.width * mask.height)
  })

  test('what fits no sheet is said', () => {
    const huge: Ring2 = [
      [0, 0],
      [300, 0],
      [300, 300],
      [0, 300],
    ]
    expect(() => nest([{ id: 7, rings: [huge], group: 'all' }], a4)).toThrow(/does not fit/)
  })
})

describe('validateSheets is shown to fail', () => {
  const list = items(21, 12, 40)
  const sheets = nest(list, a4)
  const broken = (
    change: (
      copy: { group: string; placed: { item: number; x: number; y: number; rotation: number; mirrored: boolean }[] }[],
    ) => void,
  ): string[] => {
    const copy = structuredClone(sheets) as Parameters<typeof change>[0]
    change(copy)
    return failing(list, copy as NestedSheet[], a4)
  }
  test('a part left out', () => expect(broken((s) => s[0]?.placed.pop())).toContain('each item placed once'))
  test('a part over the margin', () =>
    expect(
      broken((s) => {
        const p = s[0]?.placed[0]
        if (p) p.x -= 200
      }),
    ).toContain('everything inside the margins'))
  test('two parts on one another', () =>
    expect(
      broken((s) => {
        const [p, q] = s[0]?.placed ?? []
        if (p && q) {
          q.x = p.x
          q.y = p.y
        }
      }),
    ).toContain('gap kept between items'))
  test('a part among another colour', () =>
    expect(
      broken((s) => {
        const other = s.find((x) => x.group !== s[0]?.group)
        const p = s[0]?.placed.pop()
        if (p) other?.placed.push(p)
      }),
    ).toContain('groups keep to their sheets'))
})

test('the raster holds every cell that the outline covers, seed 31', () => {
  const random = seeded(31)
  for (let k = 0; k < 20; k++) {
    const ring = blob(random, 30).map(([x, y]): Vec2 => [x + 20, y + 40])
    const mask = rasterize([ring], 0.5)
    let inside = 0
    for (let i = 0; i < 2000; i++) {
      const p: Vec2 = [random() * 0.5 * mask.width, random() * 0.5 * mask.height]
      if (windingNumber(ring, p) === 0) continue
      inside++
      const [x, y] = [Math.floor(p[0] / 0.5), Math.floor(p[1] / 0.5)]
      let held = false
      for (let r = mask.starts[y] as number; r < (mask.starts[y + 1] as number); r++)
        if (x >= (mask.runs[2 * r] as number) && x < (mask.runs[2 * r + 1] as number)) held = true
      expect(held).toBe(true)
    }
    expect(inside).toBeGreaterThan(20)
  }
})

test('paper sizes: ISO 216 and the North American letter size', () => {
  expect([papers.a4.widthMm, papers.a4.heightMm]).toEqual([210, 297])
  // 8.5 × 11 inches of 25.4 mm.
  expect([papers.letter.widthMm, papers.letter.heightMm]).toEqual(
    [8.5 * 25.4, 11 * 25.4].map((x) => Math.round(x * 10) / 10),
  )
})

import { describe, expect, it } from 'vitest'
import type { Vec2 } from '../../src/geometry/vec2'
import { type PiecesPlan, piecesOf, type Tab, validatePieces } from '../../src/pieces'
import { cubeOnCube, pitted, smallStellated } from './fixtures'
import { a4, planOf } from './plans'

const good = planOf(pitted(), 90)

/** The names of the checks that fail. */
const failing = (plan: PiecesPlan): string[] => validatePieces(plan).flatMap((c) => (c.ok ? [] : [c.name]))
const change = <T>(list: readonly T[], at: number, by: (item: T) => T): T[] =>
  list.map((item, i) => (i === at ? by(item) : item))

const shift = (p: Vec2, x: number, y: number): Vec2 => [p[0] + x, p[1] + y]

/** One tab of the plan changed. */
const withTab = (pick: (t: Tab) => boolean, by: (t: Tab) => Tab): PiecesPlan => {
  const i = good.tabs.findIndex((list) => list.some(pick))
  const k = good.tabs[i]!.findIndex(pick)
  return { ...good, tabs: change(good.tabs, i, (list) => change(list, k, by)) }
}
const any = (): boolean => true

describe('validatePieces', () => {
  it('passes a good plan', () => {
    expect(failing(good)).toEqual([])
    expect(good.pieces.length).toBeGreaterThan(2)
  })

  const broken: [string, string, () => PiecesPlan][] = [
    [
      'every panel in one piece',
      'a panel twice',
      () => ({ ...good, pieces: change(good.pieces, 0, (p) => ({ ...p, panels: [...p.panels, p.panels[0]!] })) }),
    ],
    ['every panel in one piece', 'a piece missing', () => ({ ...good, pieces: good.pieces.slice(1) })],
    [
      'pieces are trees of folds',
      'a fold missing',
      () => ({ ...good, pieces: change(good.pieces, 0, (p) => ({ ...p, folds: p.folds.slice(1) })) }),
    ],
    [
      'panels keep their shape, unmirrored',
      'a mirrored piece',
      () => ({
        ...good,
        pieces: change(good.pieces, 0, (p) => ({
          ...p,
          panels: p.panels.map((q) => ({ ...q, rings: q.rings.map((r) => r.map(([x, y]): Vec2 => [-x, y])) })),
        })),
      }),
    ],
    [
      'panels keep their shape, unmirrored',
      'a piece printed 3 % too small',
      () => ({
        ...good,
        pieces: change(good.pieces, 1, (p) => ({
          ...p,
          panels: p.panels.map((q) => ({
            ...q,
            rings: q.rings.map((r) => r.map(([x, y]): Vec2 => [0.97 * x, 0.97 * y])),
          })),
        })),
      }),
    ],
    [
      'folded panels lie edge to edge',
      'a panel moved by a tenth of a millimetre',
      () => ({
        ...good,
        pieces: change(good.pieces, 0, (p) => ({
          ...p,
          panels: change(p.panels, 0, (q) => ({ ...q, rings: q.rings.map((r) => r.map((z) => shift(z, 0.1, 0))) })),
        })),
      }),
    ],
    [
      'no overlap',
      'a panel laid onto another',
      () => ({
        ...good,
        pieces: change(good.pieces, 0, (p) => {
          // Middle on middle: of panels laid corner on corner it depends on the net whether they overlap.
          const middle = (k: number, i: 0 | 1): number => {
            const ring = p.panels[k]!.rings[0]!
            return ring.reduce((sum, z) => sum + z[i], 0) / ring.length
          }
          const [x, y] = [middle(1, 0) - middle(0, 0), middle(1, 1) - middle(0, 1)]
          return {
            ...p,
            panels: change(p.panels, 0, (q) => ({ ...q, rings: q.rings.map((r) => r.map((z) => shift(z, x, y))) })),
          }
        }),
      }),
    ],
    [
      'no overlap',
      'all creases of one vertex but one folded, at a vertex of more than 360 degrees',
      () => {
        // Three arms meet at a dodecahedron's vertex with 6 × 72 degrees.
        const skin = smallStellated()
        const around = skin.creases.filter((c) => c.ends.includes(0)).map((c) => c.id)
        return { ...good, skin, pieces: piecesOf(skin, 20, around.slice(1), a4), edgeMm: 20 }
      },
    ],
    [
      'pieces fold back onto the skin',
      'an inner angle changed by a thousandth of a degree',
      () => {
        const fold = good.pieces[0]!.folds[0]!
        const creases = change(good.skin.creases, fold, (c) => ({ ...c, innerAngle: c.innerAngle + 1e-3 }))
        return { ...good, skin: { ...good.skin, creases } }
      },
    ],
    [
      'pieces fit the sheet with their tabs',
      'a smaller sheet',
      () => ({ ...good, fit: { widthMm: 190, heightMm: 120 } }),
    ],
    [
      'every seam has its tab or is listed',
      'a tab missing',
      () => ({ ...good, tabs: change(good.tabs, 0, (list) => list.slice(1)) }),
    ],
    [
      'every seam has its tab or is listed',
      'a seam with a tab also listed without',
      () => ({ ...good, buttSeams: [good.tabs[0]![0]!.crease] }),
    ],
    [
      'tabs clear in the flat',
      'a tab pushed 1 mm into its panel',
      () =>
        withTab(any, (t) => {
          const [b, a] = t.outline as [Vec2, Vec2]
          const length = Math.hypot(b[0] - a[0], b[1] - a[1])
          // To the left of a → b is the panel.
          const [x, y] = [-(b[1] - a[1]) / length, (b[0] - a[0]) / length]
          return { ...t, outline: t.outline.map((p) => shift(p, x, y)) }
        }),
    ],
    [
      'tabs clear in the flat',
      'a tab run clockwise',
      () => withTab(any, (t) => ({ ...t, outline: [...t.outline].reverse() })),
    ],
    [
      'tabs inside the panels behind',
      'a tab three times as deep as the panel behind',
      () =>
        withTab(any, (t) => {
          const [b, a, p, q] = t.outline as [Vec2, Vec2, Vec2, Vec2]
          const far = (from: Vec2, to: Vec2): Vec2 => [
            from[0] + 40 * (to[0] - from[0]),
            from[1] + 40 * (to[1] - from[1]),
          ]
          return { ...t, outline: [b, a, far(a, p), far(b, q)] }
        }),
    ],
    [
      'tabs on the piece glued earlier',
      'pieces in another order',
      () => ({ ...good, pieces: [...good.pieces].reverse(), tabs: [...good.tabs].reverse() }),
    ],
  ]
  for (const [name, how, plan] of broken)
    it(`finds ${how}`, () => {
      expect(failing(plan())).toContain(name)
    })

  it('finds a second tab behind the same panel', () => {
    // One of two tabs behind a panel grows until it covers almost all of that back.
    const creases = good.skin.creases
    const other = (t: Tab): number => creases[t.crease]!.panels.find((p) => p !== t.panel)!
    const all = good.tabs.flat()
    const first = all.find((t) => all.some((u) => u !== t && other(u) === other(t)))
    expect(first).toBeDefined()
    const flat = new Map(good.pieces.flatMap((p) => p.panels.map((q) => [q.panel, q] as const)))
    const ends = (panel: number): [Vec2, Vec2] => {
      const ring = flat.get(panel)!.rings[0]!
      const i = good.skin.panels[panel]!.creases[0]!.indexOf(first!.crease)
      return [ring[i]!, ring[(i + 1) % ring.length]!]
    }
    const [a, b] = ends(first!.panel)
    const [c, d] = ends(other(first!))
    const length = Math.hypot(b[0] - a[0], b[1] - a[1])
    const back = flat.get(other(first!))!.rings[0]!.map((p): Vec2 => {
      // Along the crease from d, into the panel; then out of the carrier's edge a → b by as much. Drawn in a little.
      const x = ((p[0] - d[0]) * (c[0] - d[0]) + (p[1] - d[1]) * (c[1] - d[1])) / length
      const y = Math.abs((p[0] - d[0]) * (c[1] - d[1]) - (p[1] - d[1]) * (c[0] - d[0])) / length
      const [u, v] = [0.9 * x + 0.05 * length, 0.9 * y]
      const [tx, ty] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length]
      return [a[0] + u * tx + v * ty, a[1] + u * ty - v * tx]
    })
    const grown = withTab(
      (t) => t === first,
      (t) => ({ ...t, outline: [...back].reverse() }),
    )
    const found = validatePieces(grown).find((check) => check.name === 'tabs inside the panels behind')!
    expect(found.ok).toBe(false)
    expect(found.detail).toMatch(/lie on each other/)
  })

  it('finds a panel with a hole that another panel lies in', () => {
    const plan = planOf(cubeOnCube(), 70)
    expect(failing(plan)).toEqual([])
    const holed = plan.pieces.findIndex((p) => p.panels.some((q) => q.rings.length === 2))
    const moved = change(plan.pieces, holed, (p) => ({
      ...p,
      panels: p.panels.map((q) => (q.rings.length === 2 ? { ...q, rings: q.rings.slice(0, 1) } : q)),
    }))
    expect(failing({ ...plan, pieces: moved })).toContain('panels keep their shape, unmirrored')
  })
})

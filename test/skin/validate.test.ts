/** The skin's validator is shown to fail: each promise broken once, and only the check that guards it (at least) says so. */
import { describe, expect, test } from 'vitest'
import { computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'

type Loose = {
  -readonly [K in keyof Skin]: Skin[K] extends readonly (infer E)[] ? { -readonly [P in keyof E]: E[P] }[] : Skin[K]
}

const broken: readonly [string, string, (s: Loose) => void][] = [
  ['a panel left out of the area', 'skin closes', (s) => void (s.area *= 1.001)],
  [
    'a panel turned round',
    'panels are flat, with outward normals and true areas',
    (s) => {
      const p = s.panels[3] as Loose['panels'][number]
      p.normal = [-p.normal[0], -p.normal[1], -p.normal[2]]
    },
  ],
  [
    'a corner moved',
    'panels are flat, with outward normals and true areas',
    (s) => {
      const p = s.points[0] as unknown as [number, number, number]
      s.points[0] = [p[0] + 1e-3, p[1], p[2]] as never
    },
  ],
  [
    'a ring edge without its crease',
    'creases cover every ring edge',
    (s) => {
      const p = s.panels[0] as Loose['panels'][number]
      p.creases = p.creases.map((r) => r.map((c, i) => (i === 0 ? c + 1 : c)))
    },
  ],
  ['a crease removed', 'creases cover every ring edge', (s) => void s.creases.pop()],
  [
    'ends the wrong way round',
    'creases cover every ring edge',
    (s) => {
      const c = s.creases[2] as Loose['creases'][number]
      c.ends = [c.ends[1], c.ends[0]]
    },
  ],
  [
    'a mountain said to be a valley',
    'inner angles agree with the panels',
    (s) => {
      const c = s.creases[1] as Loose['creases'][number]
      c.innerAngle = 360 - c.innerAngle
    },
  ],
  ['bodies miscounted', 'bodies and parts are counted', (s) => void s.bodies++],
  ['parts miscounted', 'bodies and parts are counted', (s) => void s.parts++],
  ['volume misstated', 'skin closes', (s) => void (s.volume += 1e-3)],
]

describe('validateSkin', () => {
  const skin = computeSkin(buildSolid('great-icosahedron'))

  test('finds nothing in a true skin', () => {
    expect(validateSkin(skin).filter((c) => !c.ok)).toEqual([])
    expect(validateSkin(skin).length).toBe(5)
  })

  for (const [fault, name, breakIt] of broken)
    test(`finds ${fault}`, () => {
      const copy = structuredClone(skin) as unknown as Loose
      breakIt(copy)
      const failing = validateSkin(copy as unknown as Skin).filter((c) => !c.ok)
      expect(failing.map((c) => c.name)).toContain(name)
    })
})

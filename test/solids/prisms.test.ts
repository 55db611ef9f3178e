/** Prisms and antiprisms against closed forms and against Wythoff's construction of the same solids. */
import { describe, expect, test } from 'vitest'
import { norm } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { buildSolid, listFamily, type SolidFacts, validateSolid } from '../../src/solids'
import { buildFrom } from '../../src/solids/build'
import { factsOf } from '../../src/solids/facts'
import { antiprismNames, constructAntiprism, constructPrism, prismNames } from '../../src/solids/prisms'
import { canonicalConfiguration } from '../../src/solids/vertex-configuration'
import { constructWythoff } from '../../src/solids/wythoff'
import { signedVolume } from './volumes'

const prisms = listFamily('prism')
const antiprisms = listFamily('antiprism')
const gcd = (a: number, b: number): number => (b === 0 ? a : gcd(b, a % b))

/** n and d as the Wythoff symbol has them, d over n/2 for crossed ones. */
const polygonOf = (f: SolidFacts): { n: number; d: number } => {
  const text = (f.family === 'prism' ? f.wythoff.split(' ')[1] : f.wythoff.split(' ')[3]) as string
  const [n, d] = text.split('/').map(Number) as [number, number | undefined]
  return { n, d: d ?? 1 }
}

test('all {n/d} with n from 3 to 24 are there, but for the cube and the octahedron', () => {
  const wanted: string[] = []
  for (let n = 3; n <= 24; n++) for (let d = 1; 2 * d < n; d++) if (gcd(n, d) === 1) wanted.push(`${n}/${d}`)
  const key = (f: SolidFacts): string => `${polygonOf(f).n}/${polygonOf(f).d}`
  expect(prisms.map(key)).toEqual(wanted.filter((k) => k !== '4/1'))
  const plain = antiprisms.filter((f) => !f.name.includes('crossed'))
  expect(plain.map(key)).toEqual(wanted.filter((k) => k !== '3/1'))
  const crossed: string[] = []
  for (let n = 3; n <= 24; n++)
    for (let d = 1; d < n; d++) if (gcd(n, d) === 1 && n / d > 3 / 2 && n / d < 2) crossed.push(`${n}/${d}`)
  const found = antiprisms.filter((f) => f.name.includes('crossed')).map(key)
  expect([...found].sort()).toEqual([...crossed].sort())
  expect([prisms.length, plain.length, crossed.length]).toEqual([88, 88, 29])
})

test('what is left out is in the 75: {4} gives the cube, {3} the octahedron, and {3/2} no antiprism at all', () => {
  const about = { index: null, wythoff: '', dual: null, notes: [] }
  const plain = { id: 'x', name: 'x', family: 'prism' } as const
  const pick = ({ vertexConfiguration, vertices, circumradius, symmetry }: SolidFacts) => ({
    ...{ vertexConfiguration, vertices, symmetry },
    circumradius: circumradius.toFixed(12),
  })
  const [octahedron, cube] = listFamily('uniform').slice(4, 6) as [SolidFacts, SolidFacts]
  expect(pick(factsOf(buildFrom(constructPrism(4, 1), plain), about))).toEqual(pick(cube))
  expect(pick(factsOf(buildFrom(constructAntiprism(3, 1), plain), about))).toEqual(pick(octahedron))
  expect(() => constructAntiprism(3, 2)).toThrow(/no antiprism/)
})

test('names are plain, ids are unique and kebab-case', () => {
  const name = (id: string) => [...prisms, ...antiprisms].find((f) => f.id === id)?.name
  expect(name('heptagonal-prism')).toBe('heptagonal prism')
  expect(name('square-antiprism')).toBe('square antiprism')
  expect(name('heptagrammic-7-3-prism')).toBe('heptagrammic 7/3 prism')
  expect(name('heptagrammic-7-4-crossed-antiprism')).toBe('heptagrammic 7/4 crossed antiprism')
  for (const { id } of [...prisms, ...antiprisms]) expect(id).toMatch(/^[a-z0-9]+(-[a-z0-9]+)*$/)
})

describe('facts by closed form', () => {
  test('prisms: 2n vertices, 3n edges, n + 2 faces, density d, 4.4.n/d, angles of the polygon, D_nh', () => {
    for (const f of prisms) {
      const { n, d } = polygonOf(f)
      expect([f.id, f.vertices, f.edges, f.faces, f.euler, f.density]).toEqual([f.id, 2 * n, 3 * n, n + 2, 2, d])
      expect(canonicalConfiguration(f.vertexConfiguration)).toBe(
        canonicalConfiguration(d === 1 ? `4.4.${n}` : `4.4.${n}/${d}`),
      )
      expect([f.id, f.symmetry, f.chiral, f.orientable]).toEqual([f.id, `D_${n}h`, false, true])
      expect(f.circumradius).toBeCloseTo(Math.hypot(0.5, 0.5 / Math.sin((Math.PI * d) / n)), 12)
      const square = f.facesByKind.find((k) => k.n === 4)?.id
      const inner = f.dihedralAngles.find((a) => a.kinds.every((k) => k === square))?.degrees as number
      expect(inner).toBeCloseTo(180 - (360 * d) / n, 9)
    }
  })

  // The end polygons look the same way up when d is even, and are turned half a step when it is odd.
  test('antiprisms: 2n, 4n, 2n + 2, density d, 3.3.3.n/d, D_nd where d is odd and D_nh where it is even', () => {
    for (const f of antiprisms) {
      const { n, d } = polygonOf(f)
      expect([f.id, f.vertices, f.edges, f.faces, f.euler]).toEqual([f.id, 2 * n, 4 * n, 2 * n + 2, 2])
      expect([f.id, f.density]).toEqual([f.id, d])
      expect(f.vertexConfiguration).toBe(d === 1 ? `3.3.3.${n}` : `3.3.3.${n}/${d}`)
      expect([f.id, f.symmetry]).toEqual([f.id, `D_${n}${d % 2 === 1 ? 'd' : 'h'}`])
      // Circumradius √(4 + cosec²(π/2n))/4 and tan(π/2n)/√3 for the angle at the end polygon, from memory; n/d in place of n.
      const half = (Math.PI * d) / (2 * n)
      expect(f.circumradius).toBeCloseTo(Math.sqrt(4 + 1 / Math.sin(half) ** 2) / 4, 12)
      const end = f.facesByKind.find((k) => k.n === n)?.id
      const angle = f.dihedralAngles.find((a) => a.kinds.some((k) => k === end))?.degrees as number
      // Measured on the polygon's own side, which for crossed ones is beyond the axis.
      const cosine = -Math.tan(half) / Math.sqrt(3)
      const expected = (Math.acos(cosine) * 180) / Math.PI
      expect(Math.abs(angle - (2 * d > n ? 180 - expected : expected))).toBeLessThan(1e-9)
    }
  })

  test('volume of prisms n/4 · cot(π/n), of antiprisms by the closed form (from memory), n/d in place of n', () => {
    for (const f of [...prisms, ...antiprisms]) {
      const { n, d } = polygonOf(f)
      const a = (Math.PI * d) / n
      const prism = n / (4 * Math.tan(a))
      const antiprism = (n * Math.sqrt(4 * Math.cos(a / 2) ** 2 - 1) * Math.sin(1.5 * a)) / (12 * Math.sin(a) ** 2)
      const volume = signedVolume(buildSolid(f.id))
      expect([f.id, Math.abs(volume - (f.family === 'prism' ? prism : antiprism)) < 1e-11 * n]).toEqual([f.id, true])
    }
  })

  // A star is n kites; its inner corners lie at radius R cos(πd/n) / cos(π(d − 1)/n), worked out by hand.
  test('the skin of a star prism is that of the prism over the outline of the star', () => {
    for (const f of prisms) {
      const { n, d } = polygonOf(f)
      const outer = 0.5 / Math.sin((Math.PI * d) / n)
      const inner = (outer * Math.cos((Math.PI * d) / n)) / Math.cos((Math.PI * (d - 1)) / n)
      const skin = computeSkin(buildSolid(f.id))
      const area = n * outer * inner * Math.sin(Math.PI / n)
      expect([f.id, skin.panels.length]).toEqual([f.id, d === 1 ? n + 2 : 2 * n + 2])
      expect(Math.abs(skin.volume - area)).toBeLessThan(1e-10 * n)
      const side = Math.hypot(outer - inner * Math.cos(Math.PI / n), inner * Math.sin(Math.PI / n))
      expect(Math.abs(skin.area - 2 * area - 2 * n * side)).toBeLessThan(1e-9 * n)
    }
  })
})

test('all are valid', () => {
  for (const { id } of [...prisms, ...antiprisms])
    expect([id, validateSolid(buildSolid(id)).filter((c) => !c.ok)]).toEqual([id, []])
})

describe("the same solids by Wythoff's construction", () => {
  const about = { index: null, wythoff: '', dual: null, notes: [] }
  const some = [...prismNames.filter((_, i) => i % 4 === 0), ...antiprismNames.filter((_, i) => i % 9 === 0)]
  for (const { name, wythoff } of some)
    test(`${name}: ${wythoff}`, () => {
      const other = factsOf(buildFrom(constructWythoff(wythoff), { id: 'x', name, family: 'prism' }), about)
      const facts = [...prisms, ...antiprisms].find((f) => f.name === name) as SolidFacts
      expect(other.circumradius).toBeCloseTo(facts.circumradius, 9)
      const pick = ({ vertices, edges, faces, density, symmetry, vertexConfiguration, facesByKind }: SolidFacts) => ({
        ...{ vertices, edges, faces, density, symmetry, vertexConfiguration, facesByKind },
      })
      expect(pick(other)).toEqual(pick(facts))
      const sorted = (f: SolidFacts): number[] => f.dihedralAngles.map((a) => a.degrees).sort((a, b) => a - b)
      sorted(other).forEach((x, i) => {
        expect(x).toBeCloseTo(sorted(facts)[i] as number, 6)
      })
    })
})

test('rotations carry vertices to vertices and are as many as the symbol says', () => {
  for (const f of [...prisms, ...antiprisms]) {
    const { rotations, vertices } = buildSolid(f.id)
    expect([f.id, rotations.length]).toEqual([f.id, 2 * polygonOf(f).n])
    expect(Math.max(...vertices.map(norm)) - Math.min(...vertices.map(norm))).toBeLessThan(1e-12)
  }
})

/** What is shown alone, the vertex figure in words, and where its labels lie. */
import { describe, expect, test } from 'vitest'
import { firstChoices } from '../../src/app/state/choices'
import { letter, placeLabels, type Segment } from '../../src/app/ui/figure-labels'
import { planItems } from '../../src/app/ui/scene'
import { orbitsOf, sayShown, showAll, shownItems, vertexSorts } from '../../src/app/ui/show'
import { nameFigure, sayFacesRound, sayFigure, sayLengths, sayLines } from '../../src/app/words/vertex'
import { makePlan } from '../../src/plan'
import { faceItems } from '../../src/preview'
import { buildSolid } from '../../src/solids'
import { solidParts } from '../../src/solids/parts'
import { vertexFigure } from '../../src/solids/vertex-figure'

const rawOf = (id: string) => {
  const solid = buildSolid(id)
  const items = faceItems(solid, ['#aaaaaa']).map((item) => ({ ...item, kind: solid.kinds[Number(item.kind)]!.name }))
  return { solid, items, whole: { parts: solidParts(solid) } }
}

describe('faces of the small snub icosicosidodecahedron', () => {
  const { items, whole } = rawOf('small-snub-icosicosidodecahedron')

  test('all, a kind, and its orbits, which share the triangles out', () => {
    expect(shownItems(showAll, items, whole)).toBe(null)
    const triangles = shownItems({ what: 'kind', kind: 'triangle', orbit: null }, items, whole)!
    expect(triangles.size).toBe(100)
    const orbits = orbitsOf(whole.parts, 'triangle')
    expect(orbits.map(({ faces }) => faces).sort()).toEqual([20, 20, 60])
    const shared = orbits.flatMap(({ orbit }) => [
      ...shownItems({ what: 'kind', kind: 'triangle', orbit }, items, whole)!,
    ])
    expect(new Set(shared)).toEqual(triangles)
    expect(shared).toHaveLength(100)
    expect(orbitsOf(whole.parts, 'pentagram')).toHaveLength(1)
  })

  test('in words', () => {
    const [first] = orbitsOf(whole.parts, 'triangle')
    expect([
      sayShown(showAll, items, whole),
      sayShown({ what: 'kind', kind: 'triangle', orbit: null }, items, whole),
      sayShown({ what: 'kind', kind: 'triangle', orbit: first!.orbit }, items, whole),
      sayShown({ what: 'vertex', vertex: 3 }, items, whole),
      sayShown({ what: 'kind', kind: 'triangle', orbit: null }, items, null),
    ]).toEqual([
      'Shown: the whole model.',
      'Shown: 100 triangles alone.',
      `Shown: ${first!.faces} of 100 triangles, orbit 1 of 3.`,
      expect.stringMatching(
        /^Shown: vertex 4 of 60 with its faces alone, (5 triangles and 1 pentagram|1 pentagram and 5 triangles)\.$/,
      ),
      'Shown: triangles alone (100 panels).',
    ])
  })

  test('a vertex: exactly the faces that have it as a corner', () => {
    const { solid } = rawOf('small-snub-icosicosidodecahedron')
    for (const vertex of [0, 17, 59]) {
      const shown = shownItems({ what: 'vertex', vertex }, items, whole)!
      const right = solid.faces.flatMap(({ cycle }, face) => (cycle.includes(vertex) ? [face] : []))
      expect([...shown].sort((a, b) => a - b)).toEqual(right)
    }
  })
})

test('panels of a plan: those of the faces at the vertex, all of them in their planes', () => {
  const solid = buildSolid('great-icosahedron')
  const plan = makePlan(firstChoices('great-icosahedron'))
  const facesOf = new Map(plan.panels.map(({ id, faces }) => [id, faces]))
  const whole = { parts: solidParts(solid), facesOf }
  const items = planItems(plan, {})
  const shown = shownItems({ what: 'vertex', vertex: 0 }, items, whole)!
  const [x, y, z] = solid.vertices[0]!
  const mm = plan.model.edgeMm
  // A plane through the vertex and a panel's own plane: the same distance from the centre along the panel's normal.
  const through = plan.panels.filter(({ normal, rings }) => {
    const [a] = rings[0]!
    const own = normal[0] * a![0] + normal[1] * a![1] + normal[2] * a![2]
    return Math.abs(own - mm * (normal[0] * x + normal[1] * y + normal[2] * z)) < 1e-6
  })
  expect([...shown].sort((a, b) => a - b)).toEqual(through.map(({ id }) => id).sort((a, b) => a - b))
  expect(shown.size).toBe(45)
  expect(sayShown({ what: 'vertex', vertex: 0 }, items, whole)).toMatch(/5 triangles \(45 panels\)\.$/)
})

test('sorts of vertices: the rhombic dodecahedron has two', () => {
  const { whole } = rawOf('rhombic-dodecahedron')
  expect(
    vertexSorts(whole.parts)
      .map(({ vertices }) => vertices.length)
      .sort(),
  ).toEqual([6, 8])
})

describe('the figure in words', () => {
  const say = (id: string, vertex = 0) => sayFigure(vertexFigure(buildSolid(id), vertex))
  test.each([
    ['cube', 'Seen along the axis: 3 squares.'],
    ['great-icosahedron', 'Seen along the axis: 5 triangles. They wind twice round the vertex.'],
    ['compound-of-five-cubes', 'Seen along the axis, 2 rings of faces: 3 squares; 3 squares.'],
  ])('%s', (id, right) => {
    expect(say(id)).toBe(right)
  })

  test('backward and edge-on sides are said, in cyclic order', () => {
    const figure = vertexFigure(buildSolid('tetrahemihexahedron'), 0)
    expect(`${sayFigure(figure)}`.replace('Seen along the axis: ', '').replace('.', '').split(', ').sort()).toEqual([
      'square (edge-on)',
      'square (edge-on)',
      'triangle',
      'triangle (backwards)',
    ])
    expect(nameFigure(figure)).toBe('Vertex figure, 4 sides, 1 backwards, 2 edge-on')
    expect(sayLines([figure])).toMatch(/Solid.*Dashed.*Dotted/)
    expect(sayLines([vertexFigure(buildSolid('cube'), 0)])).toBe('')
    expect(sayLengths(vertexFigure(buildSolid('cuboctahedron'), 0))).toMatch(/square 1\.414/)
  })

  test('eight sides of several sorts are numbered', () => {
    const text = say('great-dirhombicosidodecahedron')
    expect([...text.matchAll(/(\d): /g)].map(([, n]) => n)).toEqual(['1', '2', '3', '4', '5', '6', '7', '8'])
    expect(text.match(/backwards/g)).toHaveLength(2)
  })

  test('where there is none, why, and the faces', () => {
    const solid = buildSolid('small-rhombihexacron')
    const figures = solid.vertices.map((_, v) => vertexFigure(solid, v))
    const none = figures.find(({ figure }) => !figure)!
    expect(sayFigure(none)).toMatch(/^No flat figure: the edges here spread/)
    expect(sayFacesRound(solidParts(solid).kinds, none)).toMatch(/^Round the vertex: 4 /)
  })
})

test('labels of a regular figure cover no side, no other label, and stay in the drawing', () => {
  for (const sides of [3, 4, 5, 6]) {
    const corner = (i: number): [number, number] => {
      const angle = (2 * Math.PI * i) / sides
      return [100 * Math.cos(angle), 100 * Math.sin(angle)]
    }
    const lines = Array.from({ length: sides }, (_, i): Segment => [corner(i), corner(i + 1)])
    const labels = placeLabels(lines, Array(sides).fill('square'), [150, 126])
    expect(labels).toHaveLength(sides)
    for (const [i, { x, y, text }] of labels.entries()) {
      const [w, h] = [(text.length * letter.width) / 2, letter.height / 2]
      expect(Math.abs(x) + w).toBeLessThanOrEqual(150)
      expect(Math.abs(y) + h).toBeLessThanOrEqual(126)
      for (const other of labels.slice(i + 1))
        expect(Math.abs(x - other.x) >= 2 * w || Math.abs(y - other.y) >= 2 * h, `${sides}`).toBe(true)
      for (const [a, b] of lines)
        for (let t = 0; t <= 1; t += 0.01) {
          const p = [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])]
          expect(Math.abs(p[0]! - x) < w - 2 && Math.abs(p[1]! - y) < h - 2, `${sides}`).toBe(false)
        }
    }
  }
})

/**
 * A plan made without the program's stages: a cube of 40 mm as an open box of five panels and a lid, on one A4 sheet.
 * Everything is worked out from the drawing of the net, so that the checks have something to hold on to but our own code.
 */
import { regionArea, union } from '../../src/geometry/clip'
import type { Plan, PlanCrease, PlanTab, Point2, Point3 } from '../../src/plan/types'

const edge = 40
const h = edge / 2
const depth = 5

/** Outward normals; the net is a cross: bottom in the middle, walls round it, the lid by itself. */
const names = ['bottom', 'east', 'north', 'west', 'south', 'lid'] as const

/** Rings counter-clockwise seen from outside; the walls begin with their edge at the bottom. */
const corners: Record<(typeof names)[number], Point3[]> = {
  // Seen from below x runs to the left; the ring begins so that edge i meets wall i + 1 (east, north, west, south).
  bottom: [
    [h, h, -h],
    [h, -h, -h],
    [-h, -h, -h],
    [-h, h, -h],
  ],
  east: [
    [h, -h, -h],
    [h, h, -h],
    [h, h, h],
    [h, -h, h],
  ],
  north: [
    [-h, h, h],
    [h, h, h],
    [h, h, -h],
    [-h, h, -h],
  ],
  west: [
    [-h, h, -h],
    [-h, -h, -h],
    [-h, -h, h],
    [-h, h, h],
  ],
  south: [
    [-h, -h, -h],
    [h, -h, -h],
    [h, -h, h],
    [-h, -h, h],
  ],
  lid: [
    [-h, -h, h],
    [h, -h, h],
    [h, h, h],
    [-h, h, h],
  ],
}
const normals: Point3[] = [
  [0, 0, -1],
  [1, 0, 0],
  [0, 1, 0],
  [-1, 0, 0],
  [0, -1, 0],
  [0, 0, 1],
]

const key = (p: readonly number[]): string => p.join(' ')

/** All edges between two of the rings. */
const findCreases = (): Omit<PlanCrease, 'join' | 'label'>[] => {
  const found: Omit<PlanCrease, 'join' | 'label'>[] = []
  for (const [a, first] of names.entries())
    for (const [b, second] of names.entries()) {
      if (a >= b) continue
      const [ringA, ringB] = [corners[first], corners[second]]
      for (const [i, p] of ringA.entries()) {
        const q = ringA[(i + 1) % 4]!
        const shared = ringB.some((r, j) => key(r) === key(q) && key(ringB[(j + 1) % 4]!) === key(p))
        if (shared) found.push({ id: found.length, panels: [a, b], ends: [p, q], innerAngle: 90, contact: 'surface' })
      }
    }
  return found
}

/** Turns and shifts a ring of the plane so that a→b comes onto c→d; all are edges of squares along the axes. */
const carry = (ring: Point2[], [a, b]: [Point2, Point2], [c, d]: [Point2, Point2]): Point2[] => {
  const [px, py] = [b[0] - a[0], b[1] - a[1]]
  const [qx, qy] = [d[0] - c[0], d[1] - c[1]]
  const cos = Math.round((px * qx + py * qy) / (edge * edge))
  const sin = Math.round((px * qy - py * qx) / (edge * edge))
  return ring.map(([x, y]): Point2 => {
    const [u, v] = [x - a[0], y - a[1]]
    return [cos * u - sin * v + c[0], sin * u + cos * v + c[1]]
  })
}

const square: Point2[] = [
  [0, 0],
  [edge, 0],
  [edge, edge],
  [0, edge],
]

export const cubePlan = (): Plan => {
  const bare = findCreases()
  const ringAt = (panel: number): Point3[] => corners[names[panel]!]
  // Corner i of every flat ring is corner i of the ring in space.
  const flat: Point2[][] = [square]
  for (const wall of [1, 2, 3, 4]) {
    const crease = bare.find(({ panels }) => panels[0] === 0 && panels[1] === wall)!
    const spot = (panel: number, p: Point3): number => ringAt(panel).findIndex((q) => key(p) === key(q))
    const place = (end: Point3): [Point2, Point2] => [square[spot(wall, end)]!, flat[0]![spot(0, end)]!]
    const [[a, c], [b, d]] = [place(crease.ends[0]), place(crease.ends[1])]
    flat[wall] = carry(square, [a, b], [c, d])
  }
  flat[5] = square

  const seamNames = 'ABCDEFGH'
  let next = 0
  const creases = bare.map((crease): PlanCrease => {
    const fold = crease.panels[0] === 0
    return fold ? { ...crease, join: 'fold' } : { ...crease, join: 'seam', label: seamNames[next++]! }
  })
  const seams = creases.filter(({ join }) => join === 'seam')

  // All tabs on the box: of two walls the one with the lower number carries it, and towards the lid the wall.
  const tabs = seams.map(({ id, panels, ends }): PlanTab => {
    const panel = panels[0]
    const at = (end: Point3): Point2 => flat[panel]![ringAt(panel).findIndex((p) => key(p) === key(end))]!
    const [from, to] = [at(ends[0]), at(ends[1])]
    const [dx, dy] = [(to[0] - from[0]) / edge, (to[1] - from[1]) / edge]
    // Right of the edge, since the panel lies to its left; ends slope by 45 degrees.
    const out = (along: number, off: number): Point2 => [
      from[0] + along * dx + off * dy,
      from[1] + along * dy - off * dx,
    ]
    return {
      crease: id,
      panel,
      kind: 'single',
      outline: [out(edge, 0), out(0, 0), out(depth, depth), out(edge - depth, depth)],
    }
  })
  const boxPanels = [0, 1, 2, 3, 4]
  const outline = union([...boxPanels.map((panel) => flat[panel]!), ...tabs.map((tab) => tab.outline)])
  if (outline.length !== 1) throw new Error('the net is not in one piece')
  const boxOutline = outline[0]!.map(([x, y]): Point2 => [x, y])

  const perimeter = boxOutline.reduce((sum, p, i) => {
    const q = boxOutline[(i + 1) % boxOutline.length]!
    return sum + Math.hypot(q[0] - p[0], q[1] - p[1])
  }, 0)
  const netArea = regionArea(outline) + edge * edge
  const hours = { cut: 0.1, score: 0.05, fold: 0.05, glue: 0.2, handling: 0.1 }
  const plan: Plan = {
    format: 'facetwright-plan',
    version: 1,
    model: { id: 'cube', name: 'Cube', hand: 'none', edgeMm: edge, heightMm: edge * Math.sqrt(3), fill: 'nonzero' },
    panels: names.map((name, id) => ({
      id,
      normal: normals[id]!,
      rings: [corners[name]],
      faces: [id],
      colour: 'square',
      areaMm2: edge * edge,
      body: 0,
    })),
    creases,
    pieces: [
      {
        id: 0,
        label: '1',
        template: 'a',
        hand: 'none',
        colour: 'square',
        step: 1,
        panels: boxPanels.map((panel) => ({ panel, rings: [flat[panel]!] })),
        folds: creases.filter(({ join }) => join === 'fold').map(({ id }) => id),
        outline: boxOutline,
        tabs,
      },
      {
        id: 1,
        label: '2',
        template: 'b',
        hand: 'none',
        colour: 'square',
        step: 2,
        panels: [{ panel: 5, rings: [flat[5]] }],
        folds: [],
        outline: square,
        tabs: [],
      },
    ],
    sheets: [
      {
        id: 0,
        paper: 'a4',
        widthMm: 210,
        heightMm: 297,
        marginMm: 10,
        card: '160 g/m²',
        colour: 'all',
        placed: [
          { piece: 0, x: 80, y: 80, rotation: 0, mirrored: false },
          { piece: 1, x: 120, y: 240, rotation: 90, mirrored: false },
        ],
      },
    ],
    steps: [
      { step: 1, piece: 0, seams: seams.filter(({ panels }) => panels[1] !== 5).map(({ id }) => id), note: '' },
      { step: 2, piece: 1, seams: seams.filter(({ panels }) => panels[1] === 5).map(({ id }) => id), note: 'closes' },
    ],
    docket: {
      panels: 6,
      pieces: 2,
      templates: 2,
      seams: 8,
      bodies: 1,
      lineContacts: 0,
      sheets: 1,
      cardAreaMm2: 210 * 297,
      netAreaMm2: netArea,
      utilisation: netArea / (210 * 297),
      cutMm: perimeter + 4 * edge,
      scoreMm: 12 * edge,
      glueMm: 8 * edge,
      hours: { ...hours, total: 0.5 },
      tightest: { panel: 0, widthMm: edge },
      sharpestInnerAngle: 90,
      buttSeams: [],
      checks: [],
    },
  }
  // Rings above are shared between places of the plan; whoever changes one place must not change another.
  return JSON.parse(JSON.stringify(plan)) as Plan
}

/** Ways to break a sound plan, each with the check that must notice. They work on any plan with two or more pieces. */
import type { Plan, PlanCheck, PlanCrease, PlanPiece, PlanTab, Point2 } from '../../src/plan/types'

const largest = (plan: Plan): PlanPiece => plan.pieces.reduce((a, b) => (b.panels.length > a.panels.length ? b : a))
const seams = (plan: Plan): PlanCrease[] => plan.creases.filter(({ join }) => join === 'seam')
const creaseOf = (plan: Plan, id: number): PlanCrease => plan.creases.find((crease) => crease.id === id)!
/** A piece with a tab, and the tab. */
const tabbed = (plan: Plan): { piece: PlanPiece; tab: PlanTab } => {
  const piece = plan.pieces.find(({ tabs }) => tabs.length > 0)!
  return { piece, tab: piece.tabs[0]! }
}
const shift = (ring: Point2[], x: number, y: number): void => {
  for (const point of ring) {
    point[0] += x
    point[1] += y
  }
}
const size = (plan: Plan): number => plan.model.heightMm

type Break = readonly [check: string, how: string, (plan: Plan) => void]

export const breaks: readonly Break[] = [
  ['keeps to the schema', 'a coordinate is no number', (plan) => (plan.panels[0]!.rings[0]![0]![0] = Number.NaN)],
  ['keeps to the schema', 'a part is missing', (plan) => delete (plan as Partial<Plan>).sheets],
  ['keeps to the schema', 'there is a field too many', (plan) => Object.assign(plan.model, { colour: 'red' })],

  ['ids lead somewhere', 'a panel is lost', (plan) => plan.panels.pop()],
  ['ids lead somewhere', 'a crease is lost', (plan) => plan.creases.splice(largest(plan).folds[0]!, 1)],
  ['ids lead somewhere', 'two panels have one id', (plan) => (plan.panels[1]!.id = plan.panels[0]!.id)],
  [
    'ids lead somewhere',
    'a sheet names a piece that is not there',
    (plan) => (plan.sheets[0]!.placed[0]!.piece = 9999),
  ],
  ['ids lead somewhere', 'a panel is left out of its piece', (plan) => largest(plan).panels.pop()],
  ['ids lead somewhere', 'the docket names a crease that is not there', (plan) => plan.docket.buttSeams.push(99999)],

  ['panels are flat and true', 'a corner is lifted', (plan) => (plan.panels[0]!.rings[0]![0]![2] += size(plan) / 100)],
  ['panels are flat and true', 'a ring runs backwards', (plan) => plan.panels[0]!.rings[0]!.reverse()],
  [
    'panels are flat and true',
    'a normal points inwards',
    (plan) => {
      plan.panels[0]!.normal = plan.panels[0]!.normal.map((x) => -x) as [number, number, number]
    },
  ],
  ['panels are flat and true', 'an area is wrong', (plan) => (plan.panels[0]!.areaMm2 *= 1.001)],

  [
    'each panel once',
    'a panel is cut out twice',
    (plan) => {
      plan.pieces[0]!.panels.push(structuredClone(plan.pieces[1]!.panels[0]!))
    },
  ],
  ['each panel once', 'a piece has the wrong colour', (plan) => (plan.pieces[0]!.colour = 'another')],

  ['skin closes', 'a panel belongs to another body', (plan) => (plan.panels[0]!.body = 77)],
  ['skin closes', 'the model is not as large as it says', (plan) => (plan.model.heightMm *= 1.01)],
  ['skin closes', 'the docket counts other bodies', (plan) => (plan.docket.bodies += 1)],

  [
    'creases cover every ring',
    'a crease is too short',
    (plan) => {
      const [a, b] = plan.creases[0]!.ends
      for (const i of [0, 1, 2] as const) b[i] += 0.01 * (a[i] - b[i])
    },
  ],
  ['creases cover every ring', 'a crease runs backwards', (plan) => plan.creases[0]!.ends.reverse()],
  [
    'creases cover every ring',
    'a crease is listed twice',
    (plan) => {
      plan.creases.push({ ...structuredClone(plan.creases[0]!), id: 99999 })
    },
  ],
  [
    'creases cover every ring',
    'a crease lies off its panels',
    (plan) => {
      for (const end of plan.creases[0]!.ends) end[0] += 1
    },
  ],

  ['inner angles agree', 'an angle is off by a degree', (plan) => (plan.creases[0]!.innerAngle += 1)],
  [
    'inner angles agree',
    'a mountain is called a valley',
    (plan) => {
      const crease = plan.creases.find(({ innerAngle }) => innerAngle !== 180 && innerAngle !== 0)!
      crease.innerAngle = 360 - crease.innerAngle
    },
  ],

  ['bodies keep apart', 'a surface crease joins two bodies', (plan) => (plan.panels[0]!.body += 1)],

  [
    'pieces are flat copies',
    'a corner is off by half a millimetre',
    (plan) => {
      largest(plan).panels[0]!.rings[0]![0]![0] += 0.5
    },
  ],
  [
    'pieces are flat copies',
    'a panel is mirrored',
    (plan) => {
      const entry = largest(plan).panels[0]!
      entry.rings = entry.rings.map((ring) => ring.map(([x, y]): Point2 => [-x, y]))
    },
  ],
  [
    'pieces are flat copies',
    'a panel is a hair too large',
    (plan) => {
      for (const point of largest(plan).panels[0]!.rings[0]!) for (const i of [0, 1] as const) point[i] *= 1.001
    },
  ],
  ['pieces are flat copies', 'there is a point too many', (plan) => largest(plan).panels[0]!.rings[0]!.push([0, 0])],

  [
    'folds hold each piece together',
    'a fold is torn open',
    (plan) => {
      const { panels } = largest(plan)
      for (const ring of panels[panels.length - 1]!.rings) shift(ring, 0.3, 0.2)
    },
  ],
  ['folds hold each piece together', 'a fold is forgotten', (plan) => largest(plan).folds.pop()],
  ['folds hold each piece together', 'a seam is called a fold', (plan) => (seams(plan)[0]!.join = 'fold')],
  [
    'folds hold each piece together',
    'a fold is called a seam',
    (plan) => {
      creaseOf(plan, largest(plan).folds[0]!).join = 'seam'
    },
  ],

  [
    'no overlap in a piece',
    'two panels lie on each other',
    (plan) => {
      const { panels } = largest(plan)
      const [a, b] = [panels[0]!, panels[panels.length - 1]!]
      // Middle on middle: of panels laid corner on corner it depends on the net whether they overlap.
      const middle = (entry: typeof a, i: 0 | 1): number =>
        entry.rings[0]!.reduce((sum, point) => sum + point[i], 0) / entry.rings[0]!.length
      for (const ring of b.rings) shift(ring, middle(a, 0) - middle(b, 0), middle(a, 1) - middle(b, 1))
    },
  ],

  [
    'outlines are the cut lines',
    'the cut line leaves the tabs out',
    (plan) => {
      const { piece } = tabbed(plan)
      piece.tabs.pop()
    },
  ],
  ['outlines are the cut lines', 'the cut line is shifted', (plan) => shift(plan.pieces[0]!.outline, 0.2, 0)],
  ['outlines are the cut lines', 'the cut line runs backwards', (plan) => plan.pieces[0]!.outline.reverse()],

  [
    'pieces of a template are alike',
    'two shapes share a template',
    (plan) => {
      const other = plan.pieces.find(({ panels }) => panels.length !== plan.pieces[0]!.panels.length)!
      other.template = plan.pieces[0]!.template
    },
  ],

  ['tabs hang on their seams', 'a tab is cut off its edge', (plan) => shift(tabbed(plan).tab.outline, 1, 1)],
  ['tabs hang on their seams', 'a tab stands on a fold', (plan) => (tabbed(plan).tab.crease = largest(plan).folds[0]!)],
  ['tabs hang on their seams', 'a tab runs clockwise', (plan) => tabbed(plan).tab.outline.reverse()],
  [
    'tabs hang on their seams',
    'a tab hangs on a panel of another piece',
    (plan) => {
      const { piece, tab } = tabbed(plan)
      plan.pieces.find((other) => other !== piece)!.tabs.push(tab)
    },
  ],

  [
    'tabs are clear in the flat',
    'a tab lies on a panel',
    (plan) => {
      const { piece, tab } = tabbed(plan)
      tab.outline = piece.panels[0]!.rings[0]!.map(([x, y]): Point2 => [x, y])
    },
  ],
  [
    'tabs are clear in the flat',
    'a tab leaves no room for the knife beside the next one',
    (plan) => {
      const piece = plan.pieces.find(({ tabs }) => tabs.length > 1)!
      // A sliver of the other tab's neighbourhood: its own outline, moved just off it.
      const [a, b] = piece.tabs
      const [p, q] = [b!.outline[2]!, b!.outline[3]!]
      const length = Math.hypot(q[0] - p[0], q[1] - p[1])
      const [nx, ny] = [(q[1] - p[1]) / length, -(q[0] - p[0]) / length]
      const at = ([x, y]: Point2, off: number): Point2 => [x + off * nx, y + off * ny]
      a!.outline = [at(p, 0.05), at(p, 0.5), at(q, 0.5), at(q, 0.05)]
    },
  ],
  [
    'tabs are clear in the flat',
    'two tabs lie on each other',
    (plan) => {
      const piece = plan.pieces.find(({ tabs }) => tabs.length > 1)!
      piece.tabs[1]!.outline = structuredClone(piece.tabs[0]!.outline)
    },
  ],

  [
    'tabs fit behind',
    'a tab is deeper than the panel that it is glued to',
    (plan) => {
      const { tab } = tabbed(plan)
      const [from, to] = [tab.outline[1]!, tab.outline[0]!]
      const length = Math.hypot(to[0] - from[0], to[1] - from[1])
      // Right of the seam, as seen by the panel that carries it.
      const [nx, ny] = [((to[1] - from[1]) / length) * size(plan), (-(to[0] - from[0]) / length) * size(plan)]
      for (const point of tab.outline.slice(2)) {
        point[0] += nx
        point[1] += ny
      }
    },
  ],

  ['each seam is paired', 'a seam has no label', (plan) => delete seams(plan)[0]!.label],
  ['each seam is paired', 'two seams have one label', (plan) => (seams(plan)[0]!.label = seams(plan)[1]!.label!)],
  [
    'each seam is paired',
    'a seam has two single tabs',
    (plan) => {
      const { piece, tab } = tabbed(plan)
      piece.tabs.push(structuredClone(tab))
    },
  ],
  [
    'each seam is paired',
    'a tab comes with the piece that is glued later',
    (plan) => {
      for (const piece of plan.pieces) piece.step = plan.pieces.length + 1 - piece.step
    },
  ],
  ['each seam is paired', 'a paired tab has no partner', (plan) => (tabbed(plan).tab.kind = 'paired')],

  ['butt seams are owned up to', 'a tab is left out without a word', (plan) => tabbed(plan).piece.tabs.shift()],
  [
    'butt seams are owned up to',
    'a seam with a tab is called a butt seam',
    (plan) => {
      plan.docket.buttSeams.push(tabbed(plan).tab.crease)
    },
  ],

  ['everything is on a sheet', 'a piece lies off the sheet', (plan) => (plan.sheets[0]!.placed[0]!.x += 400)],
  ['everything is on a sheet', 'a piece reaches into the margin', (plan) => (plan.sheets[0]!.marginMm += 1000)],
  [
    'everything is on a sheet',
    'a piece is forgotten',
    (plan) => {
      const placed = plan.sheets.flatMap((sheet) => sheet.placed)
      placed[0]!.piece = placed[1]!.piece
    },
  ],
  [
    'everything is on a sheet',
    'a piece is placed twice',
    (plan) => {
      plan.sheets[0]!.placed.push(structuredClone(plan.sheets[0]!.placed[0]!))
    },
  ],
  [
    'everything is on a sheet',
    'a piece is mirrored alone',
    (plan) => {
      const placement = plan.sheets[0]!.placed[0]!
      placement.mirrored = !placement.mirrored
    },
  ],
  ['everything is on a sheet', 'the sheet is no A4', (plan) => (plan.sheets[0]!.widthMm += 1)],
  ['everything is on a sheet', 'the sheet has another colour', (plan) => (plan.sheets[0]!.colour = 'another')],

  [
    'nothing overlaps on a sheet',
    'one piece lies on another',
    (plan) => {
      const { placed } = plan.sheets[0]!
      placed.push({ ...placed[0]!, x: placed[0]!.x + 1, y: placed[0]!.y + 1 })
    },
  ],

  ['each step joins', 'a step is forgotten', (plan) => plan.steps.pop()],
  ['each step joins', 'a piece has two steps', (plan) => (plan.steps[1]!.piece = plan.steps[0]!.piece)],
  ['each step joins', 'steps are out of order', (plan) => plan.steps.reverse()],
  ['each step joins', 'a label does not begin with the step', (plan) => (plan.pieces[0]!.label = '99')],
  [
    'each step joins',
    'a step does not name its seams',
    (plan) => (plan.steps.find(({ seams }) => seams.length)!.seams = []),
  ],

  ...(
    [
      'panels',
      'pieces',
      'templates',
      'seams',
      'lineContacts',
      'sheets',
      'cardAreaMm2',
      'netAreaMm2',
      'cutMm',
      'scoreMm',
      'glueMm',
    ] as const
  ).map((field): Break => ['the docket agrees', `${field} is wrong`, (plan) => (plan.docket[field] += 1)]),
  ['the docket agrees', 'utilisation is wrong', (plan) => (plan.docket.utilisation += 0.01)],
  ['the docket agrees', 'hours are wrong', (plan) => (plan.docket.hours.total += 0.1)],
  ['the docket agrees', 'the sharpest angle is wrong', (plan) => (plan.docket.sharpestInnerAngle += 0.1)],
  ['the docket agrees', 'the tightest panel is not there', (plan) => (plan.docket.tightest.panel = 99999)],
]

/** Names of the checks that do not hold. */
export const failing = (checks: readonly PlanCheck[]): string[] =>
  checks.filter(({ ok }) => !ok).map(({ name }) => name)

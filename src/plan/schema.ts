/**
 * The plan file as a JSON Schema (draft 2020-12). Millimetres and degrees; field names are fixed so that others can read
 * it. What a schema cannot say (that ids lead somewhere, that nets do not overlap …) is said by `validatePlan`.
 */

/** The part of JSON Schema that is used here. */
export interface Schema {
  readonly $schema?: string
  readonly $ref?: string
  readonly $defs?: Readonly<Record<string, Schema>>
  readonly title?: string
  readonly description?: string
  readonly type?: 'object' | 'array' | 'string' | 'number' | 'integer' | 'boolean'
  readonly const?: string | number
  readonly enum?: readonly string[]
  readonly pattern?: string
  readonly minLength?: number
  readonly minimum?: number
  readonly maximum?: number
  readonly exclusiveMinimum?: number
  readonly properties?: Readonly<Record<string, Schema>>
  readonly required?: readonly string[]
  readonly additionalProperties?: false
  readonly items?: Schema
  readonly minItems?: number
  readonly maxItems?: number
}

/** All properties are required, unless named in `optional`; no others may stand beside them. */
const object = (description: string, properties: Record<string, Schema>, optional: readonly string[] = []): Schema => ({
  type: 'object',
  description,
  properties,
  required: Object.keys(properties).filter((name) => !optional.includes(name)),
  additionalProperties: false,
})
const list = (description: string, items: Schema, minItems = 0): Schema => ({
  type: 'array',
  description,
  items,
  minItems,
})
const number = (description: string): Schema => ({ type: 'number', description })
const length = (description: string): Schema => ({ type: 'number', minimum: 0, description })
const size = (description: string): Schema => ({ type: 'number', exclusiveMinimum: 0, description })
const count = (description: string): Schema => ({ type: 'integer', minimum: 0, description })
const text = (description: string): Schema => ({ type: 'string', minLength: 1, description })
const choice = (description: string, ...values: string[]): Schema => ({ type: 'string', enum: values, description })
const degrees = (description: string): Schema => ({ type: 'number', minimum: 0, maximum: 360, description })
const ref = (name: string, description?: string): Schema => ({
  $ref: `#/$defs/${name}`,
  ...(description === undefined ? {} : { description }),
})

const hand = choice('Which of the two mirror images; none where there is but one.', 'none', 'left', 'right')

const model = object(
  'What is built.',
  {
    id: { type: 'string', pattern: '^[a-z0-9]+(-[a-z0-9]+)*$', description: 'Id of the solid.' },
    name: text('Name of the solid.'),
    hand,
    edgeMm: size("The solid's edge."),
    heightMm: size("Diameter of the sphere about the solid's centre through its farthest vertex."),
    fill: choice('Whether the centres of star polygons are filled or open.', 'nonzero', 'evenodd'),
    offPlaneMm: length('How far points may be off their places and planes, where coordinates were rounded.'),
  },
  ['offPlaneMm'],
)

const panel = object('One flat region of the skin, seen from one side.', {
  id: ref('id'),
  normal: ref('point3', 'Outward, unit length.'),
  rings: list('Outer ring counter-clockwise seen from outside, then holes clockwise.', ref('ring3'), 1),
  faces: list('Faces of the solid that cover some of it.', ref('id'), 1),
  colour: text('Name of the colour.'),
  areaMm2: size('Holes left out.'),
  body: ref('id', 'The closed part of the skin that it belongs to, every line contact paired through the inside.'),
})

const crease = object(
  'A straight stretch shared by exactly two panels.',
  {
    id: ref('id'),
    panels: { type: 'array', items: ref('id'), minItems: 2, maxItems: 2, description: 'The two panels.' },
    ends: {
      type: 'array',
      items: ref('point3'),
      minItems: 2,
      maxItems: 2,
      description: 'The ring of the first panel runs from the first end to the second, that of the other one back.',
    },
    innerAngle: degrees('Between the backs of the panels, through the card side: under 180 mountain, over 180 valley.'),
    join: choice('Folded inside one piece, or cut apart and glued.', 'fold', 'seam'),
    contact: choice('On the surface, or along a line where the outside occurs more than once.', 'surface', 'line'),
    label: text('Seams only: printed at both sides.'),
  },
  ['label'],
)

const tab = object('A flap that carries glue.', {
  crease: ref('id', 'The seam that it closes.'),
  panel: ref('id', 'The panel that it hangs on.'),
  kind: choice('One flap behind the other panel, one of two face to face, or a strip.', 'single', 'paired', 'strip'),
  outline: ref('ring2', "In the piece's plane, counter-clockwise; the first two points are its root on the seam."),
})

const piece = object("A net, cut out in one. Its plane's coordinates (u, v) are seen from outside, v up.", {
  id: ref('id'),
  label: text('Number in gluing order, with its hand when it has one.'),
  template: text('Pieces of one shape (after a rotation, not a reflection) share it.'),
  hand,
  colour: text('Name of the colour; `mixed` when panels of several colours hang together.'),
  step: { type: 'integer', minimum: 1, description: 'Its place in the gluing order.' },
  panels: list(
    'The panels, laid flat.',
    object('One panel, laid flat.', {
      panel: ref('id'),
      rings: list('The same points in the same order as on the model.', ref('ring2'), 1),
    }),
    1,
  ),
  folds: list('Creases that are folded.', ref('id')),
  outline: ref('ring2', 'The cut line round panels and tabs, counter-clockwise; holes are in the rings.'),
  tabs: list('Its tabs.', tab),
})

const sheet = object('One piece of card. Origin bottom left, y up.', {
  id: ref('id'),
  paper: choice('Name of the paper size.', 'a4', 'letter'),
  widthMm: size('Of the card.'),
  heightMm: size('Of the card.'),
  marginMm: length('Kept free on all four sides.'),
  card: text('Kind of card.'),
  colour: text('Name of the colour; `all` with one card for all.'),
  placed: list(
    'What is cut from it.',
    object('From piece plane to sheet: mirror u if mirrored, rotate counter-clockwise, then add (x, y).', {
      piece: ref('id'),
      x: number('mm'),
      y: number('mm'),
      rotation: number('Degrees, counter-clockwise.'),
      mirrored: { type: 'boolean', description: 'Printed on the inside of the model.' },
    }),
    1,
  ),
})

const step = object('One step at the bench.', {
  step: { type: 'integer', minimum: 1, description: 'Counts from 1.' },
  piece: ref('id', 'The piece that is glued now.'),
  seams: list('The seams that are closed now.', ref('id')),
  note: { type: 'string', description: 'A word to the builder; may be empty.' },
})

const contact = object('A place where bodies touch without a crease on the surface.', {
  kind: choice('Along a stretch of line, or at one point.', 'line', 'point'),
  ends: list('The two ends of the stretch, or the one point.', ref('point3'), 1),
  lengthMm: length('Of the stretch.'),
  bodies: list('Bodies that touch there.', ref('id'), 1),
  held: choice(
    'What holds there: the skin folds or is glued across, a strip or a gusset is put in, or nothing.',
    'fold',
    'seam',
    'strip',
    'gusset',
    'apart',
  ),
})

const part = object('A part of the model that no crease joins to the rest.', {
  bodies: list('Its bodies.', ref('id'), 1),
  pieces: list('Its pieces.', ref('id'), 1),
  joint: choice('What joins it to the parts before it.', 'first', 'strip', 'gusset', 'apart'),
})

const docketFields: Record<string, Schema> = {
  panels: count('Panels.'),
  pieces: count('Pieces.'),
  templates: count('Different templates.'),
  seams: count('Creases that are glued.'),
  bodies: count('Closed parts of the skin, every line contact paired through the inside.'),
  lineContacts: count('Stretches that are held only along a line.'),
  contacts: list('Where bodies touch, with what holds there.', contact),
  parts: list('What is built separately; empty when the model is one part.', part),
  closed: object('Stretches too short to cut or glue that were drawn together.', {
    belowMm: size('Shorter ones were closed up.'),
    stretches: count('How many.'),
    panels: count('Panels that went with them.'),
    movedMm: length('How far the farthest point moved.'),
    offPlaneMm: length('How far points may be off the planes of their panels since.'),
  }),
  sheets: count('Sheets.'),
  cardAreaMm2: length('All sheets, margins included.'),
  netAreaMm2: length('Panels and tabs.'),
  utilisation: { type: 'number', minimum: 0, maximum: 1, description: 'Net area by card area.' },
  cutMm: length('Length of all cuts.'),
  scoreMm: length('Length of all scored lines.'),
  glueMm: length('Length of all glued seams.'),
  hours: object('Hours of work by kind.', {
    cut: length('Hours.'),
    score: length('Hours.'),
    fold: length('Hours.'),
    glue: length('Hours.'),
    handling: length('Hours.'),
    total: length('Their sum.'),
  }),
  tightest: object('The narrowest panel.', { panel: ref('id'), widthMm: size('Its width.') }),
  sharpestInnerAngle: degrees('The smallest inner angle of a crease.'),
  buttSeams: list('Seams that carry no tab.', ref('id')),
  checks: list(
    "The plan's own checks.",
    object('One promise.', {
      name: text('What is promised.'),
      ok: { type: 'boolean', description: 'Whether it is kept.' },
      detail: { type: 'string', description: 'What was found.' },
    }),
  ),
}

const docket = object('The summary.', docketFields, ['contacts', 'parts', 'closed'])

export const planSchema: Schema = {
  $schema: 'https://json-schema.org/draft/2020-12/schema',
  title: 'Plan for building one solid from card at one size with one set of choices',
  ...object('Millimetres and degrees throughout.', {
    format: { const: 'facetwright-plan', description: 'Says what the file is.' },
    version: { const: 1, description: 'Counts up when a field changes its meaning.' },
    model,
    panels: list('The skin.', panel, 1),
    creases: list('Where panels meet.', crease, 1),
    pieces: list('The nets.', piece, 1),
    sheets: list('What is printed and cut.', sheet, 1),
    steps: list('The gluing order.', step, 1),
    docket,
  }),
  $defs: {
    id: { type: 'integer', minimum: 0 },
    point2: { type: 'array', items: { type: 'number' }, minItems: 2, maxItems: 2 },
    point3: { type: 'array', items: { type: 'number' }, minItems: 3, maxItems: 3 },
    ring2: {
      type: 'array',
      items: ref('point2'),
      minItems: 3,
      description: 'Closed; the last point is not the first again.',
    },
    ring3: {
      type: 'array',
      items: ref('point3'),
      minItems: 3,
      description: 'Closed; the last point is not the first again.',
    },
  },
}

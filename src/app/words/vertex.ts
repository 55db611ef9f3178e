/** The vertex figure in words. */
import type { VertexFigure } from '../../worker'
import { counted, listed, plural, figure as rounded } from './figures'

type Ring = NonNullable<VertexFigure['figure']>['rings'][number]
type Side = Ring['sides'][number]

const senseWords: Readonly<Record<Side['sense'], string>> = {
  forward: '',
  backwards: ' (backwards)',
  'edge-on': ' (edge-on)',
}

/** Whether the sides carry numbers instead of names: several sorts, and no room for the names. */
export const isNumbered = (sides: readonly Side[]): boolean =>
  new Set(sides.map(({ name }) => name)).size > 1 && (sides.length > 6 || sides.some(({ name }) => name.length > 9))

/** By ring, in cyclic order; a ring of one sort only is counted. */
const sayRings = (rings: readonly Ring[]): string[] => {
  const numbered = isNumbered(rings.flatMap(({ sides }) => sides))
  let number = 0
  return rings.map(({ sides }) => {
    const { name, sense } = sides[0]!
    const isOne = sides.every((side) => side.name === name && side.sense === sense)
    if (isOne && !numbered) return `${counted(sides.length, name, plural(name))}${senseWords[sense]}`
    return sides.map((side) => `${numbered ? `${++number}: ` : ''}${side.name}${senseWords[side.sense]}`).join(', ')
  })
}

const windingWords = ['', '', ' They wind twice round the vertex.', ' They wind three times round the vertex.']

/** E.g. `Seen along the axis: triangle, square, triangle (backwards), square.` */
export const sayFigure = ({ figure, reason }: VertexFigure): string => {
  if (!figure) return `No flat figure: ${reason.charAt(0).toLowerCase()}${reason.slice(1)}`
  const [first, ...more] = figure.rings as [Ring, ...Ring[]]
  if (more.length === 0) {
    const { windings } = first
    return `Seen along the axis: ${sayRings(figure.rings)[0]}.${
      windings > 3 ? ` They wind ${windings} times round the vertex.` : windingWords[windings]
    }`
  }
  return `Seen along the axis, ${figure.rings.length} rings of faces: ${sayRings(figure.rings).join('; ')}.`
}

/** Side lengths where they mean something: for unit edge. */
export const sayLengths = ({ figure }: VertexFigure): string => {
  if (figure?.cut !== 'neighbours') return ''
  const lengths = new Map(figure.rings.flatMap(({ sides }) => sides.map(({ name, length }) => [name, length] as const)))
  return `Sides, for edge 1: ${listed([...lengths].map(([name, length]) => `${name} ${rounded(length, 3)}`))}.`
}

/** Short name for the drawing: `Vertex figure, 4 sides, 1 backwards`. */
export const nameFigure = ({ figure }: VertexFigure): string => {
  const sides = figure?.rings.flatMap((ring) => ring.sides) ?? []
  const count = (sense: Side['sense']): number => sides.filter((side) => side.sense === sense).length
  return [
    `Vertex figure, ${counted(sides.length, 'side')}`,
    ...(count('backwards') > 0 ? [`${count('backwards')} backwards`] : []),
    ...(count('edge-on') > 0 ? [`${count('edge-on')} edge-on`] : []),
  ].join(', ')
}

/** The faces in order, where there is no figure. */
export const sayFacesRound = (kinds: readonly string[], { faces }: VertexFigure): string => {
  const counts = new Map<string, number>()
  for (const face of faces.flat()) counts.set(kinds[face]!, (counts.get(kinds[face]!) ?? 0) + 1)
  return `Round the vertex: ${listed([...counts].map(([kind, count]) => counted(count, kind, plural(kind))))}.`
}

/** What the kinds of lines in these drawings mean; empty where all are solid. */
export const sayLines = (figures: readonly VertexFigure[]): string => {
  const senses = new Set(
    figures.flatMap(({ figure }) => figure?.rings.flatMap(({ sides }) => sides.map((s) => s.sense)) ?? []),
  )
  if (senses.size === 0 || (senses.size === 1 && senses.has('forward'))) return ''
  return [
    senses.has('forward') ? 'Solid line: forward.' : '',
    senses.has('backwards') ? 'Dashed: backwards.' : '',
    senses.has('edge-on') ? 'Dotted: edge-on, a face that contains the axis.' : '',
  ]
    .filter(Boolean)
    .join(' ')
}

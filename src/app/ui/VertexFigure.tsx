/** Vertex figures as flat drawings: sides of forward faces solid, backward ones dashed, each with its word. */
import { useEffect, useMemo, useState } from 'preact/hooks'
import type { VertexFigure as Figure, SolidParts } from '../../worker'
import { counted } from '../words/figures'
import { isNumbered, nameFigure, sayFacesRound, sayFigure, sayLengths, sayLines } from '../words/vertex'
import { useApp } from './context'
import { letter, placeLabels, type Segment } from './figure-labels'
import { vertexSorts } from './show'

/** So many sorts of vertices are drawn side by side; a model with more shows the figure of the vertex that stands alone. */
const atMost = 6
type Side = NonNullable<Figure['figure']>['rings'][number]['sides'][number]

interface Props {
  readonly solid: string
  readonly hand: 'left' | 'right'
  readonly parts: SolidParts | null
  /** The vertex that is shown alone; null while none is. */
  readonly vertex: number | null
}

export const VertexFigure = ({ solid, hand, parts, vertex }: Props) => {
  const { press } = useApp()
  const [figures, setFigures] = useState<readonly Figure[]>([])
  const sorts = useMemo(() => (parts ? vertexSorts(parts) : []), [parts])
  const wanted = vertex !== null ? [vertex] : sorts.length <= atMost ? sorts.map(({ vertices }) => vertices[0]!) : []
  const key = `${solid} ${hand} ${wanted.join(' ')}`
  useEffect(() => {
    if (wanted.length === 0) return setFigures([])
    let stale = false
    void press.figures(solid, hand, wanted).then((answer) => {
      if (!stale) setFigures(answer.ok ? answer.value : [])
    })
    return () => {
      stale = true
    }
  }, [key])
  if (!parts) return null
  const drawn = vertex === null ? withoutMirrorImages(figures) : figures
  const legend = sayLines(drawn)
  return (
    <details class="vertex-figures" open={matchMedia('(min-width: 801px)').matches}>
      <summary>Vertex figure</summary>
      {sorts.length > atMost && vertex === null && (
        <p class="so">Show one vertex of the model to see its figure: no two kinds of them are alike.</p>
      )}
      {drawn.map((figure) => (
        <figure key={figure.vertex}>
          {figure.figure && <Drawing figure={figure} />}
          <figcaption>
            {drawn.length > 1 && (
              <b>
                At {counted(sorts[parts.vertexOrbits[figure.vertex]!]?.vertices.length ?? 1, 'vertex', 'vertices')}.{' '}
              </b>
            )}
            {sayFigure(figure)} {figure.figure ? sayLengths(figure) : sayFacesRound(parts.kinds, figure)}
          </figcaption>
        </figure>
      ))}
      {legend !== '' && <p class="so">{legend}</p>}
    </details>
  )
}

/** Of vertices whose figures are mirror images, the first; they are the same to a builder. */
const withoutMirrorImages = (figures: readonly Figure[]): Figure[] => {
  const key = ({ figure, faces }: Figure): string =>
    figure
      ? figure.rings
          .map(({ sides, windings }) => {
            const words = sides.map(({ name, sense, length }) => `${name} ${sense} ${length.toFixed(5)}`).sort()
            return `${windings} ${words.join(',')}`
          })
          .join(';')
      : String(faces.map((ring) => ring.length))
  const seen = new Set<string>()
  return figures.filter((figure) => !seen.has(key(figure)) && seen.add(key(figure)))
}

/** Half width and half height of the drawing; the figure fills a circle of 100. */
const frame = [150, 126] as const

/** Words beside the sides: names where there is room for them, else numbers as in the caption; none where all are alike. */
const textsOf = (sides: readonly Side[]): string[] => {
  const isMixed = new Set(sides.map(({ name }) => name)).size > 1
  const numbered = isNumbered(sides)
  return sides.map(({ name, sense }, i) =>
    [isMixed ? (numbered ? `${i + 1}` : name) : '', sense === 'backwards' ? 'back' : ''].filter(Boolean).join(' '),
  )
}

const Drawing = ({ figure: whole }: { figure: Figure }) => {
  const sides = whole.figure!.rings.flatMap((ring) => ring.sides)
  const reach = Math.max(...sides.map(({ from }) => Math.hypot(...from)))
  // The longest side lies level, below the axis.
  const longest = sides.reduce((best, side) => (side.length > best.length * (1 + 1e-6) ? side : best))
  const [ux, uy] = [longest.to[0] - longest.from[0], longest.to[1] - longest.from[1]].map(
    (x) => x / longest.length,
  ) as [number, number]
  const at = ([x, y]: readonly [number, number]): [number, number] => [
    (100 * (x * ux + y * uy)) / reach,
    (-100 * (y * ux - x * uy)) / reach,
  ]
  const lines = sides.map(({ from, to }): Segment => [at(from), at(to)])
  return (
    <svg
      class="vertex-figure"
      role="img"
      aria-label={nameFigure(whole)}
      viewBox={`${-frame[0]} ${-frame[1]} ${2 * frame[0]} ${2 * frame[1]}`}
    >
      {lines.map(([[x1, y1], [x2, y2]], i) => (
        <line key={`${x1} ${y1} ${x2} ${y2}`} class={sides[i]!.sense} x1={x1} y1={y1} x2={x2} y2={y2} />
      ))}
      <path class="axis" d="M-5 0H5M0 -5V5" />
      {lines.map(([[x, y]]) => (
        <circle key={`${x} ${y}`} cx={x} cy={y} r="3" />
      ))}
      {placeLabels(lines, textsOf(sides), frame).map(({ text, x, y }) => (
        <text key={`${x} ${y}`} x={x} y={y} font-size={letter.height}>
          {text}
        </text>
      ))}
    </svg>
  )
}

/** Vertex figures as flat drawings: sides of forward faces solid, backward ones dashed, each with its word. */
import { useEffect, useMemo, useState } from 'preact/hooks'
import type { VertexFigure as Figure, SolidParts } from '../../worker'
import { counted } from '../words/figures'
import { nameFigure, sayFacesRound, sayFigure, sayLengths } from '../words/vertex'
import { useApp } from './context'
import { vertexSorts } from './show'

/** So many sorts of vertices are drawn side by side; a model with more shows the figure of the vertex that stands alone. */
const atMost = 6
/** Sides beyond this number carry no words but `back`. */
const wordsUpTo = 12

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
      {drawn.some(({ figure }) =>
        figure?.rings.some(({ sides }) => sides.some(({ sense }) => sense !== 'forward')),
      ) && (
        <p class="so">Solid line: forward. Dashed: backwards. Dotted: a face that contains the axis, seen edge-on.</p>
      )}
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

const Drawing = ({ figure: whole }: { figure: Figure }) => {
  const { rings } = whole.figure!
  const points = rings.flatMap(({ sides }) => sides.map(({ from }) => from))
  const reach = Math.max(...points.map(([x, y]) => Math.hypot(x, y)))
  // The figure is drawn within a circle of 100, its labels beside the sides.
  const at = ([x, y]: readonly [number, number]): [number, number] => [(100 * x) / reach, (-100 * y) / reach]
  const count = rings.reduce((sum, { sides }) => sum + sides.length, 0)
  return (
    <svg class="vertex-figure" role="img" aria-label={nameFigure(whole)} viewBox="-140 -126 280 252">
      {rings.flatMap(({ sides }, ring) =>
        sides.map(({ from, to, sense }, i) => {
          const [[x1, y1], [x2, y2]] = [at(from), at(to)]
          return <line key={`${ring} ${i}`} class={sense} x1={x1} y1={y1} x2={x2} y2={y2} />
        }),
      )}
      <path class="axis" d="M-5 0H5M0 -5V5" />
      {points.map((p) => {
        const [x, y] = at(p)
        return <circle key={`${x} ${y}`} cx={x} cy={y} r="3" />
      })}
      {rings.flatMap(({ sides }, ring) =>
        sides.map(({ from, to, sense, name }, i) => {
          const words = [count <= wordsUpTo ? name : '', sense === 'backwards' ? 'back' : ''].filter(Boolean).join(' ')
          const [[x1, y1], [x2, y2]] = [at(from), at(to)]
          // Not in the middle, where long sides cross.
          const share = sense === 'forward' ? 0.5 : 0.3
          return (
            words && (
              <text key={`${ring} ${i}`} x={x1 + share * (x2 - x1)} y={y1 + share * (y2 - y1)}>
                {words}
              </text>
            )
          )
        }),
      )}
    </svg>
  )
}

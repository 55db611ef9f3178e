/** A piece alone: cut solid, mountain dash-dot, valley dashed, seams with their labels, the ones to glue now lit. */
import { useMemo } from 'preact/hooks'
import type { Plan, PlanPiece, Point2 } from '../../plan/types'
import { colourOf } from '../palette'
import { drawPiece } from './piece-drawing'

const path = (rings: readonly (readonly Point2[])[]): string =>
  rings.map((ring) => `M${ring.map(([x, y]) => `${x.toFixed(3)} ${y.toFixed(3)}`).join('L')}Z`).join('')

/** A label no longer than its edge, but never too small to be read. */
const fitted = (from: Point2, to: Point2, size: number): number =>
  Math.max(0.6 * size, Math.min(size, 0.6 * Math.hypot(to[0] - from[0], to[1] - from[1])))

interface Props {
  readonly plan: Plan
  readonly piece: PlanPiece
  readonly tints: Readonly<Record<string, string>>
  /** Crease ids of the seams to glue now. */
  readonly now: ReadonlySet<number>
  /** Crease id of the seam pointed at. */
  readonly strong: number | null
  /** Every label, for a figure that has room for them; else those of the seams to glue now. */
  readonly large?: boolean
}

export const PieceFigure = ({ plan, piece, tints, now, strong, large = false }: Props) => {
  const drawn = useMemo(() => drawPiece(plan, piece), [plan, piece])
  const colours = useMemo(() => new Map(plan.panels.map(({ id, colour }) => [id, colour])), [plan])
  const { box } = drawn
  const size = Math.max(box.width, box.height, 1)
  const pad = size * 0.06
  // Lines and letters as for a figure about 300 px wide (700 px if large), whatever the size of the piece.
  const unit = size / (large ? 700 : 300)
  const text = unit * (large || now.size <= 16 ? 12 : 9)
  const seams = [...drawn.seams].sort((a, b) => Number(now.has(a.crease)) - Number(now.has(b.crease)))
  return (
    <svg
      class="piece-figure"
      role="img"
      aria-label={`Piece ${piece.label} alone${drawn.mirrored ? ', seen from the inside' : ''}`}
      viewBox={`${box.x - pad} ${box.y - pad} ${box.width + 2 * pad} ${box.height + 2 * pad}`}
      data-testid="piece-figure"
    >
      <path d={path(drawn.tabs)} class="tab" />
      {drawn.panels.map(({ panel, rings }) => (
        <path key={panel} d={path(rings)} fill={colourOf(colours.get(panel) ?? '', tints)} fill-rule="evenodd" />
      ))}
      <path d={path([drawn.outline])} class="cut" stroke-width={1.4 * unit} />
      {drawn.panels.flatMap(({ panel, rings }) =>
        rings
          .slice(1)
          .map((ring, i) => <path key={`${panel} ${i}`} d={path([ring])} class="cut" stroke-width={1.4 * unit} />),
      )}
      {drawn.folds.map(({ kind, from, to }) => (
        <line
          key={`${from} ${to}`}
          x1={from[0]}
          y1={from[1]}
          x2={to[0]}
          y2={to[1]}
          class={`fold ${kind}`}
          stroke-width={1.2 * unit}
          stroke-dasharray={(kind === 'mountain' ? [9, 3, 2, 3] : kind === 'valley' ? [6, 4] : [1, 3])
            .map((dash) => dash * unit)
            .join(' ')}
        />
      ))}
      {seams.map(({ crease, from, to, at, label, panel }) => {
        const isNow = now.has(crease)
        return (
          <g key={`${crease} ${panel}`} class={`seam ${isNow ? 'now' : ''} ${strong === crease ? 'strong' : ''}`}>
            {isNow && (
              <line x1={from[0]} y1={from[1]} x2={to[0]} y2={to[1]} stroke-width={(strong === crease ? 7 : 4) * unit} />
            )}
            {(isNow || large) && (
              <text
                x={at[0]}
                y={at[1]}
                font-size={fitted(from, to, text)}
                text-anchor="middle"
                dominant-baseline="central"
              >
                {label}
              </text>
            )}
          </g>
        )
      })}
    </svg>
  )
}

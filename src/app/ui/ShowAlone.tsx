/** Chooses what of the model is shown alone: a face kind, one orbit of it, or one vertex with its faces. */
import { useEffect, useMemo, useState } from 'preact/hooks'
import type { SceneItem } from '../../preview'
import type { SolidParts } from '../../worker'
import { counted, plural } from '../words/figures'
import { useApp } from './context'
import { Swatch } from './Swatch'
import { kindsOf } from './scene'
import { orbitsOf, type Show, sayShown, showAll, vertexSorts, type Whole } from './show'

/** More than these are no choice but a list. */
const atMost = 12

/** The parts of a solid, once the press has told them; null while it has not, or when it does not know the solid. */
export const useParts = (solid: string | null, hand: 'left' | 'right'): SolidParts | null => {
  const { press } = useApp()
  const [known, setKnown] = useState<{ readonly key: string; readonly parts: SolidParts } | null>(null)
  const key = `${solid} ${hand}`
  useEffect(() => {
    if (solid === null) return
    let stale = false
    void press.parts(solid, hand).then((answer) => {
      if (!stale && answer.ok) setKnown({ key, parts: answer.value })
    })
    return () => {
      stale = true
    }
  }, [key])
  return known?.key === key ? known.parts : null
}

interface Props {
  readonly items: readonly SceneItem[]
  readonly whole: Whole | null
  readonly show: Show
  readonly onShow: (show: Show) => void
}

export const ShowAlone = ({ items, whole, show, onShow }: Props) => {
  const kinds = useMemo(() => kindsOf(items), [items])
  const parts = whole?.parts
  if (kinds.length < 2 && !parts) return null
  return (
    <div class="show-alone">
      <fieldset class="row tight kinds">
        <legend>Show</legend>
        <button type="button" class="quiet" aria-pressed={show.what === 'all'} onClick={() => onShow(showAll)}>
          All
        </button>
        {kinds.map(({ kind, panels, colour }) => {
          const isShown = show.what === 'kind' && show.kind === kind
          return (
            <button
              key={kind}
              type="button"
              class="quiet kind"
              aria-pressed={isShown}
              aria-label={`Only ${plural(kind)} (${counted(panels, whole && !whole.facesOf ? 'face' : 'panel')})`}
              onClick={() => onShow(isShown ? showAll : { what: 'kind', kind, orbit: null })}
            >
              <Swatch kind={kind} tints={{ [kind]: colour }} />
              {plural(kind)}
            </button>
          )
        })}
        {parts && (
          <button
            type="button"
            class="quiet"
            aria-pressed={show.what === 'vertex'}
            onClick={() => onShow(show.what === 'vertex' ? showAll : { what: 'vertex', vertex: 0 })}
          >
            One vertex
          </button>
        )}
      </fieldset>
      {parts && show.what === 'kind' && <Orbits parts={parts} show={show} onShow={onShow} />}
      {parts && show.what === 'vertex' && <Vertices parts={parts} vertex={show.vertex} onShow={onShow} />}
      <p class={show.what === 'all' ? 'unseen' : 'so'} role="status" data-testid="shown">
        {sayShown(show, items, whole)}
      </p>
    </div>
  )
}

const Orbits = ({
  parts,
  show,
  onShow,
}: {
  parts: SolidParts
  show: Show & { what: 'kind' }
  onShow: (show: Show) => void
}) => {
  const orbits = useMemo(() => orbitsOf(parts, show.kind), [parts, show.kind])
  if (orbits.length < 2 || orbits.length > atMost) return null
  const all = orbits.reduce((sum, { faces }) => sum + faces, 0)
  return (
    <label class="row tight">
      Which
      <select
        aria-label={`Which ${plural(show.kind)}: faces of one orbit are those that turning the solid carries into each other`}
        value={show.orbit ?? ''}
        onChange={({ currentTarget: { value } }) => onShow({ ...show, orbit: value === '' ? null : Number(value) })}
      >
        <option value="">all {all}</option>
        {orbits.map(({ orbit, faces }, i) => (
          <option key={orbit} value={orbit}>
            orbit {i + 1}: {faces}
          </option>
        ))}
      </select>
    </label>
  )
}

const Vertices = ({ parts, vertex, onShow }: { parts: SolidParts; vertex: number; onShow: (show: Show) => void }) => {
  const sorts = useMemo(() => vertexSorts(parts), [parts])
  const isChoice = sorts.length > 1 && sorts.length <= atMost
  const sort = sorts.find(({ orbit }) => orbit === parts.vertexOrbits[vertex])!
  const among = isChoice ? sort.vertices : parts.vertices.map((_, v) => v)
  const step = (by: number): void => {
    const at = among.indexOf(vertex) + by + among.length
    onShow({ what: 'vertex', vertex: among[at % among.length]! })
  }
  return (
    <div class="row tight">
      {isChoice && (
        <label class="row tight">
          Which
          <select
            aria-label="Which vertices: those of one orbit are carried into each other by turning the solid"
            value={sort.orbit}
            onChange={({ currentTarget: { value } }) =>
              onShow({
                what: 'vertex',
                vertex: sorts.find(({ orbit }) => orbit === Number(value))!.vertices[0]!,
              })
            }
          >
            {sorts.map(({ orbit, vertices }, i) => (
              <option key={orbit} value={orbit}>
                orbit {i + 1}: {counted(vertices.length, 'vertex', 'vertices')},{' '}
                {counted(parts.facesAt[vertices[0]!]!.length, 'face')} each
              </option>
            ))}
          </select>
        </label>
      )}
      <button type="button" class="quiet" onClick={() => step(-1)}>
        Previous<span class="unseen"> vertex</span>
      </button>
      <span class="figures">
        {among.indexOf(vertex) + 1} of {among.length}
      </span>
      <button type="button" class="quiet" onClick={() => step(1)}>
        Next<span class="unseen"> vertex</span>
      </button>
    </div>
  )
}

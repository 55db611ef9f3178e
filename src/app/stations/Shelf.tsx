import { signal, useComputed, useSignal } from '@preact/signals'
import { useCallback, useEffect, useMemo, useRef, useState } from 'preact/hooks'
import type { SceneItem } from '../../preview'
import type { SolidFacts } from '../../worker'
import { colourOf } from '../palette'
import { choicesOf } from '../state/build'
import { factsKey } from '../state/workshop'
import { useApp } from '../ui/context'
import { ModelView } from '../ui/ModelView'
import { OpenModelButton } from '../ui/OpenModel'
import { Picture } from '../ui/Picture'
import { useParts } from '../ui/ShowAlone'
import { showAll } from '../ui/show'
import { VertexFigure } from '../ui/VertexFigure'
import { counted, degreesText, figure } from '../words/figures'
import { breakable, capital, sayFaces, sayKnown, saySymmetry } from '../words/solid'
import { filterGroups, passes } from './shelf-filter'

/** Kept while the page is open, so that coming back to the Shelf finds it as it was left. */
const query = signal('')
const chosen = signal<ReadonlySet<string>>(new Set())
const looked = signal<string | null>(null)
const hand = signal<'left' | 'right'>('right')

interface Found {
  /** Best first. */
  readonly ids: readonly string[]
  /** Why something asked for by name does not exist. */
  readonly why: string | null
}
/** What the search finds; null while there is nothing to search for. */
const useFound = () => {
  const { press } = useApp()
  const found = useSignal<Found | null>(null)
  const text = query.value.trim()
  useEffect(() => {
    if (text === '') {
      found.value = null
      return
    }
    let stale = false
    void press.find(text).then((answer) => {
      if (!stale) found.value = answer.ok ? answer.value : { ids: [], why: null }
    })
    return () => {
      stale = true
    }
  }, [text])
  return found
}

const Filters = () => (
  <div class="filters">
    {filterGroups.map(({ name, filters }) => (
      <fieldset key={name} class="row tight">
        <legend class="filter-name">{name}</legend>
        {filters.map(({ id, word }) => (
          <button
            key={id}
            type="button"
            class="chip"
            aria-pressed={chosen.value.has(id)}
            onClick={() => {
              const next = new Set(chosen.value)
              if (!next.delete(id)) next.add(id)
              chosen.value = next
            }}
          >
            {word}
          </button>
        ))}
      </fieldset>
    ))}
  </div>
)

/** Cards that are put on the page at a time: few enough that neither typing nor scrolling waits for them. */
const atOnce = 24

/** The first ones of a list, and a frame later some more, until all are there. */
const useGrowing = <T,>(all: readonly T[]): readonly T[] => {
  const [grown, setGrown] = useState({ all, count: atOnce })
  // A list that only goes on longer leaves what is there.
  const last = Math.min(grown.count, grown.all.length) - 1
  const count = all[last] && all[last] === grown.all[last] ? grown.count : atOnce
  useEffect(() => {
    if (count >= all.length) return
    const timer = setTimeout(() => setGrown({ all, count: count + atOnce }), 16)
    return () => clearTimeout(timer)
  }, [all, count])
  return all.slice(0, count)
}

/** @param onPick the same one every time, so that a card is drawn again only when something in it changes */
const Card = ({ solid, onPick }: { solid: SolidFacts; onPick: (id: string) => void }) => {
  const { workshop } = useApp()
  const isLooked = useComputed(() => looked.value === solid.id)
  const known = useComputed(() => workshop.known.value.get(factsKey(solid.id, 'nonzero'))).value
  return (
    <li>
      <button
        type="button"
        class="card"
        aria-pressed={isLooked.value}
        data-solid={solid.id}
        onClick={() => onPick(solid.id)}
      >
        <Picture solid={solid.id} size={136} />
        <span class="card-name">{breakable(capital(solid.name))}</span>
        <span class="soft figures">
          {solid.index !== null && `No. ${solid.index}, `}
          {counted(solid.faces, 'face')}
        </span>
        <span class="card-facts figures">
          {known ? (
            sayKnown(known).map(([name, value]) => (
              <span key={name}>
                {value} <span class="soft">{name}</span>
              </span>
            ))
          ) : (
            <span class="soft">{solid.vertexConfiguration}</span>
          )}
        </span>
      </button>
    </li>
  )
}

const Looked = ({ solid }: { solid: SolidFacts }) => {
  const { press, workshop, router } = useApp()
  const items = useSignal<readonly SceneItem[]>([])
  const seen = solid.chiral ? hand.value : 'right'
  useEffect(() => {
    let stale = false
    const colours = Object.fromEntries(solid.facesByKind.map(({ name }) => [name, colourOf(name, {})]))
    void press.faces(solid.id, seen, 'nonzero', colours).then((answer) => {
      if (!stale && answer.ok) items.value = answer.value
    })
    return () => {
      stale = true
    }
  }, [solid.id, seen])
  const options = useMemo(() => ({ backs: 'same' as const, centre: [0, 0, 0] as [number, number, number] }), [])
  const parts = useParts(solid.id, seen)
  const whole = useMemo(() => parts && { parts }, [parts])
  const [show, setShow] = useState(showAll)
  const known = workshop.known.value.get(factsKey(solid.id, 'nonzero'))
  const isHere = workshop.choices.value.solid === solid.id
  /** A model from a file has a build already. */
  const buildWith = (id: string): string | null =>
    workshop.builds.peek().find((build) => choicesOf(build).solid === id && !build.removed)?.id ?? null
  return (
    <section class="looked" aria-label={capital(solid.name)} data-looked={solid.id}>
      <h2 tabIndex={-1}>{capital(solid.name)}</h2>
      <ModelView
        label={`The ${solid.name}, its raw faces`}
        items={items.value}
        options={options}
        whole={whole}
        onShow={setShow}
      />
      {solid.chiral && (
        <fieldset class="row tight">
          <legend>Hand</legend>
          {(['left', 'right'] as const).map((side) => (
            <label key={side} class="choice">
              <input
                type="radio"
                name="shelf-hand"
                checked={hand.value === side}
                onChange={() => {
                  hand.value = side
                }}
              />
              {side}
            </label>
          ))}
        </fieldset>
      )}
      <button
        type="button"
        class="primary"
        onClick={() => {
          const kept = solid.family === 'own' && !isHere ? buildWith(solid.id) : null
          if (kept) void workshop.open(kept)
          else workshop.take(solid.id, solid.chiral ? hand.value : workshop.choices.value.hand)
          router.go('board')
        }}
      >
        {isHere ? 'Back to the Board' : 'Take to the Board'}
      </button>
      <dl class="pairs figures">
        <dt>Faces</dt>
        <dd>{sayFaces(solid)}</dd>
        <dt>Vertices, edges</dt>
        <dd>
          {solid.vertices}, {solid.edges}
        </dd>
        {ownFacts(solid).map(([name, value]) => [<dt key={name}>{name}</dt>, <dd key={`${name} is`}>{value}</dd>])}
        {solid.dihedralAngles.length > 0 && <dt>Dihedral angles</dt>}
        {solid.dihedralAngles.length > 0 && (
          <dd>
            {solid.dihedralAngles.map(({ kinds, degrees }) => {
              const [a, b] = kinds.map((kind) => solid.facesByKind.find(({ id }) => id === kind)?.name ?? '')
              return <div key={`${a} ${b} ${degrees}`}>{`${a} to ${b} ${degreesText(degrees)}`}</div>
            })}
          </dd>
        )}
        {sayKnown(known).map(([name, value]) => [
          <dt key={name}>{capital(name)}</dt>,
          <dd key={`${name} is`}>{value || <span class="soft">known once it is planned</span>}</dd>,
        ])}
        {solid.family !== 'dual' && solid.family !== 'own' && (
          <>
            <dt>Edge at 250 mm</dt>
            <dd>{figure(250 / (2 * solid.circumradius), 1)} mm</dd>
          </>
        )}
      </dl>
      <VertexFigure solid={solid.id} hand={seen} parts={parts} vertex={show.what === 'vertex' ? show.vertex : null} />
      {solid.notes.map((note) => (
        <p key={note} class="so">
          {note}
        </p>
      ))}
    </section>
  )
}

/** Facts that not every solid has. */
const ownFacts = (solid: SolidFacts): [string, string][] => {
  const facts: [string, string | number | null][] = [
    ['Vertex configuration', solid.vertexConfiguration],
    ['Wythoff symbol', solid.wythoff],
    ['Symmetry', solid.symmetry && saySymmetry(solid.symmetry)],
    ['Components', solid.components > 1 ? solid.components : null],
    ['Euler characteristic', solid.euler],
    ['Density', solid.density ?? (solid.family === 'own' || solid.family === 'compound' ? null : 'none')],
    ['Sides', solid.family === 'own' ? null : solid.orientable ? 'two (orientable)' : 'one (not orientable)'],
  ]
  return facts.flatMap(([name, value]) => (value === null || value === '' ? [] : [[name, String(value)]]))
}

export const Shelf = () => {
  const { catalogue, workshop } = useApp()
  const found = useFound()
  const detail = useRef<HTMLDivElement>(null)
  const shown = useComputed(() => {
    const all = catalogue.value
    const ids = found.value?.ids
    const listed = ids ? ids.flatMap((id) => all.find((solid) => solid.id === id) ?? []) : all
    return listed.filter((solid) => passes(solid, chosen.value))
  })
  const subject = catalogue.value.find(({ id }) => id === (looked.value ?? workshop.choices.value.solid))
  const drawn = useGrowing(shown.value)
  const pick = useCallback((id: string) => {
    looked.value = id
    // On a narrow screen the details stand above the list.
    const box = detail.current!.getBoundingClientRect()
    if (box.bottom < 0) detail.current!.scrollIntoView({ block: 'start' })
  }, [])
  const filtered = chosen.value.size > 0 || query.value.trim() !== ''
  return (
    <div class="shelf">
      <section class="shelf-list" aria-label="Solids">
        <div class="row search">
          <label class="grow">
            <span class="unseen">Find by name, number, vertex configuration or Wythoff symbol</span>
            <input
              type="search"
              placeholder="Name, number, 3.5.3.5, 2 | 3 5"
              value={query.value}
              onInput={(event) => {
                query.value = event.currentTarget.value
              }}
            />
          </label>
          <span class="soft figures" role="status">
            {counted(shown.value.length, 'solid')}
          </span>
          {filtered && (
            <button
              type="button"
              class="quiet"
              onClick={() => {
                chosen.value = new Set()
                query.value = ''
              }}
            >
              Show all
            </button>
          )}
        </div>
        <Filters />
        <div class="row">
          <OpenModelButton />
          <span class="soft">OBJ, STL or PLY; or drop the file on this page.</span>
        </div>
        {catalogue.value.length === 0 && <p class="soft">Constructing the solids</p>}
        {catalogue.value.length > 0 && shown.value.length === 0 && (
          <p>{found.value?.why ?? 'No solid fits. Take a word away, or search for part of a name.'}</p>
        )}
        <ul class="cards">
          {drawn.map((solid) => (
            <Card key={solid.id} solid={solid} onPick={pick} />
          ))}
        </ul>
      </section>
      <div class="shelf-detail" ref={detail}>
        {subject && <Looked key={subject.id} solid={subject} />}
      </div>
    </div>
  )
}

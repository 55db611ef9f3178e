/** The ticket: on the right of every station; on a phone a drawer with one line showing. */
import { useComputed, useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import type { Planned } from '../state/workshop'
import { docketFacts, type Fact } from '../words/docket'
import { counted, hoursText } from '../words/figures'
import { nothingPointed, useApp } from './context'
import { pieceByPanel } from './scene'

/** How long a changed fact stays marked, ms. */
const markFor = 8000

/** Values of the facts before, for those that have changed. */
const changes = (now: readonly Fact[], then: readonly Fact[]): ReadonlyMap<string, string> =>
  new Map(
    now.flatMap(({ id, value }): [string, string][] => {
      const old = then.find((fact) => fact.id === id)
      return old && old.value !== value ? [[id, old.value]] : []
    }),
  )

export const Docket = ({ shown, whose }: { shown: Planned | null; whose: string }) => {
  const { workshop, pointed } = useApp()
  const open = useSignal(false)
  const marked = useSignal<ReadonlyMap<string, string>>(new Map())
  const isFresh = useComputed(() => workshop.isFresh.value)

  const told = useRef('')
  useEffect(() => {
    const before = workshop.before.peek()
    // Told once, when the plan has come; not again with every change of station.
    if (!shown || !before || shown.key !== workshop.planned.peek()?.key || told.current === shown.key) {
      marked.value = new Map()
      return
    }
    told.current = shown.key
    marked.value = changes(docketFacts(shown.plan, shown.choices), docketFacts(before, shown.choices))
    const timer = setTimeout(() => {
      marked.value = new Map()
    }, markFor)
    return () => clearTimeout(timer)
  }, [shown?.key])

  const point = (panel: number | undefined): void => {
    if (!shown) return
    pointed.value = panel === undefined ? nothingPointed : { panel, piece: pieceByPanel(shown.plan).get(panel) ?? null }
  }
  const facts = shown ? docketFacts(shown.plan, shown.choices) : []
  const docket = shown?.plan.docket
  const line = docket
    ? `${counted(docket.sheets, 'sheet')}, ${counted(docket.pieces, 'piece')}, ${hoursText(docket.hours.total)}`
    : 'no plan yet'
  const isOld = shown !== null && shown.key === workshop.planned.value?.key && !isFresh.value
  return (
    <aside class={`docket ${open.value ? 'open' : ''} ${isOld ? 'old' : ''}`} aria-label="Docket">
      <button
        type="button"
        class="docket-line"
        aria-expanded={open.value}
        aria-controls="docket-facts"
        onClick={() => {
          open.value = !open.value
        }}
      >
        <b>Docket</b> <span>{line}</span>
      </button>
      <div id="docket-facts" class="docket-body" tabIndex={-1}>
        <h2>
          Docket <small>{whose}</small>
        </h2>
        {!shown && (
          <p class="soft">
            Sheets, card, cut and glue lengths, hours and the tightest spot stand here as soon as there is a plan.
          </p>
        )}
        {isOld && <p class="stale">As of the earlier choices.</p>}
        <dl>
          {facts.map(({ id, name, value, meaning, caution, panel }) => {
            const was = marked.value.get(id)
            return (
              <div key={id} class={`fact ${was === undefined ? '' : 'changed'}`} data-fact={id}>
                <dt>{name}</dt>
                <dd class="value">
                  {panel === undefined ? (
                    value
                  ) : (
                    <button
                      type="button"
                      class="link"
                      onPointerEnter={() => point(panel)}
                      onPointerLeave={() => point(undefined)}
                      onFocus={() => point(panel)}
                      onBlur={() => point(undefined)}
                      onClick={() => point(panel)}
                    >
                      {value}
                      <span class="unseen">, show it</span>
                    </button>
                  )}
                </dd>
                <dd class="meaning">
                  {caution && <span class="flag">Look: </span>}
                  {meaning}
                  {was !== undefined && <span class="was"> (was {was})</span>}
                </dd>
              </div>
            )
          })}
        </dl>
        {docket && docket.checks.length > 0 && (
          <details open={docket.checks.some(({ ok }) => !ok)}>
            <summary>The plan's own checks</summary>
            <ul class="checks">
              {docket.checks.map(({ name, ok, detail }) => (
                <li key={name}>
                  <b>{ok ? 'ok' : 'failed'}</b> {name}
                  {detail !== '' && <small>{detail}</small>}
                </li>
              ))}
            </ul>
          </details>
        )}
      </div>
    </aside>
  )
}

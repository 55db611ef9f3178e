import { useSignal } from '@preact/signals'
import { useEffect, useMemo, useRef } from 'preact/hooks'
import type { Lit, Preview, SeamLine } from '../../preview'
import { inOrder, nextPiece, seamsToGlue } from '../state/job'
import type { Planned } from '../state/workshop'
import { useApp } from '../ui/context'
import { Dialog } from '../ui/Dialog'
import { ModelView } from '../ui/ModelView'
import { PieceFigure } from '../ui/PieceFigure'
import { usePages } from '../ui/pages'
import { pieceByPanel, planItems } from '../ui/scene'
import { travel } from '../ui/travel'
import { vantage } from '../ui/vantage'
import { sayAcross, sayStep } from '../words/bench'
import { counted, hoursText } from '../words/figures'
import { capital } from '../words/solid'
import { Others } from './BenchOthers'
import { OnSheet, sheetOf } from './BenchSheet'
import { GluingLine } from './GluingLine'

const AtWork = ({ planned }: { planned: Planned }) => {
  const { workshop, router, prefs, announce } = useApp()
  const { plan } = planned
  const glued = workshop.glued.value
  const tints = workshop.tints.value
  const pages = usePages(planned)!
  const order = useMemo(() => inOrder(plan), [plan])
  const next = nextPiece(plan, glued)
  const asked = router.place.value.at
  const piece = order.find(({ step }) => step === asked) ?? next ?? order.at(-1)!
  const isNext = piece.id === next?.id
  const isGlued = glued.includes(piece.id)
  const strong = useSignal<number | null>(null)
  const showRest = useSignal(false)
  const large = useSignal(false)
  const seams = useMemo(() => seamsToGlue(plan, glued, piece.id), [plan, glued, piece.id])
  const seamSet = useMemo(() => new Set(seams), [seams])
  const creases = useMemo(() => new Map(plan.creases.map((crease) => [crease.id, crease])), [plan])
  const pieceOf = useMemo(() => pieceByPanel(plan), [plan])
  const items = useMemo(() => planItems(plan, tints), [plan, tints])
  const view = useRef<Preview | null>(null)
  const figure = useRef<HTMLDivElement>(null)

  const shown = useMemo(() => {
    const on = new Set([...glued, piece.id])
    const visible = new Set<number>()
    const rest = new Set<number>()
    for (const { id } of plan.panels) (on.has(pieceOf.get(id) ?? -1) ? visible : rest).add(id)
    return { visible, rest }
  }, [plan, glued, piece.id])
  const lit = useMemo(
    (): Lit => ({ groups: new Set([piece.id]), label: `piece ${piece.label}` }),
    [piece.id, piece.label],
  )
  const lines = useMemo(
    (): SeamLine[] =>
      seams.flatMap((id) => {
        const crease = creases.get(id)
        if (!crease) return []
        const mine = crease.panels.find((panel) => pieceOf.get(panel) === piece.id)
        return [
          {
            id,
            ends: crease.ends,
            strong: strong.value === id,
            ...(mine === undefined ? {} : { item: mine }),
            ...(strong.value === id && crease.label ? { label: crease.label } : {}),
          },
        ]
      }),
    [seams, strong.value, piece.id],
  )
  const look = useMemo(
    () => ({ direction: vantage(plan, piece.id, shown.visible), key: String(piece.id) }),
    [plan, piece.id],
  )

  const groups = useMemo(() => {
    const by = new Map<string, number[]>()
    for (const id of seams) {
      const where = sayAcross(plan, piece, id)
      by.set(where, [...(by.get(where) ?? []), id])
    }
    return [...by]
  }, [seams, piece])
  const sentence = sayStep(plan, piece, seams, sheetOf(plan, piece.id))
  const note = plan.steps.find((entry) => entry.piece === piece.id)?.note ?? ''
  useEffect(() => {
    strong.value = null
    announce(sentence)
  }, [piece.id])

  const show = (step: number): void => router.refine(step)
  const glue = (): void => {
    if (isGlued) {
      workshop.unglue(piece.id)
      return
    }
    travel(figure.current, view.current, plan, piece)
    workshop.glue(piece.id)
    show(0)
  }
  const press = useRef(glue)
  press.current = glue
  useEffect(() => {
    const onKey = (event: KeyboardEvent): void => {
      const target = event.target as HTMLElement
      if (event.ctrlKey || event.metaKey || event.altKey || target.matches('input, textarea, select')) return
      if (prefs.keys.peek() === 'on' && event.key.toLowerCase() === 'g' && !document.querySelector('dialog[open]'))
        press.current()
    }
    addEventListener('keydown', onKey)
    return () => removeEventListener('keydown', onKey)
  }, [])

  const done = glued.length
  return (
    <div class="bench" data-glued={done} data-piece-shown={piece.label}>
      <Others planned={planned} />
      {next === null && (
        <p class="finished">
          All {counted(done, 'piece')} are glued. Let the model set for 18 to 24 hours before you handle it.
        </p>
      )}
      <div class="bench-halves">
        <section class="take" aria-label="Take">
          <h2>Take</h2>
          <div class="take-both">
            <OnSheet pages={pages} plan={plan} piece={piece} />
            <figure class="take-piece" ref={figure}>
              <PieceFigure plan={plan} piece={piece} tints={tints} now={seamSet} strong={strong.value} />
              <figcaption>
                Piece {piece.label}, {piece.colour === 'mixed' ? 'mixed colours' : `${piece.colour} card`}, template{' '}
                {piece.template}.{' '}
                <button
                  type="button"
                  class="link"
                  onClick={() => {
                    large.value = true
                  }}
                >
                  Enlarge
                </button>
              </figcaption>
            </figure>
          </div>
        </section>
        <section class="place" aria-label="Place">
          <h2>Place</h2>
          <ModelView
            label={`The model so far with piece ${piece.label} lit in its place`}
            items={items}
            visible={shown.visible}
            ghost={showRest.value ? shown.rest : null}
            lit={lit}
            seams={lines}
            look={look}
            apart="pieces"
            view={view}
            onPick={(hit, event) => {
              const id = hit ? pieceOf.get(hit.item) : undefined
              const found = order.find((entry) => entry.id === id)
              if (event === 'click' && found) show(found.step)
            }}
          />
          <label class="choice">
            <input
              type="checkbox"
              checked={showRest.value}
              onChange={(event) => {
                showRest.value = event.currentTarget.checked
              }}
            />
            show what is still to come
          </label>
        </section>
      </div>
      <div class="do">
        <section class="grow do-words" aria-label="What to do">
          <p class="sentence" data-testid="sentence">
            {sentence}
            {note !== '' && ` ${capital(note)}${/[.!?]$/.test(note) ? '' : '.'}`}
          </p>
          {groups.length > 0 && (
            <fieldset class="seams">
              <legend class="unseen">Seams to glue</legend>
              {groups.map(([where, ids]) => (
                <div key={where} class="row tight">
                  <span class="soft">{where}</span>
                  {ids.map((id) => (
                    <button
                      key={id}
                      type="button"
                      class="chip"
                      aria-pressed={strong.value === id}
                      onPointerEnter={() => {
                        strong.value = id
                      }}
                      onFocus={() => {
                        strong.value = id
                      }}
                      onClick={() => {
                        strong.value = id
                        announce(`Seam ${creases.get(id)?.label} ${where} is lit.`)
                      }}
                    >
                      <b>{creases.get(id)?.label}</b>
                      {plan.docket.buttSeams.includes(id) && ' no tab'}
                    </button>
                  ))}
                </div>
              ))}
            </fieldset>
          )}
        </section>
        <div class="do-buttons">
          {!isNext && next && (
            <button type="button" onClick={() => show(0)}>
              To the next, {next.label}
            </button>
          )}
          <button type="button" class="quiet" disabled={done === 0} onClick={() => workshop.unglue()}>
            Undo
          </button>
          <button type="button" class={`big ${isGlued ? '' : 'accent'}`} onClick={glue}>
            {isGlued ? 'Not glued after all' : 'Glued'}
          </button>
        </div>
      </div>
      <GluingLine order={order} glued={glued} shown={piece.id} next={next?.id ?? null} onShow={show} />
      {large.value && (
        <Dialog
          title={`Piece ${piece.label}`}
          onClose={() => {
            large.value = false
          }}
        >
          <div class="enlarged">
            <PieceFigure plan={plan} piece={piece} tints={tints} now={seamSet} strong={strong.value} large />
          </div>
        </Dialog>
      )}
      <p class="figures soft so">
        {done} of {order.length} glued. About {hoursText(plan.docket.hours.glue * (1 - done / order.length))} of gluing
        to come.
      </p>
    </div>
  )
}

export const Bench = () => {
  const { workshop } = useApp()
  const planned = workshop.benchPlan.value
  if (planned) return <AtWork key={planned.key} planned={planned} />
  return (
    <p class="empty">
      {workshop.computing.value
        ? 'The first piece lies here as soon as the plan is ready.'
        : workshop.job.value
          ? 'Fetching the plan of this model.'
          : 'There is no plan yet.'}
    </p>
  )
}

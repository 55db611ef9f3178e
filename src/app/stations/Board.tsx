import { useSignal } from '@preact/signals'
import { useEffect, useMemo } from 'preact/hooks'
import { shortStretches, usualCloseMm } from '../../drawing'
import type { Plan } from '../../plan/types'
import type { Lit, SceneItem } from '../../preview'
import { colourOf } from '../palette'
import { factsKey } from '../state/workshop'
import { nothingPointed, useApp } from '../ui/context'
import { Group, NumberField, Radios } from '../ui/fields'
import { ModelView } from '../ui/ModelView'
import { useParts } from '../ui/ShowAlone'
import { Swatch } from '../ui/Swatch'
import { pieceByPanel, planItems } from '../ui/scene'
import {
  sayClosed,
  sayColours,
  sayCut,
  sayFill,
  sayHand,
  sayHeight,
  sayNets,
  sayPaper,
  saySide,
} from '../words/consequences'
import { cardWeights, sayCard } from '../words/craft'
import { counted, plural } from '../words/figures'
import { capital } from '../words/solid'

/** The planned model, or the raw faces as long as there is no plan for this solid. */
const BoardModel = () => {
  const { workshop, press, pointed, solid, announce } = useApp()
  const { solid: id, hand, fill } = workshop.choices.value
  const tints = workshop.tints.value
  const planned = workshop.planned.value
  const plan = planned?.choices.solid === id ? planned.plan : null
  const raw = useSignal<readonly SceneItem[]>([])
  const colours = useMemo(
    () => Object.fromEntries((solid.value?.facesByKind ?? []).map(({ name }) => [name, colourOf(name, tints)])),
    [solid.value, tints],
  )
  useEffect(() => {
    if (plan || !solid.value) return
    let stale = false
    void press.faces(id, hand, fill, colours).then((answer) => {
      if (!stale && answer.ok) raw.value = answer.value
    })
    return () => {
      stale = true
    }
  }, [plan === null, id, hand, fill, colours])
  const items = useMemo(() => (plan ? planItems(plan, tints) : raw.value), [plan, tints, raw.value])
  const options = useMemo(
    () => ({ backs: plan ? ('dull' as const) : ('same' as const), centre: [0, 0, 0] as [number, number, number] }),
    [plan === null],
  )
  const { panel, piece } = pointed.value
  const lit = useMemo((): Lit | null => {
    if (!plan || (panel === null && piece === null)) return null
    const label = plan.pieces.find(({ id: each }) => each === piece)?.label
    return panel !== null
      ? { items: new Set([panel]), ...(label ? { label: `piece ${label}` } : {}) }
      : { groups: new Set([piece!]) }
  }, [plan, panel, piece])
  const name = plan?.model.name ?? solid.value?.name ?? id
  const parts = useParts(
    solid.value ? id : null,
    plan?.model.hand === 'left' || (!plan && hand === 'left') ? 'left' : 'right',
  )
  const whole = useMemo(
    () => parts && (plan ? { parts, facesOf: new Map(plan.panels.map((each) => [each.id, each.faces])) } : { parts }),
    [parts, plan],
  )
  return (
    <ModelView
      whole={whole}
      label={plan ? `The ${name} as it will stand` : `The ${name}, its raw faces`}
      items={items}
      options={options}
      lit={lit}
      onPick={(hit, event) => {
        if (!plan) return
        pointed.value = hit ? { panel: hit.item, piece: pieceByPanel(plan).get(hit.item) ?? null } : nothingPointed
        const panelHit = hit && plan.panels.find(({ id: each }) => each === hit.item)
        const pieceHit = hit && plan.pieces.find(({ id: each }) => each === pointed.peek().piece)
        if (event === 'click' && panelHit && pieceHit)
          announce(`${capital(panelHit.colour)} panel of piece ${pieceHit.label}.`)
      }}
    />
  )
}

const Colours = () => {
  const { workshop, solid } = useApp()
  const choices = workshop.choices.value
  const tints = workshop.tints.value
  return (
    <Group title="Colours">
      <Radios
        legend="Card"
        value={choices.colours}
        options={[
          ['one', 'one card for all'],
          ['kind', 'a sheet set per face kind'],
        ]}
        onChange={(colours) => workshop.choose({ colours })}
        consequence={sayColours(choices.colours, solid.value)}
      />
      <div class="tints">
        {solid.value?.facesByKind.map(({ name }) => (
          <div key={name} class="tint">
            <Swatch kind={name} tints={tints} />
            <label>
              {name === 'card' ? name : plural(name)}
              <input
                type="color"
                value={colourOf(name, tints)}
                onChange={(event) => workshop.tint(name, event.currentTarget.value)}
              />
            </label>
            {tints[name] && (
              <button type="button" class="link" onClick={() => workshop.tint(name, null)}>
                as it was<span class="unseen">, {plural(name)}</span>
              </button>
            )}
          </div>
        ))}
      </div>
      <p class="so">Set these to your card: they colour the models on the screen, nothing is printed in them.</p>
    </Group>
  )
}

const Choices = () => {
  const { workshop, solid } = useApp()
  const choices = workshop.choices.value
  const planned = workshop.planned.value
  const plan = planned?.choices.solid === choices.solid ? planned.plan : null
  const known = workshop.known.value.get(factsKey(choices.solid, choices.fill))
  const hasStars = solid.value?.facesByKind.some(({ d }) => d > 1) ?? false
  const { past, future } = workshop.build.value.history
  return (
    <form class="choices" aria-label="Choices" onSubmit={(event) => event.preventDefault()}>
      <div class="row tight">
        <button type="button" class="quiet" disabled={past.length === 0} onClick={() => workshop.undo()}>
          Undo
        </button>
        <button type="button" class="quiet" disabled={future.length === 0} onClick={() => workshop.redo()}>
          Redo
        </button>
      </div>
      <Group title="Size">
        <NumberField
          name="heightMm"
          label="Height, across the vertices"
          value={choices.heightMm}
          step={5}
          suggestions={[100, 150, 250, 400]}
          onChange={(heightMm) => workshop.choose({ heightMm })}
          consequence={sayHeight(solid.value, choices, known)}
        />
        {solid.value?.chiral && (
          <Radios
            legend="Hand"
            value={choices.hand}
            options={[
              ['left', 'left'],
              ['right', 'right'],
            ]}
            onChange={(hand) => workshop.choose({ hand })}
            consequence={sayHand(choices.hand)}
          />
        )}
        {hasStars && (
          <Radios
            legend="Stars"
            value={choices.fill}
            options={[
              ['nonzero', 'filled'],
              ['evenodd', 'centres open'],
            ]}
            onChange={(fill) => workshop.choose({ fill })}
            consequence={sayFill(choices.fill)}
          />
        )}
      </Group>
      <Group title="Card">
        <Radios
          legend="Paper"
          value={choices.paper}
          options={[
            ['a4', 'A4'],
            ['letter', 'US Letter'],
          ]}
          onChange={(paper) => workshop.choose({ paper })}
          consequence={sayPaper(choices)}
        />
        <NumberField
          name="grammage"
          label="Weight"
          value={choices.grammage}
          step={10}
          suggestions={cardWeights}
          onChange={(grammage) => workshop.choose({ grammage })}
          consequence={sayCard(choices.grammage)}
        />
      </Group>
      <Colours />
      <Group title="Nets">
        <Radios
          legend="Cut up into"
          value={choices.nets ?? 'fewest'}
          options={[
            ['fewest', 'fewest pieces'],
            ['repeat', 'pieces that repeat'],
            ['modules', 'spikes and pits'],
            ['single', 'single panels'],
          ]}
          onChange={(nets) => workshop.choose({ nets })}
          consequence={sayCut(choices.nets ?? 'fewest')}
        />
        <p class="so">{sayNets(plan) ?? 'How many pieces it takes stands here once it is planned.'}</p>
        <Slivers plan={plan} />
        <details>
          <summary>Advanced</summary>
          <NumberField
            name="gapMm"
            label="Gap between pieces on a sheet"
            value={choices.gapMm}
            step={0.5}
            onChange={(gapMm) => workshop.choose({ gapMm })}
            consequence="Room for the knife. A wider gap takes more card."
          />
        </details>
      </Group>
      <Group title="Printing">
        <Radios
          legend="Printed side"
          value={choices.side}
          options={[
            ['outside', 'outside of the model'],
            ['inside', 'inside'],
          ]}
          onChange={(side) => workshop.choose({ side })}
          consequence={saySide(choices.side)}
        />
        <details>
          <summary>Advanced</summary>
          <NumberField
            name="marginMm"
            label="Margin of the sheet"
            value={choices.marginMm}
            step={1}
            onChange={(marginMm) => workshop.choose({ marginMm })}
            consequence="Most printers need 4 to 4.2 mm on each side; 6.35 mm is safe."
          />
        </details>
      </Group>
    </form>
  )
}

/** Stretches that no one can cut: proposed to be closed up when there are any, never done unasked. */
const Slivers = ({ plan }: { plan: Plan | null }) => {
  const { workshop } = useApp()
  const below = workshop.choices.value.closeBelowMm ?? 0
  const short = plan ? shortStretches(plan) : 0
  return (
    <>
      {below === 0 && short > 0 && (
        <div class="row proposal">
          <span class="grow">
            {counted(short, 'stretch', 'stretches')} shorter than {usualCloseMm} mm: no one can cut or glue them.
          </span>
          <button type="button" onClick={() => workshop.choose({ closeBelowMm: usualCloseMm })}>
            Close them up
          </button>
        </div>
      )}
      {(below > 0 || short > 0) && (
        <NumberField
          name="closeBelowMm"
          label="Close up stretches shorter than"
          value={below}
          step={0.1}
          onChange={(closeBelowMm) => workshop.choose({ closeBelowMm })}
          consequence={sayClosed(plan, below)}
        />
      )}
    </>
  )
}

export const Board = () => {
  const { workshop, router } = useApp()
  return (
    <div class="board">
      <section class="board-model" aria-label="Model">
        <BoardModel />
        <div class="row next-row">
          <button
            type="button"
            class="primary"
            disabled={workshop.planned.value === null}
            onClick={() => router.go('sheets')}
          >
            To the Sheets
          </button>
        </div>
      </section>
      <Choices />
    </div>
  )
}

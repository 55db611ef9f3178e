/** A builder's own model: by file picker or dropped on the page, read by a worker, told of, and taken to the Board. */
import { signal, useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import { Cancelled, InputError } from '../../errors'
import { checkFileSize, modelUnits, type ReadModel } from '../../worker'
import { limits, readNumber } from '../state/choices'
import { counted, figure } from '../words/figures'
import { openFile } from './actions'
import { type AppContext, useApp } from './context'
import { Dialog } from './Dialog'

type Incoming =
  | { readonly kind: 'reading'; readonly name: string; readonly fraction: number }
  | { readonly kind: 'read'; readonly name: string; readonly model: ReadModel }
  | { readonly kind: 'refused'; readonly name: string; readonly message: string }

/** What has been picked or dropped, until it is taken or put away. */
const incoming = signal<Incoming | null>(null)
/** Counts the files: a later one, and putting away, leave the earlier one behind. */
let turn = 0

const receive = async ({ reader, announce }: AppContext, file: File): Promise<void> => {
  const { name } = file
  const mine = ++turn
  const isMine = (): boolean => mine === turn
  incoming.value = { kind: 'reading', name, fraction: 0 }
  try {
    // Before anything is read: a file of gigabytes must not fill the memory.
    checkFileSize(file.size, name)
    const bytes = new Uint8Array(await file.arrayBuffer())
    if (!isMine()) return
    const answer = await reader.read(bytes, name, (_, fraction) => {
      if (isMine()) incoming.value = { kind: 'reading', name, fraction }
    })
    if (!isMine()) return
    incoming.value = answer.ok
      ? { kind: 'read', name, model: answer.value }
      : { kind: 'refused', name, message: answer.refusal.message }
  } catch (error) {
    if (error instanceof Cancelled || !isMine()) return
    const message = error instanceof InputError ? error.message : `${name} cannot be read: ${String(error)}`
    incoming.value = { kind: 'refused', name, message }
  } finally {
    // A later file is being read by the same worker.
    if (isMine()) reader.close()
  }
  announce(incoming.peek()?.kind === 'read' ? `${name} is read.` : `${name} cannot be used.`)
}

/** Plans and builds are opened as such, anything else is taken for a model. */
const receiveAny = (app: AppContext, file: File): void => {
  if (/\.json$/i.test(file.name)) void openFile(app, file)
  else void receive(app, file)
}

export const OpenModelButton = () => {
  const app = useApp()
  const input = useRef<HTMLInputElement>(null)
  return (
    <>
      <button type="button" onClick={() => input.current?.click()}>
        Open a model
      </button>
      <input
        ref={input}
        type="file"
        accept=".obj,.stl,.ply"
        class="unseen"
        tabIndex={-1}
        aria-label="Model file: OBJ, STL or PLY"
        data-testid="open-model"
        onChange={(event) => {
          const field = event.currentTarget
          const file = field.files?.[0]
          if (file) void receive(app, file)
          field.value = ''
        }}
      />
    </>
  )
}

/** Takes files that are dropped anywhere on the page. */
export const useDrop = (): void => {
  const app = useApp()
  useEffect(() => {
    const hasFile = (event: DragEvent): boolean => event.dataTransfer?.types.includes('Files') ?? false
    const over = (event: DragEvent): void => {
      if (hasFile(event)) event.preventDefault()
    }
    const drop = (event: DragEvent): void => {
      if (!hasFile(event)) return
      event.preventDefault()
      const file = event.dataTransfer?.files[0]
      if (file) receiveAny(app, file)
    }
    addEventListener('dragover', over)
    addEventListener('drop', drop)
    return () => {
      removeEventListener('dragover', over)
      removeEventListener('drop', drop)
    }
  }, [])
}

const unitNames: Readonly<Record<string, string>> = {
  mm: 'millimetres',
  cm: 'centimetres',
  m: 'metres',
  in: 'inches',
}

/** What was read, and how large it shall be. */
const Read = ({ model: { solid, farthest, notes } }: { model: ReadModel }) => {
  const { workshop, router, press, trouble } = useApp()
  const way = useSignal<'height' | 'unit'>('height')
  const height = useSignal(String(workshop.choices.value.heightMm))
  const unit = useSignal('mm')
  const { least, most } = limits.heightMm
  const read = readNumber('heightMm', height.value)
  const byUnit = 2 * farthest * (modelUnits[unit.value as keyof typeof modelUnits] ?? 1)
  const inRange = byUnit >= least && byUnit <= most
  const heightMm =
    way.value === 'unit' ? (inRange ? Math.round(byUnit * 100) / 100 : null) : 'value' in read ? read.value : null
  const components = solid.components ? new Set(solid.components).size : 1
  return (
    <form
      class="own-model"
      onSubmit={async (event) => {
        event.preventDefault()
        if (heightMm === null) return
        // Put away first: a second click must not begin a second build.
        incoming.value = null
        const kept = await press.keepModel(solid)
        if (!kept.ok) {
          trouble.value = kept.refusal.message
          return
        }
        await workshop.takeModel(solid, heightMm)
        router.go('board')
      }}
    >
      <p>
        <b>{solid.name}</b>: {counted(solid.faces.length, 'face')},{' '}
        {counted(solid.vertices.length, 'vertex', 'vertices')}
        {components > 1 && `, ${counted(components, 'component')}`}.
      </p>
      {notes.length > 0 && (
        <ul class="notes">
          {notes.map((note) => (
            <li key={note}>{note}</li>
          ))}
        </ul>
      )}
      <fieldset class="field">
        <legend>Size</legend>
        <label class="choice">
          <input
            type="radio"
            name="model-size"
            checked={way.value === 'height'}
            onChange={() => {
              way.value = 'height'
            }}
          />
          by its height, across the farthest vertices
        </label>
        <label class="choice">
          <input
            type="radio"
            name="model-size"
            checked={way.value === 'unit'}
            onChange={() => {
              way.value = 'unit'
            }}
          />
          as it is in the file
        </label>
        {way.value === 'height' ? (
          <label>
            Height in mm{' '}
            <input
              type="text"
              inputMode="decimal"
              autoComplete="off"
              class="number figures"
              value={height.value}
              aria-invalid={'error' in read}
              onInput={(event) => {
                height.value = event.currentTarget.value
              }}
            />
          </label>
        ) : (
          <label>
            The file counts in{' '}
            <select
              value={unit.value}
              onChange={(event) => {
                unit.value = event.currentTarget.value
              }}
            >
              {Object.keys(modelUnits).map((each) => (
                <option key={each} value={each}>
                  {unitNames[each] ?? each}
                </option>
              ))}
            </select>
          </label>
        )}
        <p class="so" role="status">
          {way.value === 'unit' ? (
            inRange ? (
              `Then it is ${figure(byUnit, 1)} mm high.`
            ) : (
              <b class="error">
                Then it is {Number(byUnit.toPrecision(3))} mm high; {least} to {most} mm can be planned.
              </b>
            )
          ) : (
            'error' in read && <b class="error">{read.error}</b>
          )}
        </p>
      </fieldset>
      <div class="row">
        <button type="submit" class="primary" disabled={heightMm === null}>
          Take to the Board
        </button>
      </div>
    </form>
  )
}

export const OpenModelDialog = () => {
  const { reader } = useApp()
  const state = incoming.value
  if (!state) return null
  const putAway = (): void => {
    turn++
    reader.close()
    incoming.value = null
  }
  return (
    <Dialog title="Your own model" onClose={putAway}>
      {state.kind === 'reading' && (
        <div class="row">
          <span class="grow">Reading {state.name}</span>
          <progress max="100" value={Math.round(state.fraction * 100)} aria-label="Progress of reading" />
          <button type="button" onClick={putAway}>
            Cancel
          </button>
        </div>
      )}
      {state.kind === 'refused' && (
        <>
          <p role="alert" class="error">
            {state.message}
          </p>
          <p>Nothing has been changed.</p>
        </>
      )}
      {state.kind === 'read' && <Read key={state.model.solid.id} model={state.model} />}
    </Dialog>
  )
}

/** All builds of this browser, and the way in and out through files. */
import { useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import { type Build, choicesOf, jobOf } from '../state/build'
import { agoText, counted } from '../words/figures'
import { openFile, saveBuildFile } from './actions'
import { useApp } from './context'
import { Dialog } from './Dialog'

const progressOf = (build: Build): string => {
  const glued = jobOf(build)?.glued.length ?? 0
  return glued === 0 ? 'nothing glued' : `${counted(glued, 'piece')} glued`
}

export const Builds = ({ onClose }: { onClose: () => void }) => {
  const app = useApp()
  const { workshop, catalogue } = app
  const { build, builds } = workshop
  const file = useRef<HTMLInputElement>(null)
  const doomed = useSignal<string | null>(null)
  useEffect(() => void workshop.refreshBuilds(), [])

  const nameOf = (entry: Build): string =>
    entry.name || catalogue.value.find(({ id }) => id === choicesOf(entry).solid)?.name || choicesOf(entry).solid
  const present = builds.value.filter(({ removed }) => !removed)
  const removed = builds.value.filter((entry) => entry.removed)
  return (
    <Dialog title="Builds" onClose={onClose}>
      <form
        class="row"
        onSubmit={(event) => {
          event.preventDefault()
          onClose()
        }}
      >
        <label class="grow">
          Name of this build
          <input
            type="text"
            maxLength={80}
            placeholder={nameOf({ ...build.value, name: '' })}
            value={build.value.name}
            onChange={(event) => workshop.rename(event.currentTarget.value)}
          />
        </label>
      </form>
      <div class="row">
        <button type="button" onClick={() => void saveBuildFile(app)}>
          Save this build to a file
        </button>
        <button type="button" onClick={() => file.current?.click()}>
          Open a file
        </button>
        <button
          type="button"
          onClick={() => {
            workshop.copyBuild()
            onClose()
          }}
        >
          Start a copy
        </button>
        <input
          ref={file}
          type="file"
          accept=".json,application/json"
          class="unseen"
          tabIndex={-1}
          aria-label="Plan or build file"
          data-testid="open-file"
          onChange={async (event) => {
            const input = event.currentTarget
            const chosen = input.files?.[0]
            if (chosen && (await openFile(app, chosen))) onClose()
            input.value = ''
          }}
        />
      </div>
      {app.trouble.value !== null && (
        <p role="alert" class="error">
          {app.trouble.value}
        </p>
      )}
      <ul class="builds">
        {present.map((entry) => {
          const isOpen = entry.id === build.value.id
          return (
            <li key={entry.id} class="row">
              <span class="grow">
                <b>{nameOf(entry)}</b>
                {isOpen && ' (open)'}
                <small>
                  {choicesOf(entry).heightMm} mm, {progressOf(entry)}, changed {agoText(entry.changed, Date.now())}
                </small>
              </span>
              {!isOpen && (
                <button
                  type="button"
                  onClick={() => {
                    void workshop.open(entry.id)
                    onClose()
                  }}
                >
                  Open<span class="unseen"> {nameOf(entry)}</span>
                </button>
              )}
              <button type="button" class="quiet" onClick={() => void workshop.setRemoved(entry.id, true)}>
                Put away<span class="unseen"> {nameOf(entry)}</span>
              </button>
            </li>
          )
        })}
      </ul>
      {removed.length > 0 && (
        <details>
          <summary>Put away ({removed.length})</summary>
          <ul class="builds">
            {removed.map((entry) => (
              <li key={entry.id} class="row">
                <span class="grow">
                  {nameOf(entry)}
                  <small>{progressOf(entry)}</small>
                </span>
                <button type="button" onClick={() => void workshop.setRemoved(entry.id, false)}>
                  Bring back<span class="unseen"> {nameOf(entry)}</span>
                </button>
                {doomed.value === entry.id ? (
                  <button type="button" class="danger" onClick={() => void workshop.forget(entry.id)}>
                    Yes, delete for good
                  </button>
                ) : (
                  <button
                    type="button"
                    class="quiet"
                    onClick={() => {
                      doomed.value = entry.id
                    }}
                  >
                    Delete<span class="unseen"> {nameOf(entry)}</span>
                  </button>
                )}
              </li>
            ))}
          </ul>
        </details>
      )}
    </Dialog>
  )
}

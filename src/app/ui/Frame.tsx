import { useSignal } from '@preact/signals'
import { useEffect, useRef } from 'preact/hooks'
import { type Station, stationNames, stations } from '../route'
import { Bench } from '../stations/Bench'
import { Board } from '../stations/Board'
import { Sheets } from '../stations/Sheets'
import { Shelf } from '../stations/Shelf'
import { nameOfBuild, saveBuildFile } from './actions'
import { Builds } from './Builds'
import { useApp } from './context'
import { Docket } from './Docket'
import { Help } from './Help'
import { OpenModelDialog, useDrop } from './OpenModel'
import { PlanBar } from './PlanBar'
import { usePlansToPrint } from './plans-to-print'

const screens: Record<Station, () => preact.JSX.Element> = { shelf: Shelf, board: Board, sheets: Sheets, bench: Bench }

const SaveState = () => {
  const app = useApp()
  const { keeper } = app.workshop
  const state = keeper.state.value
  if (state.kind === 'failed')
    return (
      <span class="save-state failed" role="alert">
        Not saved
      </span>
    )
  return <span class="save-state">{state.kind === 'saving' ? 'Saving' : 'Saved here'}</span>
}

const Troubles = () => {
  const app = useApp()
  const { keeper } = app.workshop
  const state = keeper.state.value
  return (
    <>
      {state.kind === 'failed' && (
        <div class="plan-bar fault" role="alert">
          <span class="grow">
            {state.message} Your work is here until you close this page. Save it to a file and open that file next time.
          </span>
          <button type="button" onClick={() => void saveBuildFile(app)}>
            Save to a file
          </button>
          <button type="button" onClick={() => void keeper.retry()}>
            Try again
          </button>
        </div>
      )}
      {app.trouble.value !== null && (
        <div class="plan-bar fault" role="alert">
          <span class="grow">{app.trouble.value}</span>
          <button
            type="button"
            onClick={() => {
              app.trouble.value = null
            }}
          >
            Put away
          </button>
        </div>
      )}
    </>
  )
}

export const Frame = () => {
  const app = useApp()
  const { router, workshop, prefs, solid } = app
  const dialog = useSignal<'builds' | 'help' | null>(null)
  const { station } = router.place.value
  const name = nameOfBuild(app)
  const main = useRef<HTMLElement>(null)
  const first = useRef(true)
  useDrop()

  useEffect(() => {
    document.title = `${stationNames[station]}, ${name}: Facetwright`
  }, [station, name])
  // Coming to another station, the keyboard starts at its top.
  useEffect(() => {
    if (!first.current) main.current?.focus({ preventScroll: true })
    first.current = false
    scrollTo(0, 0)
  }, [station])

  useEffect(() => {
    const onKey = (event: KeyboardEvent): void => {
      const target = event.target as HTMLElement
      const isTyping = target.matches(
        'input:not([type=range]):not([type=radio]):not([type=checkbox]), textarea, select',
      )
      if (isTyping || dialog.peek() !== null) return
      const isCommand = event.ctrlKey || event.metaKey
      if (isCommand && !event.altKey && event.key.toLowerCase() === 'z') {
        event.preventDefault()
        if (router.place.peek().station === 'bench') {
          if (!event.shiftKey) workshop.unglue()
        } else if (event.shiftKey) workshop.redo()
        else workshop.undo()
      } else if (!isCommand && !event.altKey && /^[1-4]$/.test(event.key) && prefs.keys.peek() === 'on')
        router.go(stations[Number(event.key) - 1]!)
    }
    addEventListener('keydown', onKey)
    return () => removeEventListener('keydown', onKey)
  }, [])

  const Screen = screens[station]
  const onBench = station === 'bench'
  const toPrint = usePlansToPrint()
  const shown = onBench ? workshop.benchPlan.value : station === 'sheets' ? toPrint.shown : workshop.planned.value
  const isOfBench = workshop.job.value !== null && shown !== null && shown.key === workshop.benchPlan.value?.key
  const whose = isOfBench && station !== 'board' ? 'of the model on the Bench' : (solid.value?.name ?? '')
  return (
    <div class="frame">
      <button type="button" class="skip" onClick={() => main.current?.focus()}>
        To the station
      </button>
      <header class="top">
        <button
          type="button"
          class="build-name"
          onClick={() => {
            dialog.value = 'builds'
          }}
        >
          <span class="unseen">Builds; open now: </span>
          {name}
        </button>
        <nav aria-label="Stations">
          {stations.map((each) => (
            <a
              key={each}
              href={`#${each}`}
              aria-current={each === station ? 'page' : undefined}
              onClick={(event) => {
                event.preventDefault()
                router.go(each)
              }}
            >
              {stationNames[each]}
            </a>
          ))}
        </nav>
        <div class="row tight ends">
          <SaveState />
          <button
            type="button"
            class="quiet"
            aria-label={prefs.isDark.value ? 'Change to light' : 'Change to dark'}
            onClick={() => {
              prefs.theme.value = prefs.isDark.peek() ? 'light' : 'dark'
            }}
          >
            {prefs.isDark.value ? 'Light' : 'Dark'}
          </button>
          <button
            type="button"
            class="quiet"
            onClick={() => {
              dialog.value = 'help'
            }}
          >
            Help
          </button>
        </div>
      </header>
      <main id="main" ref={main} tabIndex={-1} data-station={station}>
        <h1 class="unseen">
          {stationNames[station]}: {name}
        </h1>
        <Troubles />
        <PlanBar />
        <Screen />
      </main>
      <Docket shown={shown} whose={whose} />
      <div class="unseen" role="status" aria-live="polite" data-testid="spoken">
        {app.spoken.value}
      </div>
      <OpenModelDialog />
      {dialog.value === 'builds' && (
        <Builds
          onClose={() => {
            dialog.value = null
          }}
        />
      )}
      {dialog.value === 'help' && (
        <Help
          onClose={() => {
            dialog.value = null
          }}
        />
      )}
    </div>
  )
}

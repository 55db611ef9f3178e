/** What the computation is doing, or why there is no plan for the present choices; at the top of every station. */
import { useEffect, useRef } from 'preact/hooks'
import { sayChoices } from '../state/choices'
import { sayStage } from '../words/stages'
import { useApp } from './context'

export const PlanBar = () => {
  const { workshop, solid, announce } = useApp()
  const { computing, halted, planned, isFresh, wanted } = workshop
  const now = computing.value
  const stop = halted.value
  const isChiral = solid.value?.chiral ?? false
  const old = planned.value && !isFresh.value ? planned.value : null
  const oldName = old && old.choices.solid !== workshop.choices.value.solid ? `${old.plan.model.name}, ` : ''
  const since = old ? ` Shown is the plan as of ${oldName}${sayChoices(old.choices, isChiral)}.` : ''

  // Said once per stage: a screen reader must not be flooded.
  const stage = now?.stage
  useEffect(() => {
    if (stage) announce(`${sayStage(stage)}.`)
  }, [stage])
  const was = useRef(false)
  useEffect(() => {
    if (was.current && !now && isFresh.value) announce('The plan is ready.')
    if (was.current && !now && stop) announce('There is no plan for these choices.')
    was.current = now !== null
  }, [now === null])

  if (now) {
    const percent = Math.round(now.fraction * 100)
    return (
      <div class="plan-bar busy">
        <span class="grow">
          {sayStage(now.stage)}
          <span class="soft">{since}</span>
        </span>
        <progress max="100" value={percent} aria-label="Progress of this stage" />
        <span class="figures percent">{percent} %</span>
        <button type="button" onClick={() => workshop.cancel()}>
          Cancel
        </button>
      </div>
    )
  }
  if (stop?.refusal) {
    const { kind, message, details } = stop.refusal
    return (
      <div class="plan-bar fault" role="alert">
        <div class="grow">
          {kind === 'input' ? (
            `${message}${since}`
          ) : (
            <>
              The plan for these choices could not be made: a fault in the program. Undo the last choice, or try another
              height.{since}
              <details>
                <summary>Report</summary>
                <pre>
                  {JSON.stringify(stop.choices)}
                  {'\n'}
                  {message}
                  {'\n'}
                  {details}
                </pre>
              </details>
            </>
          )}
        </div>
        <button type="button" onClick={() => workshop.undo()}>
          Undo the choice
        </button>
        <button type="button" onClick={() => workshop.compute()}>
          Try again
        </button>
      </div>
    )
  }
  if (stop)
    return (
      <div class="plan-bar">
        <span class="grow">Stopped: there is no plan for the present choices.{since}</span>
        <button type="button" onClick={() => workshop.compute()}>
          Compute
        </button>
      </div>
    )
  if (old && !wanted.value)
    return (
      <div class="plan-bar">
        <span class="grow">The choices have changed.{since}</span>
        <button type="button" onClick={() => workshop.compute()}>
          Compute
        </button>
      </div>
    )
  return null
}

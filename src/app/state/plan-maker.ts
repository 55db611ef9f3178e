/** Starts, stops and starts again the computation as the choices go. */
import { batch, effect, type ReadonlySignal, type Signal, signal } from '@preact/signals'
import { Cancelled } from '../../errors'
import type { Plan, PlanChoices } from '../../plan/types'
import type { Planner, Refusal, Solid } from '../../worker'
import { sameChoices } from './choices'

export interface Computing {
  readonly choices: PlanChoices
  readonly stage: string
  /** 0..1 of the stage. */
  readonly fraction: number
}
/** Choices for which there is no plan and why; null as reason: the builder stopped it. */
export interface Halted {
  readonly choices: PlanChoices
  readonly refusal: Refusal | null
}

export interface PlanMaker {
  readonly computing: Signal<Computing | null>
  readonly halted: Signal<Halted | null>
  /** Plans are computed only when a station asks for one. */
  readonly wanted: Signal<boolean>
  /** Once more, after a stop or a refusal. */
  compute(): void
  /** The builder's wish: it does not start again by itself. */
  cancel(): void
  /** The choices have gone elsewhere. */
  stop(): void
}

interface Needs {
  readonly planner: Planner
  readonly choices: ReadonlySignal<PlanChoices>
  /** The solid itself where it is not of the catalogue. */
  readonly modelFor: (choices: PlanChoices) => Solid | null
  /** There is a plan of the present choices. */
  readonly isFresh: ReadonlySignal<boolean>
  /** Milliseconds that choices must rest before the computation starts. */
  readonly rest: number
  readonly onPlan: (plan: Plan, choices: PlanChoices) => void
}

export const createPlanMaker = ({ planner, choices, modelFor, isFresh, rest, onPlan }: Needs): PlanMaker => {
  const computing = signal<Computing | null>(null)
  const halted = signal<Halted | null>(null)
  const wanted = signal(false)

  const run = async (wish: PlanChoices): Promise<void> => {
    batch(() => {
      halted.value = null
      computing.value = { choices: wish, stage: '', fraction: 0 }
    })
    const isMine = (): boolean => computing.peek()?.choices === wish
    let refusal: Refusal | null = null
    let plan: Plan | null = null
    try {
      const answer = await planner.compute(
        wish,
        (stage, fraction) => {
          if (isMine()) computing.value = { choices: wish, stage, fraction }
        },
        modelFor(wish),
      )
      if (answer.ok) plan = answer.value
      else refusal = answer.refusal
    } catch (error) {
      // Whoever stopped it has set what there is to set.
      if (error instanceof Cancelled) return
      const message = error instanceof Error ? error.message : String(error)
      refusal = { kind: 'defect', message, place: '', details: '' }
    }
    if (!isMine()) return
    batch(() => {
      computing.value = null
      if (plan) onPlan(plan, wish)
      else halted.value = { choices: wish, refusal }
    })
  }

  const stop = (): void => {
    if (!computing.peek()) return
    computing.value = null
    planner.cancel()
  }

  let timer: ReturnType<typeof setTimeout> | undefined
  effect(() => {
    const wish = choices.value
    clearTimeout(timer)
    const running = computing.peek()
    if (running && !sameChoices(running.choices, wish)) stop()
    else if (running) return
    if (!wanted.value || isFresh.value) return
    const stopped = halted.value
    if (stopped && sameChoices(stopped.choices, wish)) return
    timer = setTimeout(() => void run(wish), rest)
  })

  return {
    computing,
    halted,
    wanted,
    stop,
    compute() {
      if (computing.peek()) return
      halted.value = null
      wanted.value = true
    },
    cancel() {
      const running = computing.peek()
      stop()
      if (running) halted.value = { choices: running.choices, refusal: null }
    },
  }
}

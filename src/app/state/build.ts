/** A build: what one builder plans and makes of one solid, as it is kept in the store. */
import type { PlanChoices } from '../../plan/types'
import type { Solid } from '../../worker'
import { sameChoices } from './choices'
import { change, type History, newHistory } from './history'
import type { Job } from './job'

/** All that undo goes back over: the choices, and the builder's own card colours (CSS hex by face kind). */
export interface Design {
  readonly choices: PlanChoices
  readonly tints: Readonly<Record<string, string>>
}

export interface Build {
  readonly id: string
  /** Given by the builder; '' for the solid's own name. */
  readonly name: string
  readonly history: History<Design>
  /** The builder's own model, where the build was begun with one; it goes wherever the build goes. */
  readonly model?: Solid
  /** The last plan that was computed; its choices may be older than `history.now`. */
  readonly planned: { readonly choices: PlanChoices; readonly planKey: string } | null
  readonly jobs: readonly Job[]
  /** The job on the Bench. */
  readonly job: string | null
  /** Milliseconds since 1970. */
  readonly created: number
  readonly changed: number
  /** Put aside by the builder; can be brought back. */
  readonly removed: boolean
  /** Counts the saves, so that two open tabs cannot overwrite each other unseen. */
  readonly revision: number
}

export const newBuild = (id: string, choices: PlanChoices, now: number, model?: Solid): Build => ({
  id,
  name: '',
  history: newHistory({ choices, tints: {} }),
  ...(model ? { model } : {}),
  planned: null,
  jobs: [],
  job: null,
  created: now,
  changed: now,
  removed: false,
  revision: 0,
})

export const choicesOf = (build: Build): PlanChoices => build.history.now.choices
/** The model that the present choices are about; null for a solid of the catalogue. */
export const modelOf = (build: Build, choices: PlanChoices): Solid | null =>
  build.model?.id === choices.solid ? build.model : null
export const jobOf = (build: Build): Job | null => build.jobs.find(({ id }) => id === build.job) ?? null

const sameDesign = (a: Design, b: Design): boolean => {
  const kinds = new Set([...Object.keys(a.tints), ...Object.keys(b.tints)])
  return sameChoices(a.choices, b.choices) && [...kinds].every((kind) => a.tints[kind] === b.tints[kind])
}

export const redesign = (build: Build, design: Partial<Design>): Build => {
  const history = change(build.history, { ...build.history.now, ...design }, sameDesign)
  return history === build.history ? build : { ...build, history }
}

export const choose = (build: Build, choices: Partial<PlanChoices>): Build =>
  redesign(build, { choices: { ...choicesOf(build), ...choices } })

/** Puts a job in the place of the one with its id, or beside the others, and on the Bench. */
export const withJob = (build: Build, job: Job): Build => ({
  ...build,
  job: job.id,
  jobs: build.jobs.some(({ id }) => id === job.id)
    ? build.jobs.map((old) => (old.id === job.id ? job : old))
    : [...build.jobs, job],
})

/** Keys of the plans that a build still needs. */
export const planKeysOf = (build: Build): string[] => [
  ...new Set([...(build.planned ? [build.planned.planKey] : []), ...build.jobs.map(({ planKey }) => planKey)]),
]

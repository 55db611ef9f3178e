/**
 * What goes to and fro between the page and its two workers; all of it plain data. No error crosses as an exception:
 * a class does not survive the way, so every answer says whether it is one.
 */
import type { Plan, PlanCheck, PlanChoices } from '../plan/types'
import type { Pixels, SceneItem } from '../preview'
import type { SolidFacts } from '../solids/types'

export type { SolidFacts } from '../solids/types'

/** Why something could not be done. */
export interface Refusal {
  /** 'input': the builder can mend it, `message` says how. 'defect': a fault of the program; 'details' is for the report. */
  readonly kind: 'input' | 'defect'
  readonly message: string
  /** The setting or element at fault, for 'input'. */
  readonly place: string
  readonly details: string
}
export type Answer<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly refusal: Refusal }

/** Fraction 0..1 of the stage. */
export type Report = (stage: string, fraction: number) => void

/** Long work; stopped by ending the worker. */
export interface PlannerApi {
  plan(choices: PlanChoices, report: Report): Answer<Plan>
}

export interface PageSummary {
  readonly title: string
  /** Id of the sheet to cut, null for a page that is only read. */
  readonly sheet: number | null
  readonly widthMm: number
  readonly heightMm: number
  /** Piece ids on the page; none on a page of text. */
  readonly pieces: readonly number[]
}

/** Short work that goes on beside the planner. */
export interface PressApi {
  catalogue(): Answer<SolidFacts[]>
  /** Ids, best match first. */
  find(query: string): Answer<string[]>
  /** The raw faces as scene items: id = face index, kind = name of the face kind. */
  faces(
    id: string,
    hand: PlanChoices['hand'],
    fill: PlanChoices['fill'],
    colours: Readonly<Record<string, string>>,
  ): Answer<SceneItem[]>
  /** A square picture of the raw faces, `size` pixels wide. */
  picture(id: string, colours: Readonly<Record<string, string>>, size: number): Answer<Pixels>
  /** Draws all pages of a plan and keeps them for `page` under this key; the four latest plans are kept. */
  pages(key: string, plan: Plan, choices: PlanChoices): Answer<PageSummary[]>
  /** A page as SVG text; null when the plan's pages are no longer kept (ask for `pages` again). */
  page(key: string, index: number): Answer<string | null>
  /** The project's own check of a plan that came from a file; a plan of another shape is refused. */
  check(plan: Plan): Answer<PlanCheck[]>
  /** The text of `plan.json`, the same bytes as the batch command writes. */
  planText(plan: Plan): Answer<string>
  pdf(plan: Plan, choices: PlanChoices): Promise<Answer<Uint8Array>>
}

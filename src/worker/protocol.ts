/**
 * What goes to and fro between the page and its two workers; all of it plain data. No error crosses as an exception:
 * a class does not survive the way, so every answer says whether it is one.
 */
import type { Plan, PlanCheck, PlanChoices } from '../plan/types'
import type { Pixels, SceneItem } from '../preview'
import type { SolidParts } from '../solids/parts'
import type { Solid, SolidFacts } from '../solids/types'
import type { VertexFigure } from '../solids/vertex-figure'

export type { SolidParts } from '../solids/parts'
export type { Solid, SolidFacts } from '../solids/types'
export type { VertexFigure } from '../solids/vertex-figure'

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

/** A builder's model as it was read from a file. */
export interface ReadModel {
  /** Repaired; its id is made of the file's name and its shape. */
  readonly solid: Solid
  /** Distance of the farthest vertex from the centre in the file's own unit. */
  readonly farthest: number
  /** What was repaired or left out, in plain sentences. */
  readonly notes: readonly string[]
}

/** Long work; stopped by ending the worker. */
export interface PlannerApi {
  /** @param model the solid itself where `choices.solid` is not of the catalogue */
  plan(choices: PlanChoices, model: Solid | null, report: Report): Answer<Plan>
  read(bytes: Uint8Array, fileName: string, report: Report): Answer<ReadModel>
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
  /** One family of the catalogue; asked for one by one, other work gets in between. Constructed once, then kept. */
  catalogue(family: SolidFacts['family']): Answer<SolidFacts[]>
  /** Whether the catalogue has this id; nothing is constructed. */
  knows(id: string): Answer<boolean>
  /**
   * Makes a builder's model known to the press, so that it can be pictured like one of the catalogue. What comes from a
   * store or a file is looked over first, and refused with a reason when it is no sound solid.
   */
  keepModel(model: unknown): Answer<SolidFacts>
  /** Ids, best match first; builders' models come last. `why`: the reason where what is asked for by its name cannot be. */
  find(query: string): Answer<{ ids: string[]; why: string | null }>
  /** The raw faces as scene items: id = face index, kind = name of the face kind; none of a model of thousands of faces. */
  faces(
    id: string,
    hand: PlanChoices['hand'],
    fill: PlanChoices['fill'],
    colours: Readonly<Record<string, string>>,
  ): Answer<SceneItem[]>
  /** Which faces belong together: by kind, by orbit, by vertex. Face indices as in `faces`. */
  parts(id: string, hand: PlanChoices['hand']): Answer<SolidParts>
  /** The vertex figures of these vertices. */
  figures(id: string, hand: PlanChoices['hand'], vertices: readonly number[]): Answer<VertexFigure[]>
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

/**
 * The plan file, format "facetwright-plan" version 1: millimetres and degrees. Field names are fixed so that others can
 * read it; `schema.ts` beside this file states the same as a JSON Schema.
 */
export type Point2 = [number, number]
export type Point3 = [number, number, number]

export interface PlanModel {
  id: string
  name: string
  hand: 'none' | 'left' | 'right'
  edgeMm: number
  /** Diameter of the sphere through the solid's vertices. */
  heightMm: number
  fill: 'nonzero' | 'evenodd'
  /** How far points may be off their places and off the planes of their panels; only for models read from files, whose coordinates are rounded. */
  offPlaneMm?: number
}
export interface PlanPanel {
  id: number
  /** Outward, unit length. */
  normal: Point3
  /** Outer ring counter-clockwise seen from outside, then holes clockwise. */
  rings: Point3[][]
  /** Face indices of the solid. */
  faces: number[]
  /** Name of the colour: the face kind (`triangle`, `pentagram` …). */
  colour: string
  areaMm2: number
  body: number
}
export interface PlanCrease {
  id: number
  /** The ring of the first panel runs ends[0] → ends[1], that of the second the other way. */
  panels: [number, number]
  ends: [Point3, Point3]
  innerAngle: number
  join: 'fold' | 'seam'
  contact: 'surface' | 'line'
  /** Seams only. */
  label?: string
}
export interface PlanTab {
  crease: number
  panel: number
  kind: 'single' | 'paired' | 'strip'
  outline: Point2[]
}
export interface PlanPiece {
  id: number
  /** Number in gluing order, with its hand when it has one: `12` or `12 left`. */
  label: string
  template: string
  hand: 'none' | 'left' | 'right'
  /** Colour name, `mixed` when panels of several colours hang together (one card for all). */
  colour: string
  /** 1-based gluing step. */
  step: number
  /** Rings: same points in the same order as the panel's, (u, v) mm seen from outside, v up. */
  panels: { panel: number; rings: Point2[][] }[]
  folds: number[]
  /** The cut line round the net, tabs included, counter-clockwise; holes of panels are in their rings. */
  outline: Point2[]
  tabs: PlanTab[]
}
/** Piece plane to sheet: mirror u if `mirrored`, rotate counter-clockwise by `rotation` degrees, then add (x, y). */
export interface Placement {
  piece: number
  x: number
  y: number
  rotation: number
  mirrored: boolean
}
export interface PlanSheet {
  id: number
  /** `a4` or `letter`. */
  paper: string
  /** Size of the card, origin bottom left, y up. */
  widthMm: number
  heightMm: number
  marginMm: number
  /** E.g. `160 g/m²`. */
  card: string
  /** Colour name, or `all` with one card for all. */
  colour: string
  placed: Placement[]
}
export interface PlanStep {
  step: number
  piece: number
  /** Seams closed in this step (crease ids). */
  seams: number[]
  note: string
}
export interface PlanCheck {
  name: string
  ok: boolean
  detail: string
}
/** A place where bodies touch without a crease on the surface. */
export interface PlanContact {
  kind: 'line' | 'point'
  /** The two ends of the stretch, or the one point. */
  ends: Point3[]
  lengthMm: number
  bodies: number[]
  /**
   * What holds there: a fold or a glued seam that carries the skin across, a strip or a gusset to be put in, or nothing
   * (each body closes by itself and is held elsewhere).
   */
  held: 'fold' | 'seam' | 'strip' | 'gusset' | 'apart'
}
/** A part of the model that no crease joins to the rest. */
export interface PlanPart {
  bodies: number[]
  pieces: number[]
  /** What joins it to the parts before it; `apart`: it touches none of them. */
  joint: 'first' | 'strip' | 'gusset' | 'apart'
}
/** Slivers closed up: stretches too short to cut or glue, drawn together within the card's tolerance. */
export interface PlanClosed {
  belowMm: number
  stretches: number
  /** Panels that went with them. */
  panels: number
  /** How far the farthest point moved. */
  movedMm: number
  /** How far points may be off the planes of their panels since. */
  offPlaneMm: number
}
export interface PlanDocket {
  panels: number
  pieces: number
  templates: number
  seams: number
  bodies: number
  /** Stretches that are held only along a line. */
  lineContacts: number
  /** Where bodies touch, with what holds there; missing in plans of before. */
  contacts?: PlanContact[]
  /** What is built separately; empty when the model is one part, missing in plans of before. */
  parts?: PlanPart[]
  /** What was closed up, if anything; missing when every stretch is as the solid has it. */
  closed?: PlanClosed
  sheets: number
  /** All sheets, margins included. */
  cardAreaMm2: number
  /** Panels and tabs. */
  netAreaMm2: number
  utilisation: number
  cutMm: number
  scoreMm: number
  glueMm: number
  hours: { cut: number; score: number; fold: number; glue: number; handling: number; total: number }
  tightest: { panel: number; widthMm: number }
  sharpestInnerAngle: number
  /** Crease ids of seams that carry no tab. */
  buttSeams: number[]
  checks: PlanCheck[]
}
export interface Plan {
  format: 'facetwright-plan'
  version: 1
  model: PlanModel
  panels: PlanPanel[]
  creases: PlanCrease[]
  pieces: PlanPiece[]
  sheets: PlanSheet[]
  steps: PlanStep[]
  docket: PlanDocket
}

/** What the builder decides; everything else follows from it, to the last byte. */
export interface PlanChoices {
  solid: string
  hand: 'left' | 'right'
  fill: 'nonzero' | 'evenodd'
  heightMm: number
  paper: 'a4' | 'letter'
  /** Which side of the card is printed: outside of the model, or inside (then sheets are mirror images). */
  side: 'outside' | 'inside'
  /** One card for all, or a sheet set per face kind (then pieces hold one kind only). */
  colours: 'one' | 'kind'
  marginMm: number
  /** Between outlines on a sheet. */
  gapMm: number
  grammage: number
  /**
   * How the skin is cut up: as few pieces as the sheet allows (the default), as few templates as possible, spikes and pits
   * as units, or one panel a piece.
   */
  nets?: 'fewest' | 'repeat' | 'modules' | 'single'
  /** Stretches shorter than this are closed up, mm; 0 or missing: none. */
  closeBelowMm?: number
}

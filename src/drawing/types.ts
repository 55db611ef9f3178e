/**
 * A page as a list of neutral marks, in mm, origin bottom left, y up. Writers turn them into bytes and decide nothing but
 * pens. Every mark says where it came from, so that what is pointed at on a page leads back to piece, panel and crease.
 */
import type { Vec2 } from '../geometry/vec2'

/** Where a mark came from, as far as it has a source. */
export interface Source {
  readonly piece?: number
  readonly panel?: number
  readonly crease?: number
}

/** `level`: a fold of exactly 180 degrees, where only the colour changes. `rule`: bars, ticks and boxes. */
export type LineKind = 'cut' | 'mountain' | 'valley' | 'level' | 'rule' | 'leader'

export interface LineMark extends Source {
  readonly type: 'line'
  readonly kind: LineKind
  readonly points: readonly Vec2[]
  readonly closed: boolean
}

export type TextRole = 'pieceLabel' | 'seamLabel' | 'heading' | 'body' | 'furniture'

export interface TextMark extends Source {
  readonly type: 'text'
  readonly role: TextRole
  readonly text: string
  /** Middle of the text's height; along it: start, middle or end, by `anchor`. */
  readonly at: Vec2
  readonly anchor: 'start' | 'middle' | 'end'
  readonly sizePt: number
  /** Degrees counter-clockwise. */
  readonly rotation: number
  readonly bold: boolean
}

/** A region that is not printed: the piece's panels and tabs, for pointing at. */
export interface AreaMark extends Source {
  readonly type: 'area'
  readonly rings: readonly (readonly Vec2[])[]
}

export type Mark = LineMark | TextMark | AreaMark

export interface DrawingPage {
  readonly title: string
  readonly widthMm: number
  readonly heightMm: number
  /** Sheet id, or null for pages that are read and not cut. */
  readonly sheet: number | null
  readonly pieces: readonly number[]
  readonly marks: readonly Mark[]
}

/** What the readers of the three formats hand on: the file as it stands, nothing repaired yet. */
import type { Solid } from '../solids/types'

export type ModelFormat = 'OBJ' | 'STL' | 'PLY'

/** How the file writes its coordinates; it decides how far they may be off. */
export type NumberForm = 'text' | 'float32' | 'float64' | 'integer'

export interface RawFace {
  /** Indices of vertices, in the file's order, at least three; may repeat a corner. */
  readonly cycle: readonly number[]
  /** Line (from 1) or byte (from 0) where the face stands. */
  readonly at: number
  /** Material or colour; null where the file says none. */
  readonly material: string | null
}

export interface RawModel {
  readonly format: ModelFormat
  /** Whether `RawFace.at` is a byte rather than a line. */
  readonly binary: boolean
  /** x, y, z of each vertex in file units; all finite. */
  readonly coordinates: readonly number[]
  readonly faces: readonly RawFace[]
  readonly numbers: NumberForm
  /** Most significant digits of any coordinate, for `text` and `integer`. */
  readonly digits: number
  /** What the reader left out, in plain sentences. */
  readonly notes: readonly string[]
}

/** A model that a builder brings. */
export interface Model {
  /**
   * Family `own`; centred at the centre of the least sphere round its vertices, the farthest vertex at distance 1.
   * `precision` is set.
   */
  readonly solid: Solid
  readonly format: ModelFormat
  /** Distance of the farthest vertex from the centre, in the file's own unit. */
  readonly farthest: number
  /** What was repaired, joined or left out, in plain sentences; empty when nothing was. */
  readonly notes: readonly string[]
  /** By face of the solid: where it stands in the file, e.g. `line 12` or `face 3, byte 184`. */
  readonly places: readonly string[]
}

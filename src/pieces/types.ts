import type { Motion2, Ring2, Vec2 } from '../geometry/vec2'

/** A panel as a flat polygon in mm, seen from outside; same points in the same order as on the skin. */
export interface FlatPanel {
  readonly panel: number
  readonly rings: readonly Ring2[]
}

/** A net: panels laid flat and joined by folds. Coordinates in mm, seen from outside. */
export interface Piece {
  readonly id: number
  /** Rings in the piece's plane. */
  readonly panels: readonly FlatPanel[]
  /** How each panel came to lie: from its own frame (`flattenPanels`) to the piece's plane; same order as `panels`. */
  readonly motions: readonly Motion2[]
  /** Crease ids; a spanning tree of `panels`. */
  readonly folds: readonly number[]
  /**
   * Pieces with the same template are congruent by rotation, panels and folds with their inner angles; tabs and colours
   * do not count. Their nets then have the same coordinates.
   */
  readonly template: number
  /** 'none' when the net is its own mirror image; nets that are mirror images of each other get opposite hands. */
  readonly hand: 'none' | 'left' | 'right'
  /** Face kind of the panels, −1 when there are several. */
  readonly kind: number
}

export interface Tab {
  readonly crease: number
  /** The panel that carries it. */
  readonly panel: number
  readonly kind: 'single' | 'paired' | 'strip'
  /** In the piece's plane, mm; counter-clockwise; begins on the crease, the first two points are its root. */
  readonly outline: readonly Vec2[]
}

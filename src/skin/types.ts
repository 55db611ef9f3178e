import type { Vec3 } from '../geometry/vec3'
import type { FillRule, SolidHand } from '../solids/types'

/**
 * One flat region of the skin, seen from one side. Ring vertices are indices into `Skin.points`; the outer ring runs
 * counter-clockwise seen from outside, holes clockwise. Rings are simple; a ring has a vertex wherever a crease ends,
 * so ring edge i (from vertex i to i+1) belongs to exactly one crease, `creases[r][i]`.
 */
export interface SkinPanel {
  readonly id: number
  /** Unit outward normal. */
  readonly normal: Vec3
  readonly rings: readonly (readonly number[])[]
  /** Same shape as `rings`: crease id of each ring edge. */
  readonly creases: readonly (readonly number[])[]
  /** Faces of the solid whose filled region covers some of this panel. */
  readonly faces: readonly number[]
  /** Face kind that gives the colour (index into `Solid.kinds`). */
  readonly kind: number
  /** Panels that rotations carry onto each other share this number. */
  readonly orbit: number
  /** In edge². */
  readonly area: number
  readonly body: number
}

/**
 * One straight stretch shared by exactly two panels. `ends` run so that panel `panels[0]` lies to the left, seen from
 * outside (its ring goes ends[0] → ends[1]); the ring of `panels[1]` goes the other way.
 */
export interface SkinCrease {
  readonly id: number
  readonly panels: readonly [number, number]
  /** Indices into `Skin.points`. */
  readonly ends: readonly [number, number]
  /** Degrees through the card side: under 180 mountain, over 180 valley. */
  readonly innerAngle: number
  readonly contact: 'surface' | 'line'
  /** Index into `Skin.contacts` for contact 'line', else -1. */
  readonly stretch: number
  readonly length: number
}

/** A stretch where the outside occurs more than once. */
export interface LineContact {
  readonly ends: readonly [number, number]
  readonly length: number
  /** How its panels are joined: 'inside' closes each body by itself, 'outside' carries the skin across. */
  readonly pairing: 'inside' | 'outside'
  /** Panels around it, in order of angle. */
  readonly panels: readonly number[]
  readonly bodies: readonly number[]
}

/**
 * A place where bodies touch that no crease tells of: at one point, or along an edge that lies on the middle of a panel.
 * Nothing holds there unless a gusset or a strip is put in.
 */
export interface Touch {
  readonly kind: 'point' | 'line'
  /** One point, or the two ends of a stretch. */
  readonly ends: readonly Vec3[]
  readonly length: number
  readonly bodies: readonly number[]
  readonly panels: readonly number[]
}

/** The boundary of the unbounded outside. Lengths in unit edges. */
export interface Skin {
  readonly solid: string
  readonly hand: SolidHand
  readonly fill: FillRule
  /** How far points may be off the planes of their panels; 0 for constructed solids. */
  readonly slack: number
  readonly points: readonly Vec3[]
  readonly panels: readonly SkinPanel[]
  readonly creases: readonly SkinCrease[]
  readonly contacts: readonly LineContact[]
  /** Where bodies touch besides. */
  readonly touches: readonly Touch[]
  /** Closed parts with every line contact paired through the inside. */
  readonly bodies: number
  /** Connected parts with the pairing chosen in `contacts`: 1 when the model can be built as one thing. */
  readonly parts: number
  readonly lineContactLength: number
  readonly area: number
  /** Volume enclosed by the skin. */
  readonly volume: number
}

/** A polyhedron fresh from its construction, before kinds, orbits and facts are known. */
import type { Vec3 } from '../geometry/vec3'

export interface RawFace {
  /** Vertex indices along the polygon's edges. */
  readonly cycle: readonly number[]
  /** Density of a regular polygon; 1 for irregular ones. */
  readonly d: number
  /** English name of an irregular polygon; missing for regular ones. */
  readonly shape?: string
}

/** Centred at the origin; no two vertices are the same point. */
export interface RawSolid {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly RawFace[]
  /** By face: its component. Missing = one component. */
  readonly components?: readonly number[]
}

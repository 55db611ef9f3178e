/**
 * Tolerances of the skin, in unit edges. With coordinates good to 1e-12, two different vertices of the face-plane
 * arrangements of the uniform polyhedra are never closer than about 3e-5, while equal ones agree to about 1e-12. One
 * merging tolerance inside that gap is safe, and `SnapGrid` throws on any pair between the two bounds.
 */
export interface Tolerance {
  /** Points this close are one point. */
  readonly merge: number
  /** Points nearer than this, yet farther than `merge`, are an error. */
  readonly gap: number
  /** Side of the hash cells that look for equal points. */
  readonly cell: number
  /** How far a point may be from a plane or line and still lie on it. */
  readonly on: number
}

/** For the solids of the catalogue. */
export const catalogueTolerance: Tolerance = { merge: 1e-8, gap: 1e-5, cell: 2e-3, on: 1e-8 }

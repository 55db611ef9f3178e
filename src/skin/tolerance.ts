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

/** For the solids that are constructed. */
export const catalogueTolerance: Tolerance = { merge: 1e-8, gap: 1e-5, cell: 2e-3, on: 1e-8 }

/**
 * Tolerances to be tried for a builder's model, in this order, until the skin keeps its promises. Such a model makes no
 * promise about its smallest feature, so there is no gap to assert; where features come too near to the precision of
 * the coordinates, a wider or a narrower bound often tells them apart.
 * @param precision see `Solid.precision`
 */
export const roughTolerances = (precision: number): Tolerance[] =>
  [1, 4, 16, 0.25].map((factor) => {
    const on = 2 * Math.max(1e-10, precision * factor)
    // A point may be off its plane on two faces at once, and the planes may meet aslant.
    const merge = 4 * on
    return { on, merge, gap: merge, cell: Math.max(2e-3, 8 * merge) }
  })

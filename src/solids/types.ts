import type { Mat3, Vec3 } from '../geometry/vec3'

/** A regular face polygon {n/d}; d is 1 for convex ones. */
export interface FaceKind {
  /** Position in `Solid.kinds`; also the colour index of its panels. */
  readonly id: number
  /** Plain English: triangle, square, pentagram, decagram … */
  readonly name: string
  readonly n: number
  /** Density of the polygon as drawn in its plane, 1 ≤ d < n/2 (retrograde ones are told in the vertex configuration). */
  readonly d: number
  readonly count: number
}

export interface SolidFace {
  /** Vertex indices in cyclic order along the polygon's edges: a star polygon steps over its neighbours. */
  readonly cycle: readonly number[]
  /** Index into `Solid.kinds`. */
  readonly kind: number
  /** Index of the orbit under the rotation group; faces of one kind may fall into several. */
  readonly orbit: number
}

export type SolidHand = 'none' | 'left' | 'right'

/**
 * What goes into the skin. Unit edge for the catalogue's solids, centred at the origin.
 * `rotations` are the proper rotations that map the set of faces onto itself (identity included, always at least that);
 * the skin uses them to cut one face plane per orbit only.
 */
export interface Solid {
  readonly id: string
  readonly name: string
  readonly hand: SolidHand
  readonly vertices: readonly Vec3[]
  readonly faces: readonly SolidFace[]
  readonly kinds: readonly FaceKind[]
  readonly rotations: readonly Mat3[]
  /** Missing: uniform. */
  readonly family?: Family
  /** Face → component, for compounds and models of several components; missing: one component. */
  readonly components?: readonly number[]
  /** How far coordinates may be off, in the solid's own unit, for models read from files; missing: constructed to 1e-12. */
  readonly precision?: number
}

export type Family = 'uniform' | 'prism' | 'antiprism' | 'dual' | 'compound' | 'own'

export type FillRule = 'nonzero' | 'evenodd'

/** The catalogue's facts about a solid; `density` is null where none is defined. */
export interface SolidFacts {
  readonly id: string
  /** 1 to 75 in the usual order of the uniform polyhedra. */
  readonly index: number
  readonly name: string
  readonly wythoff: string
  /** E.g. `3.4.3/2.4` or `(3.3.3.3.5/2)/2`; retrograde faces have n/d with d > n/2. */
  readonly vertexConfiguration: string
  readonly vertices: number
  readonly edges: number
  readonly faces: number
  readonly facesByKind: readonly FaceKind[]
  readonly euler: number
  readonly density: number | null
  readonly chiral: boolean
  readonly orientable: boolean
  /** Schoenflies symbol: T_d, O_h, I_h, O, I. */
  readonly symmetry: string
  /** For unit edge. */
  readonly circumradius: number
  /** Each pair of face kinds that shares an edge, with the angle between them in degrees (0 to 180). */
  readonly dihedralAngles: readonly { readonly kinds: readonly [number, number]; readonly degrees: number }[]
}

import type { Mat3, Vec3 } from '../geometry/vec3'

/**
 * One sort of face. Regular ones are told by {n/d}; irregular ones (of duals and own models) by their shape, one kind for
 * all that are congruent under the full symmetry group.
 */
export interface FaceKind {
  /** Position in `Solid.kinds`; also the colour index of its panels. */
  readonly id: number
  /** Plain English: triangle, square, pentagram, decagram, kite, dart … */
  readonly name: string
  /** Corners; 0 where faces of one kind differ in them (own models only). */
  readonly n: number
  /**
   * Density of the polygon as drawn in its plane, 1 ≤ d < n/2 (retrograde ones are told in the vertex configuration). 1 for
   * every irregular kind, whatever its cycle does.
   */
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

/** Where a solid comes from. `own`: read from a builder's file. */
export type SolidFamily = 'uniform' | 'prism' | 'antiprism' | 'dual' | 'compound' | 'own'

/**
 * What goes into the skin. Centred at the origin; unit edge, but for the duals, which are reciprocal to a solid of unit edge
 * about the sphere that its edges touch, and for own models, whose farthest vertex is at distance 1.
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

/** The catalogue's facts about a solid; null where something is not defined. */
export interface SolidFacts {
  readonly id: string
  /** 1 to 75 in the usual order of the uniform polyhedra; null outside the 75. */
  readonly index: number | null
  readonly family: SolidFamily
  readonly name: string
  /** Empty where there is none (duals, compounds). */
  readonly wythoff: string
  /**
   * E.g. `3.4.3/2.4` or `(3.3.3.3.5/2)/2`; retrograde faces have n/d with d > n/2. A dual has the configuration of its
   * original with a V before it (`V3.6.6`: how many edges meet at the corners of a face, in turn). Empty for compounds.
   */
  readonly vertexConfiguration: string
  /** Different points; where vertices coincide, `notes` says so. */
  readonly vertices: number
  readonly edges: number
  readonly faces: number
  readonly facesByKind: readonly FaceKind[]
  /** Vertices that coincide count each for itself here. Null for compounds. */
  readonly euler: number | null
  /** Null where a face passes through the centre, where the surface cannot be oriented, and for compounds. */
  readonly density: number | null
  readonly chiral: boolean
  readonly orientable: boolean
  /** Schoenflies symbol: T_d, O_h, I_h, O, I, and D_nh, D_nd with the number in place of n. */
  readonly symmetry: string
  /** Distance of the farthest vertex from the centre, for unit edge (of a dual: of its original). */
  readonly circumradius: number
  /** Id of the dual in the catalogue; null where there is none or it is not listed. */
  readonly dual: string | null
  /** Components of a compound; 1 for all others. */
  readonly components: number
  /** What else there is to know, in plain sentences. */
  readonly notes: readonly string[]
  /** Each pair of face kinds that shares an edge, with the angle between them in degrees (0 to 180). */
  readonly dihedralAngles: readonly { readonly kinds: readonly [number, number]; readonly degrees: number }[]
}

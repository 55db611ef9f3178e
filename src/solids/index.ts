/**
 * The catalogue of solids: the 75 uniform polyhedra, prisms and antiprisms, duals of the 75, and regular compounds.
 * Importing it constructs nothing; a solid and its facts are constructed when they are first asked for, and kept.
 *
 * For a shelf: `families` and `listNames` cost nothing, `listFamily` constructs one family, `listSolids` all.
 */
import { InputError } from '../errors'
import { catalogue, refusalOf } from './catalogue'
import { nearest, search } from './search'
import { mirrorSolid } from './transform'
import type { Solid, SolidFacts, SolidFamily } from './types'

export { mirrorSolid, transformSolid } from './transform'
export type { FaceKind, FillRule, Solid, SolidFace, SolidFacts, SolidFamily, SolidHand } from './types'
export { validateSolid } from './validate'

const byId = new Map(catalogue.map((e) => [e.id, e]))

/** What is known of a solid without constructing it. */
export interface SolidName {
  readonly id: string
  readonly name: string
  readonly family: SolidFamily
  /** 1 to 75 for the uniform polyhedra, else null. */
  readonly index: number | null
}

/** Names of all solids, in the order of `listSolids`. Constructs nothing. */
export const listNames = (): readonly SolidName[] =>
  catalogue.map(({ id, name, family, index }) => ({ id, name, family, index }))

export interface FamilyGroup {
  readonly family: SolidFamily
  /** What to call the group: `uniform polyhedra`, `prisms`, … */
  readonly name: string
  readonly count: number
}

const familyNames: readonly (readonly [SolidFamily, string])[] = [
  ['uniform', 'uniform polyhedra'],
  ['prism', 'prisms'],
  ['antiprism', 'antiprisms'],
  ['dual', 'duals'],
  ['compound', 'regular compounds'],
]

/** The families in the order of `listSolids`, with their counts. Constructs nothing; `own` is not among them. */
export const families = (): readonly FamilyGroup[] =>
  familyNames.map(([family, name]) => ({ family, name, count: catalogue.filter((e) => e.family === family).length }))

/** Family of a solid of the catalogue, or undefined. Constructs nothing. */
export const familyOf = (id: string): SolidFamily | undefined => byId.get(id)?.family

/** All solids: the 75 in index order, prisms, antiprisms (by corners, then density), duals (as their originals), compounds. */
export const listSolids = (): readonly SolidFacts[] => catalogue.map((e) => e.facts())

/** The solids of one family, in the order of `listSolids`; the 75 are `uniform`. */
export const listFamily = (family: SolidFamily): readonly SolidFacts[] =>
  catalogue.filter((e) => e.family === family).map((e) => e.facts())

/** Facts of one solid, or undefined. */
export const solidFacts = (id: string): SolidFacts | undefined => byId.get(id)?.facts()

/**
 * By name or part of it, index 1 to 75, vertex configuration (of a dual with V before it), or Wythoff symbol. An empty query
 * finds all. Best matches first, then in the order of `listSolids`. A query by name constructs only what it finds.
 */
export const findSolids = (query: string): SolidFacts[] => search(catalogue, query).map((e) => e.facts())

/** The `count` ids most like a misspelt one. */
export const nearestIds = (text: string, count = 3): string[] => nearest([...byId.keys()], text, count)

/**
 * Why a solid is left out of the catalogue although it has a name: the duals of solids with faces through the centre have
 * vertices at infinity. Null for every other id.
 */
export const whyNot = (id: string): string | null => (byId.has(id) ? null : refusalOf(id))

/**
 * Constructs a solid, centred at the origin. Unit edge; a dual is reciprocal to its original of unit edge about the sphere
 * that touches the edges of both.
 *
 * @param hand of a chiral solid: `right` is the form that Wythoff's construction gives with the corners of the Schwarz
 *   triangle counter-clockwise seen from outside, `left` its mirror image. A dual has the hand of its original. Of the
 *   compound of five tetrahedra, see `compounds.ts`. Other solids have hand `none` whatever is asked.
 * @throws InputError for an unknown id, naming the nearest ones, and for a dual with vertices at infinity, with that reason
 */
export const buildSolid = (id: string, hand: 'left' | 'right' = 'right'): Solid => {
  const entry = byId.get(id)
  if (!entry) {
    const why = refusalOf(id) ?? `There is no solid "${id}". Nearest: ${nearestIds(id).join(', ')}.`
    throw new InputError(why, 'solid')
  }
  const { solid } = entry.built()
  return solid.hand === 'right' && hand === 'left' ? mirrorSolid(solid) : solid
}

/**
 * The catalogue of solids. Each entry knows how to construct itself; nothing but names and Wythoff symbols is stored.
 */
import { InputError } from '../errors'
import { type Built, buildFrom } from './build'
import { factsOf } from './facts'
import { uniformNames } from './names'
import { nearest, search } from './search'
import { mirrorSolid } from './transform'
import type { Solid, SolidFacts, SolidFamily } from './types'
import { constructWythoff } from './wythoff'

export { mirrorSolid, transformSolid } from './transform'
export type { FaceKind, FillRule, Solid, SolidFace, SolidFacts, SolidFamily, SolidHand } from './types'
export { validateSolid } from './validate'

/** One solid of the catalogue. */
interface Entry {
  readonly id: string
  /** Constructed at the first call, then kept. */
  readonly built: () => Built
  readonly facts: () => SolidFacts
}

const lazily = <T>(make: () => T): (() => T) => {
  let value: { made: T } | null = null
  return () => {
    value ??= { made: make() }
    return value.made
  }
}

const catalogue: readonly Entry[] = uniformNames.map(([name, wythoff], i) => {
  const id = name.replaceAll(' ', '-')
  const built = lazily(() => buildFrom(constructWythoff(wythoff), id, name))
  return { id, built, facts: lazily(() => factsOf(built(), i + 1, wythoff)) }
})

const byId = new Map(catalogue.map((e) => [e.id, e]))

/** All solids, in index order. */
export const listSolids = (): readonly SolidFacts[] => catalogue.map((e) => e.facts())

/** The solids of one family, in the order of `listSolids`; the 75 are `uniform`. Constructs no other family. */
export const listFamily = (family: SolidFamily): readonly SolidFacts[] => (family === 'uniform' ? listSolids() : [])

/** Facts of one solid, or undefined. */
export const solidFacts = (id: string): SolidFacts | undefined => byId.get(id)?.facts()

/** By name or part of it, index 1 to 75, vertex configuration, or Wythoff symbol. An empty query finds all. */
export const findSolids = (query: string): SolidFacts[] => search(listSolids(), query)

/** The `count` ids most like a misspelt one. */
export const nearestIds = (text: string, count = 3): string[] => nearest([...byId.keys()], text, count)

/**
 * Constructs a solid: unit edge, centred at the origin.
 *
 * @param hand of a chiral solid: `right` is the form that Wythoff's construction gives with the corners of the Schwarz
 *   triangle counter-clockwise seen from outside, `left` its mirror image. Other solids have hand `none` whatever is asked.
 * @throws InputError for an unknown id, naming the nearest ones
 */
export const buildSolid = (id: string, hand: 'left' | 'right' = 'right'): Solid => {
  const entry = byId.get(id)
  if (!entry) throw new InputError(`There is no solid "${id}". Nearest: ${nearestIds(id).join(', ')}.`, 'solid')
  const { solid } = entry.built()
  return solid.hand === 'right' && hand === 'left' ? mirrorSolid(solid) : solid
}

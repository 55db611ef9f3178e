/** The entries of the catalogue, family by family. Each knows how to construct itself; nothing but names is stored. */
import { BrokenPromise } from '../errors'
import { type Built, buildFrom } from './build'
import { compoundNames } from './compounds'
import { dualNames } from './dual-names'
import { centralFaces, dualSolid, midradius, reciprocate } from './duals'
import { edgesOf } from './edges'
import { factsOf } from './facts'
import { uniformNames } from './names'
import { antiprismNames, constructAntiprism, constructPrism, type PrismName, prismNames } from './prisms'
import type { RawSolid } from './raw'
import type { SolidFacts, SolidFamily } from './types'
import { configurationText, vertexConfiguration } from './vertex-configuration'
import { constructWythoff } from './wythoff'

/** One solid of the catalogue. */
export interface Entry {
  readonly id: string
  readonly name: string
  readonly family: SolidFamily
  readonly index: number | null
  readonly wythoff: string
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

/** `great icosahedron` → `great-icosahedron`, `heptagrammic 7/3 prism` → `heptagrammic-7-3-prism`. */
const idOf = (name: string): string => name.replaceAll(/[ /]/g, '-')

const uniforms: readonly Entry[] = uniformNames.map(([name, wythoff], i) => {
  const id = idOf(name)
  const dual = dualNames[i]!
  const bounded = dual.is !== 'infinite'
  const built = lazily(() => buildFrom(constructWythoff(wythoff), { id, name, family: 'uniform' }))
  const notes = bounded ? [] : ['Faces pass through the centre, so its dual has vertices at infinity.']
  const about = { index: i + 1, wythoff, dual: bounded ? idOf(dual.name) : null, notes }
  return { id, name, family: 'uniform', index: i + 1, wythoff, built, facts: lazily(() => factsOf(built(), about)) }
})

const prismatic = (
  family: 'prism' | 'antiprism',
  { name, wythoff, n, d }: PrismName,
  construct: (n: number, d: number) => RawSolid,
): Entry => {
  const id = idOf(name)
  const built = lazily(() => buildFrom(construct(n, d), { id, name, family }))
  const about = { index: null, wythoff, dual: null, notes: [] }
  return { id, name, family, index: null, wythoff, built, facts: lazily(() => factsOf(built(), about)) }
}

const duals: readonly Entry[] = dualNames.flatMap(({ original, name, is }, i): Entry[] => {
  if (is !== 'listed') return []
  const id = idOf(name)
  const from = uniforms[i]!
  const made = lazily(() => {
    const { solid, isometries } = from.built()
    const { raw, coincident } = dualSolid(reciprocate(solid, midradius(solid)))
    return { coincident, built: buildFrom(raw, { id, name, family: 'dual' }, isometries) }
  })
  const facts = lazily(() => {
    const { built, coincident } = made()
    const { solid } = from.built()
    const euler = solid.vertices.length - edgesOf(solid).length + solid.faces.length
    const configuration = configurationText(vertexConfiguration(solid, 0))
    const merged = [...coincident].map(([times, points]) => coincidenceNote(times, points, solid.faces.length))
    const notes = [`Dual of the ${original}.`, ...merged]
    return factsOf(built, { index: null, wythoff: '', dual: from.id, notes, original: { configuration, euler } })
  })
  return [{ id, name, family: 'dual', index: null, wythoff: '', built: () => made().built, facts }]
})

const coincidenceNote = (times: number, points: number, all: number): string =>
  `At ${points} points ${times} vertices coincide (${all} vertices if each counts for itself).`

const compounds: readonly Entry[] = compoundNames.map(({ name, construct, notes }) => {
  const id = idOf(name)
  const built = lazily(() => buildFrom(construct(), { id, name, family: 'compound' }))
  const about = { index: null, wythoff: '', dual: null, notes }
  const facts = lazily(() => factsOf(built(), about))
  return { id, name, family: 'compound', index: null, wythoff: '', built, facts }
})

/** The 75, prisms, antiprisms, duals, compounds. Making this list constructs nothing. */
export const catalogue: readonly Entry[] = [
  ...uniforms,
  ...prismNames.map((name) => prismatic('prism', name, constructPrism)),
  ...antiprismNames.map((name) => prismatic('antiprism', name, constructAntiprism)),
  ...duals,
  ...compounds,
]

/**
 * Why a solid that a builder may ask for is not in the catalogue; null if there is no such reason.
 * @throws BrokenPromise when the reason does not hold
 */
export const refusalOf = (id: string): string | null => {
  const i = dualNames.findIndex(({ name, is }) => is === 'infinite' && idOf(name) === id)
  if (i < 0) return null
  const { original, name } = dualNames[i]!
  const { solid } = uniforms[i]!.built()
  const central = centralFaces(solid)
  if (central === 0) throw new BrokenPromise('No face passes through the centre.', { original })
  const of = central === solid.faces.length ? `all ${central}` : `${central} of the ${solid.faces.length}`
  return (
    `The ${name} cannot be built: ${of} faces of its dual, the ${original}, pass through the centre, ` +
    'so it has vertices at infinity. Choose another solid.'
  )
}

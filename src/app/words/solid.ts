/** Facts of a solid as the Shelf says them. */
import type { SolidFacts } from '../../worker'
import type { KnownFacts } from '../storage/types'
import { heightForWidth, narrowest } from './craft'
import { counted, figure, hoursText, listed, plural } from './figures'

const symmetryWords: Readonly<Record<string, string>> = {
  T_d: 'full tetrahedral',
  T: 'tetrahedral, rotations only',
  O_h: 'full octahedral',
  O: 'octahedral, rotations only',
  I_h: 'full icosahedral',
  I: 'icosahedral, rotations only',
}

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

export const saySymmetry = (symbol: string): string => {
  const axis = /^D_(\d+)([hd])$/.exec(symbol)
  if (axis)
    return `${axis[1]}-fold about one axis, ${axis[2] === 'h' ? 'top and bottom alike' : 'top and bottom turned'} (${symbol})`
  return symmetryWords[symbol] ? `${symmetryWords[symbol]} (${symbol})` : symbol
}

/** Groups of the Shelf, as they stand in lists. */
export const familyWords: Readonly<Record<SolidFacts['family'], string>> = {
  uniform: 'uniform',
  prism: 'prisms',
  antiprism: 'antiprisms',
  dual: 'duals',
  compound: 'compounds',
  own: 'own models',
}

export const sayFaces = ({ facesByKind }: SolidFacts): string =>
  listed(facesByKind.map(({ name, count }) => counted(count, name, plural(name))))

/** A name that may be broken between its roots, where a narrow card needs it (soft hyphens). */
export const breakable = (name: string): string =>
  name.replace(
    /(icosi|icosa|dodeca|dodeci|dodec|hemi|octa|cubocta|cubi|rhombi|rhomb|ditrigonal|tetra|hexa)(?=[a-z]{4})/g,
    '$1\u00ad',
  )

/** Least height at which the narrowest panel is wide enough for fingers. */
export const leastHeight = (known: KnownFacts): number => heightForWidth(narrowest.fingers, known.narrowest)

/** Panels, hours, least height: the three facts of a card, as far as a plan has been computed. */
export const sayKnown = (known: KnownFacts | undefined): readonly [string, string][] => [
  ['panels', known ? String(known.panels) : ''],
  ['work', known ? `${hoursText(known.hours)} at ${figure(known.heightMm)} mm` : ''],
  ['least height', known ? `${leastHeight(known)} mm` : ''],
]

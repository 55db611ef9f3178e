/**
 * Branded units. A brand costs nothing at run time and keeps millimetres, points and radians apart.
 * Lengths inside `solids` and `skin` are in unit edges (plain numbers); from `pieces` on they are mm.
 */
declare const brand: unique symbol
type Branded<B extends string> = number & { readonly [brand]: B }

/** Millimetres on card or in the finished model. */
export type Mm = Branded<'mm'>
/** PDF points, 1/72 inch. */
export type Pt = Branded<'pt'>
export type Radians = Branded<'rad'>
export type Degrees = Branded<'deg'>

export const mm = (value: number): Mm => value as Mm
export const degrees = (value: number): Degrees => value as Degrees
export const radians = (value: number): Radians => value as Radians

/** One inch is 25.4 mm exactly (international yard and pound agreement, 1959). */
export const mmToPt = (value: number): Pt => ((value * 72) / 25.4) as Pt
export const ptToMm = (value: number): Mm => ((value * 25.4) / 72) as Mm
export const toDegrees = (value: Radians): Degrees => ((value * 180) / Math.PI) as Degrees
export const toRadians = (value: Degrees): Radians => ((value * Math.PI) / 180) as Radians

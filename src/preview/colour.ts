import { InputError } from '../errors'

/** Red, green, blue, each 0 to 255. */
export type Rgb = readonly [number, number, number]

/** Reads `#rgb` or `#rrggbb`. @throws InputError for anything else */
export const parseHex = (hex: string): Rgb => {
  const short = /^#([0-9a-f])([0-9a-f])([0-9a-f])$/i.exec(hex)
  const long = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(hex)
  const digits = short ? short.slice(1).map((d) => d + d) : long?.slice(1)
  if (!digits) throw new InputError(`The colour "${hex}" cannot be read; write it as #rrggbb.`, 'colour')
  const [r, g, b] = digits.map((d) => Number.parseInt(d, 16))
  return [r!, g!, b!]
}

export const mix = (a: Rgb, b: Rgb, t: number): Rgb => [
  a[0] + (b[0] - a[0]) * t,
  a[1] + (b[1] - a[1]) * t,
  a[2] + (b[2] - a[2]) * t,
]

export const darken = (a: Rgb, k: number): Rgb => [
  Math.min(255, a[0] * k),
  Math.min(255, a[1] * k),
  Math.min(255, a[2] * k),
]

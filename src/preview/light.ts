/** One soft light over the viewer's left shoulder, fixed to the viewer; flat shading, so one tone per item and side. */
import { type Mat3, normalize, type Vec3 } from '../geometry/vec3'
import { darken, mix, type Rgb } from './colour'

const towardsLight: Vec3 = normalize([-0.4, 0.65, 0.65])
/** Bare card: what the inside of coloured card looks like. */
const bare: Rgb = [158, 152, 145]

/** Direction towards the light in model space. */
export const lightIn = ([r, u, b]: Mat3): Vec3 => {
  const [x, y, z] = towardsLight
  return [r[0] * x + u[0] * y + b[0] * z, r[1] * x + u[1] * y + b[1] * z, r[2] * x + u[2] * y + b[2] * z]
}

/**
 * Share of the card's colour that a side shows: 0.6 to 1.05.
 *
 * @param facing cosine of the angle between the side's normal and the light
 */
export const brightness = (facing: number): number => {
  // Wrapped diffuse light: sides that face away from the light still differ from each other.
  const wrapped = 0.5 + 0.5 * facing
  return 0.6 + 0.45 * wrapped * wrapped
}

/** The inside of the card: duller and darker than its outside. */
export const insideOf = (colour: Rgb): Rgb => darken(mix(colour, bare, 0.6), 0.8)

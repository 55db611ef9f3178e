/** One soft light over the viewer's left shoulder, fixed to the viewer; flat shading, so one tone per item and side. */
import { apply, type Mat3, normalize, type Vec3 } from '../geometry/vec3'
import { darken, mix, type Rgb } from './colour'

const towardsLight: Vec3 = normalize([-0.4, 0.65, 0.65])
/** Bare card: what the inside of coloured card looks like. */
const bare: Rgb = [158, 152, 145]

/** Share of the card's colour that a side with this unit normal (model space, towards the viewer) shows: 0.6 to 1.05. */
export const brightness = (rotation: Mat3, normal: Vec3): number => {
  const n = apply(rotation, normal)
  const facing = n[0] * towardsLight[0] + n[1] * towardsLight[1] + n[2] * towardsLight[2]
  // Wrapped diffuse light: sides that face away from the light still differ from each other.
  const wrapped = 0.5 + 0.5 * facing
  return 0.6 + 0.45 * wrapped * wrapped
}

/** The inside of the card: duller and darker than its outside. */
export const insideOf = (colour: Rgb): Rgb => darken(mix(colour, bare, 0.6), 0.8)

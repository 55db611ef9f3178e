/** What a builder may decide, within which bounds, and what is taken where nothing was said. */
import { InputError } from '../errors'
import type { PlanChoices } from './types'

export const leastHeightMm = 10
export const greatestHeightMm = 2000
/** Beyond this a model would be another one. */
export const greatestCloseMm = 2

export const usualChoices: Omit<PlanChoices, 'solid'> = {
  hand: 'right',
  fill: 'nonzero',
  heightMm: 250,
  paper: 'a4',
  side: 'outside',
  colours: 'one',
  marginMm: 10,
  gapMm: 2,
  grammage: 160,
  nets: 'fewest',
  closeBelowMm: 0,
}

/** Ways of cutting up, see `PlanChoices.nets`. */
export const netsWays = ['fewest', 'repeat', 'modules', 'single'] as const

/** @throws InputError that names the choice at fault and what would be right */
export const checkChoices = (choices: PlanChoices): void => {
  const { heightMm, marginMm, gapMm, grammage, closeBelowMm = 0, nets = 'fewest' } = choices
  if (!netsWays.includes(nets)) throw new InputError(`Nets are ${netsWays.join(', ')}, not ${nets}.`, 'nets')
  if (!Number.isFinite(heightMm) || heightMm < leastHeightMm || heightMm > greatestHeightMm)
    throw new InputError(
      `Height ${heightMm} mm is out of range: choose ${leastHeightMm} to ${greatestHeightMm} mm.`,
      'heightMm',
    )
  if (!Number.isFinite(marginMm) || marginMm < 4 || marginMm > 40)
    throw new InputError(`Margin ${marginMm} mm is out of range: choose 4 to 40 mm.`, 'marginMm')
  if (!Number.isFinite(gapMm) || gapMm < 0 || gapMm > 20)
    throw new InputError(`Gap ${gapMm} mm is out of range: choose 0 to 20 mm.`, 'gapMm')
  if (!Number.isFinite(closeBelowMm) || closeBelowMm < 0 || closeBelowMm > greatestCloseMm)
    throw new InputError(
      `Closing up below ${closeBelowMm} mm is out of range: choose 0 (none) to ${greatestCloseMm} mm.`,
      'closeBelowMm',
    )
  if (!Number.isFinite(grammage) || grammage < 60 || grammage > 400)
    throw new InputError(`Card weight ${grammage} g/m² is out of range: choose 60 to 400 g/m².`, 'grammage')
}

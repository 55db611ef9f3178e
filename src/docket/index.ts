/** Lengths, hours, tight spots and cautions of a plan. */
export { cautions, cautionsEnd } from './cautions'
export { composeDocket, type PlanWithoutDocket } from './compose'
export { holdsOf } from './holds'
export { leastWidth } from './panel-width'
export { type Rates, toolForWidth, usualRates } from './rates'

/** What the docket says in words: no figures are worked out here, so that drawing may lean on it. */
export { cautions, cautionsEnd } from './cautions'
export { holdWords, partWords } from './hold-words'
export { toolForWidth } from './rates'
export { shortStretches, usualCloseMm } from './short-stretches'

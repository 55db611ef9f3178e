/** Paper, card, and pieces laid on them. */
export { type NestedSheet, type NestItem, type NestOptions, nest, type Placed } from './nest'
export { cardName, type Paper, type PaperId, papers, thicknessMm } from './paper'
export { placeRings, type SheetCheck, validateSheets } from './validate'

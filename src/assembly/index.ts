/** What is glued when. */
export { type GluingOrder, type GluingStep, gluingOrder, renumber } from './order'

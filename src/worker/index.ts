export { createPlanner, type Planner } from './planner'
export { createPress, type Press } from './press'
export type { Answer, PageSummary, Refusal, Report, SolidFacts } from './protocol'

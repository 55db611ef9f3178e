export { checkFileSize } from '../models/file'
export { modelUnits } from '../models/unit'
export { createPlanner, type Planner } from './planner'
export { createPress, type Press } from './press'
export type {
  Answer,
  PageSummary,
  ReadModel,
  Refusal,
  Report,
  Solid,
  SolidFacts,
  SolidParts,
  VertexFigure,
} from './protocol'

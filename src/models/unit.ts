/** Units that a model's numbers may be in. */
/** Millimetres of each; one inch is 25.4 mm exactly (international yard and pound agreement, 1959). */
export const modelUnits = { mm: 1, cm: 10, m: 1000, in: 25.4 } as const
export type ModelUnit = keyof typeof modelUnits

export const isModelUnit = (text: string): text is ModelUnit => Object.hasOwn(modelUnits, text)

/** Height (diameter of the sphere round the model) in mm. @param farthest see `Model.farthest` */
export const unitHeightMm = (farthest: number, unit: ModelUnit): number => 2 * farthest * modelUnits[unit]

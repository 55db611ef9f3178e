/** What the computation is at, in words. A stage that is not listed is shown by its own name. */
const words: Readonly<Record<string, string>> = {
  solid: 'Constructing the solid',
  skin: 'Finding what can be seen',
  pieces: 'Choosing what folds',
  order: 'Finding the gluing order',
  tabs: 'Fitting the tabs',
  sheets: 'Nesting on the sheets',
  docket: 'Adding up',
}
export const sayStage = (stage: string): string => words[stage] ?? (stage || 'Starting')

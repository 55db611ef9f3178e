/** What the computation is at, in words. A stage that is not listed is shown by its own name. */
const words: Readonly<Record<string, string>> = {
  skin: 'finding what can be seen',
  pieces: 'choosing what folds',
  order: 'finding the gluing order',
  tabs: 'fitting the tabs',
  sheets: 'nesting on the sheets',
  checks: 'checking the plan',
}
const order = ['skin', 'pieces', 'order', 'tabs', 'sheets', 'checks']

/** E.g. `Step 2 of 6: choosing what folds`. */
export const sayStage = (stage: string): string => {
  const word = words[stage] ?? (stage || 'starting')
  const at = order.indexOf(stage) + 1
  return at > 0 ? `Step ${at} of ${order.length}: ${word}` : word
}

/**
 * Plan coordinates are kept to a nanometre, so that the same plan gives the same bytes and files stay short. The error is
 * far below what card, printer and knife can show, and below every tolerance that the plan is checked with.
 */
export const round6 = (x: number): number => {
  const r = Math.round(x * 1e6) / 1e6
  // Minus zero would be written as 0 and read back as another value.
  return r === 0 ? 0 : r
}
export const roundTo = (x: number, places: number): number => {
  const k = 10 ** places
  const r = Math.round(x * k) / k
  return r === 0 ? 0 : r
}

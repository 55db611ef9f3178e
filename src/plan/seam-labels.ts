/**
 * Seam labels: letters only, so that they are never taken for piece numbers. Letters that look like figures or like each
 * other in small print (I, O, Q, and the pair U/V) are left out.
 */
const letters = 'ABCDEFGHJKLMNPRSTUWXYZ'

/** The n-th label, n from 0: A … Z, then AA, AB … in the order in which seams are glued. */
export const seamLabel = (n: number): string => {
  let label = ''
  for (let k = n; k >= 0; k = Math.floor(k / letters.length) - 1) label = letters[k % letters.length] + label
  return label
}

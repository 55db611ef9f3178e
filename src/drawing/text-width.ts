/**
 * Widths of Helvetica, a standard font of every PDF reader, so that drawing can place text without asking a writer. Advance
 * widths in thousandths of the size, as published in the font's metrics.
 */
import { ptToMm } from '../units'

const ascii = [
  278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, 556, 556, 556, 556, 556, 556, 556,
  556, 556, 556, 278, 278, 584, 584, 584, 556, 1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833,
  722, 778, 667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469, 556, 333, 556, 556, 500, 556,
  556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, 556, 556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334,
  260, 334, 584,
]
const others: Readonly<Record<string, number>> = { '²': 333, '°': 400, '·': 278, '–': 556, '×': 584, '±': 584 }

/** Width in mm of a line of regular Helvetica; characters it does not know count as a wide letter. */
export const textWidthMm = (text: string, sizePt: number): number => {
  let units = 0
  for (const c of text) units += ascii[c.charCodeAt(0) - 32] ?? others[c] ?? 722
  return ptToMm((units * sizePt) / 1000)
}

/** Words of a text in lines no wider than `widthMm`; a longer word stands alone. */
export const wrapText = (text: string, sizePt: number, widthMm: number): string[] => {
  const lines: string[] = []
  let line = ''
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`
    if (line !== '' && textWidthMm(longer, sizePt) > widthMm) {
      lines.push(line)
      line = word
    } else line = longer
  }
  return line === '' ? lines : [...lines, line]
}

/**
 * A page as SVG in millimetres, with the same pens as the PDF. Each piece is a group with `data-piece`, so that a page on
 * the screen knows what is under the pointer; within it, groups are named cut, mountain, valley and label.
 */
import type { DrawingPage, LineKind, LineMark, Mark, TextMark } from '../drawing'
import { ptToMm } from '../units'
import { pens } from './pdf'

const n = (value: number): string => String(Math.round(value * 1e4) / 1e4)

const escapeText = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;')

const kinds: readonly LineKind[] = ['cut', 'mountain', 'valley', 'level', 'rule', 'leader']

/** A whole SVG document; y runs down, so heights are turned over here. */
export const pageToSvg = (page: DrawingPage): string => {
  const { widthMm: w, heightMm: h } = page
  const byPiece = new Map<number, Mark[]>()
  const rest: Mark[] = []
  for (const mark of page.marks) {
    if (mark.piece === undefined) rest.push(mark)
    else {
      const list = byPiece.get(mark.piece)
      if (list) list.push(mark)
      else byPiece.set(mark.piece, [mark])
    }
  }
  const out = [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<svg xmlns="http://www.w3.org/2000/svg" width="${n(w)}mm" height="${n(h)}mm" viewBox="0 0 ${n(w)} ${n(h)}">`,
    `<title>${escapeText(page.title)}</title>`,
    ...groups(rest, h),
  ]
  for (const [piece, marks] of byPiece) out.push(`<g data-piece="${piece}">`, ...groups(marks, h), '</g>')
  out.push('</svg>')
  return out.join('\n')
}

const groups = (marks: readonly Mark[], h: number): string[] => {
  const out: string[] = []
  const areas = marks.filter((m) => m.type === 'area')
  for (const { rings } of areas) {
    const d = rings.map((ring) => `M${ring.map(([x, y]) => `${n(x)} ${n(h - y)}`).join('L')}Z`).join('')
    out.push(`<path class="area" d="${d}" fill="#fff" fill-opacity="0" stroke="none"/>`)
  }
  for (const kind of kinds) {
    const lines = marks.filter((m): m is LineMark => m.type === 'line' && m.kind === kind)
    if (lines.length === 0) continue
    const { widthMm, dash } = pens[kind]
    const dashes = dash.length > 0 ? ` stroke-dasharray="${dash.map(n).join(' ')}"` : ' stroke-linecap="round"'
    out.push(
      `<g class="${kind}" fill="none" stroke="#000" stroke-width="${n(widthMm)}" stroke-linejoin="round"${dashes}>`,
    )
    for (const { points, closed, crease } of lines) {
      const d = `M${points.map(([x, y]) => `${n(x)} ${n(h - y)}`).join('L')}${closed ? 'Z' : ''}`
      out.push(`<path d="${d}"${crease === undefined ? '' : ` data-crease="${crease}"`}/>`)
    }
    out.push('</g>')
  }
  const texts = marks.filter((m): m is TextMark => m.type === 'text')
  if (texts.length > 0) {
    out.push('<g class="label" fill="#000" font-family="Helvetica, Arial, sans-serif">')
    for (const t of texts) out.push(textElement(t, h))
    out.push('</g>')
  }
  return out
}

const anchors = { start: 'start', middle: 'middle', end: 'end' } as const

const textElement = (t: TextMark, h: number): string => {
  const size = ptToMm(t.sizePt)
  const turn = t.rotation === 0 ? '' : ` rotate(${n(-t.rotation)})`
  const source = t.crease === undefined ? '' : ` data-crease="${t.crease}"`
  return (
    `<text transform="translate(${n(t.at[0])} ${n(h - t.at[1])})${turn}" y="${n(0.359 * size)}" font-size="${n(size)}" ` +
    `text-anchor="${anchors[t.anchor]}"${t.bold ? ' font-weight="bold"' : ''} data-role="${t.role}"${source}>` +
    `${escapeText(t.text)}</text>`
  )
}

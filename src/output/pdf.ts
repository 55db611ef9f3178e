/**
 * Pages to PDF, true to scale. Content streams are written as operators; PrintScaling is None, so that a reader does not
 * fit the page to the paper; dates are fixed, so that the same pages give the same bytes anywhere.
 */
import { PDFDocument, type PDFFont, PDFName, type PDFPage, PDFString, PrintScaling, StandardFonts } from 'pdf-lib'
import type { DrawingPage, LineKind, LineMark, TextMark } from '../drawing'
import { mmToPt } from '../units'

export interface PdfMeta {
  readonly title?: string
}

interface Pen {
  readonly widthMm: number
  /** Dash and gap lengths in mm. */
  readonly dash: readonly number[]
}

/** Thin enough to cut along the middle, dark enough to see under a ruler. */
export const pens: Readonly<Record<LineKind, Pen>> = {
  cut: { widthMm: 0.2, dash: [] },
  mountain: { widthMm: 0.2, dash: [4, 1.2, 0.4, 1.2] },
  valley: { widthMm: 0.2, dash: [2, 1.2] },
  level: { widthMm: 0.12, dash: [0.4, 1] },
  rule: { widthMm: 0.25, dash: [] },
  leader: { widthMm: 0.12, dash: [] },
}

/** Layers that a reader can switch off, by what they hold. */
const layerOf: Readonly<Record<LineKind, 'cut' | 'fold' | 'label'>> = {
  cut: 'cut',
  mountain: 'fold',
  valley: 'fold',
  level: 'fold',
  rule: 'label',
  leader: 'label',
}
const layerNames = ['cut', 'fold', 'label'] as const

/** Cap height of Helvetica is 0.718 of the size; `TextMark.at` is the middle of the capitals. */
const middleOfCapitals = 0.359

/** Bytes of the PDF. Characters that the standard font lacks are written as a question mark. */
export const writePdf = async (pages: readonly DrawingPage[], meta: PdfMeta = {}): Promise<Uint8Array<ArrayBuffer>> => {
  const doc = await PDFDocument.create({ updateMetadata: false })
  const fixed = new Date(Date.UTC(2026, 0, 1))
  doc.setTitle(meta.title ?? pages.map((p) => p.title)[0] ?? 'Facetwright')
  doc.setProducer('Facetwright')
  doc.setCreator('Facetwright')
  doc.setCreationDate(fixed)
  doc.setModificationDate(fixed)
  doc.catalog.getOrCreateViewerPreferences().setPrintScaling(PrintScaling.None)
  const regular = await doc.embedFont(StandardFonts.Helvetica)
  const bold = await doc.embedFont(StandardFonts.HelveticaBold)
  const layers = layerNames.map((name) =>
    doc.context.register(doc.context.obj({ Type: 'OCG', Name: PDFString.of(name) })),
  )
  doc.catalog.set(PDFName.of('OCProperties'), doc.context.obj({ OCGs: layers, D: { ON: layers, Order: layers } }))
  for (const page of pages) {
    const sheet = doc.addPage([mmToPt(page.widthMm), mmToPt(page.heightMm)])
    setResources(sheet, regular, bold, layers)
    const stream = doc.context.flateStream(contentOf(page, regular, bold))
    sheet.node.addContentStream(doc.context.register(stream))
  }
  // Copied into a buffer of its own, so that it can be handed over between threads.
  return new Uint8Array(await doc.save({ addDefaultPage: false }))
}

const setResources = (page: PDFPage, regular: PDFFont, bold: PDFFont, layers: readonly unknown[]): void => {
  page.node.setFontDictionary(PDFName.of('F1'), regular.ref)
  page.node.setFontDictionary(PDFName.of('F2'), bold.ref)
  const { Resources } = page.node.normalizedEntries()
  Resources.set(
    PDFName.of('Properties'),
    page.doc.context.obj(Object.fromEntries(layerNames.map((name, i) => [name, layers[i] as never]))),
  )
}

/** Points with three decimals: a third of a micrometre. */
const pt = (mm: number): string => String(Math.round(mmToPt(mm) * 1000) / 1000)

const contentOf = (page: DrawingPage, regular: PDFFont, bold: PDFFont): string => {
  const out: string[] = ['1 J 1 j 0 0 0 RG 0 0 0 rg']
  for (const layer of layerNames) {
    out.push(`/OC /${layer} BDC`)
    let pen: LineKind | null = null
    for (const mark of page.marks) {
      if (mark.type === 'line' && layerOf[mark.kind] === layer) {
        if (mark.kind !== pen) {
          pen = mark.kind
          const { widthMm, dash } = pens[pen]
          out.push(`${pt(widthMm)} w [${dash.map(pt).join(' ')}] 0 d`)
          // Round ends would close the gaps of fine dashes.
          out.push(dash.length > 0 ? '0 J' : '1 J')
        }
        out.push(path(mark))
      } else if (mark.type === 'text' && layer === 'label') out.push(text(mark, mark.bold ? bold : regular))
    }
    out.push('EMC')
  }
  return out.join('\n')
}

const path = ({ points, closed }: LineMark): string =>
  `${points.map(([x, y], i) => `${pt(x)} ${pt(y)} ${i === 0 ? 'm' : 'l'}`).join(' ')} ${closed ? 's' : 'S'}`

const text = (mark: TextMark, font: PDFFont): string => {
  const safe = encodable(mark.text, font)
  const width = font.widthOfTextAtSize(safe, mark.sizePt)
  const back = mark.anchor === 'start' ? 0 : mark.anchor === 'middle' ? width / 2 : width
  const down = middleOfCapitals * mark.sizePt
  const c = Math.cos((mark.rotation * Math.PI) / 180)
  const s = Math.sin((mark.rotation * Math.PI) / 180)
  const x = mmToPt(mark.at[0]) - c * back + s * down
  const y = mmToPt(mark.at[1]) - s * back - c * down
  const n = (value: number): string => String(Math.round(value * 1e4) / 1e4)
  return (
    `BT /${mark.bold ? 'F2' : 'F1'} ${mark.sizePt} Tf ${n(c)} ${n(s)} ${n(-s)} ${n(c)} ${n(x)} ${n(y)} Tm ` +
    `${font.encodeText(safe).toString()} Tj ET`
  )
}

const encodable = (value: string, font: PDFFont): string => {
  try {
    font.encodeText(value)
    return value
  } catch {
    return [...value]
      .map((c) => {
        try {
          font.encodeText(c)
          return c
        } catch {
          return '?'
        }
      })
      .join('')
  }
}

/** Reads a PDF back with pdf.js: sizes, straight paths with their dashes, and text, all in mm. */
import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs'

const mm = (pt: number): number => (pt * 25.4) / 72

export interface ReadPath {
  readonly points: readonly (readonly [number, number])[]
  /** Dash lengths in mm; empty for a solid line. */
  readonly dash: readonly number[]
}
export interface ReadText {
  readonly text: string
  readonly x: number
  readonly y: number
  readonly sizePt: number
}
export interface ReadPage {
  readonly widthMm: number
  readonly heightMm: number
  readonly paths: readonly ReadPath[]
  readonly texts: readonly ReadText[]
}

export const readPdf = async (bytes: Uint8Array): Promise<{ pages: ReadPage[]; printScaling: unknown }> => {
  // pdf.js takes the buffer over, so it gets a copy.
  const doc = await getDocument({ data: bytes.slice(), useSystemFonts: true, verbosity: 0 }).promise
  const preferences = (await doc.getViewerPreferences()) as { PrintScaling?: unknown } | null
  const pages: ReadPage[] = []
  for (let i = 1; i <= doc.numPages; i++) {
    const page = await doc.getPage(i)
    const [x0, y0, x1, y1] = page.view as [number, number, number, number]
    const paths: ReadPath[] = []
    let dash: number[] = []
    const list = await page.getOperatorList()
    list.fnArray.forEach((fn, k) => {
      const args = list.argsArray[k] as unknown[]
      if (fn === OPS.setDash) dash = [...(args[0] as number[])].map(mm)
      if (fn !== OPS.constructPath) return
      const data = [...((args[1] as [ArrayLike<number>])[0] as unknown as number[])]
      const points: [number, number][] = []
      for (let j = 0; j < data.length; j += 3) {
        if (data[j] !== 0 && data[j] !== 1) throw new Error(`path operator ${data[j]} is not a straight line`)
        points.push([mm(data[j + 1] as number), mm(data[j + 2] as number)])
      }
      paths.push({ points, dash })
    })
    const content = await page.getTextContent()
    const texts = content.items.flatMap((item) => {
      if (!('str' in item) || item.str.trim() === '') return []
      const [a, b, , , x, y] = item.transform as [number, number, number, number, number, number]
      return [{ text: item.str, x: mm(x), y: mm(y), sizePt: Math.hypot(a, b) }]
    })
    pages.push({ widthMm: mm(x1 - x0), heightMm: mm(y1 - y0), paths, texts })
  }
  await doc.destroy()
  return { pages, printScaling: preferences?.PrintScaling }
}

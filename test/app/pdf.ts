/** Reads a PDF back with a library that has nothing to do with ours. */
import { readFileSync } from 'node:fs'
import { getDocument, OPS } from 'pdfjs-dist/legacy/build/pdf.mjs'

export interface ReadPage {
  readonly widthPt: number
  readonly heightPt: number
  readonly texts: readonly string[]
  /** Straight lines: first and last point of every open path of two points, in pt. */
  readonly lines: readonly (readonly [number, number, number, number])[]
}

/** Codes of the steps inside a path, as the library hands them out. */
const moveTo = 0
const lineTo = 1
const stepLength = [2, 2, 6, 4, 0]

const straightLines = (path: ArrayLike<number>): [number, number, number, number][] => {
  const lines: [number, number, number, number][] = []
  let from: [number, number] | null = null
  for (let i = 0; i < path.length; ) {
    const code = path[i]!
    const at: [number, number] = [path[i + 1]!, path[i + 2]!]
    if (code === lineTo && from) lines.push([...from, ...at])
    from = code === moveTo || code === lineTo ? at : null
    i += 1 + stepLength[code]!
  }
  return lines
}

export const readPdf = async (path: string): Promise<ReadPage[]> => {
  const task = getDocument({ data: new Uint8Array(readFileSync(path)), verbosity: 0 })
  const doc = await task.promise
  const pages: ReadPage[] = []
  for (let i = 1; i <= doc.numPages; i++) {
    const page = await doc.getPage(i)
    const [x0, y0, x1, y1] = page.view as [number, number, number, number]
    const { items } = await page.getTextContent()
    const { fnArray, argsArray } = await page.getOperatorList()
    const lines = fnArray.flatMap((op, k) => {
      if (op !== OPS.constructPath) return []
      const [path] = argsArray[k][1] as [ArrayLike<number> | null]
      return path ? straightLines(path) : []
    })
    pages.push({
      widthPt: x1 - x0,
      heightPt: y1 - y0,
      texts: items.map((item) => ('str' in item ? item.str : '')).filter((text) => text.trim() !== ''),
      lines,
    })
  }
  await task.destroy()
  return pages
}

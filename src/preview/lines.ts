/** Lines of the scene by style: ring edges, outlines of what is lit, seams. Renderers draw them in this order. */
import type { Vec3 } from '../geometry/vec3'
import { parseHex, type Rgb } from './colour'
import type { Model } from './model'
import type { PreviewTheme, SeamLine } from './types'

export interface LineStyle {
  /** CSS px. */
  readonly width: number
  readonly colour: Rgb
  readonly alpha: number
  /** Period of dashes (half on, half off) in CSS px; 0 solid. */
  readonly dash: number
  /** 'surface': hidden by what is in front; 'through': seen through the model; 'ghost': hidden by ghosts too. */
  readonly depth: 'surface' | 'through' | 'ghost'
  /** Drawn weaker where edges crowd on the screen (see `Stage.lineAlpha`). */
  readonly thins: boolean
}

export interface LineSet {
  readonly style: LineStyle
  /** x, y, z of both ends, line after line, centred and scaled. */
  readonly ends: Float64Array
}

/** The model as it stands: vertex places, and whether its movers have left their closed places. */
export interface Posed {
  readonly model: Model
  readonly positions: Float64Array
  readonly isApart: boolean
}

const hiddenDash = 6
const widths = { fold: 0.8, rim: 1.1, ghost: 0.8, lit: 3, seam: 4, strongSeam: 7, casing: 2.5 }

/** Edges of the items wanted: one per place, or one per mover once the movers are apart. */
const gatherEdges = (
  { model, positions, isApart }: Posed,
  wanted: (item: number) => boolean,
  keep: (edgeClass: number, item: number) => boolean,
): Float64Array => {
  const { items, edges, edgeStart, edgeClass, edgeClasses, mover } = model
  const drawnWith = new Int32Array(edgeClasses).fill(-1)
  const out: number[] = []
  for (let i = 0; i < items.length; i++) {
    if (!wanted(i)) continue
    for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
      const c = edgeClass[e]!
      const owner = isApart ? mover[i]! : 0
      if (drawnWith[c] === owner || !keep(c, i)) continue
      drawnWith[c] = owner
      for (let end = 0; end < 2; end++) {
        const v = 3 * edges[2 * e + end]!
        out.push(positions[v]!, positions[v + 1]!, positions[v + 2]!)
      }
    }
  }
  return Float64Array.from(out)
}

/** Thin lines along all rings; folds inside a piece lighter than the rims of pieces. */
export const edgeLines = (
  posed: Posed,
  isSolid: (item: number) => boolean,
  isGhost: (item: number) => boolean,
  theme: PreviewTheme,
): LineSet[] => {
  const { items, edgeStart, edgeClass, edgeClasses } = posed.model
  // A class whose items belong to one piece is a fold; −2 none met yet, −3 several pieces.
  const groupOf = new Int32Array(edgeClasses).fill(-2)
  items.forEach((item, i) => {
    for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
      const c = edgeClass[e]!
      if (groupOf[c] === -2) groupOf[c] = item.group
      else if (groupOf[c] !== item.group) groupOf[c] = -3
    }
  })
  const isGrouped = items.some((item) => item.group >= 0)
  const isFold = (c: number): boolean => isGrouped && groupOf[c]! >= 0
  const style = { colour: parseHex(theme.edge), dash: 0, depth: 'surface', thins: true } as const
  return [
    { style: { ...style, width: widths.fold, alpha: 0.6 }, ends: gatherEdges(posed, isSolid, isFold) },
    {
      style: { ...style, width: widths.rim, alpha: isGrouped ? 0.95 : 0.75 },
      ends: gatherEdges(posed, isSolid, (c) => !isFold(c)),
    },
    {
      style: { ...style, width: widths.ghost, alpha: 0.5, colour: parseHex(theme.ghost), depth: 'ghost' },
      ends: gatherEdges(posed, isGhost, () => true),
    },
  ]
}

/** Outline of the items that are lit together, without the edges between them. */
export const outlineOf = (
  posed: Posed,
  isLit: (item: number) => boolean,
  accent: string,
  theme: PreviewTheme,
): LineSet[] => {
  const { items, edgeStart, edgeClass, mover } = posed.model
  const owners = new Map<number, number[]>()
  items.forEach((_, i) => {
    if (!isLit(i)) return
    for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
      const known = owners.get(edgeClass[e]!)
      if (known) known.push(i)
      else owners.set(edgeClass[e]!, [i])
    }
  })
  // An edge between two lit items is inside the lit part, unless the two have been pulled apart.
  const isOutline = (c: number, i: number): boolean =>
    (owners.get(c) ?? []).filter((j) => !posed.isApart || mover[j] === mover[i]).length === 1
  return marked(gatherEdges(posed, isLit, isOutline), accent, theme, widths.lit)
}

/** @param place where a seam's end lies in the scene */
export const seamLines = (
  seams: readonly SeamLine[],
  place: (end: Vec3, item?: number) => Vec3,
  theme: PreviewTheme,
): LineSet[] =>
  [false, true].flatMap((isStrong) => {
    const chosen = seams.filter((seam) => (seam.strong ?? false) === isStrong)
    const ends = chosen.flatMap((seam) => seam.ends.flatMap((end) => [...place(end, seam.item)]))
    return marked(Float64Array.from(ends), theme.accent, theme, isStrong ? widths.strongSeam : widths.seam)
  })

/** A marked line: dashes where it is hidden, then a casing, then the accent itself. */
const marked = (ends: Float64Array, accent: string, theme: PreviewTheme, width: number): LineSet[] => {
  const line = { colour: parseHex(accent), dash: 0, depth: 'surface', thins: false } as const
  return [
    { style: { ...line, width: Math.max(1.4, width / 2), alpha: 0.9, dash: hiddenDash, depth: 'through' }, ends },
    { style: { ...line, width: width + widths.casing, alpha: 0.9, colour: parseHex(theme.casing) }, ends },
    { style: { ...line, width, alpha: 1 }, ends },
  ]
}

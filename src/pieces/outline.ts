/** The cut lines of a piece: round the net, tabs included, and round the holes of its panels. */
import { BrokenPromise } from '../errors'
import { convexHull, fittingAngle, roomiestAngle } from '../geometry/hull'
import { type Ring2, signedArea, type Vec2 } from '../geometry/vec2'
import type { Skin } from '../skin/types'
import type { FitRectangle } from './patch'
import type { Piece, Tab } from './types'

/**
 * All closed cut lines of a piece, the outline first (counter-clockwise), then the holes (clockwise). The walk goes along
 * ring edges and turns into the next panel at every fold; where panels only touch, the line has a slit of no width. A
 * tab takes the place of the ring edge that it hangs on.
 */
export const cutLines = (skin: Skin, piece: Piece, tabs: readonly Tab[]): Ring2[] => {
  const folds = new Set(piece.folds)
  const rings = new Map(piece.panels.map((p) => [p.panel, p.rings]))
  const tabAt = new Map(tabs.filter((t) => rings.has(t.panel)).map((t) => [`${t.panel} ${t.crease}`, t]))
  const key = (panel: number, ring: number, index: number): string => `${panel} ${ring} ${index}`
  /** Where each fold is met in each panel. */
  const meets = new Map<string, readonly [number, number]>()
  for (const { panel } of piece.panels)
    skin.panels[panel]!.creases.forEach((list, r) => {
      list.forEach((crease, i) => {
        if (folds.has(crease)) meets.set(`${panel} ${crease}`, [r, i])
      })
    })
  const done = new Set<string>()
  const lines: Ring2[] = []
  for (const first of piece.panels)
    first.rings.forEach((ring, r) => {
      ring.forEach((_, i) => {
        if (done.has(key(first.panel, r, i)) || folds.has(skin.panels[first.panel]!.creases[r]![i]!)) return
        const line: Vec2[] = []
        let [panel, on, index] = [first.panel, r, i]
        while (!done.has(key(panel, on, index))) {
          done.add(key(panel, on, index))
          const crease = skin.panels[panel]!.creases[on]![index]!
          if (folds.has(crease)) {
            const other = skin.creases[crease]!.panels.find((p) => p !== panel)!
            const there = meets.get(`${other} ${crease}`)
            if (!there)
              throw new BrokenPromise('A fold has only one of its panels in the piece.', { crease, piece: piece.id })
            panel = other
            ;[on, index] = there
          } else {
            const tab = tabAt.get(`${panel} ${crease}`)
            pushPoint(line, rings.get(panel)![on]![index]!)
            // The tab's ring starts with its root, run the other way.
            if (tab) for (const p of [...tab.outline.slice(1), tab.outline[0]!]) pushPoint(line, p)
          }
          index = (index + 1) % rings.get(panel)![on]!.length
        }
        if (line.length > 1 && samePoint(line[0]!, line[line.length - 1]!)) line.pop()
        lines.push(line)
      })
    })
  return lines.sort((a, b) => signedArea(b) - signedArea(a))
}

const samePoint = (a: Vec2, b: Vec2): boolean => Math.abs(a[0] - b[0]) < 1e-9 && Math.abs(a[1] - b[1]) < 1e-9
const pushPoint = (line: Vec2[], p: Vec2): void => {
  if (line.length === 0 || !samePoint(line[line.length - 1]!, p)) line.push(p)
}

/** The outer cut line, counter-clockwise, mm in the piece's plane. */
export const pieceOutline = (skin: Skin, piece: Piece, tabs: readonly Tab[]): Ring2 => {
  const outline = cutLines(skin, piece, tabs)[0]
  if (!outline || signedArea(outline) <= 0)
    throw new BrokenPromise('A piece has no outline.', { piece: piece.id, panels: piece.panels.length })
  return outline
}

/** Points of a piece and its tabs as x0, y0, x1, y1, … */
export const piecePoints = (piece: Piece, tabs: readonly Tab[]): number[] => {
  const own = new Set(piece.panels.map((p) => p.panel))
  const out: number[] = []
  for (const { rings } of piece.panels) for (const p of rings[0]!) out.push(p[0], p[1])
  for (const tab of tabs) if (own.has(tab.panel)) for (const p of tab.outline) out.push(p[0], p[1])
  return out
}

/**
 * Degrees, 0 ≤ angle < 180, by which the piece with its tabs is turned counter-clockwise to lie in the rectangle with
 * much room to spare; null when it fits at no angle.
 */
export const bestFitRotation = (piece: Piece, tabs: readonly Tab[], fit: FitRectangle): number | null => {
  const hull = convexHull(piecePoints(piece, tabs))
  const angle = roomiestAngle(hull, fit.widthMm, fit.heightMm)
  if (fittingAngle(hull, fit.widthMm, fit.heightMm) === null) return null
  return (angle * 180) / Math.PI
}

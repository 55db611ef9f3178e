/**
 * Where labels stand. A piece's label stands in its roomiest panel; a seam's label inside the panel beside its edge, along
 * it and as upright as that allows; if there is no room, on the tab; if there is none, outside with a leader; and only as
 * the last resort small and tight. The order of trials is fixed, so the same plan gives the same page.
 */
import { signedArea, type Vec2 } from '../geometry/vec2'
import {
  boxesMeet,
  boxInside,
  Occupancy,
  pointInside,
  roomiestPoint,
  segmentMeetsBox,
  type TextBox,
  textBox,
} from './boxes'
import type { LaidEdge, LaidPanel, LaidPiece } from './layout'
import type { Mark, TextMark } from './types'

const seamSizes = [7, 6, 5]
const pieceSizes = [12, 10, 9, 8, 7, 6, 5]
/** Parts of the edge at which a seam label is tried. */
const places = [0.5, 0.38, 0.62, 0.27, 0.73, 0.18, 0.82]
/** Points; smaller than promised, for panels where nothing else is left. */
const lastResortSize = 4

export interface LabelReport {
  readonly marks: Mark[]
  /** Labels that stand tight because there was no room anywhere. */
  readonly tight: number
}

/** Labels of all pieces of one sheet. */
export const sheetLabels = (
  pieces: readonly LaidPiece[],
  page: { widthMm: number; heightMm: number; marginMm: number },
): LabelReport => {
  const room = new Room(pieces, page)
  for (const piece of pieces) room.labelPiece(piece)
  for (const piece of pieces)
    for (const panel of piece.panels)
      for (const edge of panel.edges) if (edge.use === 'seam' && edge.crease.label) room.labelSeam(piece, panel, edge)
  return { marks: room.marks, tight: room.tight }
}

/** Degrees in (−90, 90]: text that is not upside down. */
const upright = (degrees: number): number => {
  let d = ((degrees % 180) + 180) % 180
  if (d > 90) d -= 180
  return d
}

class Room {
  readonly marks: Mark[] = []
  tight = 0
  private readonly boxes: TextBox[] = []
  private readonly taken: Occupancy

  constructor(
    pieces: readonly LaidPiece[],
    private readonly page: { widthMm: number; heightMm: number; marginMm: number },
  ) {
    this.taken = new Occupancy(page.widthMm, page.heightMm)
    for (const { panels, tabs } of pieces) {
      for (const { rings } of panels) this.taken.add(rings)
      for (const { outline } of tabs) this.taken.add([outline])
    }
  }

  private clear(box: TextBox): boolean {
    return !this.boxes.some((b) => boxesMeet(b, box))
  }

  private put(mark: Omit<TextMark, 'type' | 'anchor'>, box: TextBox): void {
    this.boxes.push(box)
    this.marks.push({ type: 'text', anchor: 'middle', ...mark })
  }

  labelPiece({ piece, panels }: LaidPiece): void {
    const largest = [...panels]
      .map((p) => ({ p, area: p.rings.reduce((s, r) => s + signedArea(r), 0) }))
      .sort((a, b) => b.area - a.area || a.p.panel - b.p.panel)
      .slice(0, 8)
    const spots = largest
      .map(({ p }) => ({ p, spot: roomiestPoint(p.rings) }))
      .filter((x) => x.spot !== null)
      .sort((a, b) => b.spot!.room - a.spot!.room)
    const write = (at: Vec2, sizePt: number, rotation: number, panel: number): void =>
      this.put(
        { role: 'pieceLabel', text: piece.label, at, sizePt, rotation, bold: true, piece: piece.id, panel },
        textBox(piece.label, sizePt, at, rotation),
      )
    for (const sizePt of pieceSizes)
      for (const { p, spot } of spots)
        for (const rotation of [0, 90, 45, -45, 60, -60, 30, -30]) {
          const box = textBox(piece.label, sizePt, spot!.at, rotation)
          if (boxInside(box, p.rings) && this.clear(box)) {
            write(spot!.at, sizePt, rotation, p.panel)
            return
          }
        }
    const first = largest[0]!.p
    const middle = spots[0]?.spot?.at ?? first.rings[0]![0]!
    if (this.lead(piece.label, middle, 6, { piece: piece.id, panel: first.panel, role: 'pieceLabel', bold: true }))
      return
    this.tight++
    write(middle, lastResortSize, 0, first.panel)
  }

  labelSeam(laid: LaidPiece, panel: LaidPanel, { from, to, crease }: LaidEdge): void {
    const text = crease.label!
    const source = { piece: laid.piece.id, panel: panel.panel, crease: crease.id }
    const dx = to[0] - from[0]
    const dy = to[1] - from[1]
    const length = Math.hypot(dx, dy)
    let inward: Vec2 = [-dy / length, dx / length]
    if (laid.mirrored) inward = [-inward[0], -inward[1]]
    const angle = (Math.atan2(dy, dx) * 180) / Math.PI
    const write = (box: TextBox, sizePt: number, rotation: number): void =>
      this.put({ role: 'seamLabel', text, at: box.at, sizePt, rotation, bold: false, ...source }, box)
    for (const sizePt of seamSizes)
      for (const rotation of [upright(angle), upright(angle + 90)])
        for (const t of places) {
          const size = textBox(text, sizePt, [0, 0], rotation)
          const off = (rotation === upright(angle) ? size.halfHeight : size.halfWidth) + 0.15
          const at: Vec2 = [from[0] + t * dx + off * inward[0], from[1] + t * dy + off * inward[1]]
          const box = { ...size, at }
          if (boxInside(box, panel.rings) && this.clear(box)) {
            write(box, sizePt, rotation)
            return
          }
        }
    const tab = laid.tabs.find((t) => t.crease.id === crease.id && t.panel === panel.panel)
    if (tab) {
      const spot = roomiestPoint([tab.outline])
      for (const sizePt of [6, 5])
        if (spot) {
          const box = textBox(text, sizePt, spot.at, upright(angle))
          if (boxInside(box, [tab.outline]) && this.clear(box)) {
            write(box, sizePt, upright(angle))
            return
          }
        }
    }
    const middle: Vec2 = [from[0] + dx / 2, from[1] + dy / 2]
    if (this.lead(text, middle, 5, { ...source, role: 'seamLabel', bold: false })) return
    const spot = roomiestPoint(panel.rings)?.at ?? middle
    // Between the edge and the panel's middle, so that it still says which edge is meant.
    const at: Vec2 = pointInside(panel.rings, spot) ? [(middle[0] + spot[0]) / 2, (middle[1] + spot[1]) / 2] : middle
    this.tight++
    write(textBox(text, lastResortSize, at, upright(angle)), lastResortSize, upright(angle))
  }

  /** Writes a label on free card near a point, with a leader to it that crosses no other label. */
  private lead(
    text: string,
    to: Vec2,
    sizePt: number,
    source: { piece: number; panel: number; crease?: number; role: 'pieceLabel' | 'seamLabel'; bold: boolean },
  ): boolean {
    const size = textBox(text, sizePt, [0, 0], 0)
    const { widthMm, heightMm, marginMm } = this.page
    for (let distance = 3; distance <= 24; distance += 1.5)
      for (let k = 0; k < 16; k++) {
        const a = (2 * Math.PI * k) / 16
        const at: Vec2 = [to[0] + distance * Math.cos(a), to[1] + distance * Math.sin(a)]
        const box = { ...size, at }
        if (at[0] - size.halfWidth < marginMm || at[0] + size.halfWidth > widthMm - marginMm) continue
        if (at[1] - size.halfHeight < marginMm || at[1] + size.halfHeight > heightMm - marginMm) continue
        if (!this.taken.isFree(box) || !this.clear(box)) continue
        const end = this.edgeOf(box, to)
        if (this.boxes.some((b) => segmentMeetsBox(end, to, b))) continue
        const { role, bold, ...from } = source
        this.marks.push({ type: 'line', kind: 'leader', points: [end, to], closed: false, ...from })
        this.put({ role, text, at, sizePt, rotation: 0, bold, ...from }, box)
        return true
      }
    return false
  }

  /** Where a line from the box's middle to `to` leaves the box. */
  private edgeOf({ at, halfWidth, halfHeight }: TextBox, to: Vec2): Vec2 {
    const dx = to[0] - at[0]
    const dy = to[1] - at[1]
    const t = Math.min(1, halfWidth / (Math.abs(dx) || 1e-9), halfHeight / (Math.abs(dy) || 1e-9))
    return [at[0] + t * dx, at[1] + t * dy]
  }
}

/** One piece alone, as it lies on its sheet: lines in mm, y down, ready for an SVG. */
import type { Placement, Plan, PlanCrease, PlanPiece, Point2, Point3 } from '../../plan/types'

export interface DrawnSeam {
  readonly crease: number
  readonly label: string
  readonly from: Point2
  readonly to: Point2
  /** Where the label stands: inside the panel, off the edge. */
  readonly at: Point2
  readonly panel: number
}
export interface DrawnPiece {
  readonly box: { readonly x: number; readonly y: number; readonly width: number; readonly height: number }
  readonly outline: readonly Point2[]
  /** Holes and all: even-odd filled. */
  readonly panels: readonly { readonly panel: number; readonly rings: readonly (readonly Point2[])[] }[]
  readonly tabs: readonly (readonly Point2[])[]
  /** Folds between panels, and roots of tabs. As they print: on a mirrored sheet mountain and valley have changed places. */
  readonly folds: readonly {
    readonly kind: 'mountain' | 'valley' | 'flat'
    readonly from: Point2
    readonly to: Point2
  }[]
  readonly seams: readonly DrawnSeam[]
  readonly mirrored: boolean
  /** Where the piece plane's origin lies on its sheet, mm, y up from the bottom. */
  readonly origin: Point2
}

/** Piece plane to sheet, then y down. */
const onSheet = ({ rotation, mirrored }: Placement): ((p: Point2) => Point2) => {
  const c = Math.cos((rotation * Math.PI) / 180)
  const s = Math.sin((rotation * Math.PI) / 180)
  return ([u, v]) => {
    const x = mirrored ? -u : u
    return [c * x - s * v, -(s * x + c * v)]
  }
}

const isNear = (a: Point3, b: Point3): boolean => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]) < 1e-4

/** Finds, on the flat copies of a piece's panels, where points of the skin lie. */
const flatFinder = (plan: Plan, piece: PlanPiece): ((panel: number, point: Point3) => Point2 | null) => {
  const solid = new Map(plan.panels.map((panel) => [panel.id, panel]))
  const flat = new Map(piece.panels.map((panel) => [panel.panel, panel.rings]))
  return (panel, point) => {
    for (const [r, ring] of (solid.get(panel)?.rings ?? []).entries()) {
      const i = ring.findIndex((corner) => isNear(corner, point))
      if (i >= 0) return flat.get(panel)?.[r]?.[i] ?? null
    }
    return null
  }
}

const edgeOn = (
  crease: PlanCrease,
  panel: number,
  find: (panel: number, point: Point3) => Point2 | null,
): [Point2, Point2] | null => {
  const [a, b] = crease.ends.map((end) => find(panel, end))
  if (!a || !b) return null
  // The panel lies to the left of its ring; the second panel's ring runs the other way.
  return panel === crease.panels[0] ? [a, b] : [b, a]
}

export const drawPiece = (plan: Plan, piece: PlanPiece): DrawnPiece => {
  const placed = plan.sheets.flatMap((sheet) => sheet.placed).find((entry) => entry.piece === piece.id)
  const place = placed ?? { piece: piece.id, x: 0, y: 0, rotation: 0, mirrored: false }
  const lay = onSheet(place)
  const find = flatFinder(plan, piece)
  const mine = new Set(piece.panels.map(({ panel }) => panel))
  const folded = new Set(piece.folds)

  const folds: DrawnPiece['folds'][number][] = []
  const kindOf = (crease: PlanCrease): 'mountain' | 'valley' | 'flat' => {
    if (Math.abs(crease.innerAngle - 180) < 1e-6) return 'flat'
    return crease.innerAngle < 180 !== place.mirrored ? 'mountain' : 'valley'
  }
  const rootOf = new Map(piece.tabs.map(({ crease, outline }) => [crease, outline]))
  const seams: DrawnSeam[] = []
  for (const crease of plan.creases) {
    if (folded.has(crease.id)) {
      const edge = edgeOn(crease, crease.panels[0], find)
      if (!edge) continue
      folds.push({ kind: kindOf(crease), from: lay(edge[0]), to: lay(edge[1]) })
      continue
    }
    if (crease.join !== 'seam') continue
    // A tab is folded along its root.
    const root = rootOf.get(crease.id)
    if (root) folds.push({ kind: kindOf(crease), from: lay(root[0]!), to: lay(root[1]!) })
    for (const panel of crease.panels) {
      const edge = mine.has(panel) ? edgeOn(crease, panel, find) : null
      if (!edge) continue
      const [[ax, ay], [bx, by]] = edge
      const length = Math.hypot(bx - ax, by - ay) || 1
      const inward = Math.min(3, length / 3)
      const at: Point2 = [(ax + bx) / 2 - (inward * (by - ay)) / length, (ay + by) / 2 + (inward * (bx - ax)) / length]
      seams.push({
        crease: crease.id,
        label: crease.label ?? '',
        from: lay([ax, ay]),
        to: lay([bx, by]),
        at: lay(at),
        panel,
      })
    }
  }
  const outline = piece.outline.map(lay)
  const xs = outline.map(([x]) => x)
  const ys = outline.map(([, y]) => y)
  const x = Math.min(...xs)
  const y = Math.min(...ys)
  return {
    box: { x, y, width: Math.max(...xs) - x, height: Math.max(...ys) - y },
    outline,
    panels: piece.panels.map(({ panel, rings }) => ({ panel, rings: rings.map((ring) => ring.map(lay)) })),
    tabs: piece.tabs.map(({ outline: tab }) => tab.map(lay)),
    folds,
    seams,
    mirrored: place.mirrored,
    origin: [place.x, place.y],
  }
}

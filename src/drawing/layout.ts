/** A piece as it lies on its sheet: panels, edges and what each edge is. */
import type { Ring2, Vec2 } from '../geometry/vec2'
import type { Placement, Plan, PlanCrease, PlanPiece, Point3 } from '../plan/types'

export type EdgeUse = 'fold' | 'seam'

/** One ring edge of a panel on the sheet; the panel lies to the left of from → to, or to the right if mirrored. */
export interface LaidEdge {
  readonly from: Vec2
  readonly to: Vec2
  readonly crease: PlanCrease
  readonly use: EdgeUse
}

export interface LaidPanel {
  readonly panel: number
  /** Outer ring counter-clockwise on the sheet, holes clockwise. */
  readonly rings: readonly Ring2[]
  readonly edges: readonly LaidEdge[]
}

export interface LaidTab {
  readonly crease: PlanCrease
  readonly panel: number
  /** Counter-clockwise on the sheet; `root` is its edge on the panel. */
  readonly outline: Ring2
  readonly root: readonly [Vec2, Vec2]
}

export interface LaidPiece {
  readonly piece: PlanPiece
  readonly mirrored: boolean
  readonly panels: readonly LaidPanel[]
  readonly tabs: readonly LaidTab[]
}

/** Piece plane to sheet. */
export const onSheet = ({ x, y, rotation, mirrored }: Placement): ((p: Vec2) => Vec2) => {
  const c = Math.cos((rotation * Math.PI) / 180)
  const s = Math.sin((rotation * Math.PI) / 180)
  return ([u, v]) => {
    const m = mirrored ? -u : u
    return [c * m - s * v + x, s * m + c * v + y]
  }
}

const keyOf = (a: Point3, b: Point3): string => [...a, ...b].map((x) => Math.round(x * 1e4)).join(' ')

/** Finds the crease of a panel's ring edge by its ends on the skin. */
export const creaseFinder = (plan: Plan): ((panel: number, a: Point3, b: Point3) => PlanCrease | undefined) => {
  const found = new Map<string, PlanCrease>()
  for (const c of plan.creases) {
    found.set(`${c.panels[0]}:${keyOf(c.ends[0], c.ends[1])}`, c)
    found.set(`${c.panels[1]}:${keyOf(c.ends[1], c.ends[0])}`, c)
  }
  return (panel, a, b) => found.get(`${panel}:${keyOf(a, b)}`)
}

/** Lays pieces on their sheets. The plan is indexed once for all its pages. */
export const layer = (plan: Plan): ((placement: Placement) => LaidPiece) => {
  const find = creaseFinder(plan)
  const skin = new Map(plan.panels.map((p) => [p.id, p]))
  const creases = new Map(plan.creases.map((c) => [c.id, c]))
  const pieces = new Map(plan.pieces.map((p) => [p.id, p]))
  return (placement) => {
    const piece = pieces.get(placement.piece)!
    const place = onSheet(placement)
    const laid = (ring: readonly Vec2[]): Ring2 => {
      const out = ring.map(place)
      return placement.mirrored ? out.reverse() : out
    }
    const panels = piece.panels.map(({ panel, rings }): LaidPanel => {
      const edges: LaidEdge[] = []
      rings.forEach((ring, r) => {
        const space = skin.get(panel)!.rings[r]!
        ring.forEach((p, i) => {
          const j = (i + 1) % ring.length
          const crease = find(panel, space[i]!, space[j]!)
          if (crease) edges.push({ from: place(p), to: place(ring[j]!), crease, use: useOf(crease, piece) })
        })
      })
      return { panel, rings: rings.map(laid), edges }
    })
    const tabs = piece.tabs.map(
      ({ crease, panel, outline }): LaidTab => ({
        crease: creases.get(crease)!,
        panel,
        outline: laid(outline),
        root: [place(outline[0]!), place(outline[1]!)],
      }),
    )
    return { piece, mirrored: placement.mirrored, panels, tabs }
  }
}

const useOf = (crease: PlanCrease, piece: PlanPiece): EdgeUse =>
  crease.join === 'fold' && piece.folds.includes(crease.id) ? 'fold' : 'seam'

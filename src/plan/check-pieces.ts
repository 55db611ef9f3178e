/** Checks of a plan's nets: flat copies of the panels, held together by folds, without overlap, one cut line. */
import { intersectionArea, regionArea, symmetricDifference, union } from '../geometry/clip'
import { UnionFind } from '../geometry/union-find'
import {
  distance2,
  identity2,
  type Motion2,
  motionBetween,
  move2,
  type Ring2,
  signedArea,
  type Vec2,
} from '../geometry/vec2'
import { dot, planeFrame } from '../geometry/vec3'
import { boxOf, meetingPairs, type PlanIndex, perimeter, verdict, within } from './check-support'
import type { PlanCheck, PlanPanel, PlanPiece, Point3 } from './types'

export const eachPanelOnce = ({ plan, panels: solid }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const count = new Map<number, number>()
  for (const piece of plan.pieces) for (const { panel } of piece.panels) count.set(panel, (count.get(panel) ?? 0) + 1)
  for (const { id } of plan.panels) {
    const times = count.get(id) ?? 0
    if (times !== 1) faults.push(`panel ${id} is in ${times} pieces`)
  }
  for (const { label, panels, colour } of plan.pieces) {
    const colours = new Set(panels.map(({ panel }) => solid.get(panel)?.colour))
    const right = colours.size > 1 ? 'mixed' : [...colours][0]
    if (colour !== right) faults.push(`piece ${label}: colour ${colour}, its panels are ${right}`)
  }
  return verdict('each panel once', faults, `${plan.panels.length} panels in ${plan.pieces.length} pieces`)
}

/** The panel in a frame of its own plane, seen from outside. */
const inOwnPlane = (panel: PlanPanel): { rings: Vec2[][]; project: (p: Point3) => Vec2 } => {
  const { u, v } = planeFrame(panel.normal)
  const project = (p: Point3): Vec2 => [dot(p, u), dot(p, v)]
  return { rings: panel.rings.map((ring) => ring.map(project)), project }
}

/** The farthest point from the first: a long base makes the motion fitted to it exact. */
const farthestFrom = (points: readonly Vec2[]): number => {
  let best = 0
  points.forEach((p, i) => {
    if (distance2(p, points[0]!) > distance2(points[best]!, points[0]!)) best = i
  })
  return best
}

/** How a panel's plane came to lie in its piece; orientation is kept, so a mirrored copy cannot fit. */
export const layingMotion = (panel: PlanPanel, rings: readonly Ring2[]): ((p: Point3) => Vec2) => {
  const own = inOwnPlane(panel)
  const from = own.rings.flat()
  const to = rings.flat()
  const far = farthestFrom(from)
  const motion: Motion2 = from.length > 1 && to[far] ? motionBetween(from[0]!, from[far]!, to[0]!, to[far]!) : identity2
  return (p) => move2(motion, own.project(p))
}

export const piecesAreCopies = ({ plan, panels, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const piece of plan.pieces)
    for (const { panel, rings } of piece.panels) {
      const solid = panels.get(panel)!
      if (rings.length !== solid.rings.length || rings.some((ring, r) => ring.length !== solid.rings[r]!.length)) {
        faults.push(`piece ${piece.label}: panel ${panel} has other points`)
        continue
      }
      if (!(rings.reduce((sum, ring) => sum + signedArea(ring), 0) > 0)) {
        faults.push(`piece ${piece.label}: panel ${panel} is mirrored`)
        continue
      }
      const lay = layingMotion(solid, rings)
      const worst = Math.max(...solid.rings.flatMap((ring, r) => ring.map((p, i) => distance2(lay(p), rings[r]![i]!))))
      if (!(worst <= 3 * near)) faults.push(`piece ${piece.label}: panel ${panel} is stretched by ${worst} mm`)
    }
  return verdict('pieces are flat copies', faults, 'true to size, none mirrored')
}

/** Folds join the panels of a piece into one, without a ring of folds, and each fold lies in one place. */
export const foldsHold = ({ plan, panels, creases, laid, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const folded = new Map<number, number>()
  for (const piece of plan.pieces) {
    const place = new Map(piece.panels.map(({ panel }, i) => [panel, i]))
    const joined = new UnionFind(piece.panels.length)
    for (const id of piece.folds) {
      const crease = creases.get(id)!
      folded.set(id, (folded.get(id) ?? 0) + 1)
      const [a, b] = crease.panels.map((panel) => place.get(panel))
      if (a === undefined || b === undefined) {
        faults.push(`piece ${piece.label}: fold ${id} does not join two of its panels`)
        continue
      }
      if (!joined.union(a, b)) faults.push(`piece ${piece.label}: folds run in a ring at ${id}`)
      const [layA, layB] = crease.panels.map((panel) => layingMotion(panels.get(panel)!, laid.get(panel)!.rings))
      if (crease.ends.some((end) => !(distance2(layA!(end), layB!(end)) <= 6 * near)))
        faults.push(`piece ${piece.label}: fold ${id} is torn open`)
    }
    if (piece.folds.length !== piece.panels.length - 1)
      faults.push(`piece ${piece.label}: ${piece.folds.length} folds for ${piece.panels.length} panels`)
  }
  for (const { id, join } of plan.creases) {
    const times = folded.get(id) ?? 0
    if (times !== (join === 'fold' ? 1 : 0)) faults.push(`crease ${id} is a ${join}, and a fold of ${times} pieces`)
  }
  return verdict('folds hold each piece together', faults, `${folded.size} folds`)
}

/** Overlap thinner than this, in mm, is rounding along a shared edge. */
const hair = 1e-3

export const noOverlapInPiece = ({ plan }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const piece of plan.pieces) {
    const all = piece.panels.flatMap(({ rings }) => rings)
    const edges = all.reduce((sum, ring) => sum + perimeter(ring), 0)
    const apart = all.reduce((sum, ring) => sum + signedArea(ring), 0)
    // One union tells whether anything overlaps at all; only then the pairs are looked at.
    if (within(regionArea(union(all)), apart, 1e-4 * edges)) continue
    const boxes = piece.panels.map(({ rings }) => boxOf(rings))
    const before = faults.length
    for (const [i, j] of meetingPairs(boxes)) {
      const [a, b] = [piece.panels[i]!, piece.panels[j]!]
      const area = intersectionArea(a.rings, b.rings)
      const longest = Math.max(perimeter(a.rings[0]!), perimeter(b.rings[0]!))
      if (area > hair * longest)
        faults.push(`piece ${piece.label}: panels ${a.panel} and ${b.panel} overlap by ${area} mm²`)
    }
    if (faults.length === before) faults.push(`piece ${piece.label}: its panels cover less than the sum of their areas`)
  }
  return verdict('no overlap in a piece', faults, 'panels lie side by side')
}

/**
 * The cut line goes round panels and tabs together, their holes aside. Where parts only touch it may run in and out of a
 * slit without width; a pocket that touching parts enclose is outside it.
 */
export const outlinesAreCutLines = ({ plan }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const piece of plan.pieces) {
    const whole = union([...piece.panels.map(({ rings }) => rings[0]!), ...piece.tabs.map(({ outline }) => outline)])
    if (!(signedArea(piece.outline) > 0)) faults.push(`piece ${piece.label}: outline is not CCW`)
    const off = regionArea(symmetricDifference(whole, [piece.outline]))
    if (!(off <= hair * perimeter(piece.outline))) faults.push(`piece ${piece.label}: outline is off by ${off} mm²`)
  }
  return verdict('outlines are the cut lines', faults, `${plan.pieces.length} outlines`)
}

/** Can `b` be laid on `a` by a turn and a shift, panel on panel? */
const sameShape = (a: PlanPiece, b: PlanPiece, near: number): boolean => {
  if (a.panels.length !== b.panels.length) return false
  const cell = (x: number): number => Math.round(x / (20 * near))
  const corners = new Set<string>()
  for (const { rings } of a.panels)
    for (const [x, y] of rings.flat())
      for (const i of [-1, 0, 1]) for (const j of [-1, 0, 1]) corners.add(`${cell(x) + i} ${cell(y) + j}`)
  const base = a.panels[0]!.rings[0]!
  for (const { rings } of b.panels) {
    const ring = rings[0]!
    if (ring.length !== base.length) continue
    for (let shift = 0; shift < ring.length; shift++) {
      const [p, q] = [ring[shift]!, ring[(shift + 1) % ring.length]!]
      if (!within(distance2(p, q), distance2(base[0]!, base[1]!), 10 * near)) continue
      const motion = motionBetween(p, q, base[0]!, base[1]!)
      const fits = (point: Vec2): boolean => {
        const [x, y] = move2(motion, point)
        return corners.has(`${cell(x)} ${cell(y)}`)
      }
      if (b.panels.every((panel) => panel.rings.flat().every(fits))) return true
    }
  }
  return false
}

export const templatesAreAlike = ({ plan, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const first = new Map<string, PlanPiece>()
  for (const piece of plan.pieces) {
    const model = first.get(piece.template)
    if (!model) first.set(piece.template, piece)
    else if (!sameShape(model, piece, near))
      faults.push(`pieces ${model.label} and ${piece.label} share template ${piece.template} but not their shape`)
    else if (model.hand !== piece.hand)
      faults.push(`pieces ${model.label} and ${piece.label} share template ${piece.template} but not their hand`)
  }
  return verdict('pieces of a template are alike', faults, `${first.size} templates`)
}

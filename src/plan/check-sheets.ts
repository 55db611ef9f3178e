/** Checks of a plan's sheets, gluing order and docket. */
import { intersectionArea } from '../geometry/clip'
import { UnionFind } from '../geometry/union-find'
import { distance2, type Ring2, signedArea, type Vec2 } from '../geometry/vec2'
import { distance } from '../geometry/vec3'
import { boxOf, meetingPairs, type PlanIndex, perimeter, verdict, within } from './check-support'
import type { Placement, PlanCheck, PlanPiece, PlanSheet } from './types'

/** Trim sizes in mm, upright: ISO 216 A4, and Letter of 8.5 × 11 inches. */
const papers: Readonly<Record<string, readonly [number, number]>> = { a4: [210, 297], letter: [215.9, 279.4] }

export const placedOutline = (piece: PlanPiece, { x, y, rotation, mirrored }: Placement): Vec2[] => {
  const angle = (rotation * Math.PI) / 180
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const ring = piece.outline.map(([u, v]): Vec2 => {
    const w = mirrored ? -u : u
    return [c * w - s * v + x, s * w + c * v + y]
  })
  return mirrored ? ring.reverse() : ring
}

export const everythingOnSheets = ({ plan, pieces, near }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const times = new Map<number, number>()
  const mirrored = new Set<boolean>()
  for (const sheet of plan.sheets) {
    const paper = papers[sheet.paper]
    const size = [sheet.widthMm, sheet.heightMm]
    const isPaper = paper && [paper, [...paper].reverse()].some((p) => p.every((d, i) => within(d, size[i]!, 1e-9)))
    if (!isPaper) faults.push(`sheet ${sheet.id}: ${size.join(' × ')} mm is not ${sheet.paper}`)
    if (sheet.placed.length === 0) faults.push(`sheet ${sheet.id} is empty`)
    for (const placement of sheet.placed) {
      const piece = pieces.get(placement.piece)!
      times.set(piece.id, (times.get(piece.id) ?? 0) + 1)
      mirrored.add(placement.mirrored)
      const { x0, y0, x1, y1 } = boxOf([placedOutline(piece, placement)])
      const m = sheet.marginMm - near
      if (!(x0 >= m && y0 >= m && x1 <= sheet.widthMm - m && y1 <= sheet.heightMm - m))
        faults.push(`sheet ${sheet.id}: piece ${piece.label} reaches into the margin`)
      if (sheet.colour !== 'all' && sheet.colour !== piece.colour)
        faults.push(`sheet ${sheet.id} is ${sheet.colour}, piece ${piece.label} is ${piece.colour}`)
    }
  }
  for (const { id, label } of plan.pieces)
    if (times.get(id) !== 1) faults.push(`piece ${label} is on sheets ${times.get(id) ?? 0} times`)
  if (mirrored.size > 1) faults.push('some pieces are mirrored and some are not')
  return verdict('everything is on a sheet', faults, `${plan.pieces.length} pieces on ${plan.sheets.length} sheets`)
}

const overlaps = (sheet: PlanSheet, pieces: PlanIndex['pieces']): string[] => {
  const faults: string[] = []
  const placed = sheet.placed.map((placement) => {
    const piece = pieces.get(placement.piece)!
    return { label: piece.label, outline: placedOutline(piece, placement) as Ring2 }
  })
  for (const [i, j] of meetingPairs(placed.map(({ outline }) => boxOf([outline])))) {
    const area = intersectionArea([placed[i]!.outline], [placed[j]!.outline])
    if (area > 1e-3)
      faults.push(`sheet ${sheet.id}: pieces ${placed[i]!.label} and ${placed[j]!.label} overlap by ${area} mm²`)
  }
  return faults
}

export const noOverlapOnSheets = ({ plan, pieces }: PlanIndex): PlanCheck =>
  verdict(
    'nothing overlaps on a sheet',
    plan.sheets.flatMap((sheet) => overlaps(sheet, pieces)),
    `${plan.sheets.length} sheets`,
  )

/**
 * Steps are the pieces in order; each closes the seams between its piece and what is glued already (its own among them),
 * and all but the first piece of a connected part find something to be glued to.
 */
export const stepsJoin = ({ plan, pieces, laid, panels }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const order = plan.steps.map(({ piece }) => piece)
  if (new Set(order).size !== order.length || order.length !== plan.pieces.length)
    return verdict('each step joins', ['the steps are not a permutation of the pieces'], '')
  plan.steps.forEach(({ step, piece }, i) => {
    if (step !== i + 1) faults.push(`step ${step} stands in place ${i + 1}`)
    const { label, step: own } = pieces.get(piece)!
    if (own !== step) faults.push(`piece ${label} says step ${own}, the list says ${step}`)
    if (label.split(' ')[0] !== String(step)) faults.push(`the piece of step ${step} is labelled ${label}`)
  })

  const panelIndex = new Map(plan.panels.map(({ id }, i) => [id, i]))
  const parts = new UnionFind(plan.panels.length)
  const closing = new Map<number, Set<number>>()
  const joins = new Set<number>()
  for (const { id, join, panels: sides } of plan.creases) {
    parts.union(panelIndex.get(sides[0])!, panelIndex.get(sides[1])!)
    if (join === 'fold') continue
    const [a, b] = sides.map((side) => laid.get(side)?.piece)
    if (!a || !b) continue
    const later = a.step > b.step ? a : b
    const list = closing.get(later.step)
    if (list) list.add(id)
    else closing.set(later.step, new Set([id]))
    if (a !== b) joins.add(later.step)
  }
  const begun = new Set<number>()
  for (const { step, piece, seams } of plan.steps) {
    const wanted = closing.get(step) ?? new Set()
    if (seams.length !== wanted.size || !seams.every((seam) => wanted.has(seam)))
      faults.push(`step ${step} names ${seams.length} seams, ${wanted.size} can be closed then`)
    const part = parts.find(panelIndex.get(pieces.get(piece)!.panels[0]?.panel ?? panels.keys().next().value!)!)
    if (!joins.has(step) && begun.has(part)) faults.push(`step ${step}: nothing glued yet that the piece could join`)
    begun.add(part)
  }
  return verdict('each step joins', faults, `${plan.steps.length} steps`)
}

export const docketAgrees = ({ plan, creases, panels }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const { docket } = plan
  const say = (what: string, told: number, found: number, slack = 0): void => {
    if (!within(told, found, slack)) faults.push(`${what}: the docket says ${told}, the plan has ${found}`)
  }
  say('panels', docket.panels, plan.panels.length)
  say('pieces', docket.pieces, plan.pieces.length)
  say('templates', docket.templates, new Set(plan.pieces.map(({ template }) => template)).size)
  const seams = plan.creases.filter(({ join }) => join === 'seam')
  say('seams', docket.seams, seams.length)
  say('sheets', docket.sheets, plan.sheets.length)
  // Several creases lie along one line contact; their ends are the same points to the last digit.
  const lines = plan.creases
    .filter(({ contact }) => contact === 'line')
    .map(({ ends }) => ends.map(String).sort().join(' '))
  say('line contacts', docket.lineContacts, new Set(lines).size)
  if (docket.contacts)
    say(
      'line contacts listed',
      docket.contacts.filter((c) => lines.includes(c.ends.map(String).sort().join(' '))).length,
      new Set(lines).size,
    )
  if (docket.parts && docket.parts.length > 0) {
    const listed = docket.parts.flatMap((part) => part.pieces)
    say('pieces of separate parts', listed.length, plan.pieces.length)
    say('pieces of separate parts, each once', new Set(listed).size, plan.pieces.length)
  }
  const card = plan.sheets.reduce((sum, { widthMm, heightMm }) => sum + widthMm * heightMm, 0)
  say('card area', docket.cardAreaMm2, card, 1e-6 * card)
  const net =
    plan.panels.reduce((sum, { areaMm2 }) => sum + areaMm2, 0) +
    plan.pieces.flatMap((piece) => piece.tabs).reduce((sum, { outline }) => sum + signedArea(outline), 0)
  say('net area', docket.netAreaMm2, net, 1e-6 * net)
  say('utilisation', docket.utilisation, net / card, 1e-6)
  const { total, ...kinds } = docket.hours
  say(
    'hours',
    total,
    Object.values(kinds).reduce((sum, hours) => sum + hours, 0),
    1e-6 * (1 + total),
  )
  for (const [kind, hours] of Object.entries(docket.hours)) if (!(hours >= 0)) faults.push(`hours to ${kind}: ${hours}`)
  say(
    'sharpest inner angle',
    docket.sharpestInnerAngle,
    Math.min(...plan.creases.map(({ innerAngle }) => innerAngle)),
    1e-6,
  )

  const lengthOf = (ids: readonly number[]): number =>
    ids.reduce((sum, id) => sum + distance(...creases.get(id)!.ends), 0)
  const tabs = plan.pieces.flatMap((piece) => piece.tabs.map(({ outline }) => outline))
  const rings = plan.pieces.flatMap((piece) => piece.panels.flatMap((entry) => entry.rings))
  const folds = lengthOf(plan.pieces.flatMap((piece) => piece.folds))
  const roots = tabs.reduce((sum, outline) => sum + distance2(outline[0]!, outline[1]!), 0)
  const round = (list: readonly Ring2[]): number => list.reduce((sum, ring) => sum + perimeter(ring), 0)
  // All edges of panels and tabs are cut but the folds (an edge of two panels) and the roots (of a panel and a tab).
  const cut = round(rings) + round(tabs) - 2 * folds - 2 * roots
  say('cut length', docket.cutMm, cut, 1e-6 * cut)
  // Folds and the roots of tabs are scored.
  say('score length', docket.scoreMm, folds + roots, 1e-6 * (folds + roots))
  const glue = lengthOf(seams.map(({ id }) => id))
  say('glue length', docket.glueMm, glue, 1e-6 * glue)
  if (!panels.has(docket.tightest.panel)) faults.push(`the tightest panel ${docket.tightest.panel} is not there`)
  return verdict('the docket agrees', faults, 'counts, areas, lengths and hours')
}

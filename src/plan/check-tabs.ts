/** Checks of a plan's seams and tabs: roots, room in the flat net, room behind the receiving panel, pairs, labels. */
import { differenceArea, intersectionArea, offset } from '../geometry/clip'
import { cross2, distance2, dot2, left2, normalize2, type Ring2, signedArea, sub2, type Vec2 } from '../geometry/vec2'
import { layingMotion } from './check-pieces'
import { boxOf, meetingPairs, type PlanIndex, perimeter, verdict } from './check-support'
import type { PlanCheck, PlanCrease, PlanTab } from './types'

/** Areas up to this many mm² per mm of outline are rounding. */
const hair = 1e-3

/** Both ends of a crease where panel `side` (0 or 1) of it lies flat, in the direction in which the panel is to the left. */
const flatEnds = ({ panels, laid }: PlanIndex, crease: PlanCrease, side: 0 | 1): [Vec2, Vec2] => {
  const panel = crease.panels[side]
  const lay = layingMotion(panels.get(panel)!, laid.get(panel)!.rings)
  const ends: [Vec2, Vec2] = [lay(crease.ends[0]), lay(crease.ends[1])]
  return side === 0 ? ends : [ends[1], ends[0]]
}

const sideOf = (crease: PlanCrease, panel: number): 0 | 1 => (crease.panels[0] === panel ? 0 : 1)

export const tabsHangOnSeams = (index: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const [id, list] of index.tabs) {
    const crease = index.creases.get(id)!
    for (const { piece, tab } of list) {
      const say = (what: string): number =>
        faults.push(`piece ${piece.label}: tab on seam ${crease.label ?? id} ${what}`)
      if (crease.join !== 'seam') say('stands on a fold')
      if (!crease.panels.includes(tab.panel)) say(`is not on an edge of panel ${tab.panel}`)
      else if (index.laid.get(tab.panel)?.piece !== piece) say(`is cut out with a piece that has no panel ${tab.panel}`)
      else if (tab.outline.length < 3 || !(signedArea(tab.outline) > 0)) say('is not CCW')
      else {
        const [from, to] = flatEnds(index, crease, sideOf(crease, tab.panel))
        const along = normalize2(sub2(to, from))
        const height = (p: Vec2): number => cross2(along, sub2(p, from))
        const reach = (p: Vec2): number => dot2(along, sub2(p, from))
        const root = tab.outline.slice(0, 2)
        const length = distance2(from, to)
        const onCrease = (p: Vec2): boolean =>
          Math.abs(height(p)) <= 6 * index.near && reach(p) >= -6 * index.near && reach(p) <= length + 6 * index.near
        if (!root.every(onCrease)) say('has its root off the seam')
        else if (!tab.outline.every((p) => height(p) <= 6 * index.near)) say('lies on its own panel')
      }
    }
  }
  return verdict('tabs hang on their seams', faults, `${index.plan.pieces.reduce((n, p) => n + p.tabs.length, 0)} tabs`)
}

/** mm that a knife needs between a tab and what is not its own panel. */
const leastGap = 0.1

export const tabsClearInFlat = ({ plan }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  for (const piece of plan.pieces) {
    // Tabs are grown by the gap, except towards their own panel, which they touch along the root.
    const parts = [
      ...piece.tabs.map(({ crease, panel, outline }) => ({
        name: `tab on crease ${crease}`,
        carrier: panel,
        own: undefined,
        rings: [outline] as readonly Ring2[],
        grown: offset([outline], leastGap, { join: 'miter' }),
      })),
      ...piece.panels.map(({ panel, rings }) => ({
        name: `panel ${panel}`,
        carrier: undefined,
        own: panel,
        rings: rings as readonly Ring2[],
        grown: rings as readonly Ring2[],
      })),
    ]
    for (const [i, j] of meetingPairs(parts.map(({ grown }) => boxOf(grown)))) {
      // Tabs come first in the list, so the first of a pair is one unless both are panels.
      const [tab, other] = [parts[i]!, parts[j]!]
      if (tab.carrier === undefined) continue
      const area = intersectionArea(tab.carrier === other.own ? tab.rings : tab.grown, other.rings)
      if (area > hair * Math.min(perimeter(tab.rings[0]!), perimeter(other.rings[0]!)))
        faults.push(`piece ${piece.label}: ${tab.name} lies on ${other.name} or too near, by ${area} mm²`)
    }
  }
  return verdict('tabs are clear in the flat', faults, `${leastGap} mm from other panels and tabs`)
}

/** Where a tab comes to lie on the receiving panel, in the plane of that panel's piece: mirrored across the seam. */
const foldedOver = (index: PlanIndex, crease: PlanCrease, tab: PlanTab): Vec2[] => {
  const giving = sideOf(crease, tab.panel)
  const [from, to] = flatEnds(index, crease, giving)
  // The receiver has the crease the other way round.
  const [there, back] = flatEnds(index, crease, giving === 0 ? 1 : 0)
  const along = normalize2(sub2(to, from))
  const alongThere = normalize2(sub2(there, back))
  const inThere = left2(normalize2(sub2(back, there)))
  return tab.outline.map((p) => {
    const t = dot2(along, sub2(p, from))
    const depth = -cross2(along, sub2(p, from))
    return [back[0] + t * alongThere[0] + depth * inThere[0], back[1] + t * alongThere[1] + depth * inThere[1]]
  })
}

export const tabsFitBehind = (index: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const behind = new Map<number, { name: string; outline: Vec2[] }[]>()
  let count = 0
  for (const [id, list] of index.tabs) {
    const crease = index.creases.get(id)!
    for (const { tab } of list) {
      if (tab.kind !== 'single' || !crease.panels.includes(tab.panel)) continue
      count++
      const receiver = crease.panels[1 - sideOf(crease, tab.panel)]!
      const outline = foldedOver(index, crease, tab)
      const name = `tab on seam ${crease.label ?? id}`
      const out = differenceArea([outline], index.laid.get(receiver)!.rings)
      if (!(out <= hair * perimeter(outline))) faults.push(`${name} sticks out of panel ${receiver} by ${out} mm²`)
      const others = behind.get(receiver)
      if (others) others.push({ name, outline })
      else behind.set(receiver, [{ name, outline }])
    }
  }
  for (const [panel, list] of behind)
    for (const [i, j] of meetingPairs(list.map(({ outline }) => boxOf([outline])))) {
      const [a, b] = [list[i]!, list[j]!]
      const area = intersectionArea([a.outline], [b.outline])
      if (area > hair * Math.min(perimeter(a.outline), perimeter(b.outline)))
        faults.push(`${a.name} and ${b.name} lie on each other behind panel ${panel}`)
    }
  return verdict('tabs fit behind', faults, `${count} tabs inside the panels that they are glued to`)
}

/** A seam carries one single tab, or two paired ones, or strips; it has a label of its own; bare ones are in the docket. */
export const seamsArePaired = ({ plan, tabs, laid }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const labels = new Map<string, number>()
  let seams = 0
  for (const { id, join, label, panels } of plan.creases) {
    if (join === 'fold') {
      if (label !== undefined) faults.push(`crease ${id} is a fold with a seam label`)
      continue
    }
    seams++
    if (!label) faults.push(`seam ${id} has no label`)
    else if (labels.has(label)) faults.push(`seams ${labels.get(label)} and ${id} share the label ${label}`)
    else labels.set(label, id)
    const carried = tabs.get(id) ?? []
    const kinds = new Set(carried.map(({ tab }) => tab.kind))
    if (kinds.size > 1) faults.push(`seam ${label ?? id}: tabs of several kinds`)
    if (kinds.has('single')) {
      if (carried.length > 1) faults.push(`seam ${label ?? id}: ${carried.length} single tabs`)
      const { piece, tab } = carried[0]!
      const receiver = laid.get(panels[0] === tab.panel ? panels[1] : panels[0])
      if (receiver && piece.step > receiver.piece.step)
        faults.push(`seam ${label ?? id}: its tab comes with piece ${piece.label}, after the one it is glued to`)
    }
    if (kinds.has('paired') && new Set(carried.map(({ tab }) => tab.panel)).size !== 2)
      faults.push(`seam ${label ?? id}: a paired tab without its partner`)
  }
  return verdict('each seam is paired', faults, `${seams} seams`)
}

export const buttSeamsOwnedUp = ({ plan, tabs }: PlanIndex): PlanCheck => {
  const faults: string[] = []
  const owned = new Set(plan.docket.buttSeams)
  for (const { id, join, label } of plan.creases) {
    const bare = join === 'seam' && !tabs.has(id)
    if (bare !== owned.has(id))
      faults.push(`seam ${label ?? id} has ${bare ? 'no' : 'a'} tab, the docket says otherwise`)
  }
  if (owned.size !== plan.docket.buttSeams.length) faults.push('a butt seam is listed twice')
  return verdict('butt seams are owned up to', faults, `${owned.size} seams without a tab`)
}

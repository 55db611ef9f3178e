/** Independent measures on finished pieces: everything by clipping polygons, nothing from src/pieces. */
import { differenceArea, intersectionArea, offset } from '../../src/geometry/clip'
import { type Ring2, signedArea, type Vec2 } from '../../src/geometry/vec2'
import type { FlatPanel, Piece, Tab } from '../../src/pieces'
import type { Skin } from '../../src/skin/types'

const shrunk = (p: FlatPanel): Ring2[] => offset(p.rings, -0.002, { join: 'miter' })

/** Greatest common area of two panels in any piece, panels drawn in by 0.002 mm so that touching edges do not count. */
export const worstOverlap = (pieces: readonly Piece[]): number => {
  let worst = 0
  for (const piece of pieces) {
    const panels = piece.panels.map(shrunk)
    for (let i = 0; i < panels.length; i++)
      for (let j = i + 1; j < panels.length; j++) worst = Math.max(worst, intersectionArea(panels[i]!, panels[j]!))
  }
  return worst
}

const edge = (skin: Skin, at: FlatPanel, crease: number): [Vec2, Vec2] => {
  const lists = skin.panels[at.panel]!.creases
  const r = lists.findIndex((l) => l.includes(crease))
  const ring = at.rings[r]!
  const i = lists[r]!.indexOf(crease)
  return [ring[i]!, ring[(i + 1) % ring.length]!]
}

const turned = (from: Vec2, to: Vec2): Vec2 => {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1])
  return [(to[0] - from[0]) / length, (to[1] - from[1]) / length]
}

/** The tab where it comes to lie behind the receiving panel, in the plane of that panel's piece. */
export const foldedOver = (skin: Skin, tab: Tab, carrier: FlatPanel, receiver: FlatPanel): Ring2 => {
  const [a, b] = edge(skin, carrier, tab.crease)
  const [c, d] = edge(skin, receiver, tab.crease)
  const t = turned(a, b)
  // The receiver's edge runs the other way, d where the carrier has a. Fold the card over along the crease: what is
  // outside the carrier's edge lands inside the receiver's.
  const u = turned(d, c)
  return tab.outline.map((p): Vec2 => {
    const along = (p[0] - a[0]) * t[0] + (p[1] - a[1]) * t[1]
    const out = Math.abs((p[0] - a[0]) * t[1] - (p[1] - a[1]) * t[0])
    // The receiver lies to the left of c → d, which is to the right of u.
    return [d[0] + along * u[0] + out * u[1], d[1] + along * u[1] - out * u[0]]
  })
}

const corner = (ring: Ring2, at: Vec2): number => {
  const i = ring.findIndex((p) => Math.hypot(p[0] - at[0], p[1] - at[1]) < 1e-6)
  const n = ring.length
  const [p, q, s] = [ring[(i + n - 1) % n]!, ring[i]!, ring[(i + 1) % n]!]
  const [x, y] = [turned(q, s), turned(q, p)]
  const angle = Math.atan2(x[0] * y[1] - x[1] * y[0], x[0] * y[0] + x[1] * y[1]) * (180 / Math.PI)
  return angle < 0 ? angle + 360 : angle
}

/** All faults of tabs against the four rules, in words. */
export const tabFaults = (skin: Skin, pieces: readonly Piece[], tabs: readonly (readonly Tab[])[]): string[] => {
  const faults: string[] = []
  const where = new Map(pieces.flatMap((q, i) => q.panels.map((p) => [p.panel, { flat: p, piece: i }] as const)))
  const behind = new Map<number, { crease: number; ring: Ring2 }[]>()
  for (const [i, piece] of pieces.entries()) {
    const own = tabs[i] ?? []
    for (const tab of own) {
      const name = `tab ${tab.crease} on panel ${tab.panel}`
      const carrier = where.get(tab.panel)!
      const other = skin.creases[tab.crease]!.panels.find((p) => p !== tab.panel)!
      const receiver = where.get(other)!
      // 1: in the flat, with a gap.
      if (signedArea(tab.outline) <= 0) faults.push(`${name} runs clockwise`)
      const grown = offset([tab.outline], 0.19)
      for (const p of piece.panels)
        if (intersectionArea(p.panel === tab.panel ? [tab.outline] : grown, p.rings) > 1e-3)
          faults.push(`${name} on or near panel ${p.panel}`)
      for (const t of own)
        if (t !== tab && intersectionArea(grown, [t.outline]) > 1e-3) faults.push(`${name} near tab ${t.crease}`)
      // 2: behind the receiving panel, and off the other tabs there.
      const ring = foldedOver(skin, tab, carrier.flat, receiver.flat)
      const upright = signedArea(ring) < 0 ? [...ring].reverse() : ring
      // The whole root lies on the outline, and clipping rounds to 1e-5 mm.
      if (differenceArea([upright], receiver.flat.rings) > 5e-3) faults.push(`${name} sticks out behind ${other}`)
      const there = behind.get(other) ?? []
      for (const t of there)
        if (intersectionArea([upright], [t.ring]) > 1e-3) faults.push(`${name} over tab ${t.crease} behind ${other}`)
      behind.set(other, [...there, { crease: tab.crease, ring: upright }])
      // 3: end angles against the receiver's corners. The tab's ring is root (b side, a side), then the free edge back.
      const [rootB, rootA, topA, topB] = tab.outline as [Vec2, Vec2, Vec2, Vec2]
      const [c, d] = edge(skin, receiver.flat, tab.crease)
      const line = receiver.flat.rings.find((r) => r.some((p) => Math.hypot(p[0] - c[0], p[1] - c[1]) < 1e-6))!
      const between = (p: Vec2, q: Vec2): number => {
        const cos = p[0] * q[0] + p[1] * q[1]
        return Math.acos(Math.max(-1, Math.min(1, cos))) * (180 / Math.PI)
      }
      const startAngle = between(turned(rootA, rootB), turned(rootA, topA))
      const endAngle = between(turned(rootB, rootA), turned(rootB, topB))
      if (startAngle > corner(line, d) + 1e-6) faults.push(`${name}: ${startAngle} at a corner of ${corner(line, d)}`)
      if (endAngle > corner(line, c) + 1e-6) faults.push(`${name}: ${endAngle} at a corner of ${corner(line, c)}`)
      // 4: on the piece glued earlier.
      if (carrier.piece !== i || receiver.piece < i) faults.push(`${name} is on the later piece`)
    }
  }
  return faults
}

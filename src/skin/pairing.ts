/** Line contacts paired otherwise: the same skin, its panels joined through the inside or across the outside. */
import { UnionFind } from '../geometry/union-find'
import { insideJoins, outsideJoins } from './creases'
import { backToBack, type FanEdge, fanOf } from './stretches'
import type { LineContact, Skin, SkinCrease } from './types'

/**
 * @param pairing by contact; contacts keep theirs where it gives what they have
 * @returns a skin with the same panels, rings and crease ids; only creases along contacts change their partners
 */
export const withPairing = (skin: Skin, pairing: (contact: number) => LineContact['pairing']): Skin => {
  const changed = skin.contacts.map((c, i) => (pairing(i) === c.pairing ? null : pairing(i)))
  if (changed.every((p) => p === null)) return skin
  const around: FanEdge[][] = skin.contacts.map(() => [])
  for (const panel of skin.panels)
    panel.rings.forEach((ring, r) => {
      ring.forEach((from, e) => {
        const { stretch } = skin.creases[panel.creases[r]![e]!]!
        if (stretch >= 0 && changed[stretch])
          around[stretch]!.push({ panel: panel.id, ring: r, edge: e, from, to: ring[(e + 1) % ring.length]! })
      })
    })
  const creases = [...skin.creases]
  const moved = new Map<string, number>()
  skin.contacts.forEach((contact, i) => {
    const way = changed[i]
    if (!way) return
    const ids = skin.creases.filter((c) => c.stretch === i).map((c) => c.id)
    const blades = fanOf(around[i]!, skin.panels, skin.points, backToBack(skin.slack))
    const [from, to] = [Math.min(...contact.ends), Math.max(...contact.ends)]
    const stretch = { from, to, blades }
    const joins = way === 'outside' ? outsideJoins(stretch) : insideJoins(stretch)
    joins.forEach(({ blades: [a, b], innerAngle }, k) => {
      const id = ids[k]!
      // The first panel's ring runs along the ends, the other's against them.
      const ends: [number, number] = a.aligned ? [from, to] : [to, from]
      creases[id] = { ...skin.creases[id]!, panels: [a.panel, b.panel], ends, innerAngle } satisfies SkinCrease
      for (const blade of [a, b]) moved.set(`${blade.panel} ${blade.ring} ${blade.edge}`, id)
    })
  })
  const parts = new UnionFind(skin.panels.length)
  for (const c of creases) parts.union(c.panels[0], c.panels[1])
  return {
    ...skin,
    panels: skin.panels.map((p) => ({
      ...p,
      creases: p.creases.map((list, r) => list.map((id, e) => moved.get(`${p.id} ${r} ${e}`) ?? id)),
    })),
    creases,
    contacts: skin.contacts.map((c, i) => ({ ...c, pairing: changed[i] ?? c.pairing })),
    parts: new Set(skin.panels.map((p) => parts.find(p.id))).size,
  }
}

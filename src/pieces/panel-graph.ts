/**
 * The skin as pieces see it: flat panels as nodes, creases as links that know how one panel lies beside the other when
 * the crease between them is laid flat.
 */
import { BrokenPromise } from '../errors'
import { convexParts } from '../geometry/convex'
import { distance2, type Motion2, motionBetween, type Vec2 } from '../geometry/vec2'
import type { Skin } from '../skin/types'
import { flattenPanels } from './flatten'
import type { FlatPanel } from './types'

/** One ring edge of one panel: from ring point `index` to the next. */
export interface RingEdge {
  readonly panel: number
  readonly ring: number
  readonly index: number
}

/** A crease between panels `sides[0].panel` and `sides[1].panel`. */
export interface Link {
  readonly id: number
  readonly sides: readonly [RingEdge, RingEdge]
  /** Takes the second panel's frame into the first's, the crease laid flat. */
  readonly motion: Motion2
  readonly lengthMm: number
  /** Degrees, see `SkinCrease`. */
  readonly innerAngle: number
}

export interface PanelGraph {
  readonly edgeMm: number
  readonly flat: readonly FlatPanel[]
  /** By panel: its convex parts in its own frame, x0, y0, x1, … in mm, part after part; and how many numbers each has. */
  readonly parts: readonly Float64Array[]
  readonly partSizes: readonly Int32Array[]
  /** By panel, mm². */
  readonly areas: readonly number[]
  /** By panel: face kind. */
  readonly kinds: readonly number[]
  /** By crease id. */
  readonly links: readonly Link[]
  /** By panel: crease ids, in ring order. */
  readonly linksOf: readonly (readonly number[])[]
}

/** Ring point `index` of a panel, and the next one round the ring, in the panel's own frame. */
export const edgeEnds = (flat: readonly FlatPanel[], e: RingEdge): readonly [Vec2, Vec2] => {
  const ring = flat[e.panel]!.rings[e.ring]!
  return [ring[e.index]!, ring[(e.index + 1) % ring.length]!]
}

/** @throws BrokenPromise when a crease does not belong to exactly one ring edge of two different panels */
export const panelGraph = (skin: Skin, edgeMm: number): PanelGraph => {
  const flat = flattenPanels(skin, edgeMm)
  const sides: RingEdge[][] = skin.creases.map(() => [])
  for (const panel of skin.panels)
    panel.creases.forEach((ring, r) => {
      ring.forEach((crease, index) => {
        sides[crease]!.push({ panel: panel.id, ring: r, index })
      })
    })
  const links = skin.creases.map((crease, id): Link => {
    const pair = [...sides[id]!].sort((a, b) => crease.panels.indexOf(a.panel) - crease.panels.indexOf(b.panel))
    const [a, b] = pair
    if (!a || !b || pair.length > 2 || a.panel !== crease.panels[0] || b.panel !== crease.panels[1] || crease.id !== id)
      throw new BrokenPromise('A crease is not one ring edge of each of its two panels.', { crease: id, sides: pair })
    const [from, to] = edgeEnds(flat, a)
    const [otherFrom, otherTo] = edgeEnds(flat, b)
    return {
      id,
      sides: [a, b],
      // The two rings run along their common crease in opposite directions.
      motion: motionBetween(otherFrom, otherTo, to, from),
      lengthMm: distance2(from, to),
      innerAngle: crease.innerAngle,
    }
  })
  const parts = flat.map((p) => convexParts(p.rings))
  return {
    edgeMm,
    flat,
    parts: parts.map((list) => Float64Array.from(list.flatMap((part) => [...part]))),
    partSizes: parts.map((list) => Int32Array.from(list, (part) => part.length)),
    areas: skin.panels.map((p) => p.area * edgeMm * edgeMm),
    kinds: skin.panels.map((p) => p.kind),
    links,
    linksOf: skin.panels.map((p) => p.creases.flat()),
  }
}

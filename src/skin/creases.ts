/**
 * From stretches to creases. An ordinary stretch is one crease. At a line contact the blades can be paired through the
 * inside (each body closes by itself) or across the outside (a valley fold that carries the skin from one body to the
 * next); the pairing is chosen so that as few contacts as possible are crossed and yet the skin hangs together.
 */
import { UnionFind } from '../geometry/union-find'
import type { Blade, Stretch } from './stretches'

/** Two blades that one crease joins, with the angle between their panels through the card side. */
export interface Join {
  readonly blades: readonly [Blade, Blade]
  readonly innerAngle: number
}

const inDegrees = (radians: number): number => (radians * 180) / Math.PI

/** Across the outside: blades 0–1, 2–3, … */
export const outsideJoins = ({ blades }: Stretch): Join[] => {
  const joins: Join[] = []
  for (let i = 0; i < blades.length; i += 2) {
    const a = blades[i]!
    const b = blades[i + 1]!
    joins.push({ blades: [a, b], innerAngle: 360 - inDegrees(b.angle - a.angle) })
  }
  return joins
}

/** Through the inside: blades 1–2, 3–4, …, last–0. */
export const insideJoins = ({ blades }: Stretch): Join[] => {
  const joins: Join[] = []
  for (let i = 1; i < blades.length; i += 2) {
    const a = blades[i]!
    const last = i + 1 === blades.length
    const b = blades[last ? 0 : i + 1]!
    const wedge = inDegrees(b.angle - a.angle + (last ? 2 * Math.PI : 0))
    joins.push({ blades: [b, a], innerAngle: Math.max(0, wedge) })
  }
  return joins
}

export interface Pairing {
  /** By stretch. */
  readonly across: readonly boolean[]
  /** By panel: its body, with every line contact paired through the inside. */
  readonly bodyOf: readonly number[]
  readonly bodies: number
  /** Parts that do not hang together under the chosen pairing. */
  readonly parts: number
}

/** @param lengths by stretch */
export const pairContacts = (stretches: readonly Stretch[], panels: number, lengths: readonly number[]): Pairing => {
  const bodies = new UnionFind(panels)
  for (const s of stretches) for (const { blades } of insideJoins(s)) bodies.union(blades[0].panel, blades[1].panel)
  const number = new Map<number, number>()
  const bodyOf = Array.from({ length: panels }, (_, p) => {
    const root = bodies.find(p)
    if (!number.has(root)) number.set(root, number.size)
    return number.get(root)!
  })
  // A spanning forest over the bodies, longest contacts first (Kruskal's algorithm).
  const hung = new UnionFind(number.size)
  const across = stretches.map(() => false)
  const contacts = stretches.map((_, i) => i).filter((i) => stretches[i]!.blades.length > 2)
  contacts.sort((a, b) => (Math.abs(lengths[a]! - lengths[b]!) > 1e-9 ? lengths[b]! - lengths[a]! : a - b))
  for (const i of contacts) {
    const around = stretches[i]!.blades.map((b) => bodyOf[b.panel]!)
    for (const b of around) if (hung.union(around[0]!, b)) across[i] = true
  }
  const whole = new UnionFind(panels)
  stretches.forEach((s, i) => {
    for (const { blades } of across[i] ? outsideJoins(s) : insideJoins(s)) whole.union(blades[0].panel, blades[1].panel)
  })
  const roots = new Set<number>()
  for (let p = 0; p < panels; p++) roots.add(whole.find(p))
  return { across, bodyOf, bodies: number.size, parts: roots.size }
}

/**
 * The order of gluing: which piece is next, and which seams it closes. A greedy walk over the graph of pieces, as in
 * Prim's algorithm (Bell System Technical Journal 36, 1957): the piece that joins what is glued along the most seam and
 * opens the least new rim comes next. The closing piece is chosen beforehand and kept for last.
 */
import type { Piece } from '../pieces/types'
import type { Skin } from '../skin/types'

export interface GluingStep {
  /** `Piece.id` */
  readonly piece: number
  /** Crease ids of the seams that this step closes: inside the piece, and to what is glued already. */
  readonly seams: readonly number[]
  /** Plain words for the builder; empty when the step is like any other. */
  readonly note: string
}

export interface GluingOrder {
  /** Piece ids, first to last. */
  readonly order: readonly number[]
  readonly steps: readonly GluingStep[]
}

/** A seam as the order sees it: between piece indices a and b, which may be the same. */
interface Seam {
  readonly crease: number
  readonly a: number
  readonly b: number
  readonly length: number
}

/** All creases that are not folds. */
const seamsBetween = (skin: Skin, pieces: readonly Piece[]): Seam[] => {
  const pieceOf = new Map<number, number>()
  pieces.forEach((piece, i) => {
    for (const { panel } of piece.panels) pieceOf.set(panel, i)
  })
  const folds = new Set(pieces.flatMap((p) => p.folds))
  return skin.creases
    .filter((c) => !folds.has(c.id))
    .map((c) => ({ crease: c.id, a: pieceOf.get(c.panels[0])!, b: pieceOf.get(c.panels[1])!, length: c.length }))
}

/** New rim counts this much against joined seam, a further separate stretch as much as this part of a mean seam. */
const rimWeight = 0.25
const stretchWeight = 0.5

/**
 * Each new piece joins what is already glued along seams, as long as there is such a piece; a part of the model that
 * hangs together nowhere with the rest is begun with a note. Deterministic: ties go to the smaller piece id.
 */
export const gluingOrder = (skin: Skin, pieces: readonly Piece[]): GluingOrder => {
  const seams = seamsBetween(skin, pieces)
  const seamsOf: Seam[][] = pieces.map(() => [])
  for (const s of seams) {
    seamsOf[s.a]!.push(s)
    if (s.b !== s.a) seamsOf[s.b]!.push(s)
  }
  const mean = seams.reduce((sum, s) => sum + s.length, 0) / Math.max(1, seams.length)
  const centres = pieces.map((p) => centreOf(skin, p))
  const parts = connectedParts(seamsOf)
  const glued = pieces.map(() => false)
  const steps: GluingStep[] = []
  const take = (i: number, note: string): void => {
    glued[i] = true
    const closed = seamsOf[i]!.filter((s) => glued[s.a] && glued[s.b])
    steps.push({ piece: pieces[i]!.id, seams: closed.map((s) => s.crease).sort((a, b) => a - b), note })
  }
  parts.forEach((part, k) => {
    const closing = closingPiece(skin, pieces, part, seamsOf)
    take(
      startingPiece(part, closing, centres, pieces, skin),
      k === 0 ? '' : 'Starts a separate part: no seam joins it to what is glued so far.',
    )
    for (let left = part.length - 1; left > 0; left--) {
      let best = -1
      let bestScore = Number.NEGATIVE_INFINITY
      for (const i of part) {
        if (glued[i] || (i === closing && left > 1)) continue
        let joined = 0
        let open = 0
        const line: number[] = []
        for (const s of seamsOf[i]!) {
          if (s.a === s.b) continue
          if (glued[s.a === i ? s.b : s.a]) {
            joined += s.length
            line.push(s.crease)
          } else open += s.length
        }
        if (line.length === 0) continue
        const score = joined - rimWeight * open - stretchWeight * mean * (stretches(skin, line) - 1)
        if (score > bestScore + 1e-9) {
          bestScore = score
          best = i
        }
      }
      take(best, left === 1 && part.length > 2 ? 'Closing piece.' : '')
    }
  })
  return { order: steps.map((s) => s.piece), steps }
}

/** Piece indices by connected part, each part ascending. */
const connectedParts = (seamsOf: readonly (readonly Seam[])[], without = -1): number[][] => {
  const seen = seamsOf.map((_, i) => i === without)
  const parts: number[][] = []
  for (let i = 0; i < seamsOf.length; i++) {
    if (seen[i]) continue
    seen[i] = true
    const part = [i]
    for (let k = 0; k < part.length; k++)
      for (const s of seamsOf[part[k]!]!) {
        const other = s.a === part[k] ? s.b : s.a
        if (!seen[other]) {
          seen[other] = true
          part.push(other)
        }
      }
    parts.push(part.sort((a, b) => a - b))
  }
  return parts
}

/** Connected stretches that the creases form, joined at their ends. */
const stretches = (skin: Skin, creases: readonly number[]): number => {
  const group = new Map<number, number>()
  let count = 0
  const root = (v: number): number => {
    let r = v
    while (group.get(r) !== r) r = group.get(r)!
    return r
  }
  for (const id of creases) {
    for (const v of skin.creases[id]!.ends)
      if (!group.has(v)) {
        group.set(v, v)
        count++
      }
    const [a, b] = skin.creases[id]!.ends.map(root) as [number, number]
    if (a !== b) {
      group.set(a, b)
      count--
    }
  }
  return count
}

type Point = readonly [number, number, number]

const centreOf = (skin: Skin, piece: Piece): Point => {
  const sum: [number, number, number] = [0, 0, 0]
  let weight = 0
  for (const { panel } of piece.panels) {
    const { rings, area } = skin.panels[panel]!
    const ring = rings[0]!
    for (const v of ring) for (const k of [0, 1, 2] as const) sum[k] += (skin.points[v]![k] * area) / ring.length
    weight += area
  }
  return [sum[0] / weight, sum[1] / weight, sum[2] / weight]
}

/**
 * Last comes a large plain lid: much area for little outline, few panels, few and long edges, seams of obtuse inner angle
 * where fingers reach; common practice, no source. It must not be what holds the rest together.
 */
const closingPiece = (
  skin: Skin,
  pieces: readonly Piece[],
  part: readonly number[],
  seamsOf: readonly (readonly Seam[])[],
): number => {
  if (part.length < 3) return -1
  const scored = part.map((i) => {
    let rim = 0
    let outline = 0
    let bend = 0
    for (const s of seamsOf[i]!) {
      outline += s.a === s.b ? 2 * s.length : s.length
      if (s.a === s.b) continue
      rim += s.length
      bend += s.length * Math.abs(180 - skin.creases[s.crease]!.innerAngle)
    }
    const { panels } = pieces[i]!
    const area = panels.reduce((sum, p) => sum + skin.panels[p.panel]!.area, 0)
    const round = area / (outline * outline)
    const open = rim > 0 ? 1 - bend / rim / 360 : 0
    return { i, score: round * open * Math.sqrt(area / panels.length) * (1 + 1 / seamsOf[i]!.length) }
  })
  scored.sort((a, b) => (Math.abs(a.score - b.score) > 1e-9 ? b.score - a.score : a.i - b.i))
  const whole = connectedParts(seamsOf).length
  return scored.find(({ i }) => connectedParts(seamsOf, i).length === whole)?.i ?? -1
}

/** Opposite to the closing piece; the largest when there is none. */
const startingPiece = (
  part: readonly number[],
  closing: number,
  centres: readonly Point[],
  pieces: readonly Piece[],
  skin: Skin,
): number => {
  const away = centres[closing]
  const worth = (i: number): number => {
    const c = centres[i]!
    if (away) return -(c[0] * away[0] + c[1] * away[1] + c[2] * away[2])
    return pieces[i]!.panels.reduce((sum, p) => sum + skin.panels[p.panel]!.area, 0)
  }
  let best = part[0]!
  for (const i of part) if (i !== closing && (best === closing || worth(i) > worth(best) + 1e-9)) best = i
  return best
}

/**
 * The pieces in gluing order with ids 0, 1, 2 …, templates renumbered by first appearance, and the steps to match.
 * @returns what the later stages take: tabs, sheets, plan
 */
export const renumber = (
  pieces: readonly Piece[],
  { order, steps }: GluingOrder,
): { pieces: Piece[]; steps: GluingStep[] } => {
  const byId = new Map(pieces.map((p) => [p.id, p]))
  const templates = new Map<number, number>()
  const out = order.map((old, id): Piece => {
    const piece = byId.get(old)!
    if (!templates.has(piece.template)) templates.set(piece.template, templates.size)
    return { ...piece, id, template: templates.get(piece.template)! }
  })
  return { pieces: out, steps: steps.map((s, piece) => ({ ...s, piece })) }
}

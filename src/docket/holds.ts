/** What holds the bodies of a model together: line contacts, touches, and parts that are built separately. */
import { UnionFind } from '../geometry/union-find'
import { scale } from '../geometry/vec3'
import type { PlanContact, PlanCrease, PlanPart, PlanPiece, Point3 } from '../plan/types'
import type { Skin } from '../skin/types'

/**
 * @param creases of the plan, ids as in the skin
 * @param edgeMm one unit of the skin in mm
 * @returns contacts: every stretch or point where bodies touch, with what holds there; parts: what is built separately,
 *   with what joins it to the parts before it (none when the model is one part)
 */
export const holdsOf = (
  skin: Skin,
  creases: readonly PlanCrease[],
  pieces: readonly PlanPiece[],
  edgeMm: number,
): { contacts: PlanContact[]; parts: PlanPart[] } => {
  const inMm = (p: readonly [number, number, number]): Point3 =>
    scale(p, edgeMm).map((x) => Math.round(x * 1e6) / 1e6 || 0) as Point3
  const across = new Map<number, boolean>()
  for (const c of skin.creases)
    if (c.contact === 'line') across.set(c.stretch, (across.get(c.stretch) ?? true) && creases[c.id]!.join === 'fold')
  const contacts = skin.contacts.map(
    (c, i): PlanContact => ({
      kind: 'line',
      ends: c.ends.map((v) => inMm(skin.points[v]!)),
      lengthMm: c.length * edgeMm,
      bodies: [...c.bodies],
      held: c.pairing === 'inside' ? 'apart' : across.get(i) ? 'fold' : 'seam',
    }),
  )

  // Parts hang together along creases; where two of them touch, a strip or a gusset can make them one.
  const panels = new UnionFind(skin.panels.length)
  for (const c of skin.creases) panels.union(c.panels[0], c.panels[1])
  const parts = new UnionFind(skin.panels.length)
  const joints = new Map<number, 'strip' | 'gusset'>()
  for (const touch of [...skin.touches].sort((a, b) => (a.kind === b.kind ? 0 : a.kind === 'line' ? -1 : 1))) {
    const roots = [...new Set(touch.panels.map((p) => panels.find(p)))]
    const joint = touch.kind === 'line' ? 'strip' : 'gusset'
    let needed = false
    for (const root of roots)
      if (parts.union(roots[0]!, root)) {
        needed = true
        for (const r of [root, roots[0]!]) if (joints.get(r) !== 'strip') joints.set(r, joint)
      }
    contacts.push({
      kind: touch.kind,
      ends: touch.ends.map(inMm),
      lengthMm: touch.length * edgeMm,
      bodies: [...touch.bodies],
      held: needed ? joint : 'apart',
    })
  }
  return { contacts, parts: skin.parts < 2 ? [] : partsOf(skin, pieces, panels, parts, joints) }
}

const partsOf = (
  skin: Skin,
  pieces: readonly PlanPiece[],
  panels: UnionFind,
  joined: UnionFind,
  joints: ReadonlyMap<number, 'strip' | 'gusset'>,
): PlanPart[] => {
  const made = new Map<number, { bodies: Set<number>; pieces: number[] }>()
  for (const piece of pieces) {
    const root = panels.find(piece.panels[0]!.panel)
    let part = made.get(root)
    if (!part) made.set(root, (part = { bodies: new Set(), pieces: [] }))
    part.pieces.push(piece.id)
    for (const { panel } of piece.panels) part.bodies.add(skin.panels[panel]!.body)
  }
  const groups = new Set<number>()
  return [...made].map(([root, part]): PlanPart => {
    const group = joined.find(root)
    const first = !groups.has(group)
    groups.add(group)
    return {
      bodies: [...part.bodies].sort((a, b) => a - b),
      pieces: part.pieces,
      joint: first ? (groups.size === 1 ? 'first' : 'apart') : (joints.get(root) ?? 'gusset'),
    }
  })
}

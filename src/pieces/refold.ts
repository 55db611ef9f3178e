/** A net folded up again: the inverse of laying it flat, and the motion picture between the two. */
import { BrokenPromise } from '../errors'
import { add, apply, type Mat3, multiply, normalize, rotationAbout, sub, type Vec3 } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import type { Piece } from './types'

/** Rigid motion in space: first turn, then add. */
export interface Motion3 {
  readonly turn: Mat3
  readonly shift: Vec3
}

const identity: Motion3 = {
  turn: [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ],
  shift: [0, 0, 0],
}
export const move3 = (m: Motion3, p: Vec3): Vec3 => add(apply(m.turn, p), m.shift)

/**
 * Folds a piece about its folds. The flat net lies in the plane z = 0, its outer side up; the panel `root` stays there.
 *
 * @param amount 0 flat … 1 folded to the inner angles of the skin
 * @param root panel id; the first panel if left out
 * @returns for each panel of the piece, in the same order, the motion from its place in the flat net (x, y, 0) to its
 *   place in space, mm
 */
export const foldPiece = (skin: Skin, piece: Piece, amount = 1, root = piece.panels[0]?.panel): Motion3[] => {
  const place = new Map(piece.panels.map((p, i) => [p.panel, i]))
  const foldsOf = new Map<number, number[]>()
  for (const fold of piece.folds)
    for (const p of skin.creases[fold]!.panels) foldsOf.set(p, [...(foldsOf.get(p) ?? []), fold])
  const motions: (Motion3 | undefined)[] = piece.panels.map(() => undefined)
  if (root === undefined || !place.has(root))
    throw new BrokenPromise('No such panel in the piece.', { root, piece: piece.id })
  motions[place.get(root)!] = identity
  const queue = [root]
  for (let panel = queue.shift(); panel !== undefined; panel = queue.shift()) {
    const here = motions[place.get(panel)!]!
    for (const fold of foldsOf.get(panel) ?? []) {
      const crease = skin.creases[fold]!
      const other = crease.panels[0] === panel ? crease.panels[1] : crease.panels[0]
      const at = place.get(other)
      if (at === undefined) throw new BrokenPromise('A fold leads out of its piece.', { fold, piece: piece.id })
      if (motions[at]) continue
      const [a, b] = edgeOf(skin, piece, place.get(panel)!, fold)
      // The panel lies to the left of a → b; a mountain fold turns what lies to the right down.
      const bend = (amount * (180 - crease.innerAngle) * Math.PI) / 180
      const turn = rotationAbout(normalize(sub(b, a)), bend)
      motions[at] = {
        turn: multiply(here.turn, turn),
        shift: move3(here, sub(a, apply(turn, a))),
      }
      queue.push(other)
    }
  }
  return motions.map((m, i) => {
    if (!m)
      throw new BrokenPromise('A piece does not hang together.', { piece: piece.id, panel: piece.panels[i]!.panel })
    return m
  })
}

const edgeOf = (skin: Skin, piece: Piece, at: number, crease: number): [Vec3, Vec3] => {
  const { panel, rings } = piece.panels[at]!
  const lists = skin.panels[panel]!.creases
  for (let r = 0; r < lists.length; r++) {
    const i = lists[r]!.indexOf(crease)
    if (i < 0) continue
    const ring = rings[r]!
    const [a, b] = [ring[i]!, ring[(i + 1) % ring.length]!]
    return [
      [a[0], a[1], 0],
      [b[0], b[1], 0],
    ]
  }
  throw new BrokenPromise('A fold is not on the ring of its panel.', { crease, panel })
}

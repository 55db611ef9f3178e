/**
 * Whether pieces and tabs keep what they promise. Nothing of the search is used here: overlaps are measured by clipping
 * whole polygons, places in space by folding the nets up again.
 */
import { differenceArea, intersectionArea, offset } from '../geometry/clip'
import { distance2, type Ring2, signedArea, type Vec2 } from '../geometry/vec2'
import { cross, distance, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import type { Skin, SkinPanel } from '../skin/types'
import { bestFitRotation } from './outline'
import type { FitRectangle } from './patch'
import { foldPiece, move3 } from './refold'
import type { FlatPanel, Piece, Tab } from './types'

export interface PieceCheck {
  readonly name: string
  readonly ok: boolean
  readonly detail: string
}

export interface PiecesPlan {
  readonly skin: Skin
  readonly edgeMm: number
  /** In gluing order. */
  readonly pieces: readonly Piece[]
  /** By piece index. */
  readonly tabs: readonly (readonly Tab[])[]
  /** Crease ids of the seams that carry no tab. */
  readonly buttSeams: readonly number[]
  readonly fit: FitRectangle
}

/** mm², what two parts may seem to overlap by: clipping rounds to 1e-5 mm, and parts touch along edges of up to 300 mm. */
const touching = 5e-3
/** mm², what a tab may seem to stick out by: its whole root lies on the outline of the panel behind. */
const rootTouching = 5e-3
/** mm: the gap that tabs keep in the flat, as far as it is promised. */
const tabGap = 0.2

/** Runs every check; none throws, a failing one says where. */
export const validatePieces = (plan: PiecesPlan): PieceCheck[] => [
  check('every panel in one piece', plan, eachOnce),
  check('pieces are trees of folds', plan, trees),
  check('panels keep their shape, unmirrored', plan, shapes),
  check('folded panels lie edge to edge', plan, foldsMeet),
  check('no overlap', plan, overlaps),
  check('pieces fold back onto the skin', plan, refolds),
  check('pieces fit the sheet with their tabs', plan, fits),
  check('every seam has its tab or is listed', plan, seamsServed),
  check('tabs clear in the flat', plan, tabsFlat),
  check('tabs inside the panels behind', plan, tabsBehind),
  check('tabs on the piece glued earlier', plan, tabsEarlier),
]

/** Each fault in words; an empty list is a pass. */
type Test = (plan: PiecesPlan) => Iterable<string>

const check = (name: string, plan: PiecesPlan, test: Test): PieceCheck => {
  const faults: string[] = []
  try {
    for (const fault of test(plan)) faults.push(fault)
  } catch (error) {
    faults.push(error instanceof Error ? error.message : String(error))
  }
  const more = faults.length > 3 ? `; ${faults.length - 3} more` : ''
  return { name, ok: faults.length === 0, detail: faults.slice(0, 3).join('; ') + more }
}

const eachOnce: Test = function* ({ skin, pieces }) {
  const count = skin.panels.map(() => 0)
  for (const piece of pieces)
    for (const { panel } of piece.panels) {
      if (count[panel] === undefined) yield `piece ${piece.id} has a panel ${panel} that is not on the skin`
      else count[panel]++
    }
  for (const [panel, n] of count.entries()) if (n !== 1) yield `panel ${panel} is in ${n} pieces`
}

const trees: Test = function* ({ skin, pieces }) {
  for (const piece of pieces) {
    const reached = new Set(piece.panels.slice(0, 1).map((p) => p.panel))
    if (piece.folds.length !== piece.panels.length - 1)
      yield `piece ${piece.id}: ${piece.panels.length} panels, ${piece.folds.length} folds`
    for (let grown = true; grown; ) {
      grown = false
      for (const fold of piece.folds) {
        const [a, b] = skin.creases[fold]!.panels
        if (reached.has(a) !== reached.has(b)) grown = reached.add(a).add(b).size > 0
      }
    }
    const apart = piece.panels.filter((p) => !reached.has(p.panel)).length
    if (apart > 0 || reached.size > piece.panels.length) yield `piece ${piece.id}: its folds do not join its panels`
  }
}

const shapes: Test = function* ({ skin, pieces, edgeMm }) {
  for (const piece of pieces)
    for (const { panel, rings } of piece.panels) {
      const own = skin.panels[panel]!
      const there = own.rings.flat().map((i) => scale(skin.points[i]!, edgeMm))
      const here = rings.flat()
      if (rings.length !== own.rings.length || here.length !== there.length) {
        yield `panel ${panel} has other points than on the skin`
        continue
      }
      const [o, p] = [here[0]!, there[0]!]
      const stretch = Math.max(...here.map((h, i) => Math.abs(distance2(h, o) - distance(there[i]!, p))))
      const area = rings.reduce((sum, ring) => sum + signedArea(ring), 0)
      const should = own.area * edgeMm * edgeMm
      const slack = skin.slack * edgeMm
      if (stretch > 1e-6 * edgeMm + slack) yield `panel ${panel} is stretched by ${stretch.toExponential(2)} mm`
      else if (Math.abs(area - should) > 1e-6 * Math.max(1, should) + slack * Math.sqrt(should))
        yield `panel ${panel}: ${area} mm², not ${should}`
    }
}

/** A panel's ring edge on a crease, in the piece's plane. */
const edgeOn = (skin: Skin, { panel, rings }: FlatPanel, crease: number): readonly [Vec2, Vec2] | undefined => {
  const lists = skin.panels[panel]!.creases
  for (let r = 0; r < lists.length; r++) {
    const i = lists[r]!.indexOf(crease)
    const ring = rings[r]
    if (i >= 0 && ring) return [ring[i]!, ring[(i + 1) % ring.length]!]
  }
  return undefined
}

const foldsMeet: Test = function* ({ skin, pieces, edgeMm }) {
  for (const piece of pieces) {
    const flat = new Map(piece.panels.map((p) => [p.panel, p]))
    for (const fold of piece.folds) {
      const [a, b] = skin.creases[fold]!.panels.map((p) => flat.get(p) && edgeOn(skin, flat.get(p)!, fold))
      if (!a || !b) yield `fold ${fold} has no edge on one of its panels in piece ${piece.id}`
      else if (Math.max(distance2(a[0], b[1]), distance2(a[1], b[0])) > 1e-6 * edgeMm)
        yield `fold ${fold}: its panels lie apart in piece ${piece.id}`
    }
  }
}

const boxOf = (rings: readonly Ring2[]): [number, number, number, number] => {
  const outer = rings[0]!
  const xs = outer.map((p) => p[0])
  const ys = outer.map((p) => p[1])
  return [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)]
}
type Box = ReturnType<typeof boxOf>
const apart = (a: Box, b: Box, slack: number): boolean =>
  a[2] < b[0] + slack || b[2] < a[0] + slack || a[3] < b[1] + slack || b[3] < a[1] + slack

const overlaps: Test = function* ({ pieces }) {
  for (const piece of pieces) {
    const boxes = piece.panels.map((p) => boxOf(p.rings))
    for (let i = 0; i < boxes.length; i++)
      for (let j = i + 1; j < boxes.length; j++) {
        if (apart(boxes[i]!, boxes[j]!, 1e-5)) continue
        const [p, q] = [piece.panels[i]!, piece.panels[j]!]
        const area = intersectionArea(p.rings, q.rings)
        if (area > touching)
          yield `piece ${piece.id}: panels ${p.panel} and ${q.panel} overlap by ${area.toFixed(4)} mm²`
      }
  }
}

const frameOf = (panel: SkinPanel, points: readonly Vec3[]): [Vec3, Vec3, Vec3] => {
  const [a, b] = [points[panel.rings[0]![0]!]!, points[panel.rings[0]![1]!]!]
  const u = normalize(sub(b, a))
  return [u, cross(panel.normal, u), panel.normal]
}

const refolds: Test = function* ({ skin, pieces, edgeMm }) {
  const height = 2 * edgeMm * Math.max(...skin.points.map(norm))
  for (const piece of pieces) {
    const motions = foldPiece(skin, piece)
    // Where the first panel is on the skin, seen from where it lies.
    const root = piece.panels[0]!
    const [u, v, n] = frameOf(skin.panels[root.panel]!, skin.points)
    const [a, b] = [root.rings[0]![0]!, root.rings[0]![1]!]
    const length = distance2(a, b)
    const [c, s] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length]
    const origin = scale(skin.points[skin.panels[root.panel]!.rings[0]![0]!]!, edgeMm)
    const toSpace = (p: Vec3): Vec3 => {
      const [x, y] = [p[0] - a[0], p[1] - a[1]]
      const [along, up] = [c * x + s * y, c * y - s * x]
      return [0, 1, 2].map((k) => origin[k]! + along * u[k]! + up * v[k]! + p[2] * n[k]!) as unknown as Vec3
    }
    let worst = 0
    piece.panels.forEach(({ panel, rings }, i) => {
      rings.forEach((ring, r) => {
        ring.forEach((p, k) => {
          const should = scale(skin.points[skin.panels[panel]!.rings[r]![k]!]!, edgeMm)
          worst = Math.max(worst, distance(toSpace(move3(motions[i]!, [p[0], p[1], 0])), should))
        })
      })
    })
    // Folds of panels that are flat within a slack only are off by about that much each.
    if (!(worst <= 1e-6 * height + 4 * skin.slack * edgeMm * piece.panels.length))
      yield `piece ${piece.id} misses its place by ${worst.toExponential(2)} mm`
  }
}

const fits: Test = function* ({ pieces, tabs, fit }) {
  for (const [i, piece] of pieces.entries())
    if (bestFitRotation(piece, tabs[i] ?? [], fit) === null)
      yield `piece ${piece.id} does not fit ${fit.widthMm} × ${fit.heightMm} mm`
}

const seamsServed: Test = function* ({ skin, pieces, tabs, buttSeams }) {
  const folds = new Set(pieces.flatMap((p) => p.folds))
  const butt = new Set(buttSeams)
  const count = new Map<number, number>()
  for (const list of tabs) for (const t of list) count.set(t.crease, (count.get(t.crease) ?? 0) + 1)
  for (const { id } of skin.creases) {
    const n = count.get(id) ?? 0
    if (folds.has(id) && (n > 0 || butt.has(id))) yield `fold ${id} is treated as a seam`
    else if (!folds.has(id) && n + (butt.has(id) ? 1 : 0) !== 1)
      yield `seam ${id} has ${n} tabs${butt.has(id) ? ' and is listed without' : ''}`
  }
}

const tabsFlat: Test = function* ({ skin, pieces, tabs }) {
  for (const [i, piece] of pieces.entries()) {
    const own = tabs[i] ?? []
    const flat = new Map(piece.panels.map((p) => [p.panel, p]))
    for (const [k, tab] of own.entries()) {
      const carrier = flat.get(tab.panel)
      const edge = carrier && edgeOn(skin, carrier, tab.crease)
      if (!edge) {
        yield `tab on crease ${tab.crease} hangs on no panel of piece ${piece.id}`
        continue
      }
      const off = Math.max(...tab.outline.slice(0, 2).map((p) => Math.abs(beside(edge, p)[1])))
      if (off > 1e-6 || signedArea(tab.outline) <= 0) yield `tab on crease ${tab.crease} does not stand on its crease`
      const grown = offset([tab.outline], tabGap - 0.01)
      const box = boxOf(grown)
      for (const { panel, rings } of piece.panels) {
        if (apart(box, boxOf(rings), 0)) continue
        // Its own panel it touches along the root.
        const area = intersectionArea(panel === tab.panel ? [tab.outline] : grown, rings)
        if (area > touching) yield `tab on crease ${tab.crease} is too near to panel ${panel}`
      }
      for (const other of own.slice(k + 1))
        if (!apart(box, boxOf([other.outline]), 0) && intersectionArea(grown, [other.outline]) > touching)
          yield `tabs on creases ${tab.crease} and ${other.crease} are too near`
    }
  }
}

/** Coordinates along a directed edge and to its right. */
const beside = ([a, b]: readonly [Vec2, Vec2], p: Vec2): [number, number] => {
  const length = distance2(a, b)
  const [tx, ty] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length]
  const [dx, dy] = [p[0] - a[0], p[1] - a[1]]
  return [dx * tx + dy * ty, dx * ty - dy * tx]
}

const tabsBehind: Test = function* ({ skin, pieces, tabs }) {
  const flat = new Map(pieces.flatMap((piece) => piece.panels.map((p) => [p.panel, p] as const)))
  const onBack = new Map<number, { crease: number; ring: Ring2 }[]>()
  for (const list of tabs)
    for (const tab of list) {
      const other = skin.creases[tab.crease]!.panels.find((p) => p !== tab.panel)!
      const [carrier, receiver] = [flat.get(tab.panel), flat.get(other)]
      const edge = carrier && edgeOn(skin, carrier, tab.crease)
      const far = receiver && edgeOn(skin, receiver, tab.crease)
      if (!edge || !far) {
        yield `tab on crease ${tab.crease} has no panel behind which it goes`
        continue
      }
      const length = distance2(far[0], far[1])
      const [tx, ty] = [(far[0][0] - far[1][0]) / length, (far[0][1] - far[1][1]) / length]
      // Along the crease from the carrier's first end, which is the receiver's second; then into the receiver.
      const ring = tab.outline.map((p): Vec2 => {
        const [x, y] = beside(edge, p)
        return [far[1][0] + x * tx + y * ty, far[1][1] + x * ty - y * tx]
      })
      const upright = signedArea(ring) < 0 ? [...ring].reverse() : ring
      const out = differenceArea([upright], receiver.rings)
      if (out > rootTouching) yield `tab on crease ${tab.crease} sticks out of panel ${other} by ${out.toFixed(3)} mm²`
      const list = onBack.get(other) ?? []
      for (const there of list)
        if (intersectionArea([upright], [there.ring]) > touching)
          yield `tabs on creases ${tab.crease} and ${there.crease} lie on each other behind panel ${other}`
      onBack.set(other, [...list, { crease: tab.crease, ring: upright }])
    }
}

const tabsEarlier: Test = function* ({ skin, pieces, tabs }) {
  const pieceOf = new Map(pieces.flatMap((piece, i) => piece.panels.map((p) => [p.panel, i] as const)))
  for (const [i, list] of tabs.entries())
    for (const tab of list) {
      const [p, q] = skin.creases[tab.crease]!.panels.map((panel) => pieceOf.get(panel) ?? -1) as [number, number]
      if (pieceOf.get(tab.panel) !== i || Math.min(p, q) !== i)
        yield `tab on crease ${tab.crease} hangs on the piece that is glued later`
    }
}

/**
 * Closing up slivers: stretches too short to cut or to glue are drawn together to a point, panels that lose their area
 * go, and their neighbours meet. Edge collapse as in "Surface simplification using quadric error metrics", Proceedings
 * of SIGGRAPH (1997), restricted to edges below a bound; the point kept is the one nearest to the planes around it.
 */
import { InputError } from '../errors'
import { UnionFind } from '../geometry/union-find'
import { signedArea, windingNumber } from '../geometry/vec2'
import { add, cross, distance, dot, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import { areaVector } from './area'
import { solve3 } from './nearest-point'
import { frameOf, toPlane } from './planes'
import { findTouches } from './touching'
import type { LineContact, Skin, SkinCrease, SkinPanel } from './types'
import { validateSkin } from './validate'

export interface Closed {
  readonly skin: Skin
  /** Stretches drawn together, panels that went with them, and how far the farthest point moved, in the skin's unit. */
  readonly stretches: number
  readonly panels: number
  readonly moved: number
}

/** One side of a crease: a ring edge of a panel. */
interface Half {
  readonly panel: number
  from: number
  to: number
  /** What it is glued or folded to. */
  partner: Half
  /** Inner angle to the partner, as far as known from before. */
  angle: number
  readonly line: boolean
  gone: boolean
}

/**
 * Closes all creases shorter than `below`, as far as no point moves farther than `below`; panels stay flat within it.
 * Points that came close only by closing others up are closed in a second pass.
 *
 * @param below in the skin's unit
 * @throws InputError when the skin cannot be closed up at this bound: a smaller one may do
 */
export const closeSlivers = (skin: Skin, below: number): Closed => {
  let closed: Closed = { skin, stretches: 0, panels: 0, moved: 0 }
  let place = skin.points.map((_, v) => v)
  for (let pass = 0; pass < 4; pass++) {
    const next = closeOnce(closed.skin, below)
    if (!next) break
    const there = place.map((v) => next.place[v]!)
    let moved = 0
    there.forEach((v, i) => {
      moved = Math.max(moved, distance(next.skin.points[v]!, skin.points[i]!))
    })
    if (moved > below) break
    closed = {
      skin: next.skin,
      stretches: closed.stretches + next.stretches,
      panels: skin.panels.length - next.skin.panels.length,
      moved,
    }
    place = there
  }
  return closed
}

/** One pass; null if there is nothing to close. `place`: by point, the point of the new skin that it became. */
const closeOnce = (skin: Skin, below: number): { skin: Skin; stretches: number; place: number[] } | null => {
  const short = skin.creases.filter((c) => c.length < below)
  const { target, points } = drawTogether(skin, short, below)
  const stretches = short.filter((c) => target[c.ends[0]] === target[c.ends[1]]).length
  if (stretches === 0) return null
  const rings = reconnect(skin, target)
  const panels = rebuildPanels(skin, rings, points)
  const { skin: closed, used } = assemble(skin, panels, points)
  const failed = validateSkin(closed).filter((c) => !c.ok)
  if (failed.length > 0) throw tooWide(`${failed[0]!.name}: ${failed[0]!.detail}`)
  // A point whose panels all went lies at a point that stayed, or nowhere: then where its group was drawn to is near.
  const place = target.map((t) => used.get(t) ?? nearestOf(closed.points, points[t]!))
  return { skin: closed, stretches, place }
}

const tooWide = (why: string): InputError =>
  new InputError(`Stretches below this bound cannot all be closed up (${why}): choose a smaller one.`, 'closeBelowMm')

const nearestOf = (points: readonly Vec3[], p: Vec3): number => {
  let best = 0
  points.forEach((q, i) => {
    if (distance(p, q) < distance(p, points[best]!)) best = i
  })
  return best
}

/** How much of the bound the way to a group's centre may take; the rest is left for the way from there to the planes. */
const reachShare = 0.85

/** By point: the point it becomes; and where the points then are. */
const drawTogether = (
  skin: Skin,
  short: readonly SkinCrease[],
  below: number,
): { target: number[]; points: Vec3[] } => {
  const groups = new UnionFind(skin.points.length)
  const members = new Map<number, number[]>()
  const of = (v: number): number[] => members.get(groups.find(v)) ?? [v]
  const centreOf = (list: readonly number[]): Vec3 =>
    scale(
      list.reduce<Vec3>((s, v) => add(s, skin.points[v]!), [0, 0, 0]),
      1 / list.length,
    )
  for (const c of [...short].sort((a, b) => a.length - b.length || a.id - b.id)) {
    const [a, b] = c.ends
    if (groups.find(a) === groups.find(b)) continue
    const all = [...of(a), ...of(b)]
    const centre = centreOf(all)
    // A chain of short stretches must not add up to a long one.
    if (all.some((v) => distance(skin.points[v]!, centre) > reachShare * below + 1e-12)) continue
    groups.union(a, b)
    members.set(
      groups.find(a),
      all.sort((x, y) => x - y),
    )
  }
  const points = [...skin.points]
  for (const [root, list] of members) {
    if (groups.find(root) !== root || list.length < 2) continue
    points[root] = nearestToPlanes(skin, list, centreOf(list), below)
  }
  return { target: skin.points.map((_, v) => groups.find(v)), points }
}

/** The point that misses the planes of the panels round a group least, close to its centre. */
const nearestToPlanes = (skin: Skin, group: readonly number[], centre: Vec3, below: number): Vec3 => {
  const inside = new Set(group)
  // Normal equations of the least-squares distance to the planes, with a slight pull to the centre.
  const pull = 1e-3
  const m: number[][] = [
    [pull, 0, 0],
    [0, pull, 0],
    [0, 0, pull],
  ]
  const rhs = [0, 0, 0]
  for (const panel of skin.panels) {
    const outer = panel.rings[0]!
    if (!panel.rings.some((ring) => ring.some((v) => inside.has(v)))) continue
    if (outer.filter((v) => !inside.has(v)).length < 2) continue
    const off = dot(panel.normal, sub(skin.points[outer[0]!]!, centre))
    for (const i of [0, 1, 2] as const) {
      for (const j of [0, 1, 2] as const) m[i]![j]! += panel.normal[i] * panel.normal[j]
      rhs[i]! += panel.normal[i] * off
    }
  }
  const step = solve3(m, rhs)
  const length = norm(step)
  const limit = (1 - reachShare) * below
  return add(centre, length > limit ? scale(step, limit / length) : step)
}

/** Rings of halves with the new points: collapsed edges gone, edges that lie back to back in one ring cancelled. */
const reconnect = (skin: Skin, target: readonly number[]): Half[][][] => {
  const halves = new Map<string, Half>()
  const rings = skin.panels.map((panel) =>
    panel.rings.map((ring, r) =>
      ring.map((v, e): Half => {
        const crease = skin.creases[panel.creases[r]![e]!]!
        const half: Half = {
          panel: panel.id,
          from: target[v]!,
          to: target[ring[(e + 1) % ring.length]!]!,
          partner: undefined as unknown as Half,
          angle: crease.innerAngle,
          line: crease.contact === 'line',
          gone: false,
        }
        const first = crease.panels[0] === panel.id && crease.ends[0] === v
        halves.set(`${crease.id} ${first ? 0 : 1}`, half)
        return half
      }),
    ),
  )
  for (const c of skin.creases) {
    const [a, b] = [halves.get(`${c.id} 0`)!, halves.get(`${c.id} 1`)!]
    a.partner = b
    b.partner = a
  }
  return rings.map((list) => list.map(cancel))
}

/** Drops halves without length, and pairs that run there and back, whose partners then meet each other. */
const cancel = (ring: readonly Half[]): Half[] => {
  const stack: Half[] = []
  const meet = (h: Half, g: Half): void => {
    h.gone = true
    g.gone = true
    if (h.partner === g) return
    const [p, q] = [h.partner, g.partner]
    // The vanished panel lay between the two folds: their bends add up.
    const angle = h.angle + g.angle - 180
    p.partner = q
    q.partner = p
    p.angle = angle
    q.angle = angle
  }
  for (const half of ring) {
    if (half.from === half.to) {
      half.gone = true
      continue
    }
    const last = stack[stack.length - 1]
    if (last && last.from === half.to) meet(stack.pop()!, half)
    else stack.push(half)
  }
  while (
    stack.length > 1 &&
    stack[0]!.from === stack[stack.length - 1]!.to &&
    stack[0]!.to === stack[stack.length - 1]!.from
  )
    meet(stack.shift()!, stack.pop()!)
  return stack
}

/** A panel as it is rebuilt: rings of halves, outer first. */
interface Rebuilt {
  readonly old: SkinPanel
  readonly rings: Half[][]
  readonly normal: Vec3
  readonly area: number
}

const rebuildPanels = (skin: Skin, rings: readonly Half[][][], points: readonly Vec3[]): Rebuilt[] => {
  const out: Rebuilt[] = []
  skin.panels.forEach((old, p) => {
    const loops = rings[p]!.flatMap((ring) => simpleLoops(ring.filter((h) => !h.gone)))
    if (loops.length === 0) return
    const frame = frameOf({ normal: old.normal, offset: 0 })
    const flat = loops.map((loop) => loop.map((h) => toPlane(frame, points[h.from]!)))
    const areas = flat.map(signedArea)
    const outers = loops.map((_, i) => i).filter((i) => areas[i]! > 0)
    const holes = loops.map((_, i) => i).filter((i) => areas[i]! <= 0)
    for (const o of outers) {
      // A hole goes with the smallest outer ring around it.
      const own = holes.filter((h) => {
        const around = outers.filter((k) => windingNumber(flat[k]!, flat[h]![0]!) !== 0)
        return around.sort((x, y) => areas[x]! - areas[y]!)[0] === o
      })
      const list = [loops[o]!, ...own.map((h) => loops[h]!)]
      const vector = list.reduce<Vec3>((s, loop) => add(s, areaVector(loop.map((h) => points[h.from]!))), [0, 0, 0])
      out.push({ old, rings: list, normal: normalize(vector), area: norm(vector) })
    }
  })
  return out
}

/** Cuts a ring at points that it visits more than once. */
const simpleLoops = (ring: readonly Half[]): Half[][] => {
  const loops: Half[][] = []
  let stack: Half[] = []
  for (const half of ring) {
    const at = stack.findIndex((h) => h.from === half.from)
    if (at >= 0) {
      loops.push(stack.slice(at))
      stack = stack.slice(0, at)
    }
    stack.push(half)
  }
  if (stack.length > 0) loops.push(stack)
  return loops
}

const assemble = (
  before: Skin,
  rebuilt: readonly Rebuilt[],
  points: readonly Vec3[],
): { skin: Skin; used: ReadonlyMap<number, number> } => {
  const used = new Map<number, number>()
  const renumber = (v: number): number => {
    let id = used.get(v)
    if (id === undefined) used.set(v, (id = used.size))
    return id
  }
  const panelOf = new Map<Half, number>()
  rebuilt.forEach(({ rings }, id) => {
    for (const ring of rings) for (const half of ring) panelOf.set(half, id)
  })
  const creaseOf = new Map<Half, number>()
  const creases: SkinCrease[] = []
  rebuilt.forEach(({ rings }, id) => {
    for (const ring of rings)
      for (const half of ring) {
        if (creaseOf.has(half)) continue
        const other = panelOf.get(half.partner)
        if (other === undefined) throw tooWide(`panel ${half.partner.panel} would turn over`)
        const crease = creases.length
        creaseOf.set(half, crease)
        creaseOf.set(half.partner, crease)
        creases.push({
          id: crease,
          panels: [id, other],
          ends: [renumber(half.from), renumber(half.to)],
          innerAngle: angleBetween(half, rebuilt[id]!, rebuilt[other]!, points),
          contact: half.line || half.partner.line ? 'line' : 'surface',
          stretch: -1,
          length: distance(points[half.from]!, points[half.to]!),
        })
      }
  })
  const panels = rebuilt.map(
    ({ old, rings, normal, area }, id): SkinPanel => ({
      ...old,
      id,
      normal,
      area,
      rings: rings.map((ring) => ring.map((h) => renumber(h.from))),
      creases: rings.map((ring) => ring.map((h) => creaseOf.get(h)!)),
    }),
  )
  const kept: Vec3[] = []
  for (const [v, id] of used) kept[id] = points[v]!
  const { numbered, contacts } = contactsOf(creases, panels)
  const parts = new UnionFind(panels.length)
  for (const c of numbered) parts.union(c.panels[0], c.panels[1])
  let slack = before.slack
  for (const p of panels) {
    const all = p.rings.flat()
    const offset = dot(p.normal, kept[p.rings[0]![0]!]!)
    for (const v of all) slack = Math.max(slack, Math.abs(dot(p.normal, kept[v]!) - offset))
  }
  const skin: Skin = {
    ...before,
    slack,
    points: kept,
    panels,
    creases: numbered,
    contacts,
    touches: before.bodies > 1 ? findTouches({ points: kept, panels, creases: numbered, slack }) : [],
    bodies: new Set(panels.map((p) => p.body)).size,
    parts: new Set(panels.map((p) => parts.find(p.id))).size,
    lineContactLength: contacts.reduce((sum, c) => sum + c.length, 0),
    area: panels.reduce((sum, p) => sum + p.area, 0),
    volume: panels.reduce((sum, p) => sum + (dot(p.normal, kept[p.rings[0]![0]!]!) * p.area) / 3, 0),
  }
  return { skin, used }
}

/** From the normals; which side of flat or of back to back it is, by what was known before. */
const angleBetween = (half: Half, own: Rebuilt, other: Rebuilt, points: readonly Vec3[]): number => {
  const d = normalize(sub(points[half.to]!, points[half.from]!))
  const wp = cross(own.normal, d)
  const wq = cross(other.normal, scale(d, -1))
  const between = (Math.atan2(norm(cross(wp, wq)), dot(wp, wq)) * 180) / Math.PI
  const inner = dot(wq, own.normal) <= 0 ? between : 360 - between
  // Back to back, 0 and 360 degrees differ by a hair only.
  return Math.abs(inner - half.angle) > 180 ? 360 - inner : inner
}

/** Line contacts anew: creases that share both ends, where there are several or where one was a line contact before. */
const contactsOf = (
  creases: readonly SkinCrease[],
  panels: readonly SkinPanel[],
): { numbered: SkinCrease[]; contacts: LineContact[] } => {
  const along = new Map<string, SkinCrease[]>()
  for (const c of creases) {
    const key = [...c.ends].sort((a, b) => a - b).join(' ')
    const list = along.get(key)
    if (list) list.push(c)
    else along.set(key, [c])
  }
  const numbered = [...creases]
  const contacts: LineContact[] = []
  for (const list of along.values()) {
    if (list.length < 2) {
      const [c] = list
      if (c!.contact === 'line') numbered[c!.id] = { ...c!, contact: 'surface' }
      continue
    }
    const bodies = [...new Set(list.flatMap((c) => c.panels.map((p) => panels[p]!.body)))].sort((a, b) => a - b)
    for (const c of list) numbered[c.id] = { ...c, contact: 'line', stretch: contacts.length }
    contacts.push({
      ends: list[0]!.ends,
      length: list[0]!.length,
      // Across the outside, a crease joins two bodies.
      pairing: list.some((c) => panels[c.panels[0]]!.body !== panels[c.panels[1]]!.body) ? 'outside' : 'inside',
      panels: [...new Set(list.flatMap((c) => c.panels))],
      bodies,
    })
  }
  return { numbered, contacts }
}

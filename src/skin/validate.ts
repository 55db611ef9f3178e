/** What a skin promises, checked on the skin alone. */
import { UnionFind } from '../geometry/union-find'
import { add, cross, distance, dot, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import { areaVector } from './area'
import type { Skin, SkinPanel } from './types'

export interface Check {
  readonly name: string
  readonly ok: boolean
  readonly detail: string
}

/**
 * Checks a skin: flat panels with true normals and areas, closed (area vectors sum to zero), every ring edge covered by
 * exactly one crease that agrees in its ends, every crease shared by exactly two panels that run along it in opposite
 * directions, inner angles that agree with the normals, bodies and parts as counted. Bounds widen by `skin.slack`.
 */
export const validateSkin = (skin: Skin): Check[] => {
  const checks: Check[] = []
  const check = (name: string, faults: readonly string[]): void => {
    checks.push({ name, ok: faults.length === 0, detail: faults.slice(0, 5).join('; ') || 'ok' })
  }
  const at = (i: number): Vec3 => skin.points[i] ?? [Number.NaN, Number.NaN, Number.NaN]
  const size = Math.max(...skin.points.map(norm), 1e-12)

  check('panels are flat, with outward normals and true areas', flatness(skin, at, size))

  let closing: Vec3 = [0, 0, 0]
  let area = 0
  let volume = 0
  for (const p of skin.panels) {
    for (const ring of p.rings) closing = add(closing, areaVector(ring.map(at)))
    area += p.area
    volume += (dot(p.normal, at(p.rings[0]![0]!)) * p.area) / 3
  }
  check('skin closes', [
    ...(norm(closing) > 1e-9 * area ? [`area vectors sum to ${norm(closing)}`] : []),
    ...(Math.abs(area - skin.area) > 1e-9 * area ? [`area is ${area}, not ${skin.area}`] : []),
    ...(Math.abs(volume - skin.volume) > 1e-9 * Math.max(1, volume) ? [`volume is ${volume}, not ${skin.volume}`] : []),
  ])
  check('creases cover every ring edge', coverage(skin))
  check('inner angles agree with the panels', angles(skin, at))
  check('bodies and parts are counted', connection(skin))
  return checks
}

const flatness = (skin: Skin, at: (i: number) => Vec3, size: number): string[] => {
  const faults: string[] = []
  for (const p of skin.panels) {
    let sum: Vec3 = [0, 0, 0]
    for (const ring of p.rings) {
      sum = add(sum, areaVector(ring.map(at)))
      if (new Set(ring).size !== ring.length || ring.length < 3) faults.push(`panel ${p.id}: ring is not simple`)
    }
    // Points off their plane by the slack tilt a panel's area by about that much along its whole outline.
    const loose = 1e-9 * Math.max(1, p.area) + skin.slack * outline(p.rings, at)
    if (Math.abs(dot(sum, p.normal) - p.area) > loose) faults.push(`panel ${p.id}: area`)
    if (norm(sub(sum, scale(p.normal, p.area))) > loose) faults.push(`panel ${p.id}: normal`)
    if (p.area <= 0) faults.push(`panel ${p.id}: no area`)
    const offset = dot(p.normal, at(p.rings[0]![0]!))
    for (const i of p.rings.flat())
      if (!(Math.abs(dot(p.normal, at(i)) - offset) <= 1e-8 * size + skin.slack)) faults.push(`panel ${p.id}: not flat`)
  }
  return faults
}

const outline = (rings: SkinPanel['rings'], at: (i: number) => Vec3): number =>
  rings.reduce(
    (sum, ring) => sum + ring.reduce((s, v, e) => s + distance(at(v), at(ring[(e + 1) % ring.length]!)), 0),
    0,
  )

const coverage = (skin: Skin): string[] => {
  const faults: string[] = []
  const seen = new Map<number, { panel: number; from: number; to: number }[]>()
  for (const p of skin.panels)
    p.rings.forEach((ring, r) => {
      ring.forEach((from, e) => {
        const id = p.creases[r]?.[e] ?? -1
        const list = seen.get(id)
        const entry = { panel: p.id, from, to: ring[(e + 1) % ring.length]! }
        if (list) list.push(entry)
        else seen.set(id, [entry])
      })
    })
  for (const c of skin.creases) {
    const list = seen.get(c.id) ?? []
    const [a, b] = c.ends
    if (c.panels[0] === c.panels[1]) faults.push(`crease ${c.id}: one panel on both sides`)
    const left = list.filter((x) => x.panel === c.panels[0] && x.from === a && x.to === b).length
    const right = list.filter((x) => x.panel === c.panels[1] && x.from === b && x.to === a).length
    if (list.length !== 2 || left !== 1 || right !== 1) faults.push(`crease ${c.id}: not shared by two ring edges`)
    if (Math.abs(distance(skin.points[a]!, skin.points[b]!) - c.length) > 1e-9) faults.push(`crease ${c.id}: length`)
    seen.delete(c.id)
  }
  for (const id of seen.keys()) faults.push(`ring edges refer to crease ${id}, which is not there`)
  return faults
}

const angles = (skin: Skin, at: (i: number) => Vec3): string[] => {
  const faults: string[] = []
  for (const c of skin.creases) {
    const [p, q] = c.panels.map((i) => skin.panels[i] as SkinPanel) as [SkinPanel, SkinPanel]
    const d = normalize(sub(at(c.ends[1]), at(c.ends[0])))
    const wp = cross(p.normal, d)
    const wq = cross(q.normal, scale(d, -1))
    const between = (Math.atan2(norm(cross(wp, wq)), dot(wp, wq)) * 180) / Math.PI
    // The second panel dips behind the first one's plane at a mountain, and rises before it at a valley.
    const dips = dot(wq, p.normal)
    const inner = dips <= 0 ? between : 360 - between
    const off = Math.abs(inner - c.innerAngle)
    // Back to back panels (0 or 360 degrees) have no telling side.
    const loose = 1e-5 + (300 * skin.slack) / c.length
    if (off > loose && !(Math.abs(dips) < 1e-9 + (4 * skin.slack) / c.length && Math.abs(360 - off) < loose))
      faults.push(`crease ${c.id}: inner angle ${c.innerAngle}, panels say ${inner}`)
  }
  return faults
}

const connection = (skin: Skin): string[] => {
  const faults: string[] = []
  const whole = new UnionFind(skin.panels.length)
  for (const c of skin.creases) {
    whole.union(c.panels[0], c.panels[1])
    if (c.contact === 'surface' && skin.panels[c.panels[0]]?.body !== skin.panels[c.panels[1]]?.body)
      faults.push(`crease ${c.id} joins two bodies on the surface`)
    if (c.contact === 'line' && !skin.contacts[c.stretch]) faults.push(`crease ${c.id}: no such line contact`)
  }
  const parts = new Set(skin.panels.map((p) => whole.find(p.id))).size
  if (parts !== skin.parts) faults.push(`${parts} parts, not ${skin.parts}`)
  const bodies = new Set(skin.panels.map((p) => p.body)).size
  if (bodies !== skin.bodies) faults.push(`${bodies} bodies, not ${skin.bodies}`)
  return faults
}

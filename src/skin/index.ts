/**
 * The skin of a solid: what can be touched from outside, as panels and creases.
 */
import { BrokenPromise, InputError, noProgress, type Progress } from '../errors'
import { distance, dot, norm, scale, type Vec3 } from '../geometry/vec3'
import type { FillRule, Solid } from '../solids/types'
import { areaVector } from './area'
import { type Arrangement, arrange } from './arrangement'
import { insideJoins, outsideJoins, pairContacts } from './creases'
import { type FilledFace, fillFace } from './filled-face'
import { neighbourFinder } from './neighbours'
import { findOutside } from './outside'
import { collectPanels, type RawPanel } from './panels'
import { carriedFaces, findPlanes, frameOf } from './planes'
import { findStretches } from './stretches'
import { catalogueTolerance, roughTolerances, type Tolerance } from './tolerance'
import { findTouches } from './touching'
import type { LineContact, Skin, SkinCrease, SkinPanel } from './types'
import { validateSkin } from './validate'

export { withPairing } from './pairing'
export { type Closed, closeSlivers } from './slivers'
export type { LineContact, Skin, SkinCrease, SkinPanel, Touch } from './types'
export { validateSkin } from './validate'

/**
 * Computes the skin: the boundary of the unbounded component of space minus the union of all filled faces.
 * Lengths in unit edges (for models of a builder: in the solid's own unit). Deterministic; cost is governed by the face
 * planes that differ under `solid.rotations`.
 *
 * @param fill `nonzero`: star polygons are filled stars; `evenodd`: star centres are open
 * @throws BrokenPromise when the tolerance gap is not kept, or the surface does not close
 * @throws InputError for a builder's model that no tolerance resolves
 * @throws Cancelled out of `progress`
 */
export const computeSkin = (solid: Solid, fill: FillRule = 'nonzero', progress: Progress = noProgress): Skin => {
  if (solid.precision === undefined) {
    const edge = meanEdge(solid)
    // The bounds are meant for edges of about one unit.
    return Math.abs(edge - 1) < 1e-6
      ? skinWithin(solid, fill, catalogueTolerance, progress)
      : scaled(skinWithin(resized(solid, 1 / edge), fill, catalogueTolerance, progress), edge)
  }
  let fault: BrokenPromise | null = null
  for (const tolerance of roughTolerances(solid.precision)) {
    try {
      const skin = skinWithin(solid, fill, tolerance, progress)
      progress('skin', 0.99)
      const failed = validateSkin(skin).filter((c) => !c.ok)
      if (failed.length === 0) return skin
      fault = new BrokenPromise('The skin does not keep its promises.', { failed })
    } catch (error) {
      if (!(error instanceof BrokenPromise)) throw error
      fault = error
    }
  }
  throw new InputError(
    `Some faces of ${solid.name} come closer to each other than its coordinates can tell apart${placeOf(fault)}. ` +
      'Save the model with more digits, or mend that place.',
    'model',
  )
}

const meanEdge = ({ vertices, faces }: Solid): number => {
  let sum = 0
  let count = 0
  for (const { cycle } of faces)
    cycle.forEach((v, i) => {
      sum += distance(vertices[v]!, vertices[cycle[(i + 1) % cycle.length]!]!)
      count++
    })
  return sum / count
}

const resized = (solid: Solid, factor: number): Solid => ({
  ...solid,
  vertices: solid.vertices.map((v) => scale(v, factor)),
})

/** The same skin in a unit `factor` times as fine. */
const scaled = (skin: Skin, factor: number): Skin => ({
  ...skin,
  slack: skin.slack * factor,
  points: skin.points.map((p) => scale(p, factor)),
  panels: skin.panels.map((p) => ({ ...p, area: p.area * factor ** 2 })),
  creases: skin.creases.map((c) => ({ ...c, length: c.length * factor })),
  contacts: skin.contacts.map((c) => ({ ...c, length: c.length * factor })),
  touches: skin.touches.map((t) => ({ ...t, ends: t.ends.map((p) => scale(p, factor)), length: t.length * factor })),
  lineContactLength: skin.lineContactLength * factor,
  area: skin.area * factor ** 2,
  volume: skin.volume * factor ** 3,
})

/** Where a fault happened, if it says. */
const placeOf = (fault: BrokenPromise | null): string => {
  const at = fault?.details.at ?? fault?.details.a
  if (!Array.isArray(at) || at.length !== 3) return ''
  return ` (near ${at.map((x: number) => x.toFixed(4)).join(', ')}; the model's reach is 1)`
}

/** The skin with one tolerance, unchecked. */
export const skinWithin = (solid: Solid, fill: FillRule, tolerance: Tolerance, progress: Progress): Skin => {
  const set = findPlanes(solid, tolerance)
  const frames = set.planes.map(frameOf)
  const faces: FilledFace[] = solid.faces.map((_, i) => {
    if (i % 256 === 0) progress('skin', (0.1 * i) / solid.faces.length)
    const plane = set.planeOfFace[i]!
    return fillFace(solid, i, plane, frames[plane]!, fill)
  })
  const neighbours = neighbourFinder(faces, 2 * tolerance.on)
  const ownFaces = set.planes.map((plane) => plane.faces.map((f) => faces[f]!))
  const arrangements = new Map<number, Arrangement>()
  set.representatives.forEach((r, i) => {
    progress('skin', 0.1 + (0.4 * i) / set.representatives.length)
    const own = ownFaces[r]!
    arrangements.set(r, arrange(set.planes[r]!, frames[r]!, own, neighbours(own), tolerance))
  })
  const sides = findOutside(set, arrangements, faces, (done) => progress('skin', 0.5 + 0.3 * done))
  const kinds = solid.faces.map((f) => f.kind)
  const { panels: raw, points } = collectPanels(
    set,
    arrangements,
    sides,
    kinds,
    carriedFaces(solid, set, tolerance),
    tolerance,
    (done) => progress('skin', 0.8 + 0.1 * done),
  )
  progress('skin', 0.9)
  // Of a large mesh these are most of what is held, and nothing needs them any more.
  arrangements.clear()
  faces.length = 0
  ownFaces.length = 0
  const slack = solid.precision === undefined ? 0 : tolerance.merge
  return assemble(solid, fill, raw, points, slack, (done) => progress('skin', 0.9 + 0.08 * done))
}

const assemble = (
  solid: Solid,
  fill: FillRule,
  raw: readonly RawPanel[],
  points: readonly Vec3[],
  slack: number,
  report: (done: number) => void,
): Skin => {
  const { stretches, stretchOf } = findStretches(raw, points, slack, (done) => report(0.5 * done))
  report(0.5)
  const lengths = stretches.map((s) => distance(points[s.from]!, points[s.to]!))
  const pairing = pairContacts(stretches, raw.length, lengths)

  const creases: SkinCrease[] = []
  const contacts: LineContact[] = []
  const creaseOfBlade = new Map<string, number>()
  stretches.forEach((s, i) => {
    const line = s.blades.length > 2
    const across = pairing.across[i]!
    for (const { blades, innerAngle } of across || !line ? outsideJoins(s) : insideJoins(s)) {
      const id = creases.length
      creases.push({
        id,
        panels: [blades[0].panel, blades[1].panel],
        ends: [s.from, s.to],
        innerAngle,
        contact: line ? 'line' : 'surface',
        stretch: line ? contacts.length : -1,
        length: lengths[i]!,
      })
      for (const b of blades) creaseOfBlade.set(`${b.panel} ${i} ${b.aligned ? 0 : 1}`, id)
    }
    if (line)
      contacts.push({
        ends: [s.from, s.to],
        length: lengths[i]!,
        pairing: across ? 'outside' : 'inside',
        panels: s.blades.map((b) => b.panel),
        bodies: [...new Set(s.blades.map((b) => pairing.bodyOf[b.panel]!))].sort((a, b) => a - b),
      })
  })

  // Ring vertices in the middle of a stretch go; what is left is one ring edge a crease.
  const used = new Map<number, number>()
  const renumber = (v: number): number => {
    let id = used.get(v)
    if (id === undefined) used.set(v, (id = used.size))
    return id
  }
  const panels = raw.map((panel, id): SkinPanel => {
    const rings: number[][] = []
    const ringCreases: number[][] = []
    panel.rings.forEach((ring, r) => {
      const list = stretchOf[id]![r]!
      const corners: number[] = []
      const owners: number[] = []
      ring.forEach((v, e) => {
        const before = list[(e + list.length - 1) % list.length]!
        const s = list[e]!
        if (s === before) return
        corners.push(renumber(v))
        const aligned = dot(
          diff(points[ring[(e + 1) % ring.length]!]!, points[v]!),
          diff(points[stretches[s]!.to]!, points[stretches[s]!.from]!),
        )
        owners.push(creaseOfBlade.get(`${id} ${s} ${aligned > 0 ? 0 : 1}`)!)
      })
      rings.push(corners)
      ringCreases.push(owners)
    })
    const area = norm(ringsArea(panel.rings, points))
    return {
      id,
      normal: panel.normal,
      rings,
      creases: ringCreases,
      faces: panel.faces,
      kind: panel.kind,
      orbit: panel.orbit,
      area,
      body: pairing.bodyOf[id]!,
    }
  })
  report(0.7)
  const kept: Vec3[] = []
  for (const [v, id] of used) kept[id] = points[v]!
  const endsOf = ([a, b]: readonly [number, number]): [number, number] => [renumber(a), renumber(b)]
  const renumbered = creases.map((c) => ({ ...c, ends: endsOf(c.ends) }))
  const skin: Skin = {
    solid: solid.id,
    hand: solid.hand,
    fill,
    slack,
    points: kept,
    panels,
    creases: renumbered,
    contacts: contacts.map((c) => ({ ...c, ends: endsOf(c.ends) })),
    touches: pairing.bodies > 1 ? findTouches({ points: kept, panels, creases: renumbered, slack }) : [],
    bodies: pairing.bodies,
    parts: pairing.parts,
    lineContactLength: contacts.reduce((sum, c) => sum + c.length, 0),
    area: panels.reduce((sum, p) => sum + p.area, 0),
    volume: panels.reduce((sum, p) => sum + (dot(p.normal, kept[p.rings[0]![0]!]!) * p.area) / 3, 0),
  }
  return skin
}

const diff = (a: Vec3, b: Vec3): Vec3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]

const ringsArea = (rings: readonly (readonly number[])[], points: readonly Vec3[]): Vec3 => {
  const sum: [number, number, number] = [0, 0, 0]
  for (const ring of rings) {
    const a = areaVector(ring.map((i) => points[i]!))
    sum[0] += a[0]
    sum[1] += a[1]
    sum[2] += a[2]
  }
  return sum
}

/** The plan's first part: model, panels and creases, in mm. */
import type { Vec3 } from '../geometry/vec3'
import { dot, norm, scale } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import type { Solid } from '../solids/types'
import { round6, roundTo } from './round'
import type { PlanCrease, PlanModel, PlanPanel, Point3 } from './types'

/** Edge length in mm of a solid whose farthest vertex from the centre shall be half of `heightMm` away. */
export const edgeForHeight = (solid: Solid, heightMm: number): number =>
  heightMm / (2 * Math.max(...solid.vertices.map(norm)))

export const planModel = (solid: Solid, skin: Skin, heightMm: number, edgeMm: number): PlanModel => ({
  id: solid.id,
  name: solid.name,
  hand: solid.hand,
  edgeMm: roundTo(edgeMm, 9),
  heightMm: roundTo(heightMm, 6),
  fill: skin.fill,
  ...(solid.precision === undefined
    ? {}
    : { offPlaneMm: round6(Math.max(solid.precision, offPlane(skin)) * edgeMm + 1e-6) }),
})

/** The greatest distance of a panel's corner from the plane through its first corner. */
const offPlane = ({ panels, points }: Skin): number =>
  panels.reduce((most, { normal, rings }) => {
    const height = dot(normal, points[rings[0]![0]!]!)
    return rings.flat().reduce((m, i) => Math.max(m, Math.abs(dot(normal, points[i]!) - height)), most)
  }, 0)

export const planPanels = (solid: Solid, skin: Skin, edgeMm: number): PlanPanel[] =>
  skin.panels.map((p) => ({
    id: p.id,
    normal: p.normal.map((x) => roundTo(x, 12)) as Point3,
    rings: p.rings.map((ring) => ring.map((i) => inMm(skin.points[i]!, edgeMm))),
    faces: [...p.faces],
    colour: solid.kinds[p.kind]!.name,
    areaMm2: round6(p.area * edgeMm * edgeMm),
    body: p.body,
  }))

/** @param folds crease ids that fold @param labels seam labels by crease id */
export const planCreases = (
  skin: Skin,
  edgeMm: number,
  folds: ReadonlySet<number>,
  labels: ReadonlyMap<number, string>,
): PlanCrease[] =>
  skin.creases.map((c) => {
    const crease: PlanCrease = {
      id: c.id,
      panels: [...c.panels],
      ends: [inMm(skin.points[c.ends[0]]!, edgeMm), inMm(skin.points[c.ends[1]]!, edgeMm)],
      innerAngle: round6(c.innerAngle),
      join: folds.has(c.id) ? 'fold' : 'seam',
      contact: c.contact,
    }
    const label = labels.get(c.id)
    if (label !== undefined) crease.label = label
    return crease
  })

const inMm = (p: Vec3, edgeMm: number): Point3 => scale(p, edgeMm).map(round6) as Point3

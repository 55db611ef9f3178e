/**
 * Walls with the outside on both sides. A builder's model may hold them; card has no back that could carry tabs there, and
 * they close off nothing, so they are refused. Of the 75 only the small snub icosicosidodecahedron has any, and only with
 * open stars, where two of its triangles lie on each other.
 */
import { InputError } from '../errors'
import { intersectionArea } from '../geometry/clip'
import { dot, planeFrame, type Vec3 } from '../geometry/vec3'
import type { Solid } from '../solids/types'
import type { Skin, SkinPanel } from './types'

/** The faces of which a part is seen from both sides. */
export const looseWalls = (skin: Skin): number[] => {
  const panelsOf = new Map<number, SkinPanel[]>()
  for (const panel of skin.panels)
    for (const f of panel.faces) {
      const list = panelsOf.get(f)
      if (list) list.push(panel)
      else panelsOf.set(f, [panel])
    }
  const boxes = skin.panels.map((panel) => boxOf(panel.rings.flat().map((i) => skin.points[i]!)))
  const found = new Set<number>()
  const tried = new Map<string, boolean>()
  for (const [face, panels] of panelsOf)
    for (const a of panels)
      for (const b of panels) {
        if (a.id >= b.id || dot(a.normal, b.normal) > 0 || !meet(boxes[a.id]!, boxes[b.id]!)) continue
        const key = `${a.id} ${b.id}`
        const loose = tried.get(key) ?? overlap(skin, a, b)
        tried.set(key, loose)
        if (loose) found.add(face)
      }
  return [...found].sort((x, y) => x - y)
}

interface Box {
  readonly low: readonly number[]
  readonly high: readonly number[]
}

const boxOf = (points: readonly Vec3[]): Box => {
  const axes = [0, 1, 2]
  return {
    low: axes.map((k) => points.reduce((m, p) => Math.min(m, p[k]!), Number.POSITIVE_INFINITY)),
    high: axes.map((k) => points.reduce((m, p) => Math.max(m, p[k]!), Number.NEGATIVE_INFINITY)),
  }
}

/** Clipping is dear, and most panels of a face lie far apart. */
const meet = (a: Box, b: Box): boolean => a.low.every((x, k) => x <= b.high[k]! && b.low[k]! <= a.high[k]!)

const overlap = (skin: Skin, a: SkinPanel, b: SkinPanel): boolean => {
  const { u, v } = planeFrame(a.normal)
  const flat = (panel: SkinPanel, turn: boolean) =>
    panel.rings.map((ring) => {
      const points = ring.map((i) => skin.points[i] as Vec3).map((p) => [dot(p, u), dot(p, v)] as const)
      return turn ? points.reverse() : points
    })
  return intersectionArea(flat(a, false), flat(b, true)) > 1e-3 * Math.min(a.area, b.area)
}

/** @throws InputError that names the first such face (its place is `face` and its number, from 1) */
export const refuseLooseWalls = (solid: Solid, skin: Skin): void => {
  const [first, ...more] = looseWalls(skin)
  if (first === undefined) return
  const corner = solid.vertices[solid.faces[first]!.cycle[0]!]!.map((x) => Number(x.toPrecision(4))).join(', ')
  throw new InputError(
    `Face ${first + 1} is a loose wall, seen from both sides${more.length > 0 ? `, like ${more.length} more` : ''}; ` +
      `give it a thickness or take it out (it begins at ${corner}, where the farthest corner is at 1).`,
    `face ${first + 1}`,
  )
}

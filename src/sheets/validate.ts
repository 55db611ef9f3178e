/** Whether sheets keep what they promise, by clipping true outlines: no raster, nothing of the search. */
import { differenceArea, intersectionArea, offset, union } from '../geometry/clip'
import type { Ring2, Vec2 } from '../geometry/vec2'
import type { NestedSheet, NestItem, NestOptions, Placed } from './nest'

export interface SheetCheck {
  readonly name: string
  readonly ok: boolean
  readonly detail: string
}

/** An item's rings as they lie on the sheet. */
export const placeRings = (rings: readonly Ring2[], placed: Placed): Ring2[] => {
  const c = Math.cos((placed.rotation * Math.PI) / 180)
  const s = Math.sin((placed.rotation * Math.PI) / 180)
  return rings.map((ring) => {
    const out = ring.map(([u, v]): Vec2 => {
      const m = placed.mirrored ? -u : u
      return [c * m - s * v + placed.x, s * m + c * v + placed.y]
    })
    return placed.mirrored ? out.reverse() : out
  })
}

/** mm²: clipping rounds to 1e-5 mm. */
const nothing = 1e-3

/** Each item once, inside the margins, the gap kept, groups apart. @param options as they were given to `nest` */
export const validateSheets = (
  items: readonly NestItem[],
  sheets: readonly NestedSheet[],
  options: NestOptions,
): SheetCheck[] => {
  const byId = new Map(items.map((i) => [i.id, i]))
  const faults: { margin: string[]; overlap: string[]; once: string[]; group: string[] } = {
    margin: [],
    overlap: [],
    once: [],
    group: [],
  }
  const count = new Map<number, number>()
  const { widthMm: w, heightMm: h, marginMm: m, gapMm } = options
  const page: Ring2[] = [
    [
      [m, m],
      [w - m, m],
      [w - m, h - m],
      [m, h - m],
    ],
  ]
  sheets.forEach((sheet, k) => {
    const regions = sheet.placed.flatMap((placed) => {
      count.set(placed.item, (count.get(placed.item) ?? 0) + 1)
      const item = byId.get(placed.item)
      if (!item) {
        faults.once.push(`sheet ${k}: no item ${placed.item}`)
        return []
      }
      if (item.group !== sheet.group) faults.group.push(`sheet ${k}: item ${item.id} is of ${item.group}`)
      const region = union(placeRings(item.rings, placed))
      if (differenceArea(region, page) > nothing) faults.margin.push(`sheet ${k}: item ${item.id} crosses the margin`)
      return [{ id: item.id, region, grown: gapMm > 0.02 ? offset(region, gapMm - 0.02) : region }]
    })
    for (let i = 0; i < regions.length; i++)
      for (let j = i + 1; j < regions.length; j++) {
        const a = regions[i]!
        const b = regions[j]!
        if (intersectionArea(a.grown, b.region) > nothing)
          faults.overlap.push(`sheet ${k}: items ${a.id} and ${b.id} are nearer than the gap`)
      }
  })
  for (const item of items)
    if (count.get(item.id) !== 1) faults.once.push(`item ${item.id} is placed ${count.get(item.id) ?? 0} times`)
  const check = (name: string, list: readonly string[]): SheetCheck => ({
    name,
    ok: list.length === 0,
    detail: list.slice(0, 3).join('; ') || 'ok',
  })
  return [
    check('each item placed once', faults.once),
    check('everything inside the margins', faults.margin),
    check('gap kept between items', faults.overlap),
    check('groups keep to their sheets', faults.group),
  ]
}

/** The command `skin`: what can be touched from outside, for one solid or for all. */
import { computeSkin } from '../skin'
import { buildSolid, listFamily } from '../solids'
import type { FillRule } from '../solids/types'
import { knownSolid } from './known-solid'
import { textTable } from './text-table'

/** Lengths in unit edges; `ms` is the time that the solid and its skin took. */
interface SkinReport {
  readonly id: string
  readonly fill: FillRule
  readonly panels: number
  readonly areaEdge2: number
  readonly volumeEdge3: number
  readonly bodies: number
  readonly lineContactLength: number
  readonly ms: number
}

const report = (id: string, fill: FillRule): SkinReport => {
  const start = performance.now()
  const skin = computeSkin(buildSolid(id), fill)
  return {
    id,
    fill,
    panels: skin.panels.length,
    areaEdge2: skin.area,
    volumeEdge3: skin.volume,
    bodies: skin.bodies,
    lineContactLength: skin.lineContactLength,
    ms: Math.round(performance.now() - start),
  }
}

export const skin = (id: string | 'all', fill: FillRule, json: boolean): string => {
  const ids = id === 'all' ? listFamily('uniform').map((facts) => facts.id) : [knownSolid(id).id]
  const reports = ids.map((one) => report(one, fill))
  if (json) return JSON.stringify(reports, undefined, 1)
  const head = ['id', 'fill', 'panels', 'area edge²', 'volume edge³', 'bodies', 'line contact', 'ms']
  return textTable(head, reports.map(Object.values))
}

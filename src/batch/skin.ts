/** The command `skin`: what can be touched from outside, for one solid or for all 75 uniform ones. */
import { placed } from '../models'
import { computeSkin } from '../skin'
import { refuseLooseWalls } from '../skin/loose-walls'
import { buildSolid, listFamily } from '../solids'
import type { FillRule } from '../solids/types'
import { knownSolid } from './known-solid'
import { readModelFile } from './model-file'
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

/** As `skin`, for a builder's model; lengths, areas and volume in the file's own unit. */
export const skinOfFile = (file: string, fill: FillRule, json: boolean): string => {
  const start = performance.now()
  const model = readModelFile(file)
  const { solid, format, farthest, notes } = model
  const skin = (() => {
    try {
      const found = computeSkin(solid, fill)
      refuseLooseWalls(solid, found)
      return found
    } catch (error) {
      throw placed(error, model, file)
    }
  })()
  const row = {
    id: solid.id,
    fill,
    panels: skin.panels.length,
    area: skin.area * farthest ** 2,
    volume: skin.volume * farthest ** 3,
    bodies: skin.bodies,
    lineContactLength: skin.lineContactLength * farthest,
    ms: Math.round(performance.now() - start),
  }
  if (json)
    return JSON.stringify(
      [{ ...row, format, faces: solid.faces.length, heightUnits: 2 * farthest, notes }],
      undefined,
      1,
    )
  const head = ['id', 'fill', 'panels', 'area', 'volume', 'bodies', 'line contact', 'ms']
  return [textTable(head, [Object.values(row)]), ...notes].join('\n')
}

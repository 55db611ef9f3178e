/** Draws: pictures of solids, pages, and the PDF. */
import { expose, transfer } from 'comlink'
import { type DrawingPage, drawPlan } from '../drawing'
import { InputError } from '../errors'
import { checkedModel, modelFacts } from '../models/stored'
import { pageToSvg, writePdf } from '../output'
import { planText } from '../plan/file'
import { validatePlan } from '../plan/validate'
import { faceItems, renderThumbnail } from '../preview/thumbnail'
import { buildSolid, familyOf, findSolids, listFamily, whyNot } from '../solids'
import { solidParts } from '../solids/parts'
import type { Solid } from '../solids/types'
import { vertexFigure } from '../solids/vertex-figure'
import { answer, answerLater } from './answer'
import type { PressApi } from './protocol'

const kept = new Map<string, DrawingPage[]>()
const keepAtMost = 4

const coloursOf = (solid: Solid, colours: Readonly<Record<string, string>>): string[] =>
  solid.kinds.map(({ name }) => colours[name] ?? '#c8c2b8')

/** Raw faces cost the page ten kilobytes each on their way; of a larger model only the skin is shown. */
const mostRaw = 4000

/** Builders' models by id. */
const models = new Map<string, Solid>()
const solidOf = (id: string, hand?: 'left' | 'right'): Solid => models.get(id) ?? buildSolid(id, hand)

const api: PressApi = {
  catalogue: (family) => answer(() => [...listFamily(family)]),
  knows: (id) => answer(() => familyOf(id) !== undefined),
  keepModel: (model) =>
    answer(() => {
      const solid = checkedModel(model)
      models.set(solid.id, solid)
      return modelFacts(solid)
    }),
  find: (query) =>
    answer(() => {
      const words = query.toLowerCase().trim()
      const own = [...models.values()].filter(({ name }) => name.toLowerCase().includes(words))
      return {
        ids: [...findSolids(query), ...own].map(({ id }) => id),
        why: whyNot(words.replace(/[^a-z0-9]+/g, '-')),
      }
    }),
  faces: (id, hand, fill, colours) =>
    answer(() => {
      const solid = solidOf(id, hand)
      if (solid.faces.length > mostRaw) return []
      return faceItems(solid, coloursOf(solid, colours), fill).map((item) => ({
        ...item,
        kind: solid.kinds[Number(item.kind)]!.name,
      }))
    }),
  parts: (id, hand) => answer(() => solidParts(solidOf(id, hand))),
  figures: (id, hand, vertices) =>
    answer(() => {
      const solid = solidOf(id, hand)
      return vertices.map((vertex) => vertexFigure(solid, vertex))
    }),
  picture: (id, colours, size) => {
    const made = answer(() => {
      const solid = solidOf(id)
      if (solid.faces.length > mostRaw) throw new InputError('Too many faces for a small picture.', 'model')
      return renderThumbnail(faceItems(solid, coloursOf(solid, colours)), { size, direction: [0.42, 0.31, 1] })
    })
    return made.ok ? transfer(made, [made.value.data.buffer]) : made
  },
  pages: (key, plan, choices) =>
    answer(() => {
      const pages = drawPlan(plan, choices)
      kept.delete(key)
      kept.set(key, pages)
      for (const old of [...kept.keys()].slice(0, -keepAtMost)) kept.delete(old)
      return pages.map(({ title, sheet, widthMm, heightMm, pieces }) => ({ title, sheet, widthMm, heightMm, pieces }))
    }),
  page: (key, index) =>
    answer(() => {
      const page = kept.get(key)?.[index]
      return page ? pageToSvg(page) : null
    }),
  check: (plan) => answer(() => validatePlan(plan)),
  planText: (plan) => answer(() => planText(plan)),
  pdf: async (plan, choices) => {
    const made = await answerLater(() => writePdf(drawPlan(plan, choices)))
    return made.ok ? transfer(made, [made.value.buffer]) : made
  },
}
expose(api)

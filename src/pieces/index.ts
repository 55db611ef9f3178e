/** The skin cut into pieces: flat nets that a builder cuts out in one and folds. */
import { noProgress, type Progress } from '../errors'
import { convexHull, roomiestAngle, turnedBox } from '../geometry/hull'
import { compose2, type Motion2, motionBetween, move2, type Vec2 } from '../geometry/vec2'
import type { Mat3 } from '../geometry/vec3'
import type { Skin } from '../skin/types'
import { actionsOn } from './action'
import { layOutNets, type Net, placedRings } from './lay-out'
import { moduleOf } from './modules'
import { edgeEnds, type PanelGraph, panelGraph } from './panel-graph'
import type { FitRectangle } from './patch'
import { searchRepeats } from './repeat'
import { searchFolds } from './search'
import { type NetTemplate, nameTemplates } from './templates'
import { refuseTooLarge } from './too-large'
import type { Piece } from './types'

/**
 * Ways of cutting up: as few pieces as the sheet allows; as few templates as possible; spikes and pits as units; one panel
 * a piece.
 */
export type Nets = 'fewest' | 'repeat' | 'modules' | 'single'

export interface CutOptions {
  /** Default: fewest. */
  readonly nets?: Nets
  /** Of the solid; needed by `repeat`, which else finds nothing that repeats. */
  readonly rotations?: readonly Mat3[]
  /** Most panels a piece may have. */
  readonly maxPanels?: number
  /** Length of the solid's edge in mm. */
  readonly edgeMm: number
  /** What the printer or the cutter reaches, in mm: every piece fits it with its tabs, turned as it likes. */
  readonly fit: FitRectangle
  /** Pieces hold panels of one face kind only (a sheet set per colour). */
  readonly perKind?: boolean
  /** Kept free for tabs on every side of the rectangle while nets are sought; default 3. */
  readonly tabRoomMm?: number
  /** How long to search, see `SearchOptions.effort`; the default grows with the number of panels. 0: greedy merging. */
  readonly effort?: number
  readonly seed?: number
}

export interface Cut {
  readonly pieces: readonly Piece[]
  /** Crease ids that fold, ascending. With the size, they are all that is needed to get the pieces again. */
  readonly folds: readonly number[]
}

/**
 * Cuts a skin into pieces: every panel in exactly one, every piece a tree of folds that lies flat, unmirrored, without
 * overlap, and fits the rectangle. Deterministic. See `search.ts` for the methods.
 *
 * @throws InputError when a single panel is larger than the rectangle
 * @throws Cancelled out of `progress`
 */
export const cutIntoPieces = (skin: Skin, options: CutOptions, progress: Progress = noProgress): Cut => {
  const { edgeMm, fit, nets = 'fewest', perKind = false, tabRoomMm = 3, seed = 1 } = options
  const { maxPanels = Number.POSITIVE_INFINITY } = options
  const graph = panelGraph(skin, edgeMm)
  refuseTooLarge(skin, graph, fit)
  const effort = options.effort ?? usualEffort(graph.flat.length)
  const within = fitWithoutTabs(fit, tabRoomMm)
  const foldsFor: Record<Nets, () => number[]> = {
    fewest: () => searchFolds(graph, { fit: within, perKind, maxPanels, effort, seed }, progress),
    modules: () =>
      searchFolds(graph, { fit: within, perKind, maxPanels, groups: moduleOf(graph), effort, seed }, progress),
    repeat: () => {
      const actions = actionsOn(skin, options.rotations ?? [])
      return searchRepeats(graph, actions, { fit: within, perKind, maxPanels, seed, starts: 40 }, progress)
    },
    single: () => [],
  }
  const folds = foldsFor[nets]()
  return { pieces: layOutPieces(graph, folds, fit), folds }
}

const fitWithoutTabs = ({ widthMm, heightMm }: FitRectangle, room: number): FitRectangle => ({
  widthMm: widthMm - 2 * room,
  heightMm: heightMm - 2 * room,
})

/** Enough for most of what there is to gain; a second or two below 500 panels, some ten for the largest skins. */
export const usualEffort = (panels: number): number => Math.min(10 * panels, 1000 + 4 * panels)

/** The pieces of a set of folds, whoever chose it; by smallest panel id. Congruent pieces get the same coordinates. */
export const piecesOf = (skin: Skin, edgeMm: number, folds: readonly number[], fit: FitRectangle): Piece[] =>
  layOutPieces(panelGraph(skin, edgeMm), folds, fit)

const layOutPieces = (graph: PanelGraph, folds: readonly number[], fit: FitRectangle): Piece[] => {
  const nets = layOutNets(graph, folds)
  const names = nameTemplates(graph, nets)
  /** By template: where the canonical start edge of its first net came to lie. */
  const anchors: (readonly [Vec2, Vec2])[] = []
  return nets.map((net, id): Piece => {
    const name = names[id]!
    const edge = startEdge(graph, net, name)
    let move: Motion2
    const anchor = anchors[name.template]
    if (anchor) move = motionBetween(edge[0], edge[1], anchor[0], anchor[1])
    else {
      move = uprightMotion(graph, net, fit)
      anchors[name.template] = [move2(move, edge[0]), move2(move, edge[1])]
    }
    const kinds = new Set(net.panels.map((p) => graph.kinds[p]!))
    return {
      id,
      panels: placedRings(graph, net, move),
      motions: net.motions.map((m) => compose2(move, m)),
      folds: net.folds,
      template: name.template,
      hand: name.hand,
      kind: kinds.size === 1 ? graph.kinds[net.panels[0]!]! : -1,
    }
  })
}

const startEdge = (graph: PanelGraph, net: Net, { start }: NetTemplate): readonly [Vec2, Vec2] => {
  const motion = net.motions[net.panels.indexOf(start.panel)]!
  const [a, b] = edgeEnds(graph.flat, start)
  return [move2(motion, a), move2(motion, b)]
}

/** Turns a net so that it has the most room in the rectangle, upright, its box in the first quadrant. */
const uprightMotion = (graph: PanelGraph, net: Net, fit: FitRectangle): Motion2 => {
  const points = placedRings(graph, net).flatMap((p) => p.rings[0]!.flat())
  const angle = roomiestAngle(convexHull(points), fit.widthMm, fit.heightMm)
  const [c, s] = [Math.cos(angle), Math.sin(angle)]
  const { minX, minY } = turnedBox(points, c, s)
  return { c, s, x: -minX, y: -minY }
}

export { flattenPanels } from './flatten'
export { bestFitRotation, cutLines, pieceOutline, piecePoints } from './outline'
export type { FitRectangle } from './patch'
export { foldPiece, type Motion3, move3 } from './refold'
export { assignTabs, type ButtReason, type ButtSeam, type TabOptions, type Tabs } from './tabs'
export type { FlatPanel, Piece, Tab } from './types'
export { type PieceCheck, type PiecesPlan, validatePieces } from './validate'

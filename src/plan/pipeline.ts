/**
 * The way of the data, from choices to plan: solid, skin, pieces, order, tabs, sheets, docket. Pure and deterministic; the
 * same choices give the same plan to the last byte.
 */
import { gluingOrder, renumber } from '../assembly'
import { composeDocket, holdsOf, type PlanWithoutDocket } from '../docket'
import { BrokenPromise, InputError, noProgress, type Progress } from '../errors'
import { convexHull, fittingAngle } from '../geometry/hull'
import type { Ring2 } from '../geometry/vec2'
import { flattenPanels } from '../pieces/flatten'
import { pieceOutline } from '../pieces/outline'
import type { FitRectangle } from '../pieces/patch'
import { assignTabs } from '../pieces/tabs'
import type { Piece, Tab } from '../pieces/types'
import { cardName, nest, papers } from '../sheets'
import { type Closed, closeSlivers, computeSkin, type Skin, validateSkin } from '../skin'
import { refuseLooseWalls } from '../skin/loose-walls'
import { buildSolid, type Solid } from '../solids'
import { shapeHash } from '../solids/shape-hash'
import { checkChoices } from './choices'
import { edgeForHeight, planCreases, planModel, planPanels } from './model'
import { cutSkin } from './nets'
import { round6 } from './round'
import { seamLabel } from './seam-labels'
import { StageCache } from './stages'
import type { Plan, PlanChoices, PlanClosed, PlanPiece, PlanSheet, PlanStep, Point2 } from './types'
import { validatePlan } from './validate'

/**
 * Makes the whole plan.
 * @param cache stages of an earlier plan, to be used again where their choices have not changed
 * @throws InputError for a choice out of range or an unknown solid
 * @throws Cancelled out of `progress`, which is called with the stage's name and its fraction
 */
export const makePlan = (
  choices: PlanChoices,
  progress: Progress = noProgress,
  cache: StageCache = new StageCache(),
): Plan => {
  checkChoices(choices)
  const solid = buildSolid(choices.solid, choices.hand)
  return planSolid(solid, choices, progress, cache)
}

/** As `makePlan`, for a solid in hand: `choices.solid` and `choices.hand` are not looked at. */
export const planSolid = (
  solid: Solid,
  choices: PlanChoices,
  progress: Progress = noProgress,
  cache: StageCache = new StageCache(),
): Plan => {
  const paper = papers[choices.paper]
  if (!paper) throw new InputError(`There is no paper "${choices.paper}": choose a4 or letter.`, 'paper')
  const fit: FitRectangle = {
    widthMm: paper.widthMm - 2 * choices.marginMm,
    heightMm: paper.heightMm - 2 * choices.marginMm,
  }
  const edgeMm = edgeForHeight(solid, choices.heightMm)
  const perKind = choices.colours === 'kind'

  // A builder's model keeps its name when it is changed and read again, so its shape belongs to the key.
  const skinKey = [solid.id, solid.hand, choices.fill, ...(solid.family === 'own' ? [shapeHash(solid)] : [])]
  const whole = cache.get('skin', skinKey, () => sound(computeSkin(solid, choices.fill, progress)))
  if (solid.family === 'own') refuseLooseWalls(solid, whole)
  const closeBelowMm = choices.closeBelowMm ?? 0
  const nets = choices.nets ?? 'fewest'
  const closed = cache.get('closed', [...skinKey, edgeMm, closeBelowMm], () =>
    closeSlivers(whole, closeBelowMm / edgeMm),
  )
  const netKey = [...skinKey, edgeMm, closeBelowMm, fit, perKind, nets]
  const glued = cache.get('pieces', netKey, () => {
    ensurePanelsFit(closed.skin, edgeMm, choices.heightMm, fit)
    const { rotations } = solid
    const { skin, cut } = cutSkin(closed.skin, { edgeMm, fit, perKind, nets, rotations }, progress)
    progress('order', 0)
    const { pieces, steps } = renumber(cut.pieces, gluingOrder(skin, cut.pieces))
    const { tabs } = assignTabs(skin, pieces, { fit }, progress)
    return { skin, pieces, steps, tabs }
  })
  const { skin } = glued
  const outlines = glued.pieces.map((piece, i) => pieceOutline(skin, piece, glued.tabs[i]!))
  const sheetKey = [...netKey, choices.paper, choices.marginMm, choices.gapMm, choices.side]
  const nested = cache.get('sheets', sheetKey, () =>
    nest(
      glued.pieces.map((piece, i) => ({
        id: piece.id,
        rings: regionOf(piece, glued.tabs[i]!),
        group: perKind ? solid.kinds[piece.kind]!.name : 'all',
      })),
      {
        widthMm: paper.widthMm,
        heightMm: paper.heightMm,
        marginMm: choices.marginMm,
        gapMm: choices.gapMm,
        mirrored: choices.side === 'inside',
      },
      progress,
    ),
  )

  const folds = new Set(glued.pieces.flatMap((p) => p.folds))
  const labels = new Map<number, string>()
  for (const { seams } of glued.steps) for (const id of seams) labels.set(id, seamLabel(labels.size))
  const plan: PlanWithoutDocket = {
    format: 'facetwright-plan',
    version: 1,
    model: planModel(solid, skin, choices.heightMm, edgeMm),
    panels: planPanels(solid, skin, edgeMm),
    creases: planCreases(skin, edgeMm, folds, labels),
    pieces: glued.pieces.map((piece, i) => planPiece(solid, piece, glued.tabs[i]!, outlines[i]!)),
    sheets: nested.map(
      ({ group, placed }, id): PlanSheet => ({
        id,
        paper: paper.id,
        widthMm: paper.widthMm,
        heightMm: paper.heightMm,
        marginMm: choices.marginMm,
        card: cardName(choices.grammage),
        colour: group,
        placed: placed.map(({ item, x, y, rotation, mirrored }) => ({
          piece: item,
          x: round6(x),
          y: round6(y),
          rotation,
          mirrored,
        })),
      }),
    ),
    steps: glued.steps.map(
      (step, i): PlanStep => ({ step: i + 1, piece: step.piece, seams: [...step.seams], note: step.note }),
    ),
  }
  progress('checks', 0)
  const docket = {
    ...composeDocket(plan, skin.bodies, skin.contacts.length, []),
    ...holdsOf(skin, plan.creases, plan.pieces, edgeMm),
    ...(closed.stretches > 0 ? { closed: closedInMm(closed, closeBelowMm, edgeMm) } : {}),
  }
  const checks = validatePlan({ ...plan, docket })
  progress('checks', 1)
  return { ...plan, docket: { ...docket, checks } }
}

const closedInMm = (closed: Closed, belowMm: number, edgeMm: number): PlanClosed => ({
  belowMm,
  stretches: closed.stretches,
  panels: closed.panels,
  movedMm: round6(closed.moved * edgeMm),
  offPlaneMm: round6(closed.skin.slack * edgeMm),
})

/** A skin that does not keep its promises must never reach the builder's card. */
const sound = (skin: Skin): Skin => {
  const failed = validateSkin(skin).filter((c) => !c.ok)
  if (failed.length > 0) throw new BrokenPromise('The skin does not keep its promises.', { solid: skin.solid, failed })
  return skin
}

/** A panel that fits the printable area at no angle cannot be cut in one: say so before nets are sought. */
const ensurePanelsFit = (skin: Skin, edgeMm: number, heightMm: number, fit: FitRectangle): void => {
  let scale = 1
  for (const { rings } of flattenPanels(skin, edgeMm)) {
    const hull = convexHull(rings[0]!.flat())
    // The scale at which the panel just fits, found by halving; most panels fit as they are.
    if (fittingAngle(hull, fit.widthMm / scale, fit.heightMm / scale) !== null) continue
    let low = 0
    for (let k = 0, high = scale; k < 30; k++) {
      const middle = (low + high) / 2
      if (fittingAngle(hull, fit.widthMm / middle, fit.heightMm / middle) === null) high = middle
      else low = middle
    }
    scale = low
  }
  if (scale < 1)
    throw new InputError(
      `At ${heightMm} mm a panel is larger than the sheet: choose a height of at most ${Math.floor(heightMm * scale)} mm.`,
      'heightMm',
    )
}

const regionOf = (piece: Piece, tabs: readonly Tab[]): Ring2[] => [
  ...piece.panels.flatMap((p) => p.rings),
  ...tabs.map((t) => t.outline),
]

const planPiece = (solid: Solid, piece: Piece, tabs: readonly Tab[], outline: Ring2): PlanPiece => ({
  id: piece.id,
  label: piece.hand === 'none' ? `${piece.id + 1}` : `${piece.id + 1} ${piece.hand}`,
  template: `T${piece.template + 1}`,
  hand: piece.hand,
  colour: piece.kind < 0 ? 'mixed' : solid.kinds[piece.kind]!.name,
  step: piece.id + 1,
  panels: piece.panels.map(({ panel, rings }) => ({ panel, rings: rings.map(plain) })),
  folds: [...piece.folds],
  outline: plain(outline),
  tabs: tabs.map(({ crease, panel, kind, outline: ring }) => ({ crease, panel, kind, outline: plain(ring) })),
})

const plain = (ring: Ring2): Point2[] => ring.map(([x, y]): Point2 => [round6(x), round6(y)])

/**
 * The whole way for each of the 75 at 250 mm on A4, the solid turned at random and its vertices and faces shuffled: every
 * validator must be content at every stage. Split over two files so that two workers share the work.
 */
import { expect, test } from 'vitest'
import { type Piece, type Tab, validatePieces } from '../../src/pieces'
import {
  type Plan,
  type PlanChoices,
  planSchema,
  planSolid,
  StageCache,
  usualChoices,
  validatePlan,
} from '../../src/plan'
import { schemaFaults } from '../../src/plan/conform'
import { type NestedSheet, papers, validateSheets } from '../../src/sheets'
import { computeSkin, type Skin, validateSkin } from '../../src/skin'
import { buildSolid, listFamily, transformSolid, validateSolid } from '../../src/solids'
import { randomRotation, seeded } from '../support/random'

/** Keeps what every stage handed on. */
class Recorder extends StageCache {
  readonly values = new Map<string, unknown>()

  override get<T>(stage: string, key: unknown, compute: () => T): T {
    const value = super.get(stage, key, compute)
    this.values.set(stage, value)
    return value
  }

  of<T>(stage: string): T {
    const value = this.values.get(stage)
    if (value === undefined) throw new Error(`the pipeline has no stage ${stage}`)
    return value as T
  }
}

interface Glued {
  /** As its line contacts are paired for these nets. */
  readonly skin: Skin
  readonly pieces: readonly Piece[]
  readonly tabs: readonly (readonly Tab[])[]
}

/** What is not kept, with its stage; empty when all is well. */
const broken = (
  stage: string,
  checks: readonly { readonly name: string; readonly ok: boolean; readonly detail: string }[],
): string[] => {
  // A validator that checks nothing would be content with everything.
  if (checks.length < 3) return [`${stage}: only ${checks.length} checks`]
  return checks.filter(({ ok }) => !ok).map(({ name, detail }) => `${stage}: ${name}: ${detail}`)
}

const { marginMm, gapMm } = usualChoices
const { widthMm, heightMm } = papers.a4
const fit = { widthMm: widthMm - 2 * marginMm, heightMm: heightMm - 2 * marginMm }

const sheetFaults = ({ pieces, tabs }: Glued, sheets: readonly NestedSheet[]): string[] => {
  const items = pieces.map((piece, i) => ({
    id: piece.id,
    rings: [...piece.panels.flatMap(({ rings }) => rings), ...tabs[i]!.map(({ outline }) => outline)],
    group: 'all',
  }))
  return broken('sheets', validateSheets(items, sheets, { widthMm, heightMm, marginMm, gapMm, mirrored: false }))
}

const pieceFaults = ({ skin, pieces, tabs }: Glued, plan: Plan): string[] =>
  broken(
    'pieces',
    validatePieces({ skin, edgeMm: plan.model.edgeMm, pieces, tabs, buttSeams: plan.docket.buttSeams, fit }),
  )

/** @param part 0 or 1: every second solid */
export const wholeWay = (part: 0 | 1): void => {
  const mine = listFamily('uniform').flatMap(({ id, index }) =>
    index !== null && index % 2 === part ? [{ id, index }] : [],
  )
  test.each(mine.map(({ id, index }) => [id, 7500 + index] as const))('%s, seed %i', (id, seed) => {
    const plain = buildSolid(id)
    const solid = transformSolid(plain, randomRotation(seeded(seed)), seed)
    const recorder = new Recorder()
    const choices: PlanChoices = { ...usualChoices, solid: id, heightMm: 250, paper: 'a4' }
    const plan = planSolid(solid, choices, undefined, recorder)
    const skin = recorder.of<Skin>('skin')
    const glued = recorder.of<Glued>('pieces')
    expect([
      ...broken('solid', validateSolid(solid)),
      ...broken('skin', validateSkin(skin)),
      ...broken('paired skin', validateSkin(glued.skin)),
      ...pieceFaults(glued, plan),
      ...sheetFaults(glued, recorder.of<NestedSheet[]>('sheets')),
      ...broken('plan', validatePlan(plan)),
      ...schemaFaults(planSchema, plan),
    ]).toEqual([])
    const still = computeSkin(plain)
    expect(plan.docket.panels).toBe(still.panels.length)
    expect(plan.docket.bodies).toBe(still.bodies)
  })
}

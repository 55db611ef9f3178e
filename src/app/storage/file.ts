/**
 * Builds and plans as files. `plan.json` is the plan and nothing else; a build file holds choices, plans and progress too,
 * and is what saves the builder's work where the browser keeps nothing.
 */
import { InputError } from '../../errors'
import type { Plan, PlanChoices } from '../../plan/types'
import { type Build, choicesOf, planKeysOf } from '../state/build'
import { firstChoices, limits } from '../state/choices'

const remedy = 'Open a plan.json or a build file that this program has saved.'

interface BuildFile {
  readonly format: 'facetwright-build'
  readonly version: 1
  readonly build: Build
  readonly plans: Readonly<Record<string, Plan>>
}
export type Opened =
  | { readonly kind: 'plan'; readonly plan: Plan; readonly choices: PlanChoices }
  | { readonly kind: 'build'; readonly build: Build; readonly plans: Readonly<Record<string, Plan>> }

/** A text of more than about 500 MB is more than a browser can hold; the largest plan of all has a tenth of that. */
export const greatestSavedBytes = 400_000_000

/**
 * Call it before a saved file is read into memory.
 * @param size in bytes
 * @throws InputError for a larger file than `greatestSavedBytes`
 */
export const checkSavedFileSize = (size: number, name: string): void => {
  if (size > greatestSavedBytes)
    throw new InputError(
      `${name} has ${Math.round(size / 1e6)} MB, a plan or a build has at most ${greatestSavedBytes / 1e6} MB. ${remedy}`,
      name,
    )
}

/** @param planOf finds a plan by key; a plan that is gone is left out */
export const buildFileText = async (build: Build, planOf: (key: string) => Promise<Plan | null>): Promise<string> => {
  const plans: Record<string, Plan> = {}
  for (const key of planKeysOf(build)) {
    const plan = await planOf(key)
    if (plan) plans[key] = plan
  }
  const file: BuildFile = { format: 'facetwright-build', version: 1, build, plans }
  return `${JSON.stringify(file)}\n`
}

/** The choices that a plan was made from, as far as it tells; the gap between pieces is not in the file. */
export const choicesOfPlan = (plan: Plan): PlanChoices => {
  const first = plan.sheets[0]
  const base = firstChoices(plan.model.id)
  const grammage = Number.parseFloat(first?.card ?? '')
  return {
    ...base,
    hand: plan.model.hand === 'left' ? 'left' : 'right',
    fill: plan.model.fill,
    heightMm: plan.model.heightMm,
    paper: first?.paper === 'letter' ? 'letter' : 'a4',
    side: plan.sheets.some(({ placed }) => placed.some(({ mirrored }) => mirrored)) ? 'inside' : 'outside',
    colours: plan.sheets.some(({ colour }) => colour !== 'all') ? 'kind' : 'one',
    marginMm: first?.marginMm ?? base.marginMm,
    grammage: Number.isFinite(grammage) ? grammage : base.grammage,
  }
}

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null
const isPlan = (value: unknown): value is Plan =>
  isRecord(value) &&
  value.format === 'facetwright-plan' &&
  value.version === 1 &&
  isRecord(value.model) &&
  isRecord(value.docket) &&
  ['panels', 'creases', 'pieces', 'sheets', 'steps'].every((name) => Array.isArray(value[name]))

const later = ['nets', 'closeBelowMm']
const isChoices = (value: unknown): value is PlanChoices => {
  if (!isRecord(value)) return false
  const { heightMm } = limits
  const height = value.heightMm
  return (
    // Choices that came later may be missing in a file of before.
    Object.entries(firstChoices('')).every(
      ([name, example]) => typeof value[name] === typeof example || (value[name] === undefined && later.includes(name)),
    ) &&
    typeof height === 'number' &&
    height >= heightMm.least &&
    height <= heightMm.most
  )
}
const isDesign = (value: unknown): boolean => isRecord(value) && isChoices(value.choices) && isRecord(value.tints)
const isJob = (value: unknown): boolean =>
  isRecord(value) &&
  isChoices(value.choices) &&
  typeof value.id === 'string' &&
  typeof value.planKey === 'string' &&
  Array.isArray(value.glued)
const isBuild = (value: unknown): value is Build => {
  if (!isRecord(value) || !isRecord(value.history)) return false
  const { past, now, future } = value.history
  const { planned } = value
  return (
    typeof value.id === 'string' &&
    typeof value.name === 'string' &&
    Array.isArray(past) &&
    Array.isArray(future) &&
    [...past, now, ...future].every(isDesign) &&
    Array.isArray(value.jobs) &&
    value.jobs.every(isJob) &&
    (planned === null || (isRecord(planned) && isChoices(planned.choices) && typeof planned.planKey === 'string'))
  )
}

/**
 * Reads a plan.json, or what `buildFileText` wrote. Whether a plan keeps its promises is not looked at here.
 *
 * @throws InputError naming the file and what to do
 */
export const readFileText = (name: string, text: string): Opened => {
  let value: unknown
  try {
    value = JSON.parse(text)
  } catch (error) {
    throw new InputError(`${name} is no complete JSON file (${(error as Error).message}). ${remedy}`, name)
  }
  const format = isRecord(value) ? value.format : undefined
  const version = isRecord(value) ? value.version : undefined
  if (format !== 'facetwright-plan' && format !== 'facetwright-build')
    throw new InputError(`${name} is neither a plan nor a build. ${remedy}`, name)
  if (version !== 1)
    throw new InputError(`${name} has version ${String(version)}, this program reads version 1. ${remedy}`, name)
  if (isPlan(value)) return { kind: 'plan', plan: value, choices: choicesOfPlan(value) }
  const { build, plans } = value as Record<string, unknown>
  if (isBuild(build) && isRecord(plans) && Object.values(plans).every(isPlan))
    return { kind: 'build', build, plans: plans as Record<string, Plan> }
  throw new InputError(
    `${name} is a ${format === 'facetwright-plan' ? 'plan' : 'build'} with parts missing. ${remedy}`,
    name,
  )
}

/**
 * Ids of the solids without which a file is of no use: what the builder has chosen now, and what the plans are of. A plan of
 * a model that the build no longer holds is left out: it can still be glued.
 */
export const solidsNeeded = (opened: Opened): string[] => {
  if (opened.kind === 'plan') return [opened.plan.model.id]
  const planned = Object.values(opened.plans).map(({ model }) => model.id)
  return [...new Set([choicesOf(opened.build).solid, ...planned.filter((id) => !id.startsWith('own-'))])]
}

/** A file name from a build's name: letters, digits and hyphens. */
export const fileNameOf = (name: string): string =>
  name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '') || 'build'

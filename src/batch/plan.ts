/** The command `plan`: writes plan.json and sheets.pdf for one solid. */
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { drawPlan } from '../drawing'
import type { Progress } from '../errors'
import { writePdf } from '../output'
import { makePlan, type PlanChoices, type PlanDocket, usualChoices } from '../plan'
import { planText } from '../plan/file'
import type { Command } from './arguments'
import { writableFolder } from './folder'
import { knownSolid } from './known-solid'

/** Stage and per cent on one line of a terminal; nothing where standard error goes to a file. */
const terminalProgress = (): Progress => {
  let shown = ''
  return (stage, fraction) => {
    const line = `${stage} ${Math.round(fraction * 100)} %`
    if (!process.stderr.isTTY || line === shown) return
    shown = line
    process.stderr.write(`\r\x1b[K${line}`)
  }
}

const clearProgress = (): void => {
  if (process.stderr.isTTY) process.stderr.write('\r\x1b[K')
}

const summary = (name: string, docket: PlanDocket): string[] => [
  `${name}: ${docket.pieces} pieces of ${docket.templates} templates on ${docket.sheets} sheets`,
  `${docket.seams} seams to glue, ${docket.buttSeams.length} of them without a tab`,
  `about ${docket.hours.total.toFixed(1)} hours; card used ${Math.round(docket.utilisation * 100)} %`,
  `narrowest panel ${docket.tightest.widthMm.toFixed(1)} mm, sharpest inner angle ${docket.sharpestInnerAngle.toFixed(1)}°`,
]

/** @throws Error when the plan fails a check of its own; it is written all the same */
export const plan = async (command: Extract<Command, { name: 'plan' }>): Promise<string> => {
  const { id, out, heightMm, paper, fill, hand, side, colours } = command
  knownSolid(id)
  const folder = writableFolder(out)
  const choices: PlanChoices = { ...usualChoices, solid: id, heightMm, paper, fill, hand, side, colours }
  const made = makePlan(choices, terminalProgress())
  clearProgress()
  const files = { json: join(folder, 'plan.json'), pdf: join(folder, 'sheets.pdf') }
  writeFileSync(files.json, planText(made))
  writeFileSync(files.pdf, await writePdf(drawPlan(made, choices)))
  const failed = made.docket.checks.filter((check) => !check.ok)
  if (failed.length > 0) {
    const list = failed.map(({ name, detail }) => `${name}: ${detail}`).join('\n')
    throw new Error(`The plan does not keep its promises; do not build from it.\n${list}\n${files.json}`)
  }
  return [...summary(made.model.name, made.docket), files.json, files.pdf].join('\n')
}

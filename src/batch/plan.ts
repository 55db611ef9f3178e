/** The command `plan`: writes plan.json and sheets.pdf for one solid. */
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { drawPlan, holdWords, partWords, shortStretches, usualCloseMm } from '../drawing'
import { InputError, type Progress } from '../errors'
import { placed, unitHeightMm } from '../models'
import { writePdf } from '../output'
import {
  checkChoices,
  greatestHeightMm,
  leastHeightMm,
  type Plan,
  type PlanChoices,
  planSolid,
  usualChoices,
} from '../plan'
import { planText } from '../plan/file'
import { buildSolid, type Solid } from '../solids'
import type { Command } from './arguments'
import { writableFolder } from './folder'
import { knownSolid } from './known-solid'
import { readModelFile } from './model-file'

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

const summary = ({ model: { name }, docket }: Plan): string[] => [
  `${name}: ${docket.pieces} pieces of ${docket.templates} templates on ${docket.sheets} sheets`,
  `${docket.seams} seams to glue, ${docket.buttSeams.length} of them without a tab`,
  `about ${docket.hours.total.toFixed(1)} hours; card used ${Math.round(docket.utilisation * 100)} %`,
  `narrowest panel ${docket.tightest.widthMm.toFixed(1)} mm, sharpest inner angle ${docket.sharpestInnerAngle.toFixed(1)}°`,
]

/** Bodies and parts, where there is anything to say of them. */
const holding = (made: Plan): string[] => {
  const { bodies, contacts = [] } = made.docket
  if (bodies === 1 && contacts.length === 0) return []
  return [`${bodies} ${bodies === 1 ? 'body' : 'bodies'}; ${holdWords(made.docket)}`, ...partWords(made)]
}

const slivers = (made: Plan): string[] => {
  const { closed } = made.docket
  if (closed)
    return [
      `${closed.stretches} stretches below ${closed.belowMm} mm closed up; no corner moved more than ${closed.movedMm.toFixed(2)} mm`,
    ]
  const short = shortStretches(made)
  if (short === 0) return []
  return [`${short} stretches are shorter than ${usualCloseMm} mm; --close-below ${usualCloseMm} closes them up`]
}

interface Subject {
  readonly solid: Solid
  readonly heightMm: number
  /** What was repaired in a file. */
  readonly notes: readonly string[]
  /** Says where in the file an error of a later stage belongs. */
  readonly explain: (error: unknown) => unknown
}

const subjectOf = (command: PlanCommand, progress: Progress): Subject => {
  if ('id' in command)
    return {
      solid: buildSolid(command.id, command.hand),
      heightMm: command.heightMm,
      notes: [],
      explain: (error) => error,
    }
  const model = readModelFile(command.file, progress)
  const heightMm = 'unit' in command ? unitHeightMm(model.farthest, command.unit) : command.heightMm
  if ('unit' in command && (heightMm < leastHeightMm || heightMm > greatestHeightMm))
    throw new InputError(
      `In ${command.unit} the model is ${Number(heightMm.toPrecision(4))} mm high, ${leastHeightMm} to ${greatestHeightMm} mm ` +
        'can be planned; say another unit, or --height 250.',
      '--unit',
    )
  return { solid: model.solid, heightMm, notes: model.notes, explain: (error) => placed(error, model, command.file) }
}

type PlanCommand = Extract<Command, { name: 'plan' }>

/** @throws Error when the plan fails a check of its own; it is written all the same */
export const plan = async (command: PlanCommand): Promise<string> => {
  const { out, paper, fill, hand, side, colours, closeBelowMm, nets } = command
  const progress = terminalProgress()
  if ('id' in command) knownSolid(command.id)
  const folder = writableFolder(out)
  const { solid, heightMm, notes, explain } = subjectOf(command, progress)
  const own = { solid: solid.id, heightMm, paper, fill, hand, side, colours, closeBelowMm, nets }
  const choices: PlanChoices = { ...usualChoices, ...own }
  checkChoices(choices)
  const made = (() => {
    try {
      return planSolid(solid, choices, progress)
    } catch (error) {
      throw explain(error)
    } finally {
      clearProgress()
    }
  })()
  const files = { json: join(folder, 'plan.json'), pdf: join(folder, 'sheets.pdf') }
  writeFileSync(files.json, planText(made))
  writeFileSync(files.pdf, await writePdf(drawPlan(made, choices)))
  const failed = made.docket.checks.filter((check) => !check.ok)
  if (failed.length > 0) {
    const list = failed.map(({ name, detail }) => `${name}: ${detail}`).join('\n')
    throw new Error(`The plan does not keep its promises; do not build from it.\n${list}\n${files.json}`)
  }
  return [...summary(made), ...holding(made), ...slivers(made), ...notes, files.json, files.pdf].join('\n')
}

/** Reads the command line. What is wrong with it becomes an `InputError` of one line that says what would be right. */
import { parseArgs } from 'node:util'
import { InputError } from '../errors'
import { isModelUnit, type ModelUnit, modelUnits } from '../models'
import { greatestCloseMm, greatestHeightMm, leastHeightMm, netsWays, usualChoices } from '../plan/choices'
import type { FillRule } from '../solids/types'

/** What a plan is made of, and how large: a file's own unit may stand for the height. */
export type PlanSubject =
  | { readonly id: string; readonly heightMm: number }
  | { readonly file: string; readonly heightMm: number }
  | { readonly file: string; readonly unit: ModelUnit }

export type Command =
  | { readonly name: 'help' }
  | { readonly name: 'list'; readonly json: boolean }
  | ({ readonly name: 'skin'; readonly fill: FillRule; readonly json: boolean } & (
      | { readonly id: string | 'all' }
      | { readonly file: string }
    ))
  | ({
      readonly name: 'plan'
      readonly paper: 'a4' | 'letter'
      readonly fill: FillRule
      readonly hand: 'left' | 'right'
      readonly side: 'outside' | 'inside'
      readonly colours: 'one' | 'kind'
      readonly closeBelowMm: number
      readonly nets: (typeof netsWays)[number]
      readonly out: string
    } & PlanSubject)

export const usage = `Use:
  npm run --silent batch -- list [--json]
      the solids and their facts
  npm run --silent batch -- skin ID | --all | --file MODEL [--fill nonzero|evenodd] [--json]
      what can be touched from outside: panels, area, volume, bodies (unit edge; of a file: its own unit)
  npm run --silent batch -- plan ID | --file MODEL --height MM --out DIR [--paper a4|letter] [--fill nonzero|evenodd]
                            [--hand left|right] [--side outside|inside] [--colours one|kind]
                            [--nets fewest|repeat|modules|single] [--close-below MM]
      MODEL is an OBJ, STL or PLY file; with --unit mm|cm|m|in instead of --height it keeps its size
      --close-below 0.3 closes up stretches shorter than that, which no one can cut
      writes plan.json and sheets.pdf into DIR; MM is the diameter of the sphere through the vertices, ${leastHeightMm} to ${greatestHeightMm}

Without --json a table for reading. Exit code 0: done; 2: the command line cannot be followed; 1: anything else.`

const flag = { type: 'boolean' } as const
const value = { type: 'string' } as const

const optionsOf = {
  list: { json: flag, help: flag },
  skin: { all: flag, fill: value, file: value, json: flag, help: flag },
  plan: {
    height: value,
    out: value,
    paper: value,
    fill: value,
    hand: value,
    side: value,
    colours: value,
    'close-below': value,
    nets: value,
    file: value,
    unit: value,
    help: flag,
  },
} as const
type Name = keyof typeof optionsOf
const isCommand = (text: string): text is Name => Object.hasOwn(optionsOf, text)

const examples: Readonly<Record<string, string>> = {
  height: '--height 250',
  out: '--out my-plan',
  file: '--file model.obj',
  unit: '--unit mm or --unit in',
  paper: '--paper a4 or --paper letter',
  fill: '--fill nonzero or --fill evenodd',
  hand: '--hand left or --hand right',
  side: '--side outside or --side inside',
  colours: '--colours one or --colours kind',
  'close-below': '--close-below 0.3',
  nets: '--nets fewest or --nets repeat',
}

type Given = Readonly<Record<string, string | boolean | undefined>>

/** `parseArgs` says what is wrong; we say what would be right. */
const explain = (name: Name, error: unknown): never => {
  const { code, message } = error as { code?: string; message: string }
  const option = /'(?:-\w, )?(--?[^'\s<]+)/.exec(message)?.[1] ?? 'an option'
  const long = option.replace(/^--/, '')
  if (code === 'ERR_PARSE_ARGS_UNKNOWN_OPTION') {
    const known = Object.keys(optionsOf[name]).filter((key) => key !== 'help')
    throw new InputError(
      `There is no option ${option}; ${name} takes ${known.map((k) => `--${k}`).join(', ')}.`,
      option,
    )
  }
  if (code === 'ERR_PARSE_ARGS_INVALID_OPTION_VALUE') {
    const example = examples[long]
    throw new InputError(example ? `${option} needs a value: ${example}.` : `${option} takes no value.`, option)
  }
  throw error
}

const read = (name: Name, args: string[]): { given: Given; ids: string[] } => {
  try {
    const { values, positionals } = parseArgs({ args, options: optionsOf[name], allowPositionals: true, strict: true })
    return { given: values as Given, ids: positionals }
  } catch (error) {
    return explain(name, error)
  }
}

const choose = <T extends string>(given: Given, option: string, values: readonly T[], usual: T): T => {
  const told = given[option]
  if (told === undefined) return usual
  const found = values.find((v) => v === told)
  if (found === undefined)
    throw new InputError(`--${option} is ${values.join(' or ')}, not ${String(told)}.`, `--${option}`)
  return found
}

const fills = ['nonzero', 'evenodd'] as const

const readHeight = (told: string | boolean | undefined): number => {
  const right = `say a number of millimetres from ${leastHeightMm} to ${greatestHeightMm}, for example --height 250`
  if (typeof told !== 'string') throw new InputError(`The height is missing; ${right}.`, '--height')
  // Number() would also take '', ' 1 ', '0x10' and 'Infinity'.
  const height = /^[+-]?(\d+\.?\d*|\.\d+)$/.test(told) ? Number(told) : Number.NaN
  if (Number.isNaN(height)) throw new InputError(`The height ${told} is not a number; ${right}.`, '--height')
  if (height < leastHeightMm || height > greatestHeightMm)
    throw new InputError(`The height ${told} is out of range; ${right}.`, '--height')
  return height
}

const readCloseBelow = (told: string | boolean | undefined): number => {
  if (told === undefined) return 0
  const below = typeof told === 'string' && /^(\d+\.?\d*|\.\d+)$/.test(told) ? Number(told) : Number.NaN
  if (!(below <= greatestCloseMm))
    throw new InputError(
      `--close-below is a number of millimetres from 0 to ${greatestCloseMm}, for example 0.3, not ${String(told)}.`,
      '--close-below',
    )
  return below
}

const oneId = (name: Name, ids: readonly string[], orElse: string): string => {
  const [id, second] = ids
  if (id === undefined)
    throw new InputError(`Say which solid: ${name} ID${orElse}; the command list shows the ids.`, 'ID')
  if (second !== undefined) throw new InputError(`One solid at a time; ${second} is too much after ${id}.`, second)
  return id
}

/** The model's file, or null when a solid of the catalogue is asked for. */
const readFileName = (given: Given, ids: readonly string[]): string | null => {
  const { file } = given
  if (file === undefined) return null
  if (typeof file !== 'string' || file === '') throw new InputError('Say which file: --file model.obj.', '--file')
  if (ids[0] !== undefined) throw new InputError(`Say either ${ids[0]} or --file, not both.`, '--file')
  return file
}

const readSubject = (given: Given, ids: readonly string[]): PlanSubject => {
  const file = readFileName(given, ids)
  const { unit } = given
  if (file === null) {
    if (unit !== undefined)
      throw new InputError('--unit goes with --file; say the height of a solid: --height 250.', '--unit')
    return { id: oneId('plan', ids, ' --height 250 --out DIR'), heightMm: readHeight(given.height) }
  }
  if (unit === undefined) return { file, heightMm: readHeight(given.height) }
  if (given.height !== undefined)
    throw new InputError('Say either --height or --unit, not both: the unit already gives the size.', '--unit')
  if (typeof unit !== 'string' || !isModelUnit(unit))
    throw new InputError(`--unit is ${Object.keys(modelUnits).join(', ')}, not ${String(unit)}.`, '--unit')
  return { file, unit }
}

/** @param args the words after the program's name */
export const readCommand = (args: readonly string[]): Command => {
  const [name, ...rest] = args
  if (name === '--help' || name === '-h' || name === 'help') return { name: 'help' }
  if (name === undefined || !isCommand(name)) {
    const wrong = name === undefined ? 'The command is missing' : `There is no command ${name}`
    throw new InputError(`${wrong}; say list, skin or plan (--help tells more).`, 'command')
  }
  const { given, ids } = read(name, rest)
  if (given.help) return { name: 'help' }
  const json = given.json === true
  switch (name) {
    case 'list':
      if (ids[0] !== undefined) throw new InputError(`list takes no solid; leave ${ids[0]} out.`, ids[0])
      return { name, json }
    case 'skin': {
      if (given.all && ids[0] !== undefined) throw new InputError(`Say either ${ids[0]} or --all, not both.`, '--all')
      const file = readFileName(given, ids)
      const fill = choose(given, 'fill', fills, usualChoices.fill)
      if (file !== null) {
        if (given.all) throw new InputError('Say either --file or --all, not both.', '--all')
        return { name, file, fill, json }
      }
      const id = given.all ? 'all' : oneId(name, ids, ' or skin --all')
      return { name, id, fill, json }
    }
    case 'plan': {
      const subject = readSubject(given, ids)
      const { out } = given
      if (typeof out !== 'string' || out === '')
        throw new InputError('Say where to write plan.json and sheets.pdf, for example --out my-plan.', '--out')
      return {
        name,
        ...subject,
        paper: choose(given, 'paper', ['a4', 'letter'], usualChoices.paper),
        fill: choose(given, 'fill', fills, usualChoices.fill),
        hand: choose(given, 'hand', ['left', 'right'], usualChoices.hand),
        side: choose(given, 'side', ['outside', 'inside'], usualChoices.side),
        colours: choose(given, 'colours', ['one', 'kind'], usualChoices.colours),
        closeBelowMm: readCloseBelow(given['close-below']),
        nets: choose(given, 'nets', netsWays, 'fewest'),
        out,
      }
    }
  }
}

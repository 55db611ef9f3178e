/** Reads the command line. What is wrong with it becomes an `InputError` of one line that says what would be right. */
import { parseArgs } from 'node:util'
import { InputError } from '../errors'
import { greatestHeightMm, leastHeightMm, usualChoices } from '../plan/choices'
import type { FillRule } from '../solids/types'

export type Command =
  | { readonly name: 'help' }
  | { readonly name: 'list'; readonly json: boolean }
  | { readonly name: 'skin'; readonly id: string | 'all'; readonly fill: FillRule; readonly json: boolean }
  | {
      readonly name: 'plan'
      readonly id: string
      readonly heightMm: number
      readonly paper: 'a4' | 'letter'
      readonly fill: FillRule
      readonly hand: 'left' | 'right'
      readonly side: 'outside' | 'inside'
      readonly colours: 'one' | 'kind'
      readonly out: string
    }

export const usage = `Use:
  npm run --silent batch -- list [--json]
      the solids and their facts
  npm run --silent batch -- skin ID | --all [--fill nonzero|evenodd] [--json]
      what can be touched from outside: panels, area, volume, bodies (unit edge)
  npm run --silent batch -- plan ID --height MM --out DIR [--paper a4|letter] [--fill nonzero|evenodd]
                            [--hand left|right] [--side outside|inside] [--colours one|kind]
      writes plan.json and sheets.pdf into DIR; MM is the diameter of the sphere through the vertices, ${leastHeightMm} to ${greatestHeightMm}

Without --json a table for reading. Exit code 0: done; 2: the command line cannot be followed; 1: anything else.`

const flag = { type: 'boolean' } as const
const value = { type: 'string' } as const

const optionsOf = {
  list: { json: flag, help: flag },
  skin: { all: flag, fill: value, json: flag, help: flag },
  plan: {
    height: value,
    out: value,
    paper: value,
    fill: value,
    hand: value,
    side: value,
    colours: value,
    help: flag,
  },
} as const
type Name = keyof typeof optionsOf
const isCommand = (text: string): text is Name => Object.hasOwn(optionsOf, text)

const examples: Readonly<Record<string, string>> = {
  height: '--height 250',
  out: '--out my-plan',
  paper: '--paper a4 or --paper letter',
  fill: '--fill nonzero or --fill evenodd',
  hand: '--hand left or --hand right',
  side: '--side outside or --side inside',
  colours: '--colours one or --colours kind',
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

const oneId = (name: Name, ids: readonly string[], orElse: string): string => {
  const [id, second] = ids
  if (id === undefined)
    throw new InputError(`Say which solid: ${name} ID${orElse}; the command list shows the ids.`, 'ID')
  if (second !== undefined) throw new InputError(`One solid at a time; ${second} is too much after ${id}.`, second)
  return id
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
      const id = given.all ? 'all' : oneId(name, ids, ' or skin --all')
      return { name, id, fill: choose(given, 'fill', fills, usualChoices.fill), json }
    }
    case 'plan': {
      const id = oneId(name, ids, ' --height 250 --out DIR')
      const heightMm = readHeight(given.height)
      const { out } = given
      if (typeof out !== 'string' || out === '')
        throw new InputError('Say where to write plan.json and sheets.pdf, for example --out my-plan.', '--out')
      return {
        name,
        id,
        heightMm,
        paper: choose(given, 'paper', ['a4', 'letter'], usualChoices.paper),
        fill: choose(given, 'fill', fills, usualChoices.fill),
        hand: choose(given, 'hand', ['left', 'right'], usualChoices.hand),
        side: choose(given, 'side', ['outside', 'inside'], usualChoices.side),
        colours: choose(given, 'colours', ['one', 'kind'], usualChoices.colours),
        out,
      }
    }
  }
}

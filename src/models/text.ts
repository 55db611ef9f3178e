/** Lines and numbers of a text file. */
import type { Progress } from '../errors'
import { fault, greatestCoordinate, quote } from './file'

/** A longer line is no line of a model; splitting it would cost memory. */
const longestLine = 200_000

/** Goes through a text line by line; line ends are LF, CR LF or CR. */
export class Lines {
  /** Number of the line that `next` gave last, from 1. */
  number = 0
  private at = 0

  constructor(
    private readonly text: string,
    readonly file: string,
    private readonly progress: Progress,
  ) {}

  /** The next line without its end, or null after the last. @throws InputError for an overlong one */
  next(): string | null {
    const { text } = this
    if (this.at >= text.length) return null
    const start = this.at
    let end = start
    for (; end < text.length; end++) {
      const c = text.charCodeAt(end)
      if (c === 10 || c === 13) break
    }
    this.at = text.charCodeAt(end) === 13 && text.charCodeAt(end + 1) === 10 ? end + 2 : end + 1
    this.number++
    if ((this.number & 1023) === 0) this.progress('model', (0.5 * end) / text.length)
    if (end - start > longestLine) throw this.fault(`a line of ${end - start} characters is no line of a model.`)
    return text.slice(start, end)
  }

  get place(): string {
    return `line ${this.number}`
  }

  fault(what: string): Error {
    return fault(this.file, this.place, what)
  }
}

export const wordsOf = (line: string): string[] => {
  const trimmed = line.trim()
  return trimmed === '' ? [] : trimmed.split(/\s+/)
}

const decimal = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/

/** Why a word is no usable coordinate, or null if it is one. */
const numberFault = (word: string): string | null => {
  if (/^[+-]?\d+,\d+$/.test(word)) return `"${quote(word)}" has a decimal comma; write a point.`
  if (!decimal.test(word)) {
    if (/^[+-]?(nan|inf(inity)?|1\.#\w+)/i.test(word)) return `"${quote(word)}" is not a finite number; correct it.`
    return `"${quote(word)}" is not a number; correct it.`
  }
  if (!(Math.abs(Number(word)) <= greatestCoordinate))
    return `"${quote(word)}" is too large a number; use at most ${greatestCoordinate}.`
  return null
}

/** A number of the text. @throws InputError that names line and word */
export const readNumber = (lines: Lines, word: string | undefined, what: string): number => {
  if (word === undefined) throw lines.fault(`${what} is missing a number; correct the line.`)
  const wrong = numberFault(word)
  if (wrong !== null) throw lines.fault(`${what}: ${wrong}`)
  return Number(word)
}

/**
 * Significant digits that a number was written with: `0.500` has 3, `1200` has 2 (closing zeros of a whole number may be
 * only its size), `0` none.
 */
export const significantDigits = (word: string): number => {
  const mantissa = word.replace(/[eE].*$/, '').replace(/^[+-]/, '')
  const digits = mantissa.replace('.', '').replace(/^0+/, '')
  return mantissa.includes('.') ? digits.length : digits.replace(/0+$/, '').length
}

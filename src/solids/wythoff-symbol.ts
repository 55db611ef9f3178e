/** Reading and comparing Wythoff symbols: `p | q r`, `p q | r`, `p q r |`, `p q (r s) |`, `| p q r`, `| p q r s`. */
import { BrokenPromise } from '../errors'

/** A rational n/d, kept as written (3/2 and 6/4 differ). */
export interface Rational {
  readonly n: number
  readonly d: number
}

/** n/d as a number. */
export const ratio = ({ n, d }: Rational): number => n / d

export interface WythoffSymbol {
  /** Numbers before and after the bar; a bracketed pair gives `before` its first number and `alternative` its second. */
  readonly before: readonly Rational[]
  readonly after: readonly Rational[]
  readonly alternative: Rational | null
}

const readNumber = (text: string): Rational => {
  const match = /^(\d+)(?:\/(\d+))?$/.exec(text)
  if (!match) throw new BrokenPromise('Not a number of a Wythoff symbol.', { text })
  return { n: Number(match[1]), d: Number(match[2] ?? 1) }
}

/** @throws BrokenPromise when the text is no Wythoff symbol */
export const readWythoff = (text: string): WythoffSymbol => {
  const halves = text.split('|')
  if (halves.length !== 2) throw new BrokenPromise('A Wythoff symbol has one bar.', { text })
  const pair = /\(([^()]*)\)/.exec(halves[0]!)
  const inPair = pair ? pair[1]!.trim().split(/\s+/).map(readNumber) : []
  const numbers = (half: string): Rational[] => half.trim().split(/\s+/).filter(Boolean).map(readNumber)
  const before = numbers(halves[0]!.replace(/\([^()]*\)/, ''))
  return {
    before: inPair[0] ? [...before, inPair[0]] : before,
    after: numbers(halves[1]!),
    alternative: inPair[1] ?? null,
  }
}

/**
 * One spelling for symbols that mean the same: spaces, and the order of numbers on one side of the bar or in brackets, do
 * not count. Null if the text is no symbol.
 */
export const canonicalWythoff = (text: string): string | null => {
  if (!/^[\d\s/|()]+$/.test(text) || text.split('|').length !== 2) return null
  const [before, after] = text.split('|') as [string, string]
  const sorted = (part: string): string => part.trim().split(/\s+/).filter(Boolean).sort().join(' ')
  const pair = /\(([^()]*)\)/.exec(before)
  const rest = sorted(before.replace(/\([^()]*\)/, ' '))
  return `${rest}${pair ? ` (${sorted(pair[1]!)})` : ''} | ${sorted(after)}`.trim()
}

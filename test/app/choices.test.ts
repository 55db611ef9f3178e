import { describe, expect, test } from 'vitest'
import {
  firstChoices,
  limits,
  type NumberChoice,
  papers as ours,
  readNumber,
  sameChoices,
  sayChoices,
} from '../../src/app/state/choices'
import { checkChoices, usualChoices } from '../../src/plan/choices'
import { papers } from '../../src/sheets/paper'

const read = (name: NumberChoice, text: string): number | string => {
  const result = readNumber(name, text)
  return 'value' in result ? result.value : result.error
}

describe('choices', () => {
  test('begin as the plan room has them', () => {
    expect(firstChoices('cube')).toEqual({ ...usualChoices, solid: 'cube' })
  })

  test.each(Object.keys(limits) as NumberChoice[])('the limits of %s are those of the plan room', (name) => {
    const { least, most } = limits[name]
    const check = (value: number) => () => checkChoices({ ...firstChoices('cube'), [name]: value })
    expect(check(least)).not.toThrow()
    expect(check(most)).not.toThrow()
    expect(check(most + 0.01)).toThrow(/out of range/)
    if (least > 0) expect(check(least - 0.01)).toThrow(/out of range/)
    else expect(check(-0.01)).toThrow(/out of range/)
  })

  test('paper sizes are those that the sheets are made for', () => {
    for (const id of ['a4', 'letter'] as const) expect(papers[id]).toMatchObject(ours[id])
  })

  test('a height is read as people type it', () => {
    expect(read('heightMm', '250')).toBe(250)
    expect(read('heightMm', ' 123,5 ')).toBe(123.5)
    expect(read('heightMm', '10')).toBe(10)
    expect(read('heightMm', '2000')).toBe(2000)
  })

  test.each(['', 'tall', '9.99', '2000.1', '-5', '1e3', '12 34', 'NaN', 'Infinity'])(
    '%j is refused, and the range named',
    (text) => {
      expect(read('heightMm', text)).toMatch(/10 to 2000 mm/)
    },
  )

  test('every choice counts when two are compared', () => {
    const base = firstChoices('cube')
    const other = {
      solid: 'tetrahedron',
      hand: 'left',
      fill: 'evenodd',
      heightMm: 251,
      paper: 'letter',
      side: 'inside',
      colours: 'kind',
      marginMm: 11,
      gapMm: 3,
      grammage: 180,
      nets: 'repeat',
      closeBelowMm: 0.3,
    } as const
    expect(sameChoices(base, { ...base })).toBe(true)
    // A build of before knows less and means the usual.
    const { nets, closeBelowMm, ...older } = base
    expect([nets, closeBelowMm, sameChoices(base, older)]).toEqual(['fewest', 0, true])
    for (const name of Object.keys(other) as (keyof typeof other)[])
      expect(sameChoices(base, { ...base, [name]: other[name] }), name).toBe(false)
  })

  test('choices in one line name the hand only where there is one', () => {
    expect(sayChoices(firstChoices('cube'), false)).toBe('250 mm, A4, 160 g/m², one card, printed outside')
    expect(sayChoices(firstChoices('snub-cube'), true)).toContain('right hand')
  })
})

import { describe, expect, test } from 'vitest'
import { colourOf, defaultColours, patternOf } from '../../src/app/palette'
import { readPlace, writePlace } from '../../src/app/route'
import { firstChoices } from '../../src/app/state/choices'
import { isConvex, passes } from '../../src/app/stations/shelf-filter'
import { sayAcross, sayStep } from '../../src/app/words/bench'
import { sayColours, sayHeight, sayPaper } from '../../src/app/words/consequences'
import { heightForWidth, narrowest, sayNarrowest } from '../../src/app/words/craft'
import { docketFacts } from '../../src/app/words/docket'
import { areaText, figure, hoursText, lengthText, mmText } from '../../src/app/words/figures'
import { toolForWidth } from '../../src/docket'
import { findSolids, listFamily } from '../../src/solids'
import { cubePlan } from '../plan/by-hand'

describe('figures', () => {
  test.each([
    [figure(2.5, 1), '2.5'],
    [figure(2.04, 1), '2'],
    [figure(100, 0), '100'],
    [mmText(19.44), '19.4 mm'],
    [mmText(212.7), '213 mm'],
    [lengthText(950), '950 mm'],
    [lengthText(12_345), '12.3 m'],
    [hoursText(0.5), '30 min'],
    [hoursText(0.999), '1 h'],
    [hoursText(9.33), '9 h 20 min'],
    [hoursText(1.999), '2 h'],
    [areaText(62_370), '624 cm²'],
    [areaText(1_247_400), '1.25 m²'],
  ])('%s', (said, right) => {
    expect(said).toBe(right)
  })
})

describe('the docket', () => {
  const plan = cubePlan()
  const facts = docketFacts(plan, firstChoices('cube'))
  const fact = (id: string) => facts.find((entry) => entry.id === id)!

  test('has the same facts in the same order for every plan', () => {
    const other = cubePlan()
    other.docket.buttSeams = [1, 2]
    other.docket.lineContacts = 9
    expect(docketFacts(other, firstChoices('cube')).map(({ id }) => id)).toEqual(facts.map(({ id }) => id))
  })

  test('weighs the model by area and grammage', () => {
    // Net area in m² times 160 g/m².
    const grams = Math.round((plan.docket.netAreaMm2 / 1e6) * 160)
    expect(fact('card').meaning).toContain(`about ${grams} g`)
  })

  test('tells stretches that no one can cut, and what closing them up has changed', () => {
    expect(fact('closed')).toMatchObject({
      value: 'nothing',
      meaning: 'no stretch is too short to cut',
      caution: false,
    })
    const short = cubePlan()
    const [from] = short.creases[0]!.ends
    short.creases[0]!.ends = [from, [from[0] + 0.2, from[1], from[2]]]
    const told = (of: typeof plan) => docketFacts(of, firstChoices('cube')).find(({ id }) => id === 'closed')!
    expect(told(short).caution).toBe(true)
    expect(told(short).meaning).toContain('1 stretch shorter than 0.3 mm')
    short.docket.closed = { belowMm: 0.3, stretches: 12, panels: 4, movedMm: 0.147, offPlaneMm: 0.02 }
    expect(told(short)).toMatchObject({
      value: '12 stretches',
      meaning: 'shorter than 0.3 mm; no corner moved more than 0.15 mm, panels are flat within 0.02 mm',
    })
  })

  test('points at what to look at, in a word', () => {
    expect(fact('narrowest')).toMatchObject({ value: '40 mm', caution: false, panel: 0 })
    const bad = cubePlan()
    bad.docket.tightest.widthMm = 2.1
    bad.docket.buttSeams = [3]
    bad.docket.checks = [{ name: 'x', ok: false, detail: '' }]
    const told = docketFacts(bad, firstChoices('cube')).filter(({ caution }) => caution)
    expect(told.map(({ id }) => id)).toEqual(['narrowest', 'butt', 'checks'])
    // A cube of 40 mm edge, 2.1 mm at its height of 69.3 mm.
    expect(told[0]!.meaning).toBe('tweezers; fingers from 99 mm height')
  })
})

describe('craft', () => {
  test('says of a width what the docket room says', () => {
    for (const width of [0.5, 1, 1.5, 2, 2.5, 3, 10]) {
      const [word] = toolForWidth(width)
        .replace(/^(a|too) /, '')
        .split(' ')
      expect(sayNarrowest(width), String(width)).toContain(word)
    }
  })

  test('the least height is the one at which the panel is just wide enough', () => {
    const ratio = 2.1 / 250
    const least = heightForWidth(narrowest.fingers, ratio)
    expect(least * ratio).toBeGreaterThanOrEqual(3)
    expect((least - 1) * ratio).toBeLessThan(3)
  })
})

describe('consequences', () => {
  const cube = listFamily('uniform').find(({ id }) => id === 'cube')!
  test('of a height: the edge of a cube is its height over the root of three', () => {
    expect(sayHeight(cube, firstChoices('cube'), undefined)).toBe(`Edge ${mmText(250 / Math.sqrt(3))}.`)
    const known = { key: '', panels: 6, narrowest: 0.004, hours: 1, heightMm: 250 }
    expect(sayHeight(cube, firstChoices('cube'), known)).toMatch(
      /1 mm: a cutting machine.*500 mm tweezers.*750 mm fingers/,
    )
  })
  test('of paper and margin', () => {
    expect(sayPaper(firstChoices('cube'))).toBe('210 × 297 mm; room for pieces 190 × 277 mm.')
  })
  test('of colours, where there is but one kind', () => {
    expect(sayColours('kind', cube)).toContain('All faces are squares')
  })
})

describe('the sentence of the Bench', () => {
  const plan = cubePlan()
  test('names piece, sheet, folds, seams and what they go to', () => {
    expect(sayStep(plan, plan.pieces[0]!, plan.steps[0]!.seams, 1)).toBe(
      'Take piece 1 from sheet 1, fold it along 4 lines, and glue 4 seams to itself.',
    )
    expect(sayStep(plan, plan.pieces[1]!, plan.steps[1]!.seams, 1)).toBe(
      'Take piece 2 from sheet 1, it has no folds, and glue 4 seams to piece 1.',
    )
    expect(sayStep(plan, plan.pieces[1]!, [], 0)).toContain('nothing to glue yet')
  })
  test('names what lies across a seam', () => {
    expect(sayAcross(plan, plan.pieces[1]!, plan.steps[1]!.seams[0]!)).toBe('to piece 1')
    expect(sayAcross(plan, plan.pieces[0]!, plan.steps[0]!.seams[0]!)).toBe('to itself')
  })
})

describe('the Shelf', () => {
  const all = listFamily('uniform')
  test('five regular and thirteen semiregular solids are convex (Coxeter, Longuet-Higgins, Miller: Uniform polyhedra, Philosophical Transactions of the Royal Society A, 1954)', () => {
    expect(all.filter(isConvex)).toHaveLength(18)
    expect(all.filter((solid) => passes(solid, new Set(['nonconvex'])))).toHaveLength(57)
  })
  test('words of one group widen, words of several narrow', () => {
    const with_ = (...ids: string[]) => all.filter((solid) => passes(solid, new Set(ids)))
    expect(with_().length).toBe(75)
    expect(with_('convex', 'nonconvex').length).toBe(75)
    expect(
      with_('convex', 'chiral')
        .map(({ id }) => id)
        .sort(),
    ).toEqual(['snub-cube', 'snub-dodecahedron'])
    expect(with_('tetrahedral').length + with_('octahedral').length + with_('icosahedral').length).toBe(75)
    for (const solid of with_('pentagram', 'square'))
      expect(solid.facesByKind.map(({ name }) => name)).toEqual(expect.arrayContaining(['pentagram', 'square']))
    expect(with_('pentagram', 'square').length).toBeGreaterThan(0)
  })
  test('every face kind has its colour before the facts are there, and no two of one solid look alike', () => {
    for (const family of ['uniform', 'prism', 'antiprism', 'dual', 'compound'] as const)
      for (const { id, facesByKind } of listFamily(family)) {
        const kinds = facesByKind.map(({ name }) => name)
        for (const name of kinds) expect(defaultColours[name], `${id}: ${name}`).toBe(colourOf(name, {}))
        expect(new Set(kinds.map(patternOf)).size, `${id}: ${kinds}`).toBe(kinds.length)
        expect(new Set(kinds.map((name) => colourOf(name, {}))).size, `${id}: ${kinds}`).toBe(kinds.length)
      }
  })
  test('search finds by name, number, vertex configuration and Wythoff symbol', () => {
    const first = (query: string) => findSolids(query)[0]?.id
    for (const solid of all) {
      expect(findSolids(solid.name).map(({ id }) => id)).toContain(solid.id)
      expect(first(String(solid.index)), String(solid.index)).toBe(solid.id)
      expect(findSolids(solid.vertexConfiguration).map(({ id }) => id)).toContain(solid.id)
      expect(findSolids(solid.wythoff).map(({ id }) => id)).toContain(solid.id)
    }
  })
})

describe('addresses', () => {
  test('lead to a place and back', () => {
    for (const hash of ['#shelf', '#board', '#sheets', '#sheets/12', '#bench/3'])
      expect(writePlace(readPlace(hash))).toBe(hash)
  })
  test('anything else leads to the Shelf', () => {
    for (const hash of ['', '#', '#sheets/', '#sheets/x', '#nowhere', '#SHEETS', '#sheets/1234567'])
      expect(readPlace(hash)).toEqual({ station: 'shelf', at: 0 })
  })
})

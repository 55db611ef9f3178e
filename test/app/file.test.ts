import { describe, expect, test } from 'vitest'
import { choose, newBuild } from '../../src/app/state/build'
import { firstChoices } from '../../src/app/state/choices'
import {
  buildFileText,
  checkSavedFileSize,
  choicesOfPlan,
  fileNameOf,
  greatestSavedBytes,
  readFileText,
  solidsNeeded,
} from '../../src/app/storage/file'
import { InputError } from '../../src/errors'
import { cubePlan } from '../plan/by-hand'

const plan = cubePlan()
const broken = (change: (file: Record<string, unknown>) => void): string => {
  const file = JSON.parse(JSON.stringify(plan)) as Record<string, unknown>
  change(file)
  return JSON.stringify(file)
}

describe('files', () => {
  test.each<[string, string, RegExp]>([
    ['a cut-off file', JSON.stringify(plan).slice(0, 500), /old\.json is no complete JSON/],
    ['another file', '{"a": 1}', /neither a plan nor a build/],
    ['a list', '[]', /neither/],
    ['nothing', 'null', /neither/],
    ['a later version', broken((file) => void (file.version = 2)), /has version 2, this program reads version 1/],
    ['a plan without pieces', broken((file) => void delete file.pieces), /parts missing/],
    [
      'a build without history',
      '{"format":"facetwright-build","version":1,"build":{"id":"x"},"plans":{}}',
      /parts missing/,
    ],
  ])('%s is refused with name and remedy', (_, text, message) => {
    const reading = (): unknown => readFileText('old.json', text)
    expect(reading).toThrow(InputError)
    expect(reading).toThrow(message)
    expect(reading).toThrow(/Open a plan\.json or a build file/)
  })

  test('the choices of a plan are read off it', () => {
    const inside = JSON.parse(JSON.stringify(plan)) as typeof plan
    for (const sheet of inside.sheets) {
      sheet.paper = 'letter'
      sheet.card = '220 g/m²'
      sheet.colour = 'square'
      sheet.marginMm = 6.35
      for (const placed of sheet.placed) placed.mirrored = true
    }
    inside.model.hand = 'left'
    expect(choicesOfPlan(inside)).toMatchObject({
      hand: 'left',
      paper: 'letter',
      side: 'inside',
      colours: 'kind',
      marginMm: 6.35,
      grammage: 220,
    })
    expect(choicesOfPlan(plan)).toMatchObject({ hand: 'right', paper: 'a4', side: 'outside', colours: 'one' })
  })

  test('a build whose plan is gone is still written', async () => {
    const build = {
      ...newBuild('b', firstChoices('cube'), 1),
      planned: { choices: firstChoices('cube'), planKey: 'x' },
    }
    const opened = readFileText('b.json', await buildFileText(build, async () => null))
    expect(opened).toMatchObject({ kind: 'build', plans: {} })
  })

  test('a file of gigabytes is refused by its size, with name and remedy', () => {
    expect(() => checkSavedFileSize(2 ** 31, 'huge.json')).toThrow(/^huge\.json has 2147 MB.*Open a plan\.json/)
    checkSavedFileSize(greatestSavedBytes, 'large.json')
  })

  test('a build needs the solid that is chosen now and those of its plans, but no model that only a plan is of', () => {
    const build = choose(newBuild('b', firstChoices('own-gone-1'), 1), { solid: 'octahedron' })
    const planOf = (id: string) => ({ ...plan, model: { ...plan.model, id } })
    const plans = { k: planOf('snub-cube'), l: planOf('own-gone-1') }
    expect(solidsNeeded({ kind: 'build', build, plans })).toEqual(['octahedron', 'snub-cube'])
    const chosen = choose(build, { solid: 'own-gone-1' })
    expect(solidsNeeded({ kind: 'build', build: chosen, plans: {} })).toEqual(['own-gone-1'])
    expect(solidsNeeded({ kind: 'plan', plan: planOf('own-gone-1'), choices: firstChoices('cube') })).toEqual([
      'own-gone-1',
    ])
  })

  test('names of files hold letters, digits and hyphens', () => {
    expect(fileNameOf('Für das Fenster, 2')).toBe('fur-das-fenster-2')
    expect(fileNameOf('…')).toBe('build')
  })
})

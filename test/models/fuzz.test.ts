/**
 * Damaged model files: each becomes a model or an InputError that names the file, in a bounded number of steps; a model
 * becomes a plan that keeps all its promises, or again an InputError.
 */
import { describe, expect, test } from 'vitest'
import { InputError } from '../../src/errors'
import { type Model, readModel } from '../../src/models'
import { planSolid, usualChoices } from '../../src/plan'
import { type ModelFile, mutant, seeds } from './mutate'

const seed = 20_260
const files = 50_000
const plans = 250
/** Files of a few kilobytes call for progress at a few places, plus once in a thousand lines and faces. */
const mostSteps = 300

const why = (thrown: unknown): string => (thrown instanceof Error ? `${thrown.name}: ${thrown.stack}` : String(thrown))

/** The model, or null when it was refused as it should be; otherwise the test fails with what to replay. */
const read = ({ name, bytes }: ModelFile, replay: string): Model | null => {
  let steps = 0
  try {
    const model = readModel(bytes, name, () => {
      if (++steps > mostSteps) throw new Error('too many steps')
    })
    const { solid, farthest, places } = model
    const whole =
      farthest > 0 &&
      Number.isFinite(farthest) &&
      solid.vertices.every((p) => p.every(Number.isFinite) && Math.hypot(...p) <= 1 + 1e-9) &&
      solid.faces.every((f) => f.cycle.length >= 3 && f.cycle.every((v) => solid.vertices[v])) &&
      places.length === solid.faces.length &&
      solid.precision! > 0
    if (!whole) throw new Error('a half-loaded model')
    return model
  } catch (thrown) {
    if (thrown instanceof InputError && thrown.message.startsWith(name) && thrown.message.length > name.length + 10) {
      if (thrown.message.includes('\n') || thrown.place === '') throw new Error(`${replay}: ${thrown.message}`)
      return null
    }
    throw new Error(`${replay}: ${why(thrown)}`)
  }
}

const shapeOf = ({ solid }: Model): string =>
  JSON.stringify([solid.vertices.map((p) => p.map((x) => x.toFixed(6))), solid.faces.map((f) => f.cycle)])

describe(`damaged files, seed ${seed}`, () => {
  /** One file of each new shape among those accepted. */
  const shapes = new Map<string, { number: number; model: Model }>()

  test('the seeds themselves are sound', () => {
    for (const file of seeds) expect(read(file, file.name)).not.toBeNull()
  })

  test(`${files} of them through the readers`, () => {
    let accepted = 0
    const kinds = new Set<string>()
    for (let i = 0; i < files; i++) {
      const file = mutant(seed, i)
      const model = read(file, `file ${i} of seed ${seed}`)
      if (!model) continue
      accepted++
      kinds.add(`${model.format} ${file.binary}`)
      const shape = shapeOf(model)
      if (!shapes.has(shape)) shapes.set(shape, { number: i, model })
    }
    // The damage must neither be harmless nor stop everything at the door.
    expect(accepted).toBeGreaterThan(files / 20)
    expect(accepted).toBeLessThan(files / 2)
    expect(shapes.size).toBeGreaterThan(plans)
    expect([...kinds].sort()).toEqual(['OBJ false', 'PLY false', 'PLY true', 'STL false', 'STL true'])
  })

  test(`${plans} of the accepted shapes through the planner`, () => {
    const chosen = [...shapes.values()].slice(0, plans)
    let planned = 0
    for (const { number, model } of chosen) {
      const replay = `file ${number} of seed ${seed}`
      try {
        const { docket } = planSolid(model.solid, { ...usualChoices, solid: model.solid.id, heightMm: 150 })
        const failed = docket.checks.filter((check) => !check.ok)
        if (failed.length > 0) throw new Error(failed.map((c) => `${c.name}: ${c.detail}`).join('; '))
        planned++
      } catch (thrown) {
        if (!(thrown instanceof InputError) || thrown.message === '') throw new Error(`${replay}: ${why(thrown)}`)
      }
    }
    expect(planned).toBeGreaterThan(0.8 * chosen.length)
  })
})

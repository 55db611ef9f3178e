import 'fake-indexeddb/auto'
import { describe, expect, test } from 'vitest'
import { choicesOf } from '../../src/app/state/build'
import { createWorkshop, type Workshop } from '../../src/app/state/workshop'
import { openStore } from '../../src/app/storage/database'
import { buildFileText, readFileText } from '../../src/app/storage/file'
import { createKeeper } from '../../src/app/storage/keeper'
import { buildSolid } from '../../src/solids'
import { type FakePlanner, fakePlanner } from './fake-planner'
import { planFor } from './plans'

/** Turns of the event loop, not milliseconds: on a busy machine the store takes as many of them, but longer. */
const pause = async (turns = 30): Promise<void> => {
  for (let i = 0; i < turns; i++) {
    await new Promise((resolve) => setTimeout(resolve, 0))
    await new Promise((resolve) => setImmediate(resolve))
  }
}
let databases = 0
let ids = 0

interface Opened {
  readonly workshop: Workshop
  readonly planner: FakePlanner
  readonly name: string
}
const open = async (name = `workshop-${databases++}`): Promise<Opened> => {
  const planner = fakePlanner()
  let time = 1000
  const workshop = await createWorkshop({
    keeper: await createKeeper(() => openStore(name)),
    planner,
    now: () => time++,
    newId: () => `id-${ids++}`,
    rest: 1,
  })
  return { workshop, planner, name }
}
/** A workshop with the plan for its first choices. */
const planned = async (name?: string): Promise<Opened> => {
  const opened = await open(name)
  opened.workshop.wanted.value = true
  await pause()
  await opened.planner.finish()
  return opened
}
const pieces = [0, 1]

describe('computing', () => {
  test('nothing is computed until a station wants a plan; then by itself', async () => {
    const { workshop, planner } = await open()
    workshop.choose({ heightMm: 120 })
    await pause()
    expect(planner.asked).toEqual([])
    workshop.wanted.value = true
    await pause()
    expect(planner.asked.map(({ heightMm }) => heightMm)).toEqual([120])
    planner.report('skin', 0.5)
    expect(workshop.computing.value).toMatchObject({ stage: 'skin', fraction: 0.5 })
    await planner.finish()
    expect(workshop.computing.value).toBeNull()
    expect(workshop.isFresh.value).toBe(true)
    expect(workshop.planned.value?.plan.model.heightMm).toBe(120)
  })

  test('a change while computing stops it and begins anew; the earlier plan stays, marked as old', async () => {
    const { workshop, planner } = await planned()
    workshop.choose({ heightMm: 300 })
    await pause()
    expect(planner.running).toBe(true)
    workshop.choose({ heightMm: 310 })
    expect(planner.stopped).toBe(1)
    expect(workshop.planned.value?.choices.heightMm).toBe(250)
    expect(workshop.isFresh.value).toBe(false)
    await pause()
    await planner.finish()
    expect(planner.asked.map(({ heightMm }) => heightMm)).toEqual([250, 300, 310])
    expect(workshop.planned.value?.choices.heightMm).toBe(310)
    expect(workshop.before.value?.model.heightMm).toBe(250)
  })

  test('a change back to the choices of the plan computes nothing', async () => {
    const { workshop, planner } = await planned()
    workshop.choose({ paper: 'letter' })
    workshop.undo()
    await pause()
    expect(planner.asked).toHaveLength(1)
    expect(workshop.isFresh.value).toBe(true)
  })

  test('cancel stops at once, and it does not start again by itself, but on request or with the next change', async () => {
    const { workshop, planner } = await planned()
    workshop.choose({ heightMm: 300 })
    await pause()
    workshop.cancel()
    expect([planner.stopped, workshop.computing.value]).toEqual([1, null])
    await pause()
    expect(planner.asked).toHaveLength(2)
    expect(workshop.halted.value).toMatchObject({ refusal: null })
    workshop.compute()
    await pause()
    expect(planner.asked).toHaveLength(3)
    workshop.cancel()
    workshop.choose({ heightMm: 320 })
    await pause()
    expect(planner.asked.at(-1)?.heightMm).toBe(320)
  })

  test('a refusal is shown with its choices and goes with them', async () => {
    const { workshop, planner } = await planned()
    workshop.choose({ heightMm: 2000 })
    await pause()
    const refusal = {
      kind: 'input',
      message: 'A panel is larger than the sheet.',
      place: 'heightMm',
      details: '',
    } as const
    await planner.finish({ ok: false, refusal })
    expect(workshop.halted.value).toMatchObject({ refusal, choices: { heightMm: 2000 } })
    expect(workshop.planned.value?.choices.heightMm).toBe(250)
    workshop.undo()
    await pause()
    expect(planner.asked).toHaveLength(2)
  })

  test('what was learned of a solid is known in the next session', async () => {
    const { name } = await planned()
    await pause()
    const { workshop } = await open(name)
    expect(workshop.known.value.get('great-icosahedron/nonzero')).toMatchObject({ panels: 6, narrowest: 0.01 })
  })
})

describe('the Bench', () => {
  test('progress survives closing the browser', async () => {
    const { workshop, name } = await planned()
    for (const id of pieces) workshop.glue(id)
    await pause()
    const again = await open(name)
    expect(again.workshop.glued.value).toEqual(pieces)
    expect(again.workshop.benchPlan.value?.plan.pieces).toHaveLength(2)
  })

  test('choices on the Board leave the model on the Bench as it was begun', async () => {
    const { workshop, planner, name } = await planned()
    workshop.glue(0)
    workshop.choose({ heightMm: 400, paper: 'letter' })
    await pause()
    await planner.finish()
    expect(workshop.planned.value?.plan.model.heightMm).toBe(400)
    expect(workshop.benchPlan.value?.plan.model.heightMm).toBe(250)
    workshop.glue(1)
    expect(workshop.glued.value).toEqual([0, 1])
    await pause()
    const again = await open(name)
    await pause()
    expect(again.workshop.benchPlan.value?.plan.model.heightMm).toBe(250)
    expect(again.workshop.planned.value?.plan.model.heightMm).toBe(400)
    expect(again.workshop.glued.value).toEqual([0, 1])
  })

  test('a new model sets the old one aside, and one can go back to it', async () => {
    const { workshop, planner } = await planned()
    workshop.glue(0)
    const first = workshop.job.value!.id
    workshop.choose({ heightMm: 400 })
    await pause()
    await planner.finish()
    workshop.startOver()
    expect(workshop.glued.value).toEqual([])
    expect(workshop.benchPlan.value?.plan.model.heightMm).toBe(400)
    workshop.glue(1)
    expect(workshop.build.value.jobs).toHaveLength(2)
    workshop.resumeJob(first)
    await pause()
    expect(workshop.glued.value).toEqual([0])
    expect(workshop.benchPlan.value?.plan.model.heightMm).toBe(250)
  })

  test('undo takes back the last piece, and only there', async () => {
    const { workshop } = await planned()
    for (const id of pieces) workshop.glue(id)
    workshop.unglue()
    expect(workshop.glued.value).toEqual([0])
    workshop.undo()
    expect(workshop.glued.value).toEqual([0])
  })
})

describe('builds', () => {
  test('another solid in a build that has pieces glued begins a build of its own', async () => {
    const { workshop } = await planned()
    const first = workshop.build.value.id
    workshop.take('cube', 'right')
    expect(workshop.build.value.id).toBe(first)
    workshop.undo()
    await pause()
    workshop.glue(0)
    workshop.take('cube', 'right')
    await pause()
    expect(workshop.build.value.id).not.toBe(first)
    expect(workshop.choices.value.solid).toBe('cube')
    await workshop.open(first)
    expect(workshop.glued.value).toEqual([0])
  })

  test("a builder's model goes with its build, with a copy, and with every build that is begun with it", async () => {
    const { workshop, planner, name } = await open()
    const model = { ...buildSolid('cube'), id: 'own-box-1', name: 'box' }
    const holds = () => [workshop.choices.value.solid, workshop.build.value.model?.id]
    await workshop.takeModel(model, 120)
    expect(workshop.choices.value).toMatchObject({ solid: 'own-box-1', heightMm: 120 })
    const first = workshop.build.value.id
    workshop.wanted.value = true
    await pause()
    expect(planner.models).toEqual([model])
    await planner.finish()

    // Something else in the same build, and the model again.
    workshop.take('tetrahedron', 'right')
    await pause()
    expect(planner.models.at(-1)).toBeNull()
    await planner.finish()
    workshop.take('own-box-1', 'right')
    expect([...holds(), workshop.build.value.id]).toEqual(['own-box-1', 'own-box-1', first])
    workshop.undo()
    await pause()

    // From a build that has glued pieces: the model comes along to the new one.
    workshop.glue(0)
    workshop.take('own-box-1', 'right')
    await pause()
    expect(workshop.build.value.id).not.toBe(first)
    expect(holds()).toEqual(['own-box-1', 'own-box-1'])
    // A build of a second model keeps that one: undo must find it.
    await workshop.takeModel({ ...model, id: 'own-crate-1' }, 100)
    const second = workshop.build.value.id
    workshop.take('own-box-1', 'right')
    await pause()
    expect(holds()).toEqual(['own-box-1', 'own-box-1'])
    expect(workshop.builds.value.find(({ id }) => id === second)?.model?.id).toBe('own-crate-1')
    workshop.copyBuild()
    await pause()
    expect(holds()).toEqual(['own-box-1', 'own-box-1'])

    const again = await open(name)
    expect(again.workshop.build.value.model).toEqual(model)
    const text = await buildFileText(again.workshop.build.value, (key) => again.workshop.keeper.plan(key))
    const { workshop: other } = await open()
    await other.openFile(readFileText('box.json', text))
    expect(other.build.value.model).toEqual(model)
  })

  test('put away, bring back; for good only when asked', async () => {
    const { workshop, name } = await planned()
    workshop.glue(0)
    const first = workshop.build.value.id
    await workshop.setRemoved(first, true)
    expect(workshop.build.value.id).not.toBe(first)
    await workshop.setRemoved(first, false)
    await workshop.open(first)
    expect(workshop.glued.value).toEqual([0])
    workshop.copyBuild()
    await pause()
    await workshop.forget(first)
    const again = await open(name)
    expect(again.workshop.builds.value.some(({ id }) => id === first)).toBe(false)
  })

  test('a build goes to a file and comes back as a build of its own, progress and history included', async () => {
    const { workshop } = await planned()
    workshop.rename('For the window')
    workshop.choose({ grammage: 180 })
    workshop.undo()
    workshop.glue(1)
    await pause()
    const old = workshop.build.value
    const text = await buildFileText(old, (key) => workshop.keeper.plan(key))
    const { workshop: other } = await open()
    await other.openFile(readFileText('window.json', text))
    expect(other.build.value.id).not.toBe(old.id)
    expect(other.build.value).toMatchObject({ name: 'For the window', history: old.history })
    expect(other.glued.value).toEqual([1])
    await pause()
    expect(other.benchPlan.value?.plan).toEqual(workshop.benchPlan.value?.plan)
    other.redo()
    expect(other.choices.value.grammage).toBe(180)
  })

  test('a plan.json comes back as the plan that it is, without computing', async () => {
    const { workshop, planner } = await open()
    const plan = planFor({ ...workshop.choices.value, heightMm: 321 })
    await workshop.openFile(readFileText('plan.json', JSON.stringify(plan)))
    workshop.wanted.value = true
    await pause()
    expect(planner.asked).toEqual([])
    expect(workshop.planned.value?.plan).toEqual(plan)
    expect(choicesOf(workshop.build.value)).toMatchObject({ heightMm: 321, grammage: 160, paper: 'a4' })
  })
})

describe('two tabs', () => {
  test('what one tab keeps, the other takes over when it hears of it', async () => {
    const { workshop: one, name } = await planned()
    await pause()
    const { workshop: two } = await open(name)
    one.glue(0)
    let heard: Promise<void> = Promise.resolve()
    one.keeper.onKept = ({ id, revision }) => {
      heard = two.heard(id, revision)
    }
    one.glue(1)
    await pause()
    await heard
    expect(two.glued.value).toEqual([0, 1])
  })

  test('tabs that do not hear of each other still lose nothing', async () => {
    const { workshop: one, name } = await planned()
    one.glue(0)
    await pause()
    const { workshop: two } = await open(name)
    one.choose({ heightMm: 300 })
    await pause()
    two.glue(1)
    await pause(30)
    expect(two.glued.value).toEqual([0, 1])
    const { workshop: later } = await open(name)
    expect(later.glued.value).toEqual([0, 1])
    const all = [later.choices.value, ...later.build.value.history.past.map(({ choices }) => choices)]
    expect(all.map(({ heightMm }) => heightMm)).toContain(300)
  })
})

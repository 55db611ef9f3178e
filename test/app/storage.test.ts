import 'fake-indexeddb/auto'
import { describe, expect, test } from 'vitest'
import { type Build, choicesOf, choose, newBuild, withJob } from '../../src/app/state/build'
import { firstChoices } from '../../src/app/state/choices'
import { glue, type Job } from '../../src/app/state/job'
import { openStore } from '../../src/app/storage/database'
import { createKeeper } from '../../src/app/storage/keeper'
import { mergeBuilds } from '../../src/app/storage/merge'
import { StorageFailed, type Store } from '../../src/app/storage/types'
import { buildSolid, type Solid } from '../../src/solids'
import { planFor } from './plans'

let count = 0
const freshName = (): string => `test-${count++}`
const cube = firstChoices('cube')
const base = (): Build => newBuild('b1', cube, 1000)
const jobOn = (planKey: string, glued: number[] = []): Job => ({
  id: 'j1',
  choices: cube,
  planKey,
  glued,
  started: 1,
  changed: 1,
})

describe('the store', () => {
  test('gives back what was kept, in a new session too', async () => {
    const name = freshName()
    const first = await openStore(name)
    const kept = await first.saveBuild(
      { ...base(), planned: { choices: cube, planKey: 'p1' } },
      { key: 'p1', plan: planFor(cube) },
    )
    await first.setCurrent('b1')
    const second = await openStore(name)
    expect(await second.builds()).toEqual([kept])
    expect(await second.plan('p1')).toEqual(planFor(cube))
    expect(await second.current()).toBe('b1')
  })

  test('forgets a plan when the build has a newer one, but never one that is on the Bench', async () => {
    const store = await openStore(freshName())
    const one = await store.saveBuild(
      { ...base(), planned: { choices: cube, planKey: 'p1' } },
      { key: 'p1', plan: planFor(cube) },
    )
    const working = await store.saveBuild(withJob(one, jobOn('p1')))
    const two = await store.saveBuild(
      { ...working, planned: { choices: cube, planKey: 'p2' } },
      { key: 'p2', plan: planFor(cube) },
    )
    expect(await store.plan('p1')).not.toBeNull()
    await store.saveBuild({ ...two, planned: { choices: cube, planKey: 'p3' } }, { key: 'p3', plan: planFor(cube) })
    expect(await store.plan('p2')).toBeNull()
    expect(await store.plan('p1')).not.toBeNull()
    await store.forgetBuild('b1')
    expect([await store.plan('p1'), await store.plan('p3'), await store.builds()]).toEqual([null, null, []])
  })

  test('merges the changes of two tabs', async () => {
    const name = freshName()
    const [tabA, tabB] = [await openStore(name), await openStore(name)]
    const start = await tabA.saveBuild(withJob(base(), jobOn('p1', [7])))
    await tabA.saveBuild(withJob(start, glue(start.jobs[0]!, 8, 5)))
    const merged = await tabB.saveBuild(choose(withJob(start, glue(start.jobs[0]!, 9, 6)), { heightMm: 300 }))
    expect(merged.jobs[0]!.glued).toEqual([7, 8, 9])
    expect(choicesOf(merged).heightMm).toBe(300)
    expect(await tabA.builds()).toEqual([merged])
  })
})

describe('merging', () => {
  test('the other tab’s choices are one undo away', () => {
    const theirs = { ...choose(base(), { heightMm: 100 }), revision: 4 }
    const merged = mergeBuilds(theirs, choose(base(), { paper: 'letter' }))
    expect(choicesOf(merged)).toEqual({ ...cube, paper: 'letter' })
    expect(merged.history.past.at(-1)?.choices).toEqual({ ...cube, heightMm: 100 })
    expect(merged.revision).toBe(4)
  })

  test('a model that the other tab brought stays with the build, so that undo finds it', () => {
    const model = { ...buildSolid('cube'), id: 'own-box-1', name: 'box' }
    const taken = (which: Solid): Build => ({ ...choose(base(), { solid: which.id }), model: which })
    const merged = mergeBuilds(taken(model), choose(base(), { heightMm: 100 }))
    expect(merged.model).toEqual(model)
    expect(merged.history.past.at(-1)?.choices.solid).toBe(model.id)
    expect(choicesOf(merged)).toEqual({ ...cube, heightMm: 100 })
    // Both brought one: ours is kept, and nothing leads back to the other.
    const ours = taken({ ...model, id: 'own-crate-1' })
    const both = mergeBuilds(taken(model), ours)
    expect(both.model?.id).toBe('own-crate-1')
    expect(both.history.past.map(({ choices }) => choices.solid)).not.toContain(model.id)
  })

  test('no job is lost, whoever began it', () => {
    const theirs = withJob(base(), { ...jobOn('p1', [1]), id: 'theirs' })
    const ours = withJob(base(), { ...jobOn('p2', [2]), id: 'ours' })
    const merged = mergeBuilds(theirs, ours)
    expect(merged.jobs.map(({ id, glued }) => [id, glued])).toEqual([
      ['ours', [2]],
      ['theirs', [1]],
    ])
    expect(merged.job).toBe('ours')
  })
})

describe('the keeper', () => {
  test('says saving, then saved; a second keeper finds it', async () => {
    const name = freshName()
    const keeper = await createKeeper(() => openStore(name))
    const wait = keeper.save(base())
    expect(keeper.state.value.kind).toBe('saving')
    await wait
    expect(keeper.state.value.kind).toBe('saved')
    const later = await createKeeper(() => openStore(name))
    expect((await later.builds()).map(({ id }) => id)).toEqual(['b1'])
  })

  test('quick changes one after the other: the last one is kept, and is not taken for another tab’s', async () => {
    const name = freshName()
    const keeper = await createKeeper(() => openStore(name))
    let merges = 0
    keeper.onMerged = () => merges++
    const heights = [100, 110, 120, 130]
    await Promise.all(heights.map((heightMm) => keeper.save(choose(base(), { heightMm }))))
    await keeper.save(choose(base(), { heightMm: 140 }))
    const [kept] = await (await openStore(name)).builds()
    expect(choicesOf(kept!).heightMm).toBe(140)
    expect(merges).toBe(0)
  })

  test('a browser without storage: it says so, works on, and loses nothing while the page is open', async () => {
    const keeper = await createKeeper(async () => {
      throw new StorageFailed('The browser keeps nothing for this page: it does not allow storage here.')
    })
    expect(keeper.state.value).toMatchObject({ kind: 'failed', message: expect.stringContaining('keeps nothing') })
    const build = { ...base(), planned: { choices: cube, planKey: 'p1' } }
    await keeper.save(build, { key: 'p1', plan: planFor(cube) })
    expect(await keeper.builds()).toEqual([build])
    expect(await keeper.plan('p1')).toEqual(planFor(cube))
    expect(keeper.state.value.kind).toBe('failed')
  })

  test('a disk that is full: nothing is lost, and it is saved when there is room again', async () => {
    const name = freshName()
    const real = await openStore(name)
    let full = true
    const store: Store = {
      ...real,
      saveBuild: (build, plan) => {
        if (full) throw new StorageFailed('The browser keeps nothing for this page: the disk space is used up.')
        return real.saveBuild(build, plan)
      },
    }
    const keeper = await createKeeper(async () => store)
    const build = { ...base(), planned: { choices: cube, planKey: 'p1' } }
    await keeper.save(build, { key: 'p1', plan: planFor(cube) })
    expect(keeper.state.value).toMatchObject({ kind: 'failed', message: expect.stringContaining('used up') })
    expect(await keeper.plan('p1')).toEqual(planFor(cube))
    full = false
    await keeper.retry()
    expect(keeper.state.value.kind).toBe('saved')
    expect(await real.plan('p1')).toEqual(planFor(cube))
    expect(await real.builds()).toHaveLength(1)
  })
})

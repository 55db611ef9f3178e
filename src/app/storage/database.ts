/** The store in the browser's IndexedDB. */
import { type DBSchema, type IDBPDatabase, openDB } from 'idb'
import type { Plan } from '../../plan/types'
import { type Build, planKeysOf } from '../state/build'
import { mergeBuilds } from './merge'
import { type KnownFacts, StorageFailed, type Store } from './types'

interface Tables extends DBSchema {
  builds: { key: string; value: Build }
  plans: { key: string; value: Plan }
  facts: { key: string; value: KnownFacts }
  settings: { key: string; value: string }
}

const reasonOf = (error: unknown): string => {
  const name = (error as { name?: string } | null)?.name
  if (name === 'QuotaExceededError') return 'the disk space that the browser grants is used up'
  if (name === 'SecurityError' || name === 'InvalidStateError') return 'the browser does not allow storage here'
  return error instanceof Error && error.message !== '' ? error.message : (name ?? String(error))
}

/**
 * @param name of the database; another one for tests
 * @throws StorageFailed if the browser has no storage for this page
 */
export const openStore = async (name = 'facetwright'): Promise<Store> => {
  let lost = ''
  const guarded = async <T>(work: () => Promise<T>): Promise<T> => {
    try {
      if (lost !== '') throw new Error(lost)
      return await work()
    } catch (error) {
      throw new StorageFailed(`The browser keeps nothing for this page: ${reasonOf(error)}.`)
    }
  }
  const db: IDBPDatabase<Tables> = await guarded(() =>
    openDB<Tables>(name, 1, {
      upgrade(fresh) {
        fresh.createObjectStore('builds', { keyPath: 'id' })
        fresh.createObjectStore('plans')
        fresh.createObjectStore('facts', { keyPath: 'key' })
        fresh.createObjectStore('settings')
      },
      // Another tab brings a newer version of the tables: it must not wait for us.
      blocking: (_old, _new, event) => {
        lost = 'another tab has opened a newer version of the program; load this page again'
        ;(event.target as IDBDatabase).close()
      },
      terminated: () => {
        lost = 'the browser has closed its storage; load this page again'
      },
    }),
  )
  return {
    builds: () => guarded(() => db.getAll('builds')),
    saveBuild: (build, plan) =>
      guarded(async () => {
        const change = db.transaction(['builds', 'plans'], 'readwrite')
        const builds = change.objectStore('builds')
        const plans = change.objectStore('plans')
        const held = await builds.get(build.id)
        const merged = held && held.revision > build.revision ? mergeBuilds(held, build) : build
        const kept = { ...merged, revision: merged.revision + 1 }
        const needed = new Set(planKeysOf(kept))
        const stale = held ? planKeysOf(held).filter((key) => !needed.has(key)) : []
        await Promise.all([
          builds.put(kept),
          plan ? plans.put(plan.plan, plan.key) : undefined,
          ...stale.map((key) => plans.delete(key)),
          change.done,
        ])
        return kept
      }),
    forgetBuild: (id) =>
      guarded(async () => {
        const change = db.transaction(['builds', 'plans'], 'readwrite')
        const held = await change.objectStore('builds').get(id)
        const keys = held ? planKeysOf(held) : []
        await Promise.all([
          change.objectStore('builds').delete(id),
          ...keys.map((key) => change.objectStore('plans').delete(key)),
          change.done,
        ])
      }),
    plan: (key) => guarded(async () => (await db.get('plans', key)) ?? null),
    facts: () => guarded(() => db.getAll('facts')),
    saveFacts: (facts) =>
      guarded(async () => {
        await db.put('facts', facts)
      }),
    current: () => guarded(async () => (await db.get('settings', 'current')) ?? null),
    setCurrent: (id) =>
      guarded(async () => {
        await db.put('settings', id, 'current')
      }),
  }
}

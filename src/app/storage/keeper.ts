/**
 * Keeps what the builder makes: every change goes to the store at once, one save after the other. What the store refuses
 * stays in memory, is tried again with the next change, and is said plainly.
 */
import { type ReadonlySignal, signal } from '@preact/signals'
import type { Plan } from '../../plan/types'
import { type Build, planKeysOf } from '../state/build'
import { memoryStore } from './memory'
import type { KeyedPlan, KnownFacts, Store } from './types'

export type SaveState =
  | { readonly kind: 'saved' }
  | { readonly kind: 'saving' }
  | { readonly kind: 'failed'; readonly message: string }

export interface Keeper {
  readonly state: ReadonlySignal<SaveState>
  /** All builds, those included that the store refused. */
  builds(): Promise<Build[]>
  /** Resolves when the build is kept or refused. */
  save(build: Build, plan?: KeyedPlan): Promise<void>
  /** Hears of a build that another tab had changed meanwhile, as it is kept now. */
  onMerged: (kept: Build) => void
  /** Hears of every build that has been kept. */
  onKept: (kept: Build) => void
  forget(id: string): Promise<void>
  plan(key: string): Promise<Plan | null>
  facts(): Promise<KnownFacts[]>
  saveFacts(facts: KnownFacts): Promise<void>
  current(): Promise<string | null>
  setCurrent(id: string): Promise<void>
  /** Saves again what was refused. */
  retry(): Promise<void>
}

interface Unsaved {
  readonly build: Build
  /** Plans that are not kept yet, by key. */
  readonly plans: Map<string, Plan>
}

/** @param open opens the browser's store; when it fails, the keeper works in memory and says so */
export const createKeeper = async (open: () => Promise<Store>): Promise<Keeper> => {
  const state = signal<SaveState>({ kind: 'saved' })
  const spare = memoryStore()
  let store: Store | null = null
  const unsaved = new Map<string, Unsaved>()
  /** Revisions of our own saves: a change that was made before the last save came back builds on it. */
  const ownRevisions = new Map<string, number>()
  let queue: Promise<void> = Promise.resolve()

  const fail = (error: unknown): void => {
    state.value = { kind: 'failed', message: error instanceof Error ? error.message : String(error) }
  }
  const openAgain = async (): Promise<void> => {
    try {
      store = await open()
    } catch (error) {
      fail(error)
    }
  }
  /** From the store, or from memory when it refuses. */
  const attempt = async <T>(work: (store: Store) => Promise<T>): Promise<T> => {
    if (!store) return work(spare)
    try {
      return await work(store)
    } catch (error) {
      fail(error)
      return work(spare)
    }
  }

  const write = async (to: Store, { build, plans }: Unsaved): Promise<void> => {
    const { id } = build
    const revision = Math.max(build.revision, ownRevisions.get(id) ?? 0)
    const parcels = plans.size > 0 ? [...plans].map(([key, plan]) => ({ key, plan })) : [undefined]
    let kept: Build = { ...build, revision }
    for (const parcel of parcels) {
      kept = await to.saveBuild(kept, parcel)
      ownRevisions.set(id, kept.revision)
      if (parcel) plans.delete(parcel.key)
    }
    if (unsaved.get(id)?.build === build && plans.size === 0) unsaved.delete(id)
    if (kept.revision !== revision + parcels.length) keeper.onMerged(kept)
    keeper.onKept(kept)
  }

  const enqueue = (id: string): Promise<void> => {
    if (store && state.peek().kind === 'saved') state.value = { kind: 'saving' }
    queue = queue.then(async () => {
      const entry = unsaved.get(id)
      if (!entry || !store) return
      try {
        await write(store, entry)
        if (unsaved.size === 0) state.value = { kind: 'saved' }
      } catch (error) {
        fail(error)
      }
    })
    return queue
  }

  const keeper: Keeper = {
    state,
    onMerged: () => {},
    onKept: () => {},
    async builds() {
      const stored = await attempt((from) => from.builds())
      return [...stored.filter(({ id }) => !unsaved.has(id)), ...[...unsaved.values()].map(({ build }) => build)]
    },
    save(build, plan) {
      const plans = unsaved.get(build.id)?.plans ?? new Map<string, Plan>()
      if (plan) plans.set(plan.key, plan.plan)
      const needed = new Set(planKeysOf(build))
      for (const key of plans.keys()) if (!needed.has(key)) plans.delete(key)
      unsaved.set(build.id, { build, plans })
      return enqueue(build.id)
    },
    async forget(id) {
      unsaved.delete(id)
      await queue
      await attempt((from) => from.forgetBuild(id))
    },
    async plan(key) {
      for (const { plans } of unsaved.values()) {
        const plan = plans.get(key)
        if (plan) return plan
      }
      return attempt((from) => from.plan(key))
    },
    facts: () => attempt((from) => from.facts()),
    saveFacts: (facts) => attempt((to) => to.saveFacts(facts)),
    current: () => attempt((from) => from.current()),
    setCurrent: (id) => attempt((to) => to.setCurrent(id)),
    async retry() {
      if (!store) await openAgain()
      if (!store) return
      state.value = { kind: 'saving' }
      await Promise.all([...unsaved.keys()].map(enqueue))
      if (unsaved.size === 0) state.value = { kind: 'saved' }
    },
  }
  await openAgain()
  return keeper
}

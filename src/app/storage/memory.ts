/** A store that lasts as long as the page: for a browser that refuses to keep anything. */
import type { Plan } from '../../plan/types'
import type { Build } from '../state/build'
import type { KnownFacts, Store } from './types'

export const memoryStore = (): Store => {
  const builds = new Map<string, Build>()
  const plans = new Map<string, Plan>()
  const facts = new Map<string, KnownFacts>()
  let current: string | null = null
  return {
    builds: async () => [...builds.values()],
    async saveBuild(build, plan) {
      const kept = { ...build, revision: build.revision + 1 }
      builds.set(build.id, kept)
      if (plan) plans.set(plan.key, plan.plan)
      return kept
    },
    async forgetBuild(id) {
      builds.delete(id)
    },
    plan: async (key) => plans.get(key) ?? null,
    facts: async () => [...facts.values()],
    async saveFacts(entry) {
      facts.set(entry.key, entry)
    },
    current: async () => current,
    async setCurrent(id) {
      current = id
    },
  }
}

import type { Plan } from '../../plan/types'
import type { Build } from '../state/build'

/** What is known of a solid from plans computed on this machine. */
export interface KnownFacts {
  /** `solid/fill`. */
  readonly key: string
  readonly panels: number
  /** Width of the narrowest panel over the height of the model. */
  readonly narrowest: number
  /** Hours of work for the plan at `heightMm`. */
  readonly hours: number
  readonly heightMm: number
}

export interface KeyedPlan {
  readonly key: string
  readonly plan: Plan
}

/** Where builds are kept. Every call may reject with `StorageFailed`. */
export interface Store {
  builds(): Promise<Build[]>
  /**
   * Keeps a build, and a plan that it has come to need, in one go; forgets plans that it no longer needs. When another tab
   * has kept the build meanwhile, the two are merged.
   * @returns the build as kept
   */
  saveBuild(build: Build, plan?: KeyedPlan): Promise<Build>
  /** Forgets a build and its plans. */
  forgetBuild(id: string): Promise<void>
  plan(key: string): Promise<Plan | null>
  facts(): Promise<KnownFacts[]>
  saveFacts(facts: KnownFacts): Promise<void>
  /** Id of the build that was open last. */
  current(): Promise<string | null>
  setCurrent(id: string): Promise<void>
}

/** The browser keeps nothing for us; `message` is shown as is. */
export class StorageFailed extends Error {
  override readonly name = 'StorageFailed'
}

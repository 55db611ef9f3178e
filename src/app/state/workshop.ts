/**
 * The state behind all stations, and everything that a builder can do to it. No page elements here: the worker, the store
 * and the clock are handed in, so that tests run it without a browser.
 */
import { batch, computed, effect, type ReadonlySignal, type Signal, signal } from '@preact/signals'
import type { Plan, PlanChoices } from '../../plan/types'
import type { Planner, Solid } from '../../worker'
import type { Opened } from '../storage/file'
import type { Keeper } from '../storage/keeper'
import { mergeBuilds } from '../storage/merge'
import type { KnownFacts } from '../storage/types'
import { type Build, choicesOf, choose, type Design, jobOf, modelOf, newBuild, redesign, withJob } from './build'
import { firstChoices, sameChoices } from './choices'
import { redo, undo } from './history'
import { glue, type Job, unglue } from './job'
import { type Computing, createPlanMaker, type Halted } from './plan-maker'

/** A plan with the choices that it was made from. */
export interface Planned {
  readonly key: string
  readonly choices: PlanChoices
  readonly plan: Plan
}
export interface Workshop {
  readonly keeper: Keeper
  readonly build: Signal<Build>
  /** All builds, newest change first, the removed ones included. */
  readonly builds: Signal<readonly Build[]>
  readonly choices: ReadonlySignal<PlanChoices>
  readonly tints: ReadonlySignal<Design['tints']>
  /** Last plan computed for this build, maybe of earlier choices. */
  readonly planned: Signal<Planned | null>
  /** The plan before that one, for "was …" on the docket; null across solids. */
  readonly before: Signal<Plan | null>
  /** `planned` belongs to the present choices. */
  readonly isFresh: ReadonlySignal<boolean>
  readonly computing: Signal<Computing | null>
  readonly halted: Signal<Halted | null>
  /** Plans are computed only when a station asks for one. */
  readonly wanted: Signal<boolean>
  readonly job: ReadonlySignal<Job | null>
  /** What is built on the Bench: the job's plan, or the latest plan while nothing is glued. */
  readonly benchPlan: ReadonlySignal<Planned | null>
  readonly glued: ReadonlySignal<readonly number[]>
  readonly known: Signal<ReadonlyMap<string, KnownFacts>>

  choose(choices: Partial<PlanChoices>): void
  tint(kind: string, colour: string | null): void
  undo(): void
  redo(): void
  compute(): void
  cancel(): void
  glue(piece: number): void
  unglue(piece?: number): void
  /** Puts the latest plan on the Bench with nothing glued; the old job stays among the build's jobs. */
  startOver(): void
  resumeJob(id: string): void
  /** Takes a solid to the Board: in this build, or in a new one when this has pieces glued. */
  take(solid: string, hand: PlanChoices['hand']): void
  /** Begins a build of a builder's own model. */
  takeModel(model: Solid, heightMm: number): Promise<void>
  rename(name: string): void
  open(id: string): Promise<void>
  openFile(opened: Opened): Promise<void>
  copyBuild(): void
  setRemoved(id: string, removed: boolean): Promise<void>
  forget(id: string): Promise<void>
  refreshBuilds(): Promise<void>
  /** Another tab has kept a build. */
  heard(id: string, revision: number): Promise<void>
}

export interface Surroundings {
  readonly keeper: Keeper
  readonly planner: Planner
  readonly now: () => number
  readonly newId: () => string
  /** Milliseconds that choices must rest before the computation starts. */
  readonly rest: number
}

export const factsKey = (solid: string, fill: PlanChoices['fill']): string => `${solid}/${fill}`
export const solidAtFirst = 'great-icosahedron'

export const createWorkshop = async (around: Surroundings): Promise<Workshop> => {
  const { keeper, planner, now, newId } = around
  const stored = await keeper.builds()
  const currentId = await keeper.current()
  const live = stored.filter(({ removed }) => !removed).sort((a, b) => b.changed - a.changed)
  const first =
    live.find(({ id }) => id === currentId) ?? live[0] ?? newBuild(newId(), firstChoices(solidAtFirst), now())

  const build = signal(first)
  const builds = signal<readonly Build[]>(stored.some(({ id }) => id === first.id) ? stored : [first, ...stored])
  const choices = computed(() => choicesOf(build.value))
  const tints = computed(() => build.value.history.now.tints)
  const planned = signal<Planned | null>(null)
  const before = signal<Plan | null>(null)
  const job = computed(() => jobOf(build.value))
  const jobPlan = signal<Planned | null>(null)
  const known = signal<ReadonlyMap<string, KnownFacts>>(new Map((await keeper.facts()).map((f) => [f.key, f])))
  const isFresh = computed(() => planned.value !== null && sameChoices(planned.value.choices, choices.value))
  const benchPlan = computed(() => (job.value ? jobPlan.value : planned.value))
  const glued = computed(() => job.value?.glued ?? [])

  const listBuild = (kept: Build): void => {
    const others = builds.peek().filter(({ id }) => id !== kept.id)
    builds.value = [kept, ...others].sort((a, b) => b.changed - a.changed)
  }
  const set = (next: Build, plan?: { key: string; plan: Plan }): void => {
    if (next === build.peek()) return
    const stamped = { ...next, changed: now() }
    build.value = stamped
    listBuild(stamped)
    void keeper.save(stamped, plan)
  }
  keeper.onMerged = (kept) => {
    if (kept.id === build.peek().id) set(mergeBuilds(kept, build.peek()))
  }

  /** Plans of a build that has just come onto the table. */
  const loadPlans = async (): Promise<void> => {
    const { id, planned: last } = build.peek()
    const plan = last ? await keeper.plan(last.planKey) : null
    if (build.peek().id !== id) return
    batch(() => {
      planned.value = last && plan ? { key: last.planKey, choices: last.choices, plan } : null
      before.value = null
    })
  }
  await loadPlans()

  effect(() => {
    const current = job.value
    if (!current || jobPlan.peek()?.key === current.planKey) return
    const latest = planned.peek()
    if (latest?.key === current.planKey) {
      jobPlan.value = latest
      return
    }
    jobPlan.value = null
    void keeper.plan(current.planKey).then((plan) => {
      if (plan && job.peek()?.planKey === current.planKey)
        jobPlan.value = { key: current.planKey, choices: current.choices, plan }
    })
  })

  const learn = (plan: Plan, from: PlanChoices): void => {
    const { docket } = plan
    const facts: KnownFacts = {
      key: factsKey(from.solid, from.fill),
      panels: docket.panels,
      narrowest: docket.tightest.widthMm / plan.model.heightMm,
      hours: docket.hours.total,
      heightMm: from.heightMm,
    }
    known.value = new Map(known.peek()).set(facts.key, facts)
    void keeper.saveFacts(facts)
  }

  const maker = createPlanMaker({
    planner,
    choices,
    modelFor: (wish) => modelOf(build.peek(), wish),
    isFresh,
    rest: around.rest,
    onPlan(plan, wish) {
      const key = newId()
      const last = planned.peek()
      before.value = last?.choices.solid === wish.solid ? last.plan : null
      planned.value = { key, choices: wish, plan }
      set({ ...build.peek(), planned: { choices: wish, planKey: key } }, { key, plan })
      learn(plan, wish)
    },
  })

  /** Changes the build on the table. */
  const swap = async (next: Build): Promise<void> => {
    maker.stop()
    batch(() => {
      maker.halted.value = null
      planned.value = null
      before.value = null
      jobPlan.value = null
      build.value = next
    })
    listBuild(next)
    await keeper.setCurrent(next.id)
    await loadPlans()
  }
  const update = async (id: string, change: (old: Build) => Build): Promise<void> => {
    if (build.peek().id === id) return set(change(build.peek()))
    const old = builds.peek().find((entry) => entry.id === id)
    if (!old) return
    const next = { ...change(old), changed: now() }
    listBuild(next)
    await keeper.save(next)
  }

  /** A builder's model, from whichever build holds it. */
  const modelBy = (id: string): Solid | undefined =>
    [build.peek(), ...builds.peek()].find(({ model }) => model?.id === id)?.model

  void keeper.setCurrent(first.id)
  const workshop: Workshop = {
    keeper,
    build,
    builds,
    choices,
    tints,
    planned,
    before,
    isFresh,
    computing: maker.computing,
    halted: maker.halted,
    wanted: maker.wanted,
    job,
    benchPlan,
    glued,
    known,
    choose: (partial) => set(choose(build.peek(), partial)),
    tint(kind, colour) {
      const { [kind]: _, ...rest } = tints.peek()
      set(redesign(build.peek(), { tints: colour === null ? rest : { ...rest, [kind]: colour } }))
    },
    undo: () => set({ ...build.peek(), history: undo(build.peek().history) }),
    redo: () => set({ ...build.peek(), history: redo(build.peek().history) }),
    compute: maker.compute,
    cancel: maker.cancel,
    glue(piece) {
      const on = benchPlan.peek()
      if (!on) return
      const time = now()
      const present: Job = job.peek() ?? {
        id: newId(),
        choices: on.choices,
        planKey: on.key,
        glued: [],
        started: time,
        changed: time,
      }
      const next = glue(present, piece, time)
      if (next !== present) set(withJob(build.peek(), next))
    },
    unglue(piece) {
      const present = job.peek()
      if (!present) return
      const next = unglue(present, now(), piece)
      if (next !== present) set(withJob(build.peek(), next))
    },
    startOver: () => set({ ...build.peek(), job: null }),
    resumeJob: (id) => set({ ...build.peek(), job: id }),
    take(solid, hand) {
      const wish = { ...choices.peek(), solid, hand }
      const model = modelBy(solid)
      const present = build.peek()
      // One build holds one model: undo must find it.
      const room = !model || !present.model || present.model.id === model.id
      if (present.jobs.length === 0 && room) set(choose(model ? { ...present, model } : present, wish))
      else if (solid !== choices.peek().solid) {
        const next = newBuild(newId(), wish, now(), model)
        void keeper.save(next)
        void swap(next)
      } else set(choose(build.peek(), wish))
    },
    async takeModel(model, heightMm) {
      // Sizes and papers as they were; colours of other face kinds mean nothing here.
      const wish = { ...choices.peek(), solid: model.id, hand: 'right' as const, heightMm, colours: 'one' as const }
      const next = newBuild(newId(), wish, now(), model)
      await keeper.save(next)
      await swap(next)
    },
    rename: (name) => set({ ...build.peek(), name: name.trim() }),
    async open(id) {
      if (id === build.peek().id) return
      await workshop.refreshBuilds()
      const next = builds.peek().find((entry) => entry.id === id)
      if (next) await swap(next)
    },
    async openFile(opened) {
      const time = now()
      if (opened.kind === 'plan') {
        const key = newId()
        const next: Build = {
          ...newBuild(newId(), opened.choices, time),
          planned: { choices: opened.choices, planKey: key },
        }
        await keeper.save(next, { key, plan: opened.plan })
        return swap(next)
      }
      // Every key anew: the same file may be opened beside the build that it came from.
      const keys = new Map(Object.keys(opened.plans).map((key) => [key, newId()]))
      const { planned: last, jobs, job: onBench } = opened.build
      const next: Build = {
        ...opened.build,
        id: newId(),
        removed: false,
        revision: 0,
        changed: time,
        planned: last && keys.has(last.planKey) ? { ...last, planKey: keys.get(last.planKey)! } : null,
        jobs: jobs.flatMap((entry) => {
          const key = keys.get(entry.planKey)
          return key ? [{ ...entry, planKey: key }] : []
        }),
      }
      const whole = { ...next, job: next.jobs.some(({ id }) => id === onBench) ? onBench : null }
      for (const [old, key] of keys) await keeper.save(whole, { key, plan: opened.plans[old]! })
      if (keys.size === 0) await keeper.save(whole)
      return swap(whole)
    },
    copyBuild() {
      const old = build.peek()
      const next = { ...newBuild(newId(), choicesOf(old), now(), old.model), name: old.name && `${old.name}, copy` }
      const copy = { ...next, history: { ...next.history, now: old.history.now } }
      void keeper.save(copy)
      void swap(copy)
    },
    async setRemoved(id, removed) {
      await update(id, (old) => ({ ...old, removed }))
      if (!removed || id !== build.peek().id) return
      const other = builds.peek().find((entry) => !entry.removed)
      if (other) return swap(other)
      const next = newBuild(newId(), firstChoices(solidAtFirst), now())
      await keeper.save(next)
      return swap(next)
    },
    async forget(id) {
      if (id === build.peek().id) return
      builds.value = builds.peek().filter((entry) => entry.id !== id)
      await keeper.forget(id)
    },
    async refreshBuilds() {
      const mine = build.peek()
      const all = (await keeper.builds()).map((entry) => (entry.id === mine.id ? mine : entry))
      if (!all.some(({ id }) => id === mine.id)) all.push(mine)
      builds.value = all.sort((a, b) => b.changed - a.changed)
    },
    async heard(id, revision) {
      await workshop.refreshBuilds()
      if (id !== build.peek().id) return
      const theirs = (await keeper.builds()).find((entry) => entry.id === id)
      if (!theirs || theirs.revision < revision || theirs.revision <= build.peek().revision) return
      if (!sameChoices(choicesOf(theirs), choices.peek())) maker.stop()
      build.value = theirs
      listBuild(theirs)
      if (theirs.planned?.planKey !== planned.peek()?.key) await loadPlans()
    },
  }
  return workshop
}

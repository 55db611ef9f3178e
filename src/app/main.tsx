import { computed, effect, signal } from '@preact/signals'
import { render } from 'preact'
import { createPlanner, createPress, type SolidFacts } from '../worker'
import { keepForOffline } from './offline'
import { createRouter } from './route'
import { createWorkshop } from './state/workshop'
import { openStore } from './storage/database'
import { createKeeper } from './storage/keeper'
import './styles/index.css'
import { type AppContext, Context, nothingPointed, type Pointed } from './ui/context'
import { Frame } from './ui/Frame'
import { createPrefs } from './ui/prefs'

/** `crypto.randomUUID` is missing on pages served over plain http within a house network; this is not. */
const newId = (): string =>
  [...crypto.getRandomValues(new Uint8Array(12))].map((byte) => byte.toString(16).padStart(2, '0')).join('')

const start = async (): Promise<void> => {
  const prefs = createPrefs()
  const router = createRouter()
  const press = createPress()
  const trouble = signal<string | null>(null)
  const listed = signal<readonly SolidFacts[]>([])
  // Family by family, so that what is in sight gets its pictures in between.
  const list = async (): Promise<void> => {
    for (const family of ['uniform', 'prism', 'antiprism', 'dual', 'compound'] as const) {
      const some = await press.catalogue(family)
      if (some.ok) listed.value = [...listed.value, ...some.value]
      else trouble.value = `The list of solids could not be made: ${some.refusal.message}`
    }
  }
  void list()
  const keeper = await createKeeper(() => openStore())
  const planner = createPlanner()
  const workshop = await createWorkshop({ keeper, planner, now: Date.now, newId, rest: 350 })

  // Every model of a build can be pictured and told of; a build that is put away takes its model with it.
  const ownFacts = signal<ReadonlyMap<string, SolidFacts>>(new Map())
  const ownIds = signal<readonly string[]>([])
  const keptModels = new Set<string>()
  effect(() => {
    const inUse = new Set<string>()
    for (const { model, removed } of [workshop.build.value, ...workshop.builds.value]) {
      if (!model || removed) continue
      inUse.add(model.id)
      if (keptModels.has(model.id)) continue
      keptModels.add(model.id)
      void press.keepModel(model).then((answer) => {
        if (answer.ok) ownFacts.value = new Map(ownFacts.peek()).set(model.id, answer.value)
        else trouble.value = answer.refusal.message
      })
    }
    // The same list stays the same, so that not every change of a build lists the Shelf anew.
    if ([...inUse].join() !== ownIds.peek().join()) ownIds.value = [...inUse]
  })
  const catalogue = computed(() => [...listed.value, ...ownIds.value.flatMap((id) => ownFacts.value.get(id) ?? [])])

  const spoken = signal('')
  let timer: ReturnType<typeof setTimeout> | undefined
  const app: AppContext = {
    workshop,
    press,
    router,
    prefs,
    catalogue,
    solid: computed(() => catalogue.value.find(({ id }) => id === workshop.choices.value.solid) ?? null),
    trouble,
    reader: createPlanner(),
    pointed: signal<Pointed>(nothingPointed),
    sheetsOfBench: signal(false),
    spoken,
    announce(text) {
      clearTimeout(timer)
      timer = setTimeout(() => {
        // The same words twice are news too.
        spoken.value = spoken.peek() === text ? `${text} ` : text
      }, 250)
    },
  }

  effect(() => {
    workshop.wanted.value = router.place.value.station !== 'shelf'
  })
  // What is pointed at belongs to one station and one plan.
  const station = computed(() => router.place.value.station)
  effect(() => {
    void station.value
    void workshop.planned.value
    app.pointed.value = nothingPointed
  })

  // Another tab of this browser works on the same builds.
  const wire = 'BroadcastChannel' in globalThis ? new BroadcastChannel('facetwright') : null
  keeper.onKept = ({ id, revision }) => wire?.postMessage({ id, revision })
  wire?.addEventListener('message', ({ data }) => void workshop.heard(data.id, data.revision))

  // Asked for as soon as there is something to lose; a refusal changes nothing but that the file matters more.
  effect(() => {
    if (workshop.planned.value) void navigator.storage?.persist?.()
  })
  addEventListener('beforeunload', (event) => {
    if (keeper.state.peek().kind !== 'saved') event.preventDefault()
  })

  render(
    <Context.Provider value={app}>
      <Frame />
    </Context.Provider>,
    document.getElementById('app')!,
  )

  // Once the first picture is there: the computation's program, and all of it for days without a network.
  setTimeout(() => {
    planner.warm()
    setTimeout(() => void keepForOffline(), 2000)
  }, 500)
}

void start()

/** A page with nothing but the view, for the browser tests: they reach the view and the scenes through `window.bench`. */
import {
  createPreview,
  faceItems,
  type Pick,
  type Preview,
  type PreviewOptions,
  type SceneItem,
} from '../../src/preview'
import { seeded } from '../support/random'
import * as shapes from './shapes'

const colours = ['#d98c3f', '#4f81bd', '#9bbb59']

const scenes = {
  cube: () => shapes.cubeItems(),
  windows: () => shapes.windowItems(),
  tetrahedra: () => faceItems(shapes.twoTetrahedra, colours),
  stars: () => faceItems(shapes.smallStellatedDodecahedron, colours),
  openStars: () => faceItems(shapes.smallStellatedDodecahedron, colours, 'evenodd'),
  random: () => shapes.randomItems(40, seeded(7)),
  doubled: () => shapes.backToBack(shapes.randomItems(16, seeded(8))),
  many: () => shapes.randomItems(1700, seeded(11)),
} satisfies Record<string, () => SceneItem[]>

export interface Bench {
  view: Preview
  picks: { hit: Pick | null; event: string }[]
  frames: number
  open(scene: keyof typeof scenes, options?: Partial<PreviewOptions>): Promise<void>
}

declare global {
  interface Window {
    bench: Bench
  }
}

const bench: Bench = {
  view: undefined as unknown as Preview,
  picks: [],
  frames: 0,
  async open(scene, options = {}) {
    this.view?.dispose()
    const view = await createPreview(document.getElementById('host')!, { label: 'Model under test', ...options })
    this.view = view
    this.picks = []
    view.onPick = (hit, event) => this.picks.push({ hit, event })
    view.setScene(scenes[scene]())
    await view.settled()
  },
}
// Every picture goes through a requested frame; counting them shows whether the view rests.
const request = window.requestAnimationFrame.bind(window)
window.requestAnimationFrame = (callback) => {
  bench.frames++
  return request(callback)
}
window.bench = bench
document.documentElement.dataset.ready = 'yes'

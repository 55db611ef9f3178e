import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { dot } from '../../src/geometry/vec3'
import { Camera } from '../../src/preview/camera'
import { Stage, tonesPerItem } from '../../src/preview/stage'
import { faceItems } from '../../src/preview/thumbnail'
import type { Pick, SceneItem } from '../../src/preview/types'
import { type Lane, lanes, launch } from '../browser/chromium'
import { type Served, servePages } from '../browser/serve'
import { seeded } from '../support/random'
import type { Bench } from './page'
import { backToBack, randomItems, smallStellatedDodecahedron, windowItems } from './shapes'

declare const window: { bench: Bench }

const width = 600
const height = 480
const modeOf: Record<Lane, 'webgl' | 'canvas'> = { webgl: 'webgl', 'no-3d': 'canvas' }

let served: Served
const browsers = new Map<Lane, Browser>()
/** One page per lane for all tests: opening pages costs more than all that is tried in them. */
const pages = new Map<Lane, Page>()

beforeAll(async () => {
  served = await servePages()
  for (const lane of lanes) {
    const browser = await launch(lane)
    browsers.set(lane, browser)
    const page = await browser.newPage({ viewport: { width, height } })
    page.on('pageerror', (error) => {
      throw error
    })
    await page.goto(`${served.url}test/preview/page.html`)
    await page.waitForSelector('html[data-ready]')
    pages.set(lane, page)
  }
})

afterAll(async () => {
  for (const browser of browsers.values()) await browser.close()
  await served.close()
})

/** The lane's page with a fresh view on a scene, the pointer away from the model. */
const openScene = async (
  lane: Lane,
  scene: Parameters<Bench['open']>[0],
  options: Parameters<Bench['open']>[1] = {},
): Promise<Page> => {
  const page = pages.get(lane)!
  await page.mouse.move(2, 2)
  await page.evaluate(([name, more]) => window.bench.open(name, more), [scene, options] as const)
  return page
}

/** Picks on a grid of places; null beside the model. */
const pickGrid = (page: Page, step: number): Promise<(number | null)[]> =>
  page.evaluate(
    ([w, h, s]) => {
      const out: (number | null)[] = []
      for (let y = s / 2; y < h; y += s)
        for (let x = s / 2; x < w; x += s) out.push(window.bench.view.pickAt(x, y)?.item ?? null)
      return out
    },
    [width, height, step] as const,
  )

/** What stands on the screen, RGB by rows; read back through the page. */
const screenshot = async (page: Page): Promise<Uint8Array> => {
  await page.evaluate(() => window.bench.view.settled())
  const png = (await page.screenshot()).toString('base64')
  const rgb = await page.evaluate(async (data) => {
    const image = new Image()
    image.src = `data:image/png;base64,${data}`
    await image.decode()
    const canvas = document.createElement('canvas')
    canvas.width = image.width
    canvas.height = image.height
    const context = canvas.getContext('2d')!
    context.drawImage(image, 0, 0)
    let text = ''
    const pixels = context.getImageData(0, 0, image.width, image.height).data
    for (let i = 0; i < pixels.length; i += 4) text += String.fromCharCode(pixels[i]!, pixels[i + 1]!, pixels[i + 2]!)
    return btoa(text)
  }, png)
  return Uint8Array.from(Buffer.from(rgb, 'base64'))
}

/** Share of the values that differ by more than `by`. */
const differs = (a: Uint8Array, b: Uint8Array, by = 12): number =>
  a.reduce((sum, v, i) => (Math.abs(v - b[i]!) > by ? sum + 1 : sum), 0) / a.length

const picks = (page: Page): Promise<{ hit: Pick | null; event: string }[]> =>
  page.evaluate(() => window.bench.picks.splice(0))

const twoFrames = (page: Page): Promise<unknown> =>
  page.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))))

const scenes: [Parameters<Bench['open']>[0], SceneItem[]][] = [
  ['windows', windowItems()],
  ['openStars', faceItems(smallStellatedDodecahedron, ['#d98c3f', '#4f81bd', '#9bbb59'], 'evenodd')],
  ['random', randomItems(40, seeded(7))],
  ['doubled', backToBack(randomItems(16, seeded(8)))],
]

describe('with and without WebGL', () => {
  test.each(scenes)('the same picks, and each lane shows what it picks: %s', async (name, items) => {
    const stage = new Stage()
    stage.setScene(items)
    stage.update()
    const camera = new Camera()
    camera.resize(width, height)
    const tones = stage.tones(camera.rotation)
    const grids: (number | null)[][] = []
    for (const lane of lanes) {
      const page = await openScene(lane, name)
      expect(await page.evaluate(() => window.bench.view.mode)).toBe(modeOf[lane])
      const grid = await pickGrid(page, 4)
      grids.push(grid)

      const rgb = await screenshot(page)
      const columns = width / 4
      let inside = 0
      let beside = 0
      let strays = 0
      for (let row = 1; row < height / 4 - 1; row++)
        for (let column = 1; column < columns - 1; column++) {
          const at = row * columns + column
          const around = [at, at - 1, at + 1, at - columns, at + columns].map((k) => grid[k])
          // Away from edges, where lines and smoothing are.
          if (new Set(around).size > 1) continue
          const pixel = 3 * ((4 * row + 2) * width + 4 * column + 2)
          const colour = [...rgb.subarray(pixel, pixel + 3)]
          const item = stage.model.indexOf.get(around[0] ?? -1)
          let wanted = [0xf6, 0xf4, 0xf0]
          if (item !== undefined) {
            const isInside = dot(camera.ray(4 * column + 2, 4 * row + 2).direction, items[item]!.normal) > 0
            const tone = 4 * (tonesPerItem * item + (isInside ? 1 : 0))
            wanted = [...tones.subarray(tone, tone + 3)]
          }
          const off = Math.max(...wanted.map((v, k) => Math.abs(v - colour[k]!)))
          // A line or a thin thing between two places of the grid may still lie here; counted instead of failing.
          if (off > 3) strays++
          else if (item === undefined) beside++
          else inside++
        }
      expect(inside).toBeGreaterThan(1500)
      expect(beside).toBeGreaterThan(1500)
      expect(strays).toBeLessThan(0.005 * (inside + beside))
    }
    expect(grids[0]!.filter((id) => id !== null).length).toBeGreaterThan(1500)
    expect(grids[1]).toEqual(grids[0])
  })

  test('marks, hatch, ghosts and hidden lines look the same', async () => {
    const shots: Uint8Array[] = []
    for (const lane of lanes) {
      const page = await openScene(lane, 'windows')
      const bare = await screenshot(page)
      await page.evaluate(() => {
        const { view } = window.bench
        view.setGhost(new Set([2]))
        view.setLit([{ items: new Set([0, 5]), label: 'A 7' }])
        view.setSeams([
          {
            id: 1,
            ends: [
              [-1, -1, -1],
              [-1, -1, 1],
            ],
          },
          {
            id: 2,
            ends: [
              [-1, 1, 1],
              [1, 1, 1],
            ],
            strong: true,
            label: '12',
          },
        ])
      })
      const marked = await screenshot(page)
      expect(differs(bare, marked, 40)).toBeGreaterThan(0.04)
      shots.push(marked)
    }
    // Smoothing differs along the lines, nothing else.
    expect(differs(shots[0]!, shots[1]!, 60)).toBeLessThan(0.003)
  })

  test.each(lanes)('%s: what is lit on the far side shows through as dashes', async (lane) => {
    const page = await openScene(lane, 'cube')
    const bare = await screenshot(page)
    // Side −x, at the back from the first direction.
    expect((await pickGrid(page, 10)).includes(1)).toBe(false)
    await page.evaluate(() => window.bench.view.setLit({ items: new Set([1]) }))
    const lit = await screenshot(page)
    const changed: number[] = []
    for (let i = 0; i < bare.length; i += 3) if (Math.abs(bare[i]! - lit[i]!) > 25) changed.push(i / 3)
    // Dashed lines across the sides in front: more than the stretch on the silhouette alone.
    const rows = new Set(changed.map((at) => Math.floor(at / width)))
    const columns = new Set(changed.map((at) => at % width))
    expect(changed.length).toBeGreaterThan(300)
    const inMiddle = changed.filter((at) => Math.hypot((at % width) - 300, Math.floor(at / width) - 240) < 110)
    expect(inMiddle.length).toBeGreaterThan(60)
    expect(rows.size).toBeGreaterThan(100)
    expect(columns.size).toBeGreaterThan(50)
  })

  test.each(lanes)('%s: ghosts, light, pulling apart and hidden kinds draw and pick alike', async (lane) => {
    const page = await openScene(lane, 'cube')
    const before = await screenshot(page)
    await page.evaluate(() => window.bench.view.setLit({ items: new Set([0, 1, 2, 3, 4, 5]) }))
    const lit = await screenshot(page)
    expect(differs(before, lit)).toBeGreaterThan(0.05)
    await page.evaluate(() => {
      window.bench.view.setLit(null)
      window.bench.view.setGhost(new Set([0, 1, 2, 3, 4, 5]))
    })
    const ghost = await screenshot(page)
    expect(differs(before, ghost)).toBeGreaterThan(0.1)
    expect((await pickGrid(page, 20)).every((id) => id === null)).toBe(true)
    await page.evaluate(() => {
      window.bench.view.setGhost(null)
      window.bench.view.setVisibleKinds(new Set(['x']))
      window.bench.view.setExplode(0.5)
    })
    expect(new Set(await pickGrid(page, 10))).toEqual(new Set([null, 0, 1]))
    await page.evaluate(() => {
      window.bench.view.setVisibleKinds(null)
      window.bench.view.setExplode(0)
    })
    expect(differs(before, await screenshot(page))).toBeLessThan(0.001)
  })
})

describe.each(lanes)('%s: pointer, touch and keys', (lane) => {
  test('hover, click, drag, shift, wheel', async () => {
    const page = await openScene(lane, 'cube')
    await page.evaluate(() => window.bench.view.lookAt([0, 0, 1], 0))
    await page.mouse.move(300, 240)
    await twoFrames(page)
    await page.mouse.click(300, 240)
    await page.mouse.move(5, 5)
    await twoFrames(page)
    expect(await picks(page)).toEqual([
      { hit: { item: 4, group: 2 }, event: 'hover' },
      { hit: { item: 4, group: 2 }, event: 'click' },
      { hit: null, event: 'hover' },
    ])
    await page.mouse.click(5, 5)
    expect(await picks(page)).toEqual([{ hit: null, event: 'click' }])

    // A drag turns and is no click: far enough to the right to bring the left side, −x, to the front.
    await page.mouse.move(200, 240)
    await twoFrames(page)
    await page.mouse.down()
    for (let x = 200; x <= 440; x += 20) await page.mouse.move(x, 240)
    await page.mouse.up()
    await page.evaluate(() => window.bench.view.settled())
    expect((await picks(page)).filter((p) => p.event === 'click')).toEqual([])
    expect(await page.evaluate(() => window.bench.view.pickAt(300, 240)?.item)).toBe(1)

    // With Shift the picture moves instead.
    const middle = (): Promise<{ x: number; y: number }> => page.evaluate(() => window.bench.view.project([0, 0, 0]))
    const start = await middle()
    await page.keyboard.down('Shift')
    await page.mouse.down()
    for (let x = 440; x >= 400; x -= 10) await page.mouse.move(x, 240 + (440 - x) / 2)
    await page.mouse.up()
    await page.keyboard.up('Shift')
    const end = await middle()
    // The first few pixels are still a click.
    expect(end.x - start.x).toBeLessThan(-25)
    expect(end.x - start.x).toBeGreaterThanOrEqual(-40.001)
    expect(end.y - start.y).toBeGreaterThan(12)
    await page.evaluate(() => window.bench.view.resetView())

    const size = async (): Promise<number> => (await pickGrid(page, 10)).filter((id) => id !== null).length
    const before = await size()
    await page.mouse.move(300, 240)
    await page.mouse.wheel(0, -300)
    await page.evaluate(() => window.bench.view.settled())
    expect(await size()).toBeGreaterThan(1.2 * before)
  })

  test('keys turn, zoom, reset and pick; what comes under the middle mark is told', async () => {
    const page = await openScene(lane, 'cube')
    await page.evaluate(() => window.bench.view.lookAt([0, 0, 1], 0))
    const view = page.getByRole('application', { name: 'Model under test' })
    await page.keyboard.press('Tab')
    expect(await view.evaluate((node) => node === document.activeElement)).toBe(true)
    await twoFrames(page)
    await page.keyboard.press('Enter')
    expect(await picks(page)).toEqual([
      { hit: { item: 4, group: 2 }, event: 'hover' },
      { hit: { item: 4, group: 2 }, event: 'click' },
    ])
    for (let i = 0; i < 12; i++) await page.keyboard.press('ArrowRight')
    await twoFrames(page)
    expect(await picks(page)).toEqual([{ hit: { item: 1, group: 0 }, event: 'hover' }])
    const size = async (): Promise<number> => (await pickGrid(page, 10)).filter((id) => id !== null).length
    const before = await size()
    await page.keyboard.press('+')
    expect(await size()).toBeGreaterThan(1.2 * before)
    await page.keyboard.press('-')
    expect(await size()).toBe(before)
    const grid = await pickGrid(page, 20)
    await page.keyboard.press('Home')
    expect(await pickGrid(page, 20)).not.toEqual(grid)
  })

  test('one finger turns, two fingers zoom, a tap picks', async () => {
    const page = await openScene(lane, 'cube')
    await page.evaluate(() => window.bench.view.lookAt([0, 0, 1], 0))
    const session = await page.context().newCDPSession(page)
    const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', ...points: [number, number][]): Promise<unknown> =>
      session.send('Input.dispatchTouchEvent', { type, touchPoints: points.map(([x, y], id) => ({ x, y, id })) })
    await touch('touchStart', [300, 240])
    await touch('touchEnd')
    expect((await picks(page)).filter((p) => p.event === 'click')).toEqual([
      { hit: { item: 4, group: 2 }, event: 'click' },
    ])
    await touch('touchStart', [200, 240])
    for (let x = 200; x <= 440; x += 20) await touch('touchMove', [x, 240])
    await touch('touchEnd')
    expect(await page.evaluate(() => window.bench.view.pickAt(300, 240)?.item)).toBe(1)
    const size = async (): Promise<number> => (await pickGrid(page, 10)).filter((id) => id !== null).length
    const before = await size()
    await touch('touchStart', [280, 240], [320, 240])
    for (let d = 20; d <= 40; d += 5) await touch('touchMove', [300 - d, 240], [300 + d, 240])
    await touch('touchEnd')
    expect(await size()).toBeGreaterThan(2 * before)
    expect((await picks(page)).filter((p) => p.event === 'click')).toEqual([])
  })

  test('looks where it is told to: at once with reduced motion, else by and by', async () => {
    for (const reducedMotion of ['reduce', 'no-preference'] as const) {
      const page = await openScene(lane, 'cube')
      await page.emulateMedia({ reducedMotion })
      for (const [item, direction] of [
        [0, [1, 0, 0]],
        [1, [-1, 0, 0]],
        [5, [0, 0, -1]],
        [3, [0, -1, 0]],
      ] as const) {
        const atOnce = await page.evaluate((d) => {
          window.bench.view.lookAt(d, 200)
          return window.bench.view.pickAt(300, 240)?.item
        }, direction as never)
        if (reducedMotion === 'reduce') expect(atOnce).toBe(item)
        await page.evaluate(() => window.bench.view.settled())
        expect(await page.evaluate(() => window.bench.view.pickAt(300, 240)?.item)).toBe(item)
      }
    }
  })

  test('rests when nothing changes, follows its host in size, and leaves nothing behind', async () => {
    const page = await openScene(lane, 'stars')
    await page.evaluate(() => window.bench.view.orbitBy(20, 10))
    await page.evaluate(() => window.bench.view.settled())
    const frames = await page.evaluate(async () => {
      const before = window.bench.frames
      await new Promise((done) => setTimeout(done, 500))
      return window.bench.frames - before
    })
    expect(frames).toBe(0)
    await page.evaluate(() => {
      document.getElementById('host')!.style.width = '300px'
    })
    await twoFrames(page)
    await page.evaluate(() => window.bench.view.settled())
    const box = await page.evaluate(() => {
      const { x, y } = window.bench.view.project([0, 0, 0])
      return { x, y, picked: window.bench.view.pickAt(150, 240) !== null, beyond: window.bench.view.pickAt(400, 240) }
    })
    expect(box).toEqual({ x: expect.closeTo(150, 6), y: expect.closeTo(240, 6), picked: true, beyond: null })
    const left = await page.evaluate(() => {
      window.bench.view.dispose()
      const host = document.getElementById('host')!
      host.removeAttribute('style')
      return host.childElementCount
    })
    expect(left).toBe(0)
  })
})

test('when the browser takes the WebGL context away, the z-buffer goes on with the same picture and picks', async () => {
  const page = await openScene('webgl', 'windows')
  const before = await pickGrid(page, 10)
  const picture = await screenshot(page)
  await page.focus('[role=application]')
  await page.evaluate(async () => {
    const context = document.querySelector('canvas')!.getContext('webgl2')!
    context.getExtension('WEBGL_lose_context')!.loseContext()
    await new Promise((done) => setTimeout(done, 100))
    await window.bench.view.settled()
  })
  expect(await page.evaluate(() => window.bench.view.mode)).toBe('canvas')
  expect(await page.evaluate(() => document.activeElement?.getAttribute('role'))).toBe('application')
  expect(await page.locator('canvas').count()).toBe(1)
  expect(await pickGrid(page, 10)).toEqual(before)
  await page.evaluate(() => (document.activeElement as HTMLElement).blur())
  await twoFrames(page)
  const after = await screenshot(page)
  expect(differs(picture, after, 60)).toBeLessThan(0.003)
})

test('moving the pointer over the model paints nothing; lighting paints once', async () => {
  const page = await openScene('no-3d', 'random')
  await page.evaluate(() => {
    const { prototype } = CanvasRenderingContext2D
    const put = prototype.putImageData as (image: ImageData, x: number, y: number) => void
    Object.assign(window, { painted: 0 })
    prototype.putImageData = function (this: CanvasRenderingContext2D, image: ImageData, x: number, y: number) {
      ;(window as unknown as { painted: number }).painted++
      put.call(this, image, x, y)
    }
  })
  const painted = (): Promise<number> => page.evaluate(() => (window as unknown as { painted: number }).painted)
  for (let x = 150; x < 450; x += 10) await page.mouse.move(x, 240)
  await page.mouse.down()
  await page.mouse.up()
  await twoFrames(page)
  expect((await picks(page)).filter((p) => p.event === 'hover').length).toBeGreaterThan(3)
  expect(await painted()).toBe(0)
  await page.evaluate(() => {
    window.bench.view.setLit({ groups: new Set([1]) })
    window.bench.view.setSeams([])
    return window.bench.view.settled()
  })
  expect(await painted()).toBe(1)
})

test('mode "canvas" never asks for WebGL, and a view that is not interactive is an image', async () => {
  const page = await openScene('webgl', 'cube', { mode: 'canvas', interactive: false, direction: [0, 0, 1] })
  const seen = await page.evaluate(() => {
    const { view } = window.bench
    return { mode: view.mode, role: view.element.getAttribute('role'), tab: view.element.tabIndex }
  })
  expect(seen).toEqual({ mode: 'canvas', role: 'img', tab: -1 })
  await page.mouse.move(300, 240)
  await page.mouse.down()
  for (let x = 300; x <= 500; x += 20) await page.mouse.move(x, 240)
  await page.mouse.up()
  expect(await page.evaluate(() => window.bench.view.pickAt(300, 240)?.item)).toBe(4)
  await page.mouse.click(300, 240)
  expect((await picks(page)).filter((p) => p.event === 'click')).toEqual([
    { hit: { item: 4, group: 2 }, event: 'click' },
  ])
})

test('the view passes an accessibility check in both forms', async () => {
  for (const interactive of [true, false]) {
    const page = await openScene('no-3d', 'cube', { interactive })
    await page.addScriptTag({ path: 'node_modules/axe-core/axe.min.js' })
    const violations = await page.evaluate(async () => {
      const { axe } = window as unknown as { axe: { run(node: string): Promise<{ violations: { id: string }[] }> } }
      return (await axe.run('#host')).violations.map((v) => v.id)
    })
    expect(violations).toEqual([])
  }
})

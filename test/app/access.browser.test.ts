/** Every station for everybody: axe in light and dark, a phone's width, the keyboard alone. */

import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import type { AxeResults } from 'axe-core'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { launch } from '../browser/chromium'
import { type Served, serveApp } from '../browser/serve'
import { pyramid } from './models'
import { goTo, noComplaints, openApp, pageDrawn, planReady, takeToBoard } from './open-app'

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')
let browser: Browser
let served: Served
beforeAll(async () => {
  served = await serveApp()
  browser = await launch('webgl')
})
afterAll(async () => {
  await browser?.close()
  await served?.close()
})

/** One line per finding: rule, and where. */
const findings = async (page: Page): Promise<string[]> => {
  if (!(await page.evaluate(() => 'axe' in globalThis))) await page.addScriptTag({ content: axe })
  const results = (await page.evaluate(() =>
    (globalThis as unknown as { axe: { run(): Promise<unknown> } }).axe.run(),
  )) as AxeResults
  expect(results.passes.length).toBeGreaterThan(10)
  return results.violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.target.join(' ')}`))
}

const sideways = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)

const stations = ['Shelf', 'Board', 'Sheets', 'Bench'] as const

describe.each([
  ['desktop, light', 'light', { width: 1440, height: 900 }],
  ['phone, dark', 'dark', { width: 390, height: 844 }],
] as const)('%s', (_, colorScheme, viewport) => {
  test('axe finds nothing on any station nor in the windows, and nothing sticks out sideways', async () => {
    const { context, page, complaints } = await openApp(browser, served.url, 'webgl', { colorScheme, viewport })
    const found: string[] = []
    const check = async (where: string): Promise<void> => {
      for (const each of await findings(page)) found.push(`${where}: ${each}`)
      expect(await sideways(page), where).toBe(0)
    }
    await takeToBoard(page, 'small stellated dodecahedron')
    await planReady(page)
    for (const station of stations) {
      await goTo(page, station)
      if (station === 'Sheets') await pageDrawn(page)
      if (station === 'Bench') {
        await page.getByRole('button', { name: 'Glued', exact: true }).click()
        await page.locator('.bench[data-glued="1"]').waitFor()
      }
      await check(station)
      // The other theme too, by the switch.
      await page.getByRole('button', { name: /Change to (light|dark)/ }).click()
      await check(`${station}, switched`)
      await page.getByRole('button', { name: /Change to (light|dark)/ }).click()
    }
    if (viewport.width < 1000) {
      await page.locator('.docket-line').click()
      await check('docket')
      await page.locator('.docket-line').click()
    }
    await page.getByRole('button', { name: 'Help' }).click()
    await check('help')
    await page.keyboard.press('Escape')
    await page.locator('.build-name').click()
    await check('builds')
    await page.keyboard.press('Escape')
    for (const [name, text, sign] of [
      ['roof.obj', pyramid, '6 faces, 5 vertices'],
      ['open.obj', pyramid.replace('f 1 4 3\n', ''), 'Nothing has been changed.'],
    ] as const) {
      await goTo(page, 'Shelf')
      await page.getByTestId('open-model').setInputFiles({ name, mimeType: '', buffer: Buffer.from(text) })
      await page.locator('dialog').getByText(sign).waitFor()
      await check(name)
      await page.keyboard.press('Escape')
    }
    expect(found).toEqual([])
    noComplaints(complaints)
    await context.close()
  })
})

test('the whole way by keyboard alone', async () => {
  const { context, page, complaints } = await openApp(browser, served.url)
  const { keyboard } = page
  /** Tabs until the focus is on something with this name. */
  const tabTo = async (name: RegExp): Promise<void> => {
    for (let i = 0; i < 200; i++) {
      await keyboard.press('Tab')
      const on = await page.evaluate(() => {
        const node = document.activeElement as HTMLElement | null
        const label = node instanceof HTMLInputElement ? (node.labels?.[0]?.textContent ?? '') : ''
        return `${node?.getAttribute('aria-label') ?? ''} ${node?.textContent ?? ''} ${label}`
      })
      if (!name.test(on)) continue
      const outline = await page.evaluate(() => getComputedStyle(document.activeElement!).outlineStyle)
      expect(outline, `focus on ${name} must be seen`).not.toBe('none')
      return
    }
    throw new Error(`the keyboard does not reach ${name}`)
  }
  await page.locator('[data-solid=tetrahedron]').waitFor()
  await tabTo(/^ ?To the station/)
  await keyboard.press('Enter')
  await tabTo(/Find by name/)
  await keyboard.type('cube')
  await page.locator('[data-solid=cube]').waitFor()
  await tabTo(/Cube.*No\. 6/)
  await keyboard.press('Enter')
  await tabTo(/Take to the Board/)
  await keyboard.press('Enter')
  await page.locator('main[data-station=board]').waitFor()
  await tabTo(/Height, across/)
  await keyboard.press('Control+a')
  await keyboard.type('90')
  await keyboard.press('Enter')
  await planReady(page)
  await tabTo(/^ ?To the Sheets|Advanced/)
  await page.evaluate(() => (document.activeElement as HTMLElement).blur())
  await keyboard.press('3')
  await page.locator('main[data-station=sheets]').waitFor()
  await pageDrawn(page)
  await tabTo(/arrows turn pages/)
  await keyboard.press('ArrowRight')
  await page.locator('[data-testid=page][data-page="2"]').waitFor()
  await keyboard.press('Home')
  await page.locator('[data-testid=page][data-page="1"]').waitFor()
  await keyboard.press('4')
  await page.locator('main[data-station=bench]').waitFor()
  await tabTo(/^ ?Glued/)
  await keyboard.press('Enter')
  await page.locator('.bench[data-glued="1"]').waitFor()
  await keyboard.press('Control+z')
  await page.locator('.bench[data-glued="0"]').waitFor()
  await tabTo(/All pieces in gluing order/)
  await keyboard.press('End')
  noComplaints(complaints)
  await context.close()
})

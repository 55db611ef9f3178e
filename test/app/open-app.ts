/** What the browser tests of the app share. */
import type { Browser, BrowserContext, BrowserContextOptions, Page } from 'playwright-core'
import { expect } from 'vitest'
import type { Lane } from '../browser/chromium'

export interface OpenedPage {
  readonly page: Page
  /** What the page complained about: uncaught errors, console errors, requests to elsewhere. */
  readonly complaints: string[]
}

/** In the lane with WebGL the app is told to use it, since it would not choose a software one by itself. */
const prepare = (lane: Lane): string =>
  lane === 'webgl' ? `try { localStorage.setItem('facetwright.view', 'webgl') } catch {}` : ''

export const watch = async (context: BrowserContext, url: string, lane: Lane): Promise<OpenedPage> => {
  const complaints: string[] = []
  await context.addInitScript(prepare(lane))
  const page = context.pages()[0] ?? (await context.newPage())
  page.setDefaultTimeout(60_000)
  page.on('pageerror', (error) => complaints.push(`error: ${error.message}`))
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(`console: ${message.text()}`)
  })
  page.on('request', (request) => {
    const there = request.url()
    if (!there.startsWith(url) && !/^(blob|data):/.test(there)) complaints.push(`request: ${there}`)
  })
  await page.goto(url)
  return { page, complaints }
}

export const openApp = async (
  browser: Browser,
  url: string,
  lane: Lane = 'webgl',
  options: BrowserContextOptions = {},
): Promise<OpenedPage & { readonly context: BrowserContext }> => {
  const context = await browser.newContext({
    viewport: { width: 1440, height: 900 },
    acceptDownloads: true,
    ...options,
  })
  return { context, ...(await watch(context, url, lane)) }
}

/** Finds a solid by its name on the Shelf and takes it to the Board. */
export const takeToBoard = async (page: Page, name: string): Promise<void> => {
  await page.getByRole('searchbox').fill(name)
  await page.locator(`[data-solid="${name.replace(/[^a-z0-9]+/g, '-')}"]`).click()
  await page
    .locator('[data-looked]')
    .getByRole('button', { name: /to the Board/i })
    .click()
  await page.locator('main[data-station=board]').waitFor()
}

/** Waits until the docket belongs to the present choices. */
export const planReady = async (page: Page): Promise<void> => {
  await page.locator('.docket:not(.old) .fact').first().waitFor({ state: 'attached', timeout: 120_000 })
  await page.locator('.plan-bar.busy').waitFor({ state: 'detached' })
}

export const setHeight = async (page: Page, height: string): Promise<void> => {
  const field = page.getByLabel('Height, across the vertices')
  await field.fill(height)
  await field.press('Enter')
}

export const goTo = async (page: Page, station: 'Shelf' | 'Board' | 'Sheets' | 'Bench'): Promise<void> => {
  await page.getByRole('navigation', { name: 'Stations' }).getByRole('link', { name: station }).click()
  await page.locator(`main[data-station=${station.toLowerCase()}]`).waitFor()
}

/** A page of the Sheets is drawn. */
export const pageDrawn = async (page: Page, number?: number): Promise<void> => {
  const which = number === undefined ? '' : `[data-page="${number}"]`
  await page.locator(`[data-testid=page]${which} svg`).waitFor()
}

/** Label of the piece that is lit on the sheet, read off the printed page itself; '' for none. */
export const litOnSheet = (page: Page): Promise<string> =>
  page.evaluate(() => document.querySelector('[data-testid=page] .lit [data-role=pieceLabel]')?.textContent ?? '')

/** What the label in the 3D view says, e.g. `piece 4 left`; '' for none. */
export const litOnModel = (page: Page): Promise<string> =>
  page.evaluate(
    () =>
      [...document.querySelectorAll('[data-testid=model] [aria-hidden=true]')]
        .map((node) => node.textContent ?? '')
        .find((text) => text.startsWith('piece ')) ?? '',
  )

export const noComplaints = (complaints: readonly string[]): void => expect(complaints).toEqual([])

/** The builder's whole way in a real browser, with WebGL and on a machine without any 3D. */
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { lanes, launchKept } from '../browser/chromium'
import { type Served, serveApp } from '../browser/serve'
import {
  goTo,
  litOnModel,
  litOnSheet,
  noComplaints,
  pageDrawn,
  planReady,
  setHeight,
  takeToBoard,
  watch,
} from './open-app'
import { readPdf } from './pdf'

let served: Served
beforeAll(async () => {
  served = await serveApp()
})
afterAll(() => served?.close())

const ptPerMm = 72 / 25.4

describe.each(lanes)('lane %s', (lane) => {
  const folder = mkdtempSync(join(tmpdir(), 'facetwright-journey-'))
  let context: BrowserContext
  let page: Page
  let complaints: string[]
  const open = async (): Promise<void> => {
    context = await launchKept(lane, folder)
    const opened = await watch(context, served.url, lane)
    page = opened.page
    complaints = opened.complaints
    await page.setViewportSize({ width: 1440, height: 900 })
  }
  beforeAll(open)
  afterAll(async () => {
    await context?.close()
    rmSync(folder, { recursive: true, force: true })
  })

  test('pick a solid, set the height, and the plan is there', async () => {
    await takeToBoard(page, 'great icosahedron')
    await setHeight(page, '9')
    await expect.poll(() => page.locator('.field b.error').textContent()).toMatch(/10 to 2000 mm/)
    await setHeight(page, '200')
    await planReady(page)
    expect(await page.locator('[data-fact=checks] .value').textContent()).toMatch(/^(\d+) of \1 ok$/)
    expect(await page.locator('[data-testid=model]').getAttribute('data-mode')).toBe(
      lane === 'webgl' ? 'webgl' : 'canvas',
    )
  })

  test('the PDF has the size, the check bars and the labels', async () => {
    await goTo(page, 'Sheets')
    await pageDrawn(page)
    const [file] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Download PDF' }).click(),
    ])
    expect(file.suggestedFilename()).toBe('great-icosahedron-sheets.pdf')
    const path = join(folder, 'sheets.pdf')
    await file.saveAs(path)
    const pages = await readPdf(path)
    const sheets = Number.parseInt((await page.locator('[data-fact=sheets] .value').textContent()) ?? '', 10)
    const pieces = Number.parseInt((await page.locator('[data-fact=pieces] .value').textContent()) ?? '', 10)
    expect(pages.length).toBeGreaterThanOrEqual(sheets + 1)
    for (const { widthPt, heightPt } of pages) {
      expect(widthPt / ptPerMm).toBeCloseTo(210, 2)
      expect(heightPt / ptPerMm).toBeCloseTo(297, 2)
    }
    const cut = pages.slice(-sheets)
    const labels = new Set<string>()
    for (const [i, { texts, lines }] of cut.entries()) {
      const bars = lines.map(([x0, y0, x1, y1]) => [Math.abs(x1 - x0) / ptPerMm, Math.abs(y1 - y0) / ptPerMm])
      expect(
        bars.some(([w, h]) => w!.toFixed(2) === '100.00' && h === 0),
        `bar across, sheet ${i + 1}`,
      ).toBe(true)
      expect(
        bars.some(([w, h]) => h!.toFixed(2) === '100.00' && w === 0),
        `bar upright, sheet ${i + 1}`,
      ).toBe(true)
      expect(texts.join(' ')).toMatch(new RegExp(`sheet ${i + 1} of ${sheets}`, 'i'))
      for (const text of texts) if (/^\d+( left| right)?$/.test(text)) labels.add(text)
    }
    expect(labels.size).toBe(pieces)
    expect(pages[0]!.texts.join(' ')).toMatch(/great icosahedron/i)
  })

  test('what is pointed at on the sheet is lit in 3D', async () => {
    await page.getByRole('button', { name: /^Page 2:/ }).click()
    await pageDrawn(page, 2)
    const piece = page.locator('[data-testid=page] [data-piece]').first()
    const label = await piece.locator('[data-role=pieceLabel]').first().textContent()
    await piece.locator('[data-role=pieceLabel]').first().hover()
    await expect.poll(() => litOnSheet(page)).toBe(label)
    await expect.poll(() => litOnModel(page)).toBe(`piece ${label}`)
    await page.mouse.move(5, 5)
    await expect.poll(() => litOnModel(page)).toBe('')
    expect(await litOnSheet(page)).toBe('')
  })

  test('what is pointed at in 3D is lit on its sheet, which is turned to', async () => {
    const model = page.locator('[data-testid=model]')
    const box = (await model.boundingBox())!
    const seen = new Set<string>()
    for (const [u, v] of [
      [0.5, 0.5],
      [0.4, 0.42],
      [0.6, 0.58],
    ] as const) {
      await page.mouse.click(box.x + u * box.width, box.y + v * box.height)
      await expect.poll(() => litOnModel(page)).toMatch(/^piece \d+/)
      const label = (await litOnModel(page)).replace('piece ', '')
      await expect.poll(() => litOnSheet(page)).toBe(label)
      seen.add(label)
      await page.mouse.move(5, 5)
      // Else the next round would take this label for its own.
      await expect.poll(() => litOnModel(page)).toBe('')
    }
    expect(seen.size).toBeGreaterThan(0)
    // The keyboard's way: the panel under the middle mark.
    await model.locator('[role=application]').focus()
    await page.keyboard.press('Enter')
    await expect.poll(() => litOnSheet(page)).not.toBe('')
    await expect.poll(() => page.getByTestId('spoken').textContent()).toMatch(/Piece \d+.*page \d+/)
  })

  test('three pieces glued are still glued after reload and after closing the browser', async () => {
    await goTo(page, 'Bench')
    for (let i = 1; i <= 3; i++) {
      await page.getByRole('button', { name: 'Glued', exact: true }).click()
      await page.locator(`.bench[data-glued="${i}"]`).waitFor()
    }
    const next = await page.getByTestId('sentence').textContent()
    expect(next).toMatch(/^Take piece 4/)
    await expect.poll(() => page.locator('.save-state').textContent()).toBe('Saved here')
    await page.reload()
    await page.locator('.bench[data-glued="3"]').waitFor()
    expect(await page.getByTestId('sentence').textContent()).toBe(next)
    noComplaints(complaints)

    await context.close()
    await open()
    await goTo(page, 'Bench')
    await page.locator('.bench[data-glued="3"]').waitFor()
    expect(await page.getByTestId('sentence').textContent()).toBe(next)
  })

  test('the Board may go on; the model on the Bench stays as it was begun', async () => {
    await goTo(page, 'Board')
    await setHeight(page, '120')
    await planReady(page)
    await goTo(page, 'Bench')
    await page.locator('.bench[data-glued="3"]').waitFor()
    expect(await page.locator('.others').textContent()).toMatch(/On the Bench: 200 mm/)
    await page.keyboard.press('g')
    await page.locator('.bench[data-glued="4"]').waitFor()
    await page.keyboard.press('Control+z')
    await page.locator('.bench[data-glued="3"]').waitFor()
    noComplaints(complaints)
  })
})

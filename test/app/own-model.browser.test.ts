/** A builder's own model, from the file to the Bench and back from the store; and what is wrong with a file. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { launch } from '../browser/chromium'
import { serveApp } from '../browser/serve'
import { pyramid } from './models'
import { goTo, noComplaints, openApp, planReady, takeToBoard } from './open-app'

const folder = mkdtempSync(join(tmpdir(), 'facetwright-own-'))
const fileOf = (name: string, text: string): string => {
  const path = join(folder, name)
  writeFileSync(path, text)
  return path
}
let browser: Browser
let app: Awaited<ReturnType<typeof serveApp>>
beforeAll(async () => {
  app = await serveApp()
  browser = await launch('no-3d')
})
afterAll(async () => {
  await browser?.close()
  await app?.close()
  rmSync(folder, { recursive: true, force: true })
})

test('picked, sized by its unit, planned, still there after a reload, and saved with its build', async () => {
  const { context, page, complaints } = await openApp(browser, app.url, 'no-3d')
  await page.getByTestId('open-model').setInputFiles(fileOf('roof.obj', pyramid))
  const dialog = page.locator('dialog')
  await dialog.getByText('6 faces, 5 vertices').waitFor()
  await dialog.getByRole('radio', { name: 'as it is in the file' }).check()
  await dialog.getByRole('combobox').selectOption('in')
  // The base's corners and the tip lie on a sphere: its radius is 2 / (2 · 1.5) + 1.5 / 2 = 17/12 in, so 71.97 mm across.
  await dialog.getByText('Then it is 72 mm high.').waitFor()
  await dialog.getByRole('button', { name: 'Take to the Board' }).click()
  await page.locator('main[data-station=board]').waitFor()
  await planReady(page)
  expect(await page.locator('.build-name').textContent()).toContain('roof')
  await goTo(page, 'Bench')
  await page.getByRole('button', { name: 'Glued', exact: true }).click()
  await page.locator('.bench[data-glued="1"]').waitFor()
  await page.locator('.save-state', { hasText: 'Saved here' }).waitFor()
  await page.reload()
  await page.locator('.bench[data-glued="1"]').waitFor()
  expect(await page.locator('.build-name').textContent()).toContain('roof')

  // Another size can still be planned: the model itself was kept.
  await goTo(page, 'Board')
  await page.getByLabel('Height, across the vertices').fill('150')
  await page.getByLabel('Height, across the vertices').press('Enter')
  await planReady(page)

  // The build's file holds it, and is opened by dropping it on the page.
  await page.locator('.build-name').click()
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Save this build to a file' }).click(),
  ])
  const saved = join(folder, 'saved-build.json')
  await file.saveAs(saved)
  const text = readFileSync(saved, 'utf8')
  expect(JSON.parse(text).build.model.vertices.length).toBe(5)
  await context.close()

  const other = await openApp(browser, app.url, 'no-3d')
  // Without the model, with another shape in its place, far too large: refused, and nothing is opened by half.
  const changed = (change: (file: { build: { model?: { vertices: number[][] } }; plans: object }) => void): string => {
    const file = JSON.parse(text)
    change(file)
    return JSON.stringify(file)
  }
  const bare = changed((file) => {
    delete file.build.model
    file.plans = {}
  })
  const turned = changed(({ build: { model } }) => {
    for (const p of model!.vertices) p.push(p.shift()!)
  })
  for (const [name, content, why] of [
    ['bare.json', bare, /bare\.json is about a model from a file and does not hold the model/],
    ['turned.json', turned, /turned\.json: .*its shape has been changed/],
  ] as const) {
    await drop(other.page, name, content)
    await other.page.getByRole('alert').filter({ hasText: why }).waitFor()
  }
  await dropHuge(other.page, 'huge.json')
  await other.page
    .getByRole('alert')
    .filter({ hasText: /huge\.json has 2147 MB/ })
    .waitFor()
  expect(await other.page.locator('.build-name').textContent()).toMatch(/great.icosahedron/)
  await drop(other.page, 'saved-build.json', text)
  await other.page.locator('.build-name', { hasText: 'roof' }).waitFor()
  await goTo(other.page, 'Board')
  await planReady(other.page)
  await other.context.close()
  noComplaints(complaints)
  noComplaints(other.complaints)
})

/** Drops a file in the middle of the page. */
const drop = async (page: Page, name: string, text: string): Promise<void> => {
  await page.locator('main').waitFor()
  await page.evaluate(
    ([fileName, content]) => {
      const data = new DataTransfer()
      data.items.add(new File([content], fileName))
      const target = document.querySelector('main')!
      for (const type of ['dragover', 'drop'])
        target.dispatchEvent(new DragEvent(type, { bubbles: true, cancelable: true, dataTransfer: data }))
    },
    [name, text] as const,
  )
}

/** Drops a file of two gigabytes, which complains when it is read: it must be refused by its size. */
const dropHuge = (page: Page, name: string): Promise<void> =>
  page.evaluate((fileName) => {
    const huge = new File(['v 0 0 0'], fileName)
    Object.defineProperty(huge, 'size', { value: 2 ** 31 })
    for (const way of ['arrayBuffer', 'text'])
      Object.defineProperty(huge, way, { value: () => Promise.reject(new Error('read all the same')) })
    const event = new Event('drop', { bubbles: true, cancelable: true })
    Object.defineProperty(event, 'dataTransfer', { value: { types: ['Files'], files: [huge] } })
    document.querySelector('main')!.dispatchEvent(event)
  }, name)

test('what is wrong with a file is said with its place, and nothing is lost', async () => {
  const { context, page, complaints } = await openApp(browser, app.url, 'no-3d')
  await takeToBoard(page, 'tetrahedron')
  await planReady(page)
  // One face left out: the base is half open.
  await drop(page, 'open.obj', pyramid.replace('f 1 4 3\n', ''))
  const dialog = page.locator('dialog')
  await dialog.getByRole('alert').waitFor()
  const told = await dialog.getByRole('alert').textContent()
  expect(told).toContain('open.obj')
  expect(told).toMatch(/line \d+/)
  await dialog.getByText('Nothing has been changed.').waitFor()
  await page.keyboard.press('Escape')
  await dialog.waitFor({ state: 'detached' })
  expect(await page.locator('.build-name').textContent()).toContain('tetrahedron')

  // Two at once, of one name: the later one counts.
  await page.evaluate((content) => {
    const again = (text: string) => {
      const data = new DataTransfer()
      data.items.add(new File([text], 'twice.obj'))
      document
        .querySelector('main')!
        .dispatchEvent(new DragEvent('drop', { bubbles: true, cancelable: true, dataTransfer: data }))
    }
    again(content.replace('f 1 4 3\n', ''))
    again(content)
  }, pyramid)
  await dialog.getByText('6 faces, 5 vertices').waitFor()
  // While it is being read, the later one pushes in too, and putting away leaves nothing behind.
  await drop(page, 'twice.obj', pyramid)
  await page.keyboard.press('Escape')
  await dialog.waitFor({ state: 'detached' })
  await drop(page, 'again.obj', pyramid)
  await dialog.getByText('6 faces, 5 vertices').waitFor()
  await page.keyboard.press('Escape')
  await dialog.waitFor({ state: 'detached' })

  await dropHuge(page, 'huge.stl')
  const size = await dialog.getByRole('alert').textContent()
  expect(size).toContain('huge.stl')
  expect(size).not.toContain('read all the same')
  await page.keyboard.press('Escape')
  noComplaints(complaints)
  await context.close()
})

test('a prism in the lane with WebGL; a dual that cannot be says why; own models are found by name', async () => {
  const glass = await launch('webgl')
  const { page, complaints } = await openApp(glass, app.url, 'webgl')
  await page.locator('[data-solid="pentagrammic-5-2-prism"]').waitFor()
  await takeToBoard(page, 'pentagrammic 5/2 prism')
  await planReady(page)
  expect(await page.locator('[data-fact=checks] .value').textContent()).toMatch(/^(\d+) of \1 ok$/)

  await drop(page, 'roof.obj', pyramid)
  await page.locator('dialog').getByRole('button', { name: 'Take to the Board' }).click()
  await page.locator('.build-name', { hasText: 'roof' }).waitFor()
  await planReady(page)
  // Something else in the same build, and back by the Shelf.
  await goTo(page, 'Shelf')
  await takeToBoard(page, 'cube')
  await planReady(page)
  await goTo(page, 'Shelf')
  await page.getByRole('searchbox').fill('roof')
  await page.locator('.cards [data-solid^=own-roof]').click()
  await page.locator('[data-looked]').getByRole('button', { name: 'Take to the Board' }).click()
  await page.locator('.build-name', { hasText: 'roof' }).waitFor()
  await planReady(page)

  await goTo(page, 'Shelf')
  await page.getByRole('searchbox').fill('Tetrahemihexacron')
  await page.getByText('3 of the 7 faces of its dual').waitFor()
  noComplaints(complaints)
  await glass.close()
})

test('families on the Shelf; slivers are proposed to be closed up', async () => {
  const { context, page, complaints } = await openApp(browser, app.url, 'no-3d')
  await page.getByRole('button', { name: 'antiprisms', exact: true }).click()
  await page.locator('[data-solid="heptagrammic-7-3-antiprism"]').waitFor()
  // The cards come a few at a time.
  await expect.poll(() => page.locator('.cards li').count(), { timeout: 30_000 }).toBe(117)
  await page.getByRole('button', { name: 'antiprisms', exact: true }).click()
  await page.getByRole('button', { name: 'duals', exact: true }).click()
  await page.locator('[data-solid="rhombic-triacontahedron"]').click()
  await page.getByText('30 rhombi').waitFor()
  await page.locator('[data-looked]').getByRole('button', { name: 'Take to the Board' }).click()
  await planReady(page)

  await goTo(page, 'Shelf')
  await page.getByRole('button', { name: 'Show all' }).click()
  await takeToBoard(page, 'inverted snub dodecadodecahedron')
  await planReady(page)
  await page.getByText('60 stretches shorter than 0.3 mm: no one').waitFor()
  await page
    .locator('[data-fact=closed]', { hasText: '60 stretches shorter than 0.3 mm' })
    .waitFor({ state: 'attached' })
  await page.getByRole('button', { name: 'Close them up' }).click()
  await page.getByText('60 stretches closed up').waitFor({ timeout: 120_000 })
  await page.locator('[data-fact=closed]', { hasText: 'no corner moved more than' }).waitFor({ state: 'attached' })
  noComplaints(complaints)
  await context.close()
})

/** What can go wrong around the app: no storage, a cancelled computation, a file from elsewhere, a sub-folder. */
import { createReadStream, existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { extname, join } from 'node:path'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { launch } from '../browser/chromium'
import { buildApp } from '../browser/serve'
import { cubePlan } from '../plan/by-hand'
import { goTo, noComplaints, openApp, planReady, setHeight, takeToBoard } from './open-app'

const types: Record<string, string> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.css': 'text/css',
  '.svg': 'image/svg+xml',
}
const scratch = mkdtempSync(join(tmpdir(), 'facetwright-trouble-'))
let browser: Browser
let url: string
let close: () => void
beforeAll(async () => {
  // A plain file server that knows the app in a sub-folder only, as it may be put on any web space.
  const folder = await buildApp()
  const server = createServer((request, response) => {
    const path = new URL(request.url ?? '/', 'http://x').pathname
    const inside = path.startsWith('/club/tools/') ? path.slice('/club/tools/'.length) || 'index.html' : ''
    const file = join(folder, inside)
    if (inside === '' || inside.includes('..') || !existsSync(file)) {
      response.writeHead(404).end()
      return
    }
    response.writeHead(200, { 'content-type': types[extname(file)] ?? 'application/octet-stream' })
    createReadStream(file).pipe(response)
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  url = `http://127.0.0.1:${(server.address() as AddressInfo).port}/club/tools/`
  close = () => server.close()
  browser = await launch('no-3d')
})
afterAll(async () => {
  await browser?.close()
  close?.()
  rmSync(scratch, { recursive: true, force: true })
})

test('a browser that keeps nothing: it is said, the work goes to a file, and comes back from it', async () => {
  const { context, page, complaints } = await openApp(browser, url, 'no-3d')
  await context.addInitScript(() => {
    Object.defineProperty(globalThis, 'indexedDB', {
      value: {
        open: () => {
          throw new DOMException('not here', 'SecurityError')
        },
      },
    })
  })
  await page.reload()
  await page.getByText('does not allow storage here').waitFor()
  expect(await page.locator('.save-state').textContent()).toBe('Not saved')
  await takeToBoard(page, 'tetrahedron')
  await planReady(page)
  await goTo(page, 'Bench')
  await page.getByRole('button', { name: 'Glued', exact: true }).click()
  await page.locator('.bench[data-glued="1"]').waitFor()
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Save to a file' }).click(),
  ])
  const saved = join(scratch, 'saved.json')
  await file.saveAs(saved)
  page.on('dialog', (dialog) => void dialog.accept())
  await page.reload()
  await page.locator('.build-name').click()
  await page.getByTestId('open-file').setInputFiles(saved)
  await page.locator('dialog').waitFor({ state: 'detached' })
  await page.locator('.bench[data-glued="1"]').waitFor()
  noComplaints(complaints)
  await context.close()
})

test('cancel stops a long computation at once, the page stays awake, and the next one works', async () => {
  const { context, page, complaints } = await openApp(browser, url, 'no-3d')
  await takeToBoard(page, 'tetrahedron')
  await planReady(page)
  const before = await page.locator('[data-fact=pieces] .value').textContent()
  await goTo(page, 'Shelf')
  await takeToBoard(page, 'great dirhombicosidodecahedron')
  await page.locator('.plan-bar.busy').waitFor()
  // The earlier plan stays, and says what it is.
  expect(await page.locator('.plan-bar.busy').textContent()).toMatch(/as of tetrahedron/i)
  expect(await page.locator('.docket.old [data-fact=pieces] .value').textContent()).toBe(before)
  const beats = page.evaluate(
    () =>
      new Promise<number>((resolve) => {
        let count = 0
        const timer = setInterval(() => count++, 10)
        setTimeout(() => {
          clearInterval(timer)
          resolve(count)
        }, 600)
      }),
  )
  // A page that computed on its own thread would not beat at all.
  expect(await beats).toBeGreaterThan(5)
  await page.getByRole('button', { name: 'Cancel' }).click()
  await page.getByText('Stopped: there is no plan for the present choices').waitFor()
  expect(await page.locator('.plan-bar.busy').count()).toBe(0)
  await page.getByRole('button', { name: 'Undo' }).click()
  await page.locator('.docket:not(.old)').waitFor()
  await setHeight(page, '123')
  await planReady(page)
  expect(await page.locator('.so').first().textContent()).toMatch(/^Edge/)
  noComplaints(complaints)
  await context.close()
})

test('once opened, it works without a network', async () => {
  const { context, page, complaints } = await openApp(browser, url, 'no-3d')
  const isKept = () =>
    page.evaluate(async () => {
      const [name] = await caches.keys()
      const held = name ? await (await caches.open(name)).keys() : []
      return ['planner.worker', 'press.worker', 'index'].every((part) => held.some((r) => r.url.includes(part)))
    })
  await expect.poll(isKept, { timeout: 30_000 }).toBe(true)
  await context.setOffline(true)
  await page.reload()
  await takeToBoard(page, 'tetrahedron')
  await planReady(page)
  noComplaints(complaints.filter((text) => !text.includes('ERR_INTERNET_DISCONNECTED')))
  await context.close()
})

test('a height at which a panel does not fit the sheet is refused with the height that would', async () => {
  const { context, page } = await openApp(browser, url, 'no-3d')
  await takeToBoard(page, 'tetrahedron')
  await setHeight(page, '2000')
  const alert = page.locator('.plan-bar.fault')
  await alert.waitFor()
  const most = /at most (\d+) mm/.exec((await alert.textContent()) ?? '')?.[1]
  expect(most).toBeDefined()
  await setHeight(page, most!)
  await planReady(page)
  await context.close()
})

test('files: plan.json goes out and in; a broken one is refused and one with false promises is told', async () => {
  const { context, page, complaints } = await openApp(browser, url, 'no-3d')
  await takeToBoard(page, 'tetrahedron')
  await setHeight(page, '77')
  await planReady(page)
  await goTo(page, 'Sheets')
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: 'Save plan.json' }).click(),
  ])
  const saved = join(scratch, 'plan.json')
  await file.saveAs(saved)
  expect(JSON.parse(readFileSync(saved, 'utf8'))).toMatchObject({
    format: 'facetwright-plan',
    model: { id: 'tetrahedron', heightMm: 77 },
  })
  const open = async (path: string): Promise<void> => {
    await page.locator('.build-name').click()
    await page.getByTestId('open-file').setInputFiles(path)
  }
  await goTo(page, 'Board')
  await setHeight(page, '99')
  await planReady(page)
  await open(saved)
  await page.locator('dialog').waitFor({ state: 'detached' })
  await expect.poll(() => page.getByLabel('Height, across the vertices').inputValue()).toBe('77')

  const cut = join(scratch, 'cut.json')
  writeFileSync(cut, readFileSync(saved, 'utf8').slice(0, 300))
  await open(cut)
  await page.locator('dialog').getByText('cut.json is no complete JSON').waitFor()
  await page.keyboard.press('Escape')

  const lying = cubePlan()
  lying.docket.pieces = 99
  const path = join(scratch, 'lying.json')
  writeFileSync(path, JSON.stringify(lying))
  await open(path)
  await page.locator('#main').getByText('lying.json does not keep its promises').waitFor()
  noComplaints(complaints)
  await context.close()
})

/** Parts shown alone and the vertex figure, by keyboard, with WebGL and without. */
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { lanes, launch } from '../browser/chromium'
import { type Served, serveApp } from '../browser/serve'
import { noComplaints, openApp } from './open-app'

let served: Served
const browsers: Browser[] = []
beforeAll(async () => {
  served = await serveApp()
})
afterAll(async () => {
  for (const browser of browsers) await browser.close()
  await served?.close()
})

/** Shares of the view that are red card (pentagrams) and yellow card (triangles), off a picture of the screen. */
const seen = async (page: Page): Promise<{ red: number; yellow: number }> => {
  const shot = (await page.getByTestId('model').screenshot()).toString('base64')
  return page.evaluate(async (base64) => {
    const bitmap = await createImageBitmap(await (await fetch(`data:image/png;base64,${base64}`)).blob())
    const context = new OffscreenCanvas(bitmap.width, bitmap.height).getContext('2d')!
    context.drawImage(bitmap, 0, 0)
    const { data } = context.getImageData(0, 0, bitmap.width, bitmap.height)
    let [red, yellow] = [0, 0]
    for (let i = 0; i < data.length; i += 4) {
      const [r, g, b] = [data[i]!, data[i + 1]!, data[i + 2]!]
      if (r > 1.6 * g) red++
      else if (g > 1.6 * b && r > 1.2 * g) yellow++
    }
    return { red: (4 * red) / data.length, yellow: (4 * yellow) / data.length }
  }, shot)
}

test.each(lanes)('orbits and one vertex alone, lane %s', async (lane) => {
  const browser = await launch(lane)
  browsers.push(browser)
  const { context, page, complaints } = await openApp(browser, served.url, lane, { reducedMotion: 'reduce' })
  const { keyboard } = page
  await page.getByRole('searchbox').fill('small snub icosicosidodecahedron')
  await page.locator('[data-solid=small-snub-icosicosidodecahedron]').click()
  const shown = page.locator('[data-looked=small-snub-icosicosidodecahedron]').getByTestId('shown')
  const settle = () => page.waitForTimeout(250)
  /** Tabs on to the control of this name, within the controls of the view. */
  const tabTo = async (name: RegExp): Promise<void> => {
    for (let i = 0; i < 30; i++) {
      await keyboard.press('Tab')
      const on = await page.evaluate(() => {
        const node = document.activeElement
        return node?.getAttribute('aria-label') ?? node?.textContent ?? ''
      })
      if (name.test(on)) return
    }
    throw new Error(`the keyboard does not reach ${name}`)
  }
  await page.getByRole('button', { name: 'One vertex' }).waitFor()
  await page.locator('[data-looked] [role=application]').focus()
  await settle()
  const whole = await seen(page)
  expect(whole.red).toBeGreaterThan(0.005)
  expect(whole.yellow).toBeGreaterThan(0.1)
  await tabTo(/^Only triangles \(100 faces\)/)
  await keyboard.press('Enter')
  await page.getByText('Shown: 100 triangles alone.').waitFor()
  await settle()
  expect((await seen(page)).red).toBe(0)
  await tabTo(/^Which triangles/)
  await keyboard.press('ArrowDown')
  await expect.poll(() => shown.textContent()).toMatch(/^Shown: (20|60) of 100 triangles, orbit 1 of 3\.$/)
  await keyboard.press('ArrowDown')
  await expect.poll(() => shown.textContent()).toMatch(/^Shown: (20|60) of 100 triangles, orbit 2 of 3\.$/)
  await settle()
  const orbit = await seen(page)
  expect(orbit.red).toBe(0)
  expect(orbit.yellow).toBeLessThan(0.9 * whole.yellow)
  await keyboard.press('Shift+Tab')
  expect(await page.evaluate(() => document.activeElement?.textContent)).toBe('One vertex')
  await keyboard.press('Space')
  await expect.poll(() => shown.textContent()).toMatch(/^Shown: vertex 1 of 60 with its faces alone/)
  await settle()
  const one = await seen(page)
  // Five triangles and a star, all turned to the viewer, but few.
  expect(one.red).toBeGreaterThan(0.001)
  expect(one.yellow).toBeGreaterThan(0.01)
  expect(one.yellow).toBeLessThan(0.6 * whole.yellow)
  await tabTo(/^Next vertex/)
  await keyboard.press('Enter')
  await expect.poll(() => shown.textContent()).toMatch(/^Shown: vertex 2 of 60/)
  await page.getByRole('img', { name: 'Vertex figure, 6 sides' }).waitFor()
  expect(await page.locator('.vertex-figures figcaption').textContent()).toMatch(
    /Seen along the axis: (triangle, )*pentagram(, triangle)*\./,
  )
  await page.getByRole('button', { name: 'All', exact: true }).press('Enter')
  await expect.poll(() => shown.textContent()).toBe('Shown: the whole model.')
  noComplaints(complaints)
  await context.close()
})

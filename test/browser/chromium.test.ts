import { mkdtempSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { findChromium, installedChromium, type Lane, lanes, launch } from './chromium'
import { once } from './once'

describe('the browser that tests use', () => {
  test('a path that the builder named is the only one tried', () => {
    expect(installedChromium({ PATH: process.env.PATH, FACETWRIGHT_CHROMIUM: '/nowhere/chromium' })).toBeUndefined()
  })

  test('a missing browser is an error with its remedy, never a test left out', async () => {
    const before = process.env.FACETWRIGHT_CHROMIUM
    process.env.FACETWRIGHT_CHROMIUM = '/nowhere/chromium'
    try {
      await expect(findChromium()).rejects.toThrow(/apt-get install -y chromium/)
    } finally {
      if (before === undefined) delete process.env.FACETWRIGHT_CHROMIUM
      else process.env.FACETWRIGHT_CHROMIUM = before
    }
  })

  const hasWebGL: Record<Lane, boolean> = { webgl: true, 'no-3d': false }
  test.each(lanes)('lane %s has the 3D context it is meant to have', async (lane) => {
    const browser = await launch(lane)
    try {
      const page = await browser.newPage()
      const context = await page.evaluate(() => document.createElement('canvas').getContext('webgl2') !== null)
      expect(context).toBe(hasWebGL[lane])
    } finally {
      await browser.close()
    }
  })
})

describe('once', () => {
  const fresh = () => mkdtempSync(join(tmpdir(), 'once-'))

  test('two callers at a time: one works, the other waits for the result', async () => {
    const folder = fresh()
    let runs = 0
    let done = false
    const work = async () => {
      runs++
      await new Promise((resolve) => setTimeout(resolve, 50))
      done = true
    }
    const call = () => once(join(folder, 'lock'), () => done, work)
    await Promise.all([call(), call()])
    expect(runs).toBe(1)
  })

  test('work that failed leaves no lock behind', async () => {
    const folder = fresh()
    const call = (work: () => void) => once(join(folder, 'lock'), () => false, work)
    await expect(
      call(() => {
        throw new Error('no')
      }),
    ).rejects.toThrow('no')
    let ran = false
    await call(() => {
      ran = true
    })
    expect(ran).toBe(true)
  })

  test('a lock whose owner has died is taken over', async () => {
    const folder = fresh()
    const lock = join(folder, 'lock')
    const { mkdirSync } = await import('node:fs')
    mkdirSync(lock)
    writeFileSync(join(lock, 'pid'), '999999999')
    let ran = false
    await once(
      lock,
      () => false,
      () => {
        ran = true
      },
    )
    expect(ran).toBe(true)
  })
})

import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { Plan } from '../../src/plan/types'
import { validatePlan } from '../../src/plan/validate'
import { batch, npmBatch, type Outcome, words } from './run'

let folder = ''
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'batch-'))
})
afterAll(() => {
  rmSync(folder, { recursive: true, force: true })
})

const made = (name: string): { plan: Plan; planText: string; pdf: Uint8Array } => {
  const planText = readFileSync(join(folder, name, 'plan.json'), 'utf8')
  const pdf = readFileSync(join(folder, name, 'sheets.pdf'))
  return { plan: JSON.parse(planText) as Plan, planText, pdf: new Uint8Array(pdf) }
}
const failing = (plan: Plan): string[] => validatePlan(plan).flatMap(({ name, ok }) => (ok ? [] : [name]))
const planInto = (name: string, line: string): Promise<Outcome> =>
  batch(['plan', ...words(line), '--out', join(folder, name)])

describe('batch plan', () => {
  test('writes a sound plan and its pages', async () => {
    const { code, stdout, stderr } = await planInto('one', 'great-icosahedron --height 120')
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
    const { plan, pdf } = made('one')
    expect(plan.model).toMatchObject({ id: 'great-icosahedron', heightMm: 120, fill: 'nonzero', hand: 'none' })
    expect(plan.docket.panels).toBe(180)
    expect(failing(plan)).toEqual([])
    expect(plan.docket.checks).toEqual(validatePlan(plan))
    expect(stdout).toContain(`${plan.docket.pieces} pieces`)
    const document = await getDocument({ data: pdf }).promise
    expect(document.numPages).toBe(1 + plan.sheets.length)
  })

  test('the same choices give the same bytes', async () => {
    const line = 'small-stellated-dodecahedron --height 90'
    await Promise.all([planInto('first', line), planInto('second', line)])
    const [first, second] = [made('first'), made('second')]
    expect(second.planText).toBe(first.planText)
    expect(Buffer.compare(second.pdf, first.pdf)).toBe(0)
  })

  test('every option arrives', async () => {
    const line = 'snub-cube --height 80 --paper letter --fill evenodd --hand left --side inside --colours kind'
    expect((await planInto('all', line)).code).toBe(0)
    const { plan } = made('all')
    expect(plan.model).toMatchObject({ id: 'snub-cube', heightMm: 80, fill: 'evenodd', hand: 'left' })
    for (const { paper, widthMm, heightMm, colour, placed } of plan.sheets) {
      expect([paper, widthMm, heightMm]).toEqual(['letter', 215.9, 279.4])
      expect(['square', 'triangle']).toContain(colour)
      expect(placed.every(({ mirrored }) => mirrored)).toBe(true)
    }
    expect(plan.pieces.map(({ colour }) => colour)).not.toContain('mixed')
    expect(failing(plan)).toEqual([])
  })

  test('a relative folder is one beside the place where npm was called', async () => {
    const { code } = await npmBatch(words('plan tetrahedron --height 30 --out my/plan'), folder)
    expect(code).toBe(0)
    expect(existsSync(join(folder, 'my', 'plan', 'plan.json'))).toBe(true)
    expect(existsSync(join(folder, 'my', 'plan', 'sheets.pdf'))).toBe(true)
  })

  test('a panel that fits on no sheet is refused in one line, with a height that would do', async () => {
    const { code, stdout, stderr } = await planInto('large', 'cube --height 2000')
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' })
    expect(stderr).toMatch(/^[^\n]+at most \d+ mm\.\n$/)
    expect(existsSync(join(folder, 'large', 'plan.json'))).toBe(false)
    const most = /at most (\d+) mm/.exec(stderr)![1]!
    expect((await planInto('large', `cube --height ${most}`)).code).toBe(0)
    expect((await planInto('larger', `cube --height ${Number(most) + 1}`)).code).toBe(2)
  })
})

import { mkdtempSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { Plan } from '../../src/plan/types'
import { validatePlan } from '../../src/plan/validate'
import { buildSolid } from '../../src/solids'
import { both, box, cubeWith } from '../models/shapes'
import { meshOf, trianglesOf, writeBinaryStl, writeObj } from '../models/write'
import { batch, npmBatch, type Outcome } from './run'

let folder = ''
const path = (name: string): string => join(folder, name)
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'batch-'))
  writeFileSync(path('cube.obj'), cubeWith({}))
  writeFileSync(path('open.obj'), cubeWith({ 12: null }))
  writeFileSync(path('twice.obj'), cubeWith({ 10: ['f 1 2 4 3', 'f 4 2 1 3'] }))
  const pane = {
    vertices: [
      [1, 1, 0],
      [2, 1, 0],
      [2, 2, 0],
      [1, 2, 0],
    ] as const,
    faces: [
      [0, 1, 2, 3],
      [0, 1, 2],
      [0, 2, 3],
    ],
  }
  writeFileSync(path('pane.obj'), writeObj(both(box([0, 0, 0], [1, 1, 1]), pane)))
  writeFileSync(path('star.stl'), writeBinaryStl(trianglesOf(buildSolid('small-stellated-dodecahedron'))))
  writeFileSync(
    path('snub.obj'),
    writeObj(meshOf(buildSolid('snub-cube')), (x) => x.toFixed(5)),
  )
  writeFileSync(path('huge.stl'), '')
  // Two gigabytes that take no room on the disk.
  truncateSync(path('huge.stl'), 2 ** 31)
})
afterAll(() => {
  rmSync(folder, { recursive: true, force: true })
})

const refused = ({ code, stdout, stderr }: Outcome, said: RegExp): void => {
  expect({ code, stdout }).toEqual({ code: 2, stdout: '' })
  expect(stderr).toMatch(/^[^\n]+\n$/)
  expect(stderr).toMatch(said)
}

describe('a model from a file', () => {
  test('plan with a height: the plan of the built solid, all checks kept', async () => {
    const { code, stdout, stderr } = await npmBatch(
      ['plan', '--file', 'star.stl', '--height', '120', '--out', 'star'],
      folder,
    )
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
    expect(stdout).toMatch(/^star: \d+ pieces/)
    const plan = JSON.parse(readFileSync(path('star/plan.json'), 'utf8')) as Plan
    expect(plan.model).toMatchObject({ id: 'own-star', name: 'star', heightMm: 120, hand: 'none' })
    expect(plan.docket.panels).toBe(60)
    expect(validatePlan(plan).filter((c) => !c.ok)).toEqual([])
  })

  test('coordinates of five decimals, which the plan says and its checks allow for', async () => {
    const { code } = await batch(['plan', '--file', path('snub.obj'), '--height', '150', '--out', path('snub')])
    expect(code).toBe(0)
    const plan = JSON.parse(readFileSync(path('snub/plan.json'), 'utf8')) as Plan
    expect(plan.docket.panels).toBe(38)
    expect(plan.model.offPlaneMm).toBeGreaterThan(1e-4)
    expect(plan.model.offPlaneMm).toBeLessThan(0.02)
    expect(validatePlan(plan).filter((c) => !c.ok)).toEqual([])
    // A file may not talk itself out of the checks.
    const crooked = { ...plan, model: { ...plan.model, offPlaneMm: 1000 } }
    crooked.panels[0]!.rings[0]![0]![0] += 5
    expect(validatePlan(crooked).filter((c) => !c.ok).length).toBeGreaterThan(0)
  })

  test('plan in its own unit, with what was repaired', async () => {
    const line = ['plan', '--file', path('twice.obj'), '--unit', 'in', '--out', path('unit')]
    const { code, stdout } = await batch(line)
    expect(code).toBe(0)
    expect(stdout).toContain('1 face that repeats another one was dropped.')
    const plan = JSON.parse(readFileSync(path('unit/plan.json'), 'utf8')) as Plan
    expect(plan.model.heightMm).toBeCloseTo(25.4 * Math.sqrt(3), 5)
  })

  test('skin, in the units of the file', async () => {
    const { code, stdout } = await batch(['skin', '--file', path('cube.obj'), '--json'])
    expect(code).toBe(0)
    const [row] = JSON.parse(stdout) as [Record<string, number | string>]
    expect(row).toMatchObject({ id: 'own-cube', format: 'OBJ', faces: 6, panels: 6, bodies: 1, notes: [] })
    expect(row.area).toBeCloseTo(6, 9)
    expect(row.volume).toBeCloseTo(1, 9)
    const table = await batch(['skin', '--file', path('twice.obj')])
    expect(table.stdout).toContain('1 face that repeats another one was dropped.')
  })

  test('what cannot be used: exit code 2 and one line', async () => {
    const plan = (name: string, ...size: string[]): Promise<Outcome> =>
      batch(['plan', '--file', path(name), ...size, '--out', path('no')])
    refused(await plan('open.obj', '--height', '100'), /^open\.obj, line 10: not closed: .* add the face/)
    refused(await plan('cube.obj', '--unit', 'mm'), /^In mm the model is 1\.732 mm high, 10 to 2000 mm can be planned/)
    refused(await plan('pane.obj', '--height', '100'), /^pane\.obj, line \d+: Face \d+ is a loose wall, seen from both/)
    refused(await plan('none.obj', '--height', '100'), /none\.obj cannot be read \(ENOENT\); name a model/)
    refused(await plan('', '--height', '100'), /is no file; name a model/)
    refused(await plan('huge.stl', '--height', '100'), /huge\.stl: 2147 MB are too much/)
    refused(await batch(['skin', '--file', '/dev/zero']), /\/dev\/zero is no file/)
  })
})

import { describe, expect, test } from 'vitest'
import { batch, npmBatch, words } from './run'

const oneLine = /^[^\n]+\n$/

describe('batch list', () => {
  test('gives the 75 and the families with exactly the promised fields', async () => {
    const { code, stdout, stderr } = await npmBatch(['list', '--json'])
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
    const facts = JSON.parse(stdout) as Record<string, unknown>[]
    expect(facts.map(({ index }) => index)).toEqual(
      Array.from({ length: facts.length }, (_, i) => (i < 75 ? i + 1 : null)),
    )
    const counts = new Map<unknown, number>()
    for (const { family } of facts) counts.set(family, (counts.get(family) ?? 0) + 1)
    // By hand: φ(3) + … + φ(24) = 178, half of that {n/d}, one of each left out, 29 crossed; duals 75 − 9 regular − 10 with
    // faces through the centre.
    expect([...counts]).toEqual([
      ['uniform', 75],
      ['prism', 88],
      ['antiprism', 117],
      ['dual', 56],
      ['compound', 5],
    ])
    for (const entry of facts)
      expect(Object.keys(entry)).toEqual(
        words(
          `id index family name wythoff vertexConfiguration vertices edges faces euler density chiral orientable symmetry
           circumradius dual components notes`.replace(/\s+/g, ' '),
        ),
      )
    // From memory, as every table of uniform polyhedra has it.
    expect(facts[73]).toMatchObject({
      id: 'great-retrosnub-icosidodecahedron',
      vertices: 60,
      edges: 150,
      faces: 92,
      euler: 2,
      density: 37,
      chiral: true,
      symmetry: 'I',
    })
  })

  test('without --json a table with a line for each', async () => {
    const { code, stdout } = await batch(['list'])
    expect(code).toBe(0)
    const lines = stdout.trimEnd().split('\n')
    expect(lines).toHaveLength(1 + 341)
    expect(lines[6]).toMatch(/^ +6 {2}uniform +cube +3 \| 2 4 +4\.4\.4 +8 +12 +6 +1 +no +O_h +0\.8660$/)
  })
})

describe('batch skin', () => {
  test('gives one entry for one solid, both fill rules', async () => {
    const results = await Promise.all(
      ['nonzero', 'evenodd'].map((fill) =>
        batch(['skin', 'small-ditrigonal-icosidodecahedron', '--fill', fill, '--json']),
      ),
    )
    const [whole, open] = results.map(({ code, stdout }) => {
      expect(code).toBe(0)
      const list = JSON.parse(stdout) as Record<string, number | string>[]
      expect(list).toHaveLength(1)
      return list[0]!
    })
    expect(Object.keys(whole!)).toEqual(words('id fill panels areaEdge2 volumeEdge3 bodies lineContactLength ms'))
    // Twelve pentagrams lie on top; with their centres open one looks through them, and more can be touched.
    expect(whole).toMatchObject({ id: 'small-ditrigonal-icosidodecahedron', fill: 'nonzero', panels: 72, bodies: 1 })
    expect(open).toMatchObject({ id: 'small-ditrigonal-icosidodecahedron', fill: 'evenodd' })
    expect(open!.panels).toBeGreaterThan(whole!.panels as number)
    expect(open!.volumeEdge3).toBeLessThan(whole!.volumeEdge3 as number)
  })

  test('a cube has the area and volume of a cube', async () => {
    const { stdout } = await batch(words('skin cube --json'))
    const [cube] = JSON.parse(stdout) as { areaEdge2: number; volumeEdge3: number }[]
    expect(cube!.areaEdge2).toBeCloseTo(6, 12)
    expect(cube!.volumeEdge3).toBeCloseTo(1, 12)
  })
})

describe('batch: what cannot be followed', () => {
  const wrong: [line: string, said: RegExp][] = [
    [
      'skin great-icosahedrom --json',
      /There is no solid great-icosahedrom; the nearest ids are .*\bgreat-icosahedron\b/,
    ],
    ['skin tetrahemihexacron', /The tetrahemihexacron cannot be built: 3 of the 7 faces .* at infinity/],
    ['plan cubes --height 250 --out /tmp/x', /There is no solid cubes; the nearest ids are .*\bcube\b/],
    ['plan cube --height 250mm --out /tmp/x', /The height 250mm is not a number; .* from 10 to 2000/],
    ['plan cube --height 9 --out /tmp/x', /The height 9 is out of range; .* from 10 to 2000/],
    ['plan cube --height 250 --out /dev/null/x', /folder \/dev\/null\/x cannot be written to .*; name a folder/],
    ['plan cube --height 250 --out /tmp/x --paper a5', /--paper is a4 or letter, not a5/],
    ['list --jsn', /There is no option --jsn; list takes --json/],
    ['fold cube', /There is no command fold; say list, skin or plan/],
  ]
  test.each(wrong)('%s: exit code 2 and one line', async (line, said) => {
    const { code, stdout, stderr } = await batch(words(line))
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' })
    expect(stderr).toMatch(oneLine)
    expect(stderr).toMatch(said)
  })

  test('npm hands the exit code on', async () => {
    const { code, stderr } = await npmBatch(['skin', 'nothing-like-it'])
    expect(code).toBe(2)
    expect(stderr).toMatch(oneLine)
  })

  test('--help tells all three commands', async () => {
    const { code, stdout } = await batch(['--help'])
    expect(code).toBe(0)
    for (const command of ['list', 'skin', 'plan']) expect(stdout).toContain(`batch -- ${command}`)
  })
})

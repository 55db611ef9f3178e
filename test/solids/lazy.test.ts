/** Importing and naming the catalogue constructs nothing; facts construct what they are about, once. */
import { expect, test, vi } from 'vitest'
import type * as Build from '../../src/solids/build'

const built = vi.hoisted(() => ({ ids: [] as string[] }))
vi.mock('../../src/solids/build', async (original) => {
  const real = await original<typeof Build>()
  return {
    ...real,
    buildFrom: (...args: Parameters<typeof real.buildFrom>) => {
      built.ids.push(args[1].id)
      return real.buildFrom(...args)
    },
  }
})

const { buildSolid, families, familyOf, findSolids, listFamily, listNames, nearestIds, solidFacts } = await import(
  '../../src/solids'
)

test('names, families and nearest ids cost no construction', () => {
  expect(listNames()).toHaveLength(341)
  expect(listNames()[73]).toEqual({
    id: 'great-retrosnub-icosidodecahedron',
    name: 'great retrosnub icosidodecahedron',
    family: 'uniform',
    index: 74,
  })
  expect(families().map(({ family, count }) => [family, count])).toEqual([
    ['uniform', 75],
    ['prism', 88],
    ['antiprism', 117],
    ['dual', 56],
    ['compound', 5],
  ])
  expect([familyOf('cube'), familyOf('rhombic-dodecahedron'), familyOf('nothing')]).toEqual([
    'uniform',
    'dual',
    undefined,
  ])
  expect(nearestIds('heptagonal-prsm')[0]).toBe('heptagonal-prism')
  expect(built.ids).toEqual([])
})

test('what is asked for is constructed, and once', () => {
  expect(findSolids('heptagonal antiprism').map((f) => f.id)).toEqual(['heptagonal-antiprism'])
  expect(built.ids).toEqual(['heptagonal-antiprism'])
  solidFacts('rhombic-dodecahedron')
  buildSolid('rhombic-dodecahedron')
  expect(built.ids.slice(1)).toEqual(['cuboctahedron', 'rhombic-dodecahedron'])
  listFamily('compound')
  listFamily('compound')
  expect(built.ids.length).toBe(3 + 5)
})

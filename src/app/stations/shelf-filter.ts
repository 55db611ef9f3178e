/** The Shelf's filters: each a short word that stands for a plain question about a solid. */
import type { SolidFacts } from '../../worker'
import { plural } from '../words/figures'
import { familyWords } from '../words/solid'

export interface Filter {
  readonly id: string
  readonly word: string
  readonly fits: (solid: SolidFacts) => boolean
}
export interface FilterGroup {
  readonly name: string
  /** Any of the chosen words fits ('any'), or all of them must ('all'). */
  readonly mode: 'any' | 'all'
  readonly filters: readonly Filter[]
}

/** Convex: no star faces, and the faces wind round the middle once. */
export const isConvex = (solid: SolidFacts): boolean =>
  solid.density === 1 && solid.components === 1 && solid.facesByKind.every(({ d }) => d === 1)

const has =
  (kind: string) =>
  (solid: SolidFacts): boolean =>
    solid.facesByKind.some(({ name }) => name === kind)

const faceKinds = [
  'triangle',
  'square',
  'pentagon',
  'hexagon',
  'octagon',
  'decagon',
  'pentagram',
  'octagram',
  'decagram',
]

const families = Object.keys(familyWords) as SolidFacts['family'][]

export const filterGroups: readonly FilterGroup[] = [
  {
    name: 'Family',
    mode: 'any',
    filters: families.map((each) => ({ id: each, word: familyWords[each], fits: ({ family }) => family === each })),
  },
  {
    name: 'Shape',
    mode: 'any',
    filters: [
      { id: 'convex', word: 'convex', fits: isConvex },
      { id: 'nonconvex', word: 'nonconvex', fits: (solid) => !isConvex(solid) },
    ],
  },
  {
    name: 'Kind',
    mode: 'all',
    filters: [
      { id: 'chiral', word: 'has two hands', fits: ({ chiral }) => chiral },
      { id: 'one-sided', word: 'one-sided', fits: ({ orientable }) => !orientable },
    ],
  },
  {
    name: 'Symmetry of the',
    mode: 'any',
    filters: [
      { id: 'tetrahedral', word: 'tetrahedron', fits: ({ symmetry }) => symmetry.startsWith('T') },
      { id: 'octahedral', word: 'cube', fits: ({ symmetry }) => symmetry.startsWith('O') },
      { id: 'icosahedral', word: 'icosahedron', fits: ({ symmetry }) => symmetry.startsWith('I') },
      { id: 'axial', word: 'one axis', fits: ({ symmetry }) => symmetry.startsWith('D') },
    ],
  },
  {
    name: 'With',
    mode: 'all',
    filters: faceKinds.map((kind) => ({ id: kind, word: plural(kind), fits: has(kind) })),
  },
  {
    name: 'Faces',
    mode: 'any',
    filters: [
      { id: 'few', word: 'up to 20', fits: ({ faces }) => faces <= 20 },
      { id: 'some', word: '21 to 60', fits: ({ faces }) => faces > 20 && faces <= 60 },
      { id: 'many', word: 'more than 60', fits: ({ faces }) => faces > 60 },
    ],
  },
]

/** @param chosen filter ids; a group of which none is chosen lets everything pass */
export const passes = (solid: SolidFacts, chosen: ReadonlySet<string>): boolean =>
  filterGroups.every(({ mode, filters }) => {
    const active = filters.filter(({ id }) => chosen.has(id))
    if (active.length === 0) return true
    return mode === 'any' ? active.some(({ fits }) => fits(solid)) : active.every(({ fits }) => fits(solid))
  })

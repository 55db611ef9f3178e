/** What of a model is shown alone: which of its items, and how that is said. */
import type { SceneItem } from '../../preview'
import type { SolidParts } from '../../worker'
import { counted, listed, plural } from '../words/figures'

export type Show =
  | { readonly what: 'all' }
  /** One face kind, or one orbit of it. */
  | { readonly what: 'kind'; readonly kind: string; readonly orbit: number | null }
  | { readonly what: 'vertex'; readonly vertex: number }

export const showAll: Show = { what: 'all' }

/** The solid that the items are of. */
export interface Whole {
  readonly parts: SolidParts
  /** Faces of an item; missing: every item is the face of its own number. */
  readonly facesOf?: ReadonlyMap<number, readonly number[]>
}

export interface OrbitShown {
  readonly orbit: number
  readonly faces: number
}

/** Sizes by number, in the order of first appearance. */
const sizes = (numbers: readonly number[]): Map<number, number> => {
  const counts = new Map<number, number>()
  for (const number of numbers) counts.set(number, (counts.get(number) ?? 0) + 1)
  return counts
}

/** Orbits of a face kind under the rotations. */
export const orbitsOf = ({ kinds, orbits }: SolidParts, kind: string): OrbitShown[] =>
  [...sizes(orbits.filter((_, face) => kinds[face] === kind))].map(([orbit, faces]) => ({ orbit, faces }))

export interface VertexSort {
  readonly orbit: number
  readonly vertices: readonly number[]
}

/** Vertices that rotations carry into each other. */
export const vertexSorts = ({ vertexOrbits }: SolidParts): VertexSort[] => {
  const sorts = new Map<number, number[]>()
  vertexOrbits.forEach((orbit, vertex) => {
    const sort = sorts.get(orbit)
    if (sort) sort.push(vertex)
    else sorts.set(orbit, [vertex])
  })
  return [...sorts].map(([orbit, vertices]) => ({ orbit, vertices }))
}

/** Ids of the items shown; null for all. */
export const shownItems = (
  show: Show,
  items: readonly SceneItem[],
  whole: Whole | null,
): ReadonlySet<number> | null => {
  if (show.what === 'all') return null
  const facesOf = (item: number): readonly number[] => whole?.facesOf?.get(item) ?? [item]
  const ids = (keep: (item: SceneItem) => boolean): Set<number> => new Set(items.filter(keep).map(({ id }) => id))
  if (show.what === 'kind') {
    const { kind, orbit } = show
    if (orbit === null || !whole) return ids((item) => item.kind === kind)
    return ids((item) => item.kind === kind && facesOf(item.id).some((face) => whole.parts.orbits[face] === orbit))
  }
  const faces = new Set(whole?.parts.facesAt[show.vertex])
  return ids(({ id }) => facesOf(id).some((face) => faces.has(face)))
}

/** `5 triangles and 1 pentagram`. */
const sayFacesAt = ({ kinds, facesAt }: SolidParts, vertex: number): string => {
  const counts = new Map<string, number>()
  for (const face of facesAt[vertex] ?? []) counts.set(kinds[face]!, (counts.get(kinds[face]!) ?? 0) + 1)
  return listed([...counts].map(([kind, count]) => counted(count, kind, plural(kind))))
}

/** E.g. `Shown: 20 of 80 triangles, orbit 2 of 3.` */
export const sayShown = (show: Show, items: readonly SceneItem[], whole: Whole | null): string => {
  const panels =
    whole && !whole.facesOf ? '' : ` (${counted(shownItems(show, items, whole)?.size ?? items.length, 'panel')})`
  if (show.what === 'all') return 'Shown: the whole model.'
  if (show.what === 'vertex')
    return `Shown: vertex ${show.vertex + 1} of ${whole?.parts.facesAt.length ?? 0} with its faces alone, ${
      whole ? sayFacesAt(whole.parts, show.vertex) : ''
    }${panels}.`
  const { kind, orbit } = show
  if (!whole) return `Shown: ${plural(kind)} alone${panels}.`
  const orbits = orbitsOf(whole.parts, kind)
  const all = orbits.reduce((sum, { faces }) => sum + faces, 0)
  const at = orbits.findIndex((each) => each.orbit === orbit)
  if (at < 0) return `Shown: ${counted(all, kind, plural(kind))} alone${panels}.`
  return `Shown: ${orbits[at]!.faces} of ${all} ${plural(kind)}, orbit ${at + 1} of ${orbits.length}${panels}.`
}

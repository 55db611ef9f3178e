/**
 * A scene made ready for drawing: centred, scaled to radius 1, triangulated, with its edges matched. Independent of
 * renderer, camera and what is visible at the moment.
 */
import earcut from 'earcut'
import { BrokenPromise, InputError } from '../errors'
import { SnapGrid } from '../geometry/snap'
import { add, cross, dot, norm, planeFrame, scale, sub, type Vec3 } from '../geometry/vec3'
import { layers } from './bias'
import { parseHex, type Rgb } from './colour'
import { insideOf } from './light'
import type { SceneItem, SceneOptions } from './types'

export interface Model {
  readonly items: readonly SceneItem[]
  /** Index into `items` by id. */
  readonly indexOf: ReadonlyMap<number, number>
  /** In the rings' units; a model point is (p − centre) / radius. */
  readonly centre: Vec3
  readonly radius: number
  /** RGB per item in full light, as seen from outside and from inside. */
  readonly outside: Float32Array
  readonly inside: Float32Array
  /** Per item: rank of its kind in the order of first appearance, capped; the lower one wins in a shared plane. */
  readonly layer: Uint8Array
  /** Per vertex x, y, z; every ring point of every item is a vertex of its own, so that items can move apart. */
  readonly closed: Float64Array
  readonly vertexItem: Int32Array
  /** Three vertices each, counter-clockwise seen from outside, item after item. */
  readonly triangles: Uint32Array
  /** Item i has triangles `triangleStart[i]` … `triangleStart[i + 1]` − 1. */
  readonly triangleStart: Uint32Array
  /** Two vertices each, item after item. */
  readonly edges: Uint32Array
  readonly edgeStart: Uint32Array
  /** Ring edges between the same two points (either way) have the same class. */
  readonly edgeClass: Uint32Array
  readonly edgeClasses: number
  /** Mean length of a ring edge. */
  readonly meanEdge: number
  /** Per item: what it moves with. */
  readonly mover: Uint32Array
  /** Per mover x, y, z: way to go at explosion 1. */
  readonly moves: Float64Array
}

/** Share of the way from the centre, and of the radius along the outward normal, that a mover goes at explosion 1. */
const outwards = { centroid: 0.85, normal: 0.3 }

interface FlatItem {
  readonly points: Vec3[]
  /** Vertex count of each ring, region after region. */
  readonly ringSizes: number[]
  readonly triangles: number[]
  readonly area: number
  readonly centroid: Vec3
}

const flatten = (item: SceneItem): FlatItem => {
  const points: Vec3[] = []
  const ringSizes: number[] = []
  const triangles: number[] = []
  const { u, v } = planeFrame(item.normal)
  let area = 0
  let moment: Vec3 = [0, 0, 0]
  for (const region of [item.rings, ...(item.moreRings ?? [])]) {
    const first = points.length
    const flat: number[] = []
    const holes: number[] = []
    for (const ring of region) {
      if (flat.length > 0) holes.push(flat.length / 2)
      ringSizes.push(ring.length)
      for (const p of ring) {
        points.push(p)
        flat.push(dot(p, u), dot(p, v))
      }
    }
    const cut = earcut(flat, holes, 2)
    for (let i = 0; i < cut.length; i += 3) {
      const a = first + cut[i]!
      let b = first + cut[i + 1]!
      let c = first + cut[i + 2]!
      const square = cross(sub(points[b]!, points[a]!), sub(points[c]!, points[a]!))
      if (dot(square, item.normal) < 0) [b, c] = [c, b]
      triangles.push(a, b, c)
      const size = norm(square) / 2
      area += size
      moment = add(moment, scale(add(add(points[a]!, points[b]!), points[c]!), size / 3))
    }
  }
  const start = points[0] ?? [0, 0, 0]
  return { points, ringSizes, triangles, area, centroid: area > 0 ? scale(moment, 1 / area) : start }
}

const check = (items: readonly SceneItem[]): void => {
  for (const item of items) {
    const finite = [item.rings, ...(item.moreRings ?? [])].every((region) =>
      region.every((ring) => ring.every((p) => p.every(Number.isFinite))),
    )
    const length = norm(item.normal)
    if (!finite || !(Math.abs(length - 1) < 1e-3))
      throw new BrokenPromise('A scene item has no usable shape.', { item: item.id, normal: item.normal, finite })
  }
}

/**
 * @throws InputError if a colour cannot be read
 * @throws BrokenPromise if an item has coordinates that are not finite, no unit normal, or an id used twice
 */
export const buildModel = (items: readonly SceneItem[], options: SceneOptions = {}): Model => {
  check(items)
  const indexOf = new Map(items.map((item, i) => [item.id, i]))
  if (indexOf.size !== items.length)
    throw new BrokenPromise('Two scene items have the same id.', { items: items.length, ids: indexOf.size })
  const flats = items.map(flatten)

  const area = flats.reduce((sum, f) => sum + f.area, 0)
  const middle = scale(
    flats.reduce<Vec3>((sum, f) => add(sum, scale(f.centroid, f.area)), [0, 0, 0]),
    area > 0 ? 1 / area : 0,
  )
  const centre = options.centre ?? middle
  let radius = 0
  for (const f of flats) for (const p of f.points) radius = Math.max(radius, norm(sub(p, centre)))
  if (radius === 0) radius = 1
  const place = (p: Vec3): Vec3 => scale(sub(p, centre), 1 / radius)

  const vertexCount = flats.reduce((sum, f) => sum + f.points.length, 0)
  const closed = new Float64Array(3 * vertexCount)
  const vertexItem = new Int32Array(vertexCount)
  const triangles: number[] = []
  const triangleStart = new Uint32Array(items.length + 1)
  const edges = new Uint32Array(2 * vertexCount)
  const edgeStart = new Uint32Array(items.length + 1)
  const edgeClass = new Uint32Array(vertexCount)
  const snap = new SnapGrid(1e-7, 1e-7, 0.02)
  const classes = new Map<number, number>()
  let vertex = 0
  let edgeLength = 0
  flats.forEach((f, i) => {
    const first = vertex
    triangleStart[i] = triangles.length / 3
    edgeStart[i] = first
    for (const t of f.triangles) triangles.push(first + t)
    for (const size of f.ringSizes) {
      const ring = vertex
      const places: number[] = []
      for (let k = 0; k < size; k++, vertex++) {
        const [x, y, z] = place(f.points[vertex - first]!)
        closed.set([x, y, z], 3 * vertex)
        vertexItem[vertex] = i
        places.push(snap.add(x, y, z))
      }
      for (let k = 0; k < size; k++) {
        const next = (k + 1) % size
        const edge = ring + k
        edges[2 * edge] = edge
        edges[2 * edge + 1] = ring + next
        const [p, q] = [places[k]!, places[next]!]
        const key = Math.min(p, q) * 2 ** 26 + Math.max(p, q)
        let id = classes.get(key)
        if (id === undefined) {
          id = classes.size
          classes.set(key, id)
        }
        edgeClass[edge] = id
        const end = 3 * (ring + next)
        edgeLength += Math.hypot(
          closed[3 * edge]! - closed[end]!,
          closed[3 * edge + 1]! - closed[end + 1]!,
          closed[3 * edge + 2]! - closed[end + 2]!,
        )
      }
    }
  })
  triangleStart[items.length] = triangles.length / 3
  edgeStart[items.length] = vertex

  const kinds = new Map<string, number>()
  const layer = Uint8Array.from(items, (item) => {
    if (!kinds.has(item.kind)) kinds.set(item.kind, kinds.size)
    return Math.min(kinds.get(item.kind)!, layers - 1)
  })

  const colours = items.map((item) => readColour(item))
  return {
    items,
    indexOf,
    centre,
    radius,
    outside: Float32Array.from(colours.flat()),
    inside: Float32Array.from(colours.flatMap((c) => (options.backs === 'same' ? c : insideOf(c)))),
    layer,
    closed,
    vertexItem,
    triangles: Uint32Array.from(triangles),
    triangleStart,
    edges,
    edgeStart,
    edgeClass,
    edgeClasses: classes.size,
    meanEdge: vertex > 0 ? edgeLength / vertex : 1,
    ...findMovers(items, flats, place, options.explodeBy ?? 'items'),
  }
}

const readColour = (item: SceneItem): Rgb => {
  try {
    return parseHex(item.colour)
  } catch (error) {
    throw error instanceof InputError ? new InputError(error.message, `colour of "${item.kind}"`) : error
  }
}

/** Each mover goes along its centroid and a little along its mean normal, so that steep neighbours part too. */
const findMovers = (
  items: readonly SceneItem[],
  flats: readonly FlatItem[],
  place: (p: Vec3) => Vec3,
  explodeBy: 'items' | 'groups',
): { mover: Uint32Array; moves: Float64Array } => {
  const movers = new Map<string, number>()
  const mover = Uint32Array.from(items, (item, i) => {
    const key = explodeBy === 'groups' && item.group >= 0 ? `g${item.group}` : `i${i}`
    const known = movers.get(key)
    if (known !== undefined) return known
    movers.set(key, movers.size)
    return movers.size - 1
  })
  const area = new Float64Array(movers.size)
  const sums = new Float64Array(6 * movers.size)
  items.forEach((item, i) => {
    const m = mover[i]!
    const f = flats[i]!
    const centroid = place(f.centroid)
    area[m]! += f.area
    for (let k = 0; k < 3; k++) {
      sums[6 * m + k]! += f.area * centroid[k]!
      sums[6 * m + 3 + k]! += f.area * item.normal[k]!
    }
  })
  const moves = new Float64Array(3 * movers.size)
  for (let m = 0; m < movers.size; m++) {
    const share = area[m]! > 0 ? 1 / area[m]! : 0
    for (let k = 0; k < 3; k++)
      moves[3 * m + k] = share * (outwards.centroid * sums[6 * m + k]! + outwards.normal * sums[6 * m + 3 + k]!)
  }
  return { mover, moves }
}

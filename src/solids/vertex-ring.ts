/** The faces round a vertex, in the order in which edges join them. */
import { BrokenPromise } from '../errors'

interface Faces {
  readonly faces: readonly { readonly cycle: readonly number[] }[]
}

/** A face at a vertex, and the other ends of its two edges there. */
export interface Corner {
  readonly face: number
  readonly ends: readonly [number, number]
}

/** One face of a walk round a vertex: entered over the edge to `from`, left over the edge to `to`. */
export interface RingStep {
  readonly face: number
  readonly from: number
  readonly to: number
}

/** By vertex (0 to count − 1): its corners, in the order of the faces. */
export const cornersOf = ({ faces }: Faces, count: number): Corner[][] => {
  const at: Corner[][] = Array.from({ length: count }, () => [])
  faces.forEach(({ cycle }, face) => {
    const n = cycle.length
    cycle.forEach((v, k) => {
      at[v]!.push({ face, ends: [cycle[(k + n - 1) % n]!, cycle[(k + 1) % n]!] })
    })
  })
  return at
}

/**
 * Walks from face to face over the edges at a vertex.
 * @param corners the faces at that vertex
 * @throws BrokenPromise when they do not form one ring, as where several components share the vertex
 */
export const ringOf = (corners: readonly Corner[], vertex: number): RingStep[] => {
  const visited = new Set<number>()
  const walk: RingStep[] = []
  let at = corners[0]?.ends[0] ?? -1
  for (let k = 0; k < corners.length; k++) {
    const next = corners.find((c) => !visited.has(c.face) && c.ends.includes(at))
    if (!next) throw new BrokenPromise('The faces round a vertex do not form one ring.', { vertex })
    visited.add(next.face)
    const to = next.ends[0] === at ? next.ends[1] : next.ends[0]
    walk.push({ face: next.face, from: at, to })
    at = to
  }
  return walk
}

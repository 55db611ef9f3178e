/** Edges of a solid and the faces that share them. */
import { BrokenPromise } from '../errors'

interface Faces {
  readonly faces: readonly { readonly cycle: readonly number[] }[]
}

export interface SolidEdge {
  readonly ends: readonly [number, number]
  /** The two faces, and whether each runs ends[0] → ends[1]. */
  readonly sides: readonly { readonly face: number; readonly forward: boolean }[]
}

/** @throws BrokenPromise when an edge does not have exactly two faces */
export const edgesOf = ({ faces }: Faces): SolidEdge[] => {
  const found = new Map<number, { ends: [number, number]; sides: { face: number; forward: boolean }[] }>()
  faces.forEach(({ cycle }, face) => {
    cycle.forEach((a, i) => {
      const b = cycle[(i + 1) % cycle.length]!
      const low = Math.min(a, b)
      const high = Math.max(a, b)
      const key = low * 0x100000 + high
      const edge = found.get(key)
      const side = { face, forward: a === low }
      if (edge) edge.sides.push(side)
      else found.set(key, { ends: [low, high], sides: [side] })
    })
  })
  const edges = [...found.values()]
  for (const e of edges)
    if (e.sides.length !== 2)
      throw new BrokenPromise('An edge does not have exactly two faces.', { ends: e.ends, faces: e.sides.length })
  return edges
}

/**
 * By face: +1 or −1, so that with these signs every edge is run through once each way; null if the surface cannot be
 * oriented. Each connected component is begun with +1.
 */
export const orientFaces = (solid: Faces, edges: readonly SolidEdge[]): number[] | null => {
  const around: { other: number; same: boolean }[][] = solid.faces.map(() => [])
  for (const { sides } of edges) {
    const [a, b] = sides as [SolidEdge['sides'][number], SolidEdge['sides'][number]]
    const same = a.forward !== b.forward
    around[a.face]!.push({ other: b.face, same })
    around[b.face]!.push({ other: a.face, same })
  }
  const sign = solid.faces.map(() => 0)
  for (let start = 0; start < sign.length; start++) {
    if (sign[start] !== 0) continue
    sign[start] = 1
    const queue = [start]
    for (const f of queue)
      for (const { other, same } of around[f]!) {
        const wanted = same ? sign[f]! : -sign[f]!
        if (sign[other] === 0) {
          sign[other] = wanted
          queue.push(other)
        } else if (sign[other] !== wanted) return null
      }
  }
  return sign
}

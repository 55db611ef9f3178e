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
 * Walks from face to face over the edges at a vertex, until every corner has been passed. A compound or a model of several
 * components may have several rings at a vertex.
 * @param corners the faces at that vertex; a face that comes by twice has two corners
 * @param component of a face: where more than two faces meet at an edge, a walk stays in its component
 * @throws BrokenPromise when a walk does not come back to its first edge: the faces leave a gap
 */
export const ringsOf = (
  corners: readonly Corner[],
  vertex: number,
  component: (face: number) => number = () => 0,
): RingStep[][] => {
  const left = [...corners]
  const rings: RingStep[][] = []
  for (let first = left.shift(); first; first = left.shift()) {
    const [start, second] = first.ends
    const walk: RingStep[] = [{ face: first.face, from: start, to: second }]
    const mine = component(first.face)
    for (let at = second; at !== start; ) {
      const next = left.findIndex((c) => c.ends.includes(at) && component(c.face) === mine)
      if (next < 0) throw new BrokenPromise('The faces round a vertex leave a gap.', { vertex })
      const [{ face, ends }] = left.splice(next, 1) as [Corner]
      const to = ends[0] === at ? ends[1] : ends[0]
      walk.push({ face, from: at, to })
      at = to
    }
    rings.push(walk)
  }
  return rings
}

/**
 * As `ringsOf`, for a vertex whose faces form one ring.
 * @throws BrokenPromise when they do not, as where several components share the vertex
 */
export const ringOf = (corners: readonly Corner[], vertex: number): RingStep[] => {
  const [ring = [], ...more] = ringsOf(corners, vertex)
  if (more.length > 0) throw new BrokenPromise('The faces round a vertex do not form one ring.', { vertex })
  return ring
}

/** Which way a face is passed, seen along the axis of its vertex. A face that contains the axis is seen edge-on. */
export type Sense = 'forward' | 'backwards' | 'edge-on'

export interface Winding {
  /** By step of the ring. */
  readonly senses: readonly Sense[]
  /** How often the faces wind round the axis, those seen edge-on left out; 0 where forward and back cancel out. */
  readonly windings: number
  /** Whether the walk as a whole runs clockwise, against the bearings. */
  readonly isClockwise: boolean
}

/**
 * Adds up the angles under which the faces of a ring are seen along the axis.
 * @param bearing direction of a neighbour about the axis in radians, counter-clockwise
 */
export const windingOf = (ring: readonly RingStep[], bearing: (vertex: number) => number): Winding => {
  const angles = ring.map(({ from, to }) => {
    let angle = bearing(to) - bearing(from)
    if (angle <= -Math.PI + 1e-9) angle += 2 * Math.PI
    if (angle > Math.PI + 1e-9) angle -= 2 * Math.PI
    return angle
  })
  // A face that contains the axis is seen as half a turn either way, or as none: it decides nothing.
  const isEdgeOn = (angle: number): boolean => Math.abs(angle) < 1e-6 || Math.abs(angle) > Math.PI - 1e-6
  const turning = angles.reduce((sum, angle) => sum + (isEdgeOn(angle) ? 0 : angle), 0)
  const bent = angles.filter((angle) => !isEdgeOn(angle))
  // Where the turning cancels out, as where the axis lies outside the figure, the greater number decides.
  const isClockwise = Math.abs(turning) > 1e-6 ? turning < 0 : 2 * bent.filter((a) => a < 0).length > bent.length
  return {
    senses: angles.map((angle) => (isEdgeOn(angle) ? 'edge-on' : angle < 0 === isClockwise ? 'forward' : 'backwards')),
    windings: Math.round(Math.abs(turning) / (2 * Math.PI)),
    isClockwise,
  }
}

/** Vertex configurations: the faces round a vertex in order, retrograde ones as n/d with d > n/2. */
import { cross, dot, normalize, planeFrame, sub, type Vec3 } from '../geometry/vec3'
import type { Solid } from './types'
import { cornersOf, ringOf, windingOf } from './vertex-ring'

interface Step {
  readonly n: number
  readonly d: number
  /** Runs against the sense in which the faces wind round the vertex. */
  readonly retrograde: boolean
}

export interface VertexConfiguration {
  readonly steps: readonly Step[]
  /** How many times the faces wind round the vertex (1 where the sense is undecided). */
  readonly windings: number
}

/** Walks the faces round one vertex and adds up the angles under which they are seen along the axis. */
export const vertexConfiguration = (solid: Solid, vertex: number): VertexConfiguration => {
  const p = solid.vertices[vertex]!
  const { u, v } = planeFrame(normalize(p))
  const bearing = (q: number): number => {
    const d = sub(solid.vertices[q]!, p)
    return Math.atan2(dot(d, v), dot(d, u))
  }
  const walk = ringOf(cornersOf(solid, solid.vertices.length)[vertex]!, vertex)
  const { senses, windings } = windingOf(walk, bearing)
  const steps = walk.map(({ face }, i): Step => {
    const kind = solid.kinds[solid.faces[face]!.kind]!
    return { n: kind.n, d: kind.d, retrograde: senses[i] === 'backwards' }
  })
  return { steps, windings: Math.max(1, windings) }
}

const stepText = ({ n, d, retrograde }: Step): string => {
  const winding = retrograde ? n - d : d
  return winding === 1 ? `${n}` : `${n}/${winding}`
}

/** E.g. `3.4.3/2.4` or `(3.3.3.3.5/2)/2`; the cyclic order is begun where it reads smallest. */
export const configurationText = ({ steps, windings }: VertexConfiguration): string => {
  const inner = smallest(steps.map(stepText)).join('.')
  return windings === 1 ? inner : `(${inner})/${windings}`
}

const compareSteps = (a: string, b: string): number => {
  const value = (s: string): [number, number] => {
    const [n, d] = s.split('/').map(Number) as [number, number | undefined]
    return [n, d ?? 1]
  }
  const [p, q] = [value(a), value(b)]
  return p[0] - q[0] || p[1] - q[1]
}

/** The cyclic shift, either way round, that comes first. */
const smallest = (parts: readonly string[]): string[] => {
  let best: string[] | null = null
  for (const ring of [parts, [...parts].reverse()])
    for (let i = 0; i < ring.length; i++) {
      const turned = [...ring.slice(i), ...ring.slice(0, i)]
      if (!best || order(turned, best) < 0) best = turned
    }
  return best ?? []
}

const order = (a: readonly string[], b: readonly string[]): number => {
  for (let i = 0; i < a.length; i++) {
    const c = compareSteps(a[i]!, b[i]!)
    if (c !== 0) return c
  }
  return 0
}

/**
 * One spelling for configurations that mean the same: a cyclic shift, a reversal, or every n/d turned into n/(n − d) is the
 * same figure. A V before it, as for the faces of a dual, is kept. Null if the text is no configuration.
 */
export const canonicalConfiguration = (text: string): string | null => {
  const face = /^[vV]\s*(?=[\d(])/.exec(text.trim())?.[0] ?? ''
  const figure = text.trim().slice(face.length)
  const match = /^\(?([\d./\s]+)\)?(?:\/(\d+))?$/.exec(figure)
  if (!match) return null
  const parts = match[1]!.split('.').map((s) => s.trim())
  if (parts.length < 3 || !parts.every((s) => /^\d+(\/\d+)?$/.test(s))) return null
  const turned = parts.map((s) => {
    const [n, d] = s.split('/').map(Number) as [number, number | undefined]
    const other = n - (d ?? 1)
    return other === 1 ? `${n}` : `${n}/${other}`
  })
  const a = smallest(parts)
  const b = smallest(turned)
  const windings = figure.startsWith('(') ? (match[2] ?? '1') : '1'
  return `${face ? 'V' : ''}${(order(a, b) <= 0 ? a : b).join('.')} w${windings}`
}

/** Angle in degrees between two faces at a shared edge, measured through the side where both lie: 0 to 180. */
export const dihedral = (edge: Vec3, towardA: Vec3, towardB: Vec3): number => {
  const off = (w: Vec3): Vec3 => {
    const along = dot(edge, w)
    return normalize([w[0] - along * edge[0], w[1] - along * edge[1], w[2] - along * edge[2]])
  }
  const a = off(towardA)
  const b = off(towardB)
  const c = cross(a, b)
  return (Math.atan2(Math.sqrt(dot(c, c)), dot(a, b)) * 180) / Math.PI
}

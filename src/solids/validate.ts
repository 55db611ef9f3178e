/** What a solid promises, checked on its coordinates; each family has promises of its own. */
import { add, cross, distance, dot, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import { footOf } from './duals'
import { edgesOf } from './edges'
import type { Solid } from './types'

export interface SolidCheck {
  readonly name: string
  readonly ok: boolean
  readonly detail: string
}

interface Pledge {
  readonly name: string
  readonly faults: (solid: Solid, within: number) => readonly string[]
}

const pointsOf = (solid: Solid, cycle: readonly number[]): Vec3[] =>
  cycle.map((v) => solid.vertices[v] ?? ([Number.NaN, Number.NaN, Number.NaN] as Vec3))

const centroid = (points: readonly Vec3[]): Vec3 =>
  scale(
    points.reduce((s, p) => add(s, p), [0, 0, 0] as Vec3),
    1 / points.length,
  )

const lengthsOf = (points: readonly Vec3[]): number[] =>
  points.map((p, i) => distance(p, points[(i + 1) % points.length]!))

/** Faults of each face, with the face's number before them. */
const byFace =
  (fault: (points: readonly Vec3[], within: number) => string | null) =>
  (solid: Solid, within: number): string[] =>
    solid.faces.flatMap(({ cycle }, i) => {
      const said = fault(pointsOf(solid, cycle), within)
      return said === null ? [] : [`face ${i}${said}`]
    })

const unitEdges: Pledge = {
  name: 'edges have unit length',
  faults: byFace((points, within) => {
    const off = lengthsOf(points).find((l) => !(Math.abs(l - 1) < within))
    return off === undefined ? null : `: edge of ${off}`
  }),
}

/** The plane is taken from the two edges that tell it best, so that crossed faces without area have one too. */
const flat: Pledge = {
  name: 'faces are flat',
  faults: byFace((points, within) => {
    const edges = points.map((p, i) => sub(points[(i + 1) % points.length]!, p))
    let best: Vec3 = [0, 0, 0]
    for (const [i, a] of edges.entries())
      for (const b of edges.slice(i + 1)) if (norm(cross(a, b)) > norm(best)) best = cross(a, b)
    const [normal, centre] = [normalize(best), centroid(points)]
    return points.every((p) => Math.abs(dot(normal, sub(p, centre))) < within) ? null : ' is not flat'
  }),
}

const regular: Pledge = {
  name: 'faces are regular',
  faults: byFace((points, within) => {
    const centre = centroid(points)
    const radius = distance(points[0]!, centre)
    return points.every((p) => Math.abs(distance(p, centre) - radius) < within) ? null : ' is not regular'
  }),
}

const counted: Pledge = {
  name: 'kinds are counted',
  faults: (solid) => {
    const counts = solid.kinds.map(() => 0)
    const faults: string[] = []
    solid.faces.forEach(({ cycle, kind }, i) => {
      const n = solid.kinds[kind]?.n
      if (n !== cycle.length && n !== 0) faults.push(`face ${i} is not of its kind`)
      if (counts[kind] !== undefined) counts[kind]++
    })
    for (const [i, k] of solid.kinds.entries())
      if (k.count !== counts[i]) faults.push(`${counts[i]} faces of kind ${k.name}, not ${k.count}`)
    return faults
  },
}

const oneSphere: Pledge = {
  name: 'vertices lie on one sphere',
  faults: (solid, within) => {
    const radius = norm(solid.vertices[0]!)
    return solid.vertices.flatMap((p, i) => (Math.abs(norm(p) - radius) < within ? [] : [`vertex ${i} at ${norm(p)}`]))
  },
}

const twoFaces: Pledge = {
  name: 'every edge has two faces',
  faults: (solid) => {
    try {
      edgesOf(solid)
      return []
    } catch (error) {
      return [error instanceof Error ? error.message : String(error)]
    }
  },
}

/** Congruent: the same lengths of edges in turn and the same distances from the foot of the centre, either way round. */
const congruent: Pledge = {
  name: 'faces of a kind are congruent',
  faults: (solid, within) => {
    const measures = (points: readonly Vec3[]): number[] => {
      const foot = footOf(points) ?? [0, 0, 0]
      return [...lengthsOf(points), ...points.map((p) => distance(p, foot)), norm(foot)].sort((a, b) => a - b)
    }
    const model = solid.kinds.map(({ id }) => {
      const face = solid.faces.find((f) => f.kind === id)
      return face ? measures(pointsOf(solid, face.cycle)) : []
    })
    return solid.faces.flatMap(({ cycle, kind }, i) => {
      const alike = measures(pointsOf(solid, cycle)).every(
        (x, k) => Math.abs(x - (model[kind]?.[k] ?? Number.NaN)) < within,
      )
      return alike ? [] : [`face ${i} differs from others of its kind`]
    })
  },
}

/** The lines of the edges touch one sphere about the centre: so it is with every dual of a uniform solid. */
const touchSphere: Pledge = {
  name: 'edges touch one sphere',
  faults: (solid, within) => {
    const apart = (a: Vec3, b: Vec3): number => norm(cross(a, normalize(sub(b, a))))
    let radius = Number.NaN
    return solid.faces.flatMap(({ cycle }, i) => {
      const points = pointsOf(solid, cycle)
      if (i === 0) radius = apart(points[0]!, points[1]!)
      const off = points.find((p, k) => !(Math.abs(apart(p, points[(k + 1) % points.length]!) - radius) < within))
      return off ? [`face ${i}: an edge does not touch the sphere`] : []
    })
  },
}

/** Every edge joins two faces of one component. */
const closedComponents: Pledge = {
  name: 'components are closed',
  faults: (solid) => {
    const { components } = solid
    if (components?.length !== solid.faces.length) return ['not every face has a component']
    const owners = new Map<string, Set<number>>()
    solid.faces.forEach(({ cycle }, i) => {
      cycle.forEach((v, k) => {
        const w = cycle[(k + 1) % cycle.length]!
        const key = `${Math.min(v, w)} ${Math.max(v, w)}`
        owners.set(key, (owners.get(key) ?? new Set()).add(components[i]!))
      })
    })
    return [...owners].flatMap(([key, set]) => (set.size === 1 ? [] : [`edge ${key} joins two components`]))
  },
}

const uniform = [unitEdges, flat, regular, counted, oneSphere, twoFaces]

const promisesOf = (solid: Solid): readonly Pledge[] => {
  switch (solid.family ?? 'uniform') {
    case 'dual':
      return [flat, congruent, counted, touchSphere, twoFaces]
    case 'compound':
      return [...uniform, closedComponents]
    case 'own':
      return [flat, counted, twoFaces]
    default:
      return uniform
  }
}

/**
 * Checks what the solid's family promises, to 1e-10 of its unit for unit edges and to 1e-10 of its size for duals; own
 * models to their precision.
 *
 * - uniform, prism, antiprism: unit edges, regular flat faces, vertices on one sphere about the origin;
 * - dual: flat faces, congruent within a kind, edges that touch one sphere about the origin;
 * - compound: as uniform, and every edge within one component;
 * - own: flat faces;
 * - all: two faces to an edge, kinds as counted.
 */
export const validateSolid = (solid: Solid): SolidCheck[] => {
  const size = solid.family === 'dual' ? Math.max(1, ...solid.vertices.map(norm)) : 1
  const within = Math.max(1e-10 * size, solid.precision ?? 0)
  return promisesOf(solid).map(({ name, faults }) => {
    const found = faults(solid, within)
    return { name, ok: found.length === 0, detail: found.slice(0, 3).join('; ') || 'ok' }
  })
}

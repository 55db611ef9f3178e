/** What a uniform solid promises, checked on its coordinates. */
import { add, cross, distance, dot, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import { edgesOf } from './edges'
import type { Solid } from './types'

export interface SolidCheck {
  readonly name: string
  readonly ok: boolean
  readonly detail: string
}

/** Unit edges, regular flat faces, all vertices on one sphere about the origin, two faces to an edge, kinds as counted. */
export const validateSolid = (solid: Solid): SolidCheck[] => {
  const checks: SolidCheck[] = []
  const check = (name: string, faults: readonly string[]): void => {
    checks.push({ name, ok: faults.length === 0, detail: faults.slice(0, 3).join('; ') || 'ok' })
  }
  const faults: { edge: string[]; flat: string[]; regular: string[]; kinds: string[] } = {
    edge: [],
    flat: [],
    regular: [],
    kinds: [],
  }
  const counts = solid.kinds.map(() => 0)
  solid.faces.forEach(({ cycle, kind }, i) => {
    const points = cycle.map((v) => solid.vertices[v] ?? ([Number.NaN, Number.NaN, Number.NaN] as Vec3))
    const n = points.length
    const centre = scale(
      points.reduce((s, p) => add(s, p), [0, 0, 0] as Vec3),
      1 / n,
    )
    const normal = normalize(cross(sub(points[0]!, centre), sub(points[1]!, centre)))
    const radius = distance(points[0]!, centre)
    points.forEach((p, k) => {
      const next = points[(k + 1) % n]!
      if (!(Math.abs(distance(p, next) - 1) < 1e-10)) faults.edge.push(`face ${i}: edge of ${distance(p, next)}`)
      if (!(Math.abs(dot(normal, sub(p, centre))) < 1e-10)) faults.flat.push(`face ${i} is not flat`)
      if (!(Math.abs(distance(p, centre) - radius) < 1e-10)) faults.regular.push(`face ${i} is not regular`)
    })
    if (solid.kinds[kind]?.n !== n) faults.kinds.push(`face ${i} is not of its kind`)
    if (counts[kind] !== undefined) counts[kind]++
  })
  solid.kinds.forEach((k, i) => {
    if (k.count !== counts[i]) faults.kinds.push(`${counts[i]} faces of kind ${k.name}, not ${k.count}`)
  })
  check('edges have unit length', faults.edge)
  check('faces are flat', faults.flat)
  check('faces are regular', faults.regular)
  check('kinds are counted', faults.kinds)
  const radius = norm(solid.vertices[0]!)
  check(
    'vertices lie on one sphere',
    solid.vertices.flatMap((p, i) => (Math.abs(norm(p) - radius) < 1e-10 ? [] : [`vertex ${i} at ${norm(p)}`])),
  )
  let fault = ''
  try {
    edgesOf(solid)
  } catch (error) {
    fault = error instanceof Error ? error.message : String(error)
  }
  check('every edge has two faces', fault ? [fault] : [])
  return checks
}

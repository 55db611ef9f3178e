/** What there is to know about a solid, worked out from its construction. */
import { add, cross, dot, norm, normalize, scale, sub, type Vec3 } from '../geometry/vec3'
import type { Built } from './build'
import { edgesOf, orientFaces, type SolidEdge } from './edges'
import { schoenflies } from './symmetry'
import type { Solid, SolidFacts } from './types'
import { configurationText, dihedral, vertexConfiguration } from './vertex-configuration'

/**
 * @param index 1 to 75
 * @param wythoff the symbol it was constructed from
 */
export const factsOf = ({ solid, isometries }: Built, index: number, wythoff: string): SolidFacts => {
  const edges = edgesOf(solid)
  const signs = orientFaces(solid, edges)
  return {
    id: solid.id,
    index,
    family: solid.family ?? 'uniform',
    name: solid.name,
    wythoff,
    vertexConfiguration: configurationText(vertexConfiguration(solid, 0)),
    vertices: solid.vertices.length,
    edges: edges.length,
    faces: solid.faces.length,
    facesByKind: solid.kinds,
    euler: solid.vertices.length - edges.length + solid.faces.length,
    density: signs ? densityAboutCentre(solid, signs) : null,
    chiral: isometries.reflections.length === 0,
    orientable: signs !== null,
    symmetry: schoenflies(isometries),
    circumradius: Math.max(...solid.vertices.map(norm)),
    dual: null,
    components: 1,
    notes: [],
    dihedralAngles: dihedralAngles(solid, edges),
  }
}

const centreOf = (solid: Solid, face: number): Vec3 => {
  const { cycle } = solid.faces[face]!
  return scale(
    cycle.reduce((s, v) => add(s, solid.vertices[v]!), [0, 0, 0] as Vec3),
    1 / cycle.length,
  )
}

/**
 * How often the oriented faces cover the directions from the centre: signed solid angles over 4π, in absolute value. Null
 * where a face passes through the centre. Solid angle of a triangle: "The Solid Angle of a Plane Triangle", IEEE
 * Transactions on Biomedical Engineering BME-30 (1983).
 */
const densityAboutCentre = (solid: Solid, signs: readonly number[]): number | null => {
  let total = 0
  for (const [i, { cycle }] of solid.faces.entries()) {
    const c = centreOf(solid, i)
    const a0 = solid.vertices[cycle[0]!]!
    const b0 = solid.vertices[cycle[1]!]!
    const normal = normalize(cross(sub(a0, c), sub(b0, c)))
    if (Math.abs(dot(normal, a0)) < 1e-9) return null
    cycle.forEach((v, k) => {
      const a = solid.vertices[v]!
      const b = solid.vertices[cycle[(k + 1) % cycle.length]!]!
      const [la, lb, lc] = [norm(a), norm(b), norm(c)]
      const volume = dot(a, cross(b, c))
      const under = la * lb * lc + dot(a, b) * lc + dot(a, c) * lb + dot(b, c) * la
      total += signs[i]! * 2 * Math.atan2(volume, under)
    })
  }
  return Math.abs(Math.round(total / (4 * Math.PI)))
}

const dihedralAngles = (solid: Solid, edges: readonly SolidEdge[]): SolidFacts['dihedralAngles'] => {
  const found: { kinds: [number, number]; degrees: number }[] = []
  for (const { ends, sides } of edges) {
    const [p, q] = [solid.vertices[ends[0]]!, solid.vertices[ends[1]]!]
    const [a, b] = sides.map((s) => s.face) as [number, number]
    const degrees = dihedral(normalize(sub(q, p)), sub(centreOf(solid, a), p), sub(centreOf(solid, b), p))
    const kinds = [solid.faces[a]!.kind, solid.faces[b]!.kind].sort((x, y) => x - y) as [number, number]
    if (!found.some((f) => f.kinds[0] === kinds[0] && f.kinds[1] === kinds[1] && Math.abs(f.degrees - degrees) < 1e-6))
      found.push({ kinds, degrees })
  }
  return found.sort((x, y) => x.kinds[0] - y.kinds[0] || x.kinds[1] - y.kinds[1] || x.degrees - y.degrees)
}

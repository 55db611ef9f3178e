/** What there is to know about a solid, worked out from its construction. */
import { cross, dot, norm, normalize, sub, type Vec3 } from '../geometry/vec3'
import type { Built } from './build'
import { footOf } from './duals'
import { edgesOf, orientFaces, type SolidEdge } from './edges'
import { schoenflies } from './symmetry'
import type { Solid, SolidFacts } from './types'
import { configurationText, dihedral, vertexConfiguration } from './vertex-configuration'

/** What the catalogue knows about a solid besides its construction. */
export interface About {
  readonly index: number | null
  readonly wythoff: string
  readonly dual: string | null
  readonly notes: readonly string[]
  /** For duals: the configuration of the original, and its Euler characteristic. */
  readonly original?: { readonly configuration: string; readonly euler: number }
}

/** Facts of a solid of the catalogue. */
export const factsOf = ({ solid, isometries }: Built, about: About): SolidFacts => {
  const edges = edgesOf(solid)
  const signs = orientFaces(solid, edges)
  const components = new Set(solid.components ?? [0]).size
  const { original } = about
  return {
    id: solid.id,
    index: about.index,
    family: solid.family ?? 'uniform',
    name: solid.name,
    wythoff: about.wythoff,
    vertexConfiguration: original
      ? `V${original.configuration}`
      : components > 1
        ? ''
        : configurationText(vertexConfiguration(solid, 0)),
    vertices: solid.vertices.length,
    edges: edges.length,
    faces: solid.faces.length,
    facesByKind: solid.kinds,
    euler: components > 1 ? null : (original?.euler ?? solid.vertices.length - edges.length + solid.faces.length),
    density: signs && components === 1 ? densityAboutCentre(solid, signs) : null,
    chiral: isometries.reflections.length === 0,
    orientable: signs !== null,
    symmetry: schoenflies(isometries),
    circumradius: Math.max(...solid.vertices.map(norm)),
    dual: about.dual,
    components,
    notes: about.notes,
    dihedralAngles: dihedralAngles(solid, edges),
  }
}

/**
 * The middle of a face: the foot of the perpendicular from the solid's centre. In a regular face of a uniform solid this is
 * its centre, in a face of a dual the centre of the circle that touches its edges.
 */
const middlesOf = (solid: Solid): Vec3[] =>
  solid.faces.map(({ cycle }) => footOf(cycle.map((v) => solid.vertices[v]!)) ?? [0, 0, 0])

/**
 * How often the oriented faces cover the directions from the centre: signed solid angles over 4π, in absolute value. Null
 * where a face passes through the centre. Solid angle of a triangle: "The Solid Angle of a Plane Triangle", IEEE
 * Transactions on Biomedical Engineering BME-30 (1983).
 */
const densityAboutCentre = (solid: Solid, signs: readonly number[]): number | null => {
  let total = 0
  for (const [i, c] of middlesOf(solid).entries()) {
    const { cycle } = solid.faces[i]!
    const lc = norm(c)
    if (lc < 1e-9) return null
    cycle.forEach((v, k) => {
      const a = solid.vertices[v]!
      const b = solid.vertices[cycle[(k + 1) % cycle.length]!]!
      const [la, lb] = [norm(a), norm(b)]
      const volume = dot(a, cross(b, c))
      const under = la * lb * lc + dot(a, b) * lc + dot(a, c) * lb + dot(b, c) * la
      total += signs[i]! * 2 * Math.atan2(volume, under)
    })
  }
  return Math.abs(Math.round(total / (4 * Math.PI)))
}

const dihedralAngles = (solid: Solid, edges: readonly SolidEdge[]): SolidFacts['dihedralAngles'] => {
  const found: { kinds: [number, number]; degrees: number }[] = []
  const middles = middlesOf(solid)
  for (const { ends, sides } of edges) {
    const [p, q] = [solid.vertices[ends[0]]!, solid.vertices[ends[1]]!]
    const [a, b] = sides.map((s) => s.face) as [number, number]
    const degrees = dihedral(normalize(sub(q, p)), sub(middles[a]!, p), sub(middles[b]!, p))
    const kinds = [solid.faces[a]!.kind, solid.faces[b]!.kind].sort((x, y) => x - y) as [number, number]
    if (!found.some((f) => f.kinds[0] === kinds[0] && f.kinds[1] === kinds[1] && Math.abs(f.degrees - degrees) < 1e-6))
      found.push({ kinds, degrees })
  }
  return found.sort((x, y) => x.kinds[0] - y.kinds[0] || x.kinds[1] - y.kinds[1] || x.degrees - y.degrees)
}

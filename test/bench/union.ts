/**
 * The skin against a general-purpose mesh Boolean: the union of the cones from the centre over all filled faces. Where a
 * solid's inside is what its faces hide from the centre, both enclose the same volume, and only those are compared.
 */
import Module from 'manifold-3d'
import { textTable } from '../../src/batch/text-table'
import { union } from '../../src/geometry/clip'
import type { Vec2 } from '../../src/geometry/vec2'
import { add, cross, dot, normalize, planeFrame, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import { computeSkin } from '../../src/skin'
import { buildSolid } from '../../src/solids'
import type { Solid } from '../../src/solids/types'
import { medianMs } from './measure'

const ids = [
  'icosidodecahedron',
  'small-stellated-dodecahedron',
  'great-dodecahedron',
  'great-stellated-dodecahedron',
  'great-icosahedron',
  'ditrigonal-dodecadodecahedron',
  'great-icosidodecahedron',
  'snub-dodecadodecahedron',
  'great-snub-icosidodecahedron',
  'great-retrosnub-icosidodecahedron',
]

/** Outlines of the filled faces in space, counter-clockwise seen from outside; faces through the centre have no cone. */
const filledFaces = (solid: Solid): Vec3[][] =>
  solid.faces.flatMap(({ cycle }) => {
    const points = cycle.map((i) => solid.vertices[i]!)
    const centre = scale(points.reduce(add), 1 / points.length)
    const first = normalize(cross(sub(points[0]!, centre), sub(points[1]!, centre)))
    const distance = dot(first, centre)
    if (Math.abs(distance) < 1e-9) return []
    const normal = distance > 0 ? first : scale(first, -1)
    const { u, v } = planeFrame(normal)
    // The door to clipping is made for mm: scaled up so that its grid does not show.
    const k = 100
    const flat = points.map((p): Vec2 => [dot(p, u) * k, dot(p, v) * k])
    return union([flat]).map((ring) =>
      ring.map(([x, y]) => add(scale(normal, Math.abs(distance)), add(scale(u, x / k), scale(v, y / k)))),
    )
  })

export const benchUnion = async (): Promise<void> => {
  const wasm = await Module()
  wasm.setup()
  const { Manifold, Mesh } = wasm

  const cone = (ring: readonly Vec3[]): InstanceType<typeof Manifold> => {
    // The centre, the middle of the face (filled stars are seen whole from it), and the ring.
    const middle = scale(ring.reduce(add), 1 / ring.length)
    const points = [[0, 0, 0] as Vec3, middle, ...ring]
    const triangles = ring.flatMap((_, i) => {
      const [a, b] = [2 + i, 2 + ((i + 1) % ring.length)]
      return [1, a, b, 0, b, a]
    })
    const mesh = new Mesh({
      numProp: 3,
      vertProperties: new Float32Array(points.flat()),
      triVerts: new Uint32Array(triangles),
    })
    return new Manifold(mesh)
  }

  const rows = ids.flatMap((id) => {
    const solid = buildSolid(id, 'left')
    const skin = computeSkin(solid)
    const faces = filledFaces(solid)
    const unite = (): number => {
      const cones = faces.map(cone)
      const whole = Manifold.union(cones)
      const volume = whole.volume()
      for (const part of [...cones, whole]) part.delete()
      return volume
    }
    const volume = unite()
    const same = Math.abs(volume / skin.volume - 1) < 1e-4
    if (!same) return [[id, skin.panels.length, skin.volume, volume, null, null, null]]
    const [ours, theirs] = [medianMs(() => computeSkin(solid)), medianMs(unite, 3)]
    return [[id, skin.panels.length, skin.volume, volume, Math.round(ours), Math.round(theirs), theirs / ours]]
  })
  console.log('Skin against a mesh Boolean (– where cones from the centre enclose something else)')
  console.log(textTable(['solid', 'panels', 'volume', 'union', 'skin ms', 'union ms', 'union / skin'], rows))
  console.log()
}

/** Small skins made by hand from closed meshes, so that these tests do not depend on how skins are computed. */
import { add, cross, dot, norm, normalize, scale, sub, type Vec3 } from '../../src/geometry/vec3'
import type { Skin, SkinCrease, SkinPanel } from '../../src/skin/types'

const newellNormal = (points: readonly Vec3[]): Vec3 =>
  points.reduce<Vec3>((sum, p, i) => add(sum, cross(p, points[(i + 1) % points.length]!)), [0, 0, 0])

/**
 * A skin from a closed mesh without self-crossings: faces counter-clockwise seen from outside, one panel per face, one
 * crease per mesh edge. Lengths as given, so pass a mesh whose edge is 1, or take `edgeMm` as a scale.
 */
export const skinOfMesh = (points: readonly Vec3[], faces: readonly (readonly number[])[], name = 'mesh'): Skin => {
  const normals = faces.map((f) => normalize(newellNormal(f.map((i) => points[i]!))))
  const owner = new Map<string, number>()
  faces.forEach((f, p) => {
    f.forEach((v, i) => {
      owner.set(`${v} ${f[(i + 1) % f.length]}`, p)
    })
  })
  const creases: SkinCrease[] = []
  const creaseOf = new Map<string, number>()
  faces.forEach((f, p) => {
    f.forEach((a, i) => {
      const b = f[(i + 1) % f.length]!
      const q = owner.get(`${b} ${a}`)
      if (q === undefined) throw new Error(`edge ${a}-${b} is open`)
      if (q < p) return
      const id = creases.length
      const t = normalize(sub(points[b]!, points[a]!))
      // Into panel p and into panel q, square to the crease.
      const into = cross(normals[p]!, t)
      const intoOther = cross(t, normals[q]!)
      const between = (Math.acos(Math.max(-1, Math.min(1, dot(into, intoOther)))) * 180) / Math.PI
      const mountain = dot(intoOther, normals[p]!) < 0
      creases.push({
        id,
        panels: [p, q],
        ends: [a, b],
        innerAngle: mountain ? between : 360 - between,
        contact: 'surface',
        stretch: -1,
        length: norm(sub(points[b]!, points[a]!)),
      })
      creaseOf.set(`${a} ${b}`, id)
      creaseOf.set(`${b} ${a}`, id)
    })
  })
  const panels = faces.map(
    (f, id): SkinPanel => ({
      id,
      normal: normals[id]!,
      rings: [f],
      creases: [f.map((v, i) => creaseOf.get(`${v} ${f[(i + 1) % f.length]}`)!)],
      faces: [id],
      kind: f.length - 3,
      orbit: 0,
      area: norm(newellNormal(f.map((i) => points[i]!))) / 2,
      body: 0,
    }),
  )
  return {
    solid: name,
    hand: 'none',
    fill: 'nonzero',
    slack: 0,
    points,
    panels,
    creases,
    contacts: [],
    touches: [],
    bodies: 1,
    parts: 1,
    lineContactLength: 0,
    area: panels.reduce((sum, p) => sum + p.area, 0),
    volume: panels.reduce((sum, p) => sum + (dot(p.normal, points[p.rings[0]![0]!]!) * p.area) / 3, 0),
  }
}

/** Facets of the convex hull of points in convex position, counter-clockwise from outside; for a few dozen points. */
export const hullFaces = (points: readonly Vec3[]): number[][] => {
  const faces = new Map<string, number[]>()
  const n = points.length
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++)
      for (let k = j + 1; k < n; k++) {
        let normal = cross(sub(points[j]!, points[i]!), sub(points[k]!, points[i]!))
        if (norm(normal) < 1e-9) continue
        normal = normalize(normal)
        let heights = points.map((p) => dot(sub(p, points[i]!), normal))
        if (heights.every((h) => h > -1e-9)) {
          normal = scale(normal, -1)
          heights = heights.map((h) => -h)
        }
        if (heights.some((h) => h > 1e-9)) continue
        const on = heights.flatMap((h, v) => (h > -1e-9 ? [v] : []))
        if (faces.has(on.join())) continue
        const centre = scale(
          on.reduce<Vec3>((s, v) => add(s, points[v]!), [0, 0, 0]),
          1 / on.length,
        )
        const u = normalize(sub(points[on[0]!]!, centre))
        const v = cross(normal, u)
        const angle = (p: number): number =>
          Math.atan2(dot(sub(points[p]!, centre), v), dot(sub(points[p]!, centre), u))
        faces.set(
          on.join(),
          [...on].sort((a, b) => angle(a) - angle(b)),
        )
      }
  return [...faces.values()]
}

const phi = (1 + Math.sqrt(5)) / 2
const cyclic = ([x, y, z]: Vec3): Vec3[] => [
  [x, y, z],
  [z, x, y],
  [y, z, x],
]
const signs = [1, -1]

export const cubePoints: Vec3[] = signs.flatMap((x) =>
  signs.flatMap((y) => signs.map((z): Vec3 => [x / 2, y / 2, z / 2])),
)
export const icosahedronPoints: Vec3[] = signs.flatMap((a) => signs.flatMap((b) => cyclic([0, a / 2, (b * phi) / 2])))
export const dodecahedronPoints: Vec3[] = [
  ...signs.flatMap((x) => signs.flatMap((y) => signs.map((z): Vec3 => [x, y, z]))),
  ...signs.flatMap((a) => signs.flatMap((b) => cyclic([0, a / phi, b * phi]))),
].map((p) => scale(p, phi / 2))

export const cube = (): Skin => skinOfMesh(cubePoints, hullFaces(cubePoints), 'cube')
export const icosahedron = (): Skin => skinOfMesh(icosahedronPoints, hullFaces(icosahedronPoints), 'icosahedron')

/** Every face of a convex body raised (or sunk, negative) to a pyramid of the given height. */
export const withPyramids = (points: readonly Vec3[], height: number, name: string): Skin => {
  const all = [...points]
  const faces: number[][] = []
  for (const f of hullFaces(points)) {
    const centre = scale(
      f.reduce<Vec3>((s, v) => add(s, points[v]!), [0, 0, 0]),
      1 / f.length,
    )
    const apex = all.push(add(centre, scale(normalize(newellNormal(f.map((i) => points[i]!))), height))) - 1
    f.forEach((v, i) => {
      faces.push([v, f[(i + 1) % f.length]!, apex])
    })
  }
  return skinOfMesh(all, faces, name)
}

/** Outwardly a small stellated dodecahedron: 60 triangles with base 1 and sides phi. */
export const smallStellated = (): Skin =>
  withPyramids(dodecahedronPoints, Math.sqrt(phi * phi - 1 / (2 * Math.sin(Math.PI / 5)) ** 2), 'small stellated')
/** Outwardly a great dodecahedron: 20 three-sided pits. */
export const pitted = (): Skin => withPyramids(icosahedronPoints, -Math.sqrt(1 / phi ** 2 - 1 / 3), 'pitted')

/** A body that is no one's mirror image: an icosahedron whose vertices are pulled to different heights. */
export const lumpy = (seed: readonly number[], mirrored = false): Skin => {
  const points = icosahedronPoints.map((p, i) => scale(p, 1 + (seed[i % seed.length] ?? 0)))
  const faces = hullFaces(icosahedronPoints)
  return mirrored
    ? skinOfMesh(
        points.map(([x, y, z]): Vec3 => [-x, y, z]),
        faces.map((f) => [...f].reverse()),
        'lumpy',
      )
    : skinOfMesh(points, faces, 'lumpy')
}

/** A cube with a smaller cube standing on its top: the top panel is a square with a square hole. */
export const cubeOnCube = (): Skin => {
  const square = (r: number, z: number): Vec3[] => [
    [r, r, z],
    [-r, r, z],
    [-r, -r, z],
    [r, -r, z],
  ]
  const points = [...square(0.5, 0), ...square(0.5, 1), ...square(0.2, 1), ...square(0.2, 1.3)]
  const wall = (low: number): number[][] =>
    [0, 1, 2, 3].map((i) => [low + i, low + ((i + 1) % 4), low + 4 + ((i + 1) % 4), low + 4 + i])
  const mesh = [[3, 2, 1, 0], [4, 5, 6, 7], ...wall(0), ...wall(8), [12, 13, 14, 15]]
  return withHole(skinOfMeshWithHole(points, mesh))
}

const skinOfMeshWithHole = (points: readonly Vec3[], faces: readonly (readonly number[])[]): Skin =>
  // The hole's ring is a face of its own for the moment, so that the mesh closes.
  skinOfMesh(points, [...faces, [11, 10, 9, 8]], 'cube on cube')

const withHole = (skin: Skin): Skin => {
  const plug = skin.panels.length - 1
  const top = 1
  const panels = skin.panels.slice(0, plug).map((p) =>
    p.id === top
      ? {
          ...p,
          rings: [...p.rings, skin.panels[plug]!.rings[0]!],
          creases: [...p.creases, skin.panels[plug]!.creases[0]!],
          area: p.area - skin.panels[plug]!.area,
        }
      : p,
  )
  const creases = skin.creases.map((c): SkinCrease => {
    const at = c.panels.indexOf(plug)
    if (at < 0) return c
    return { ...c, panels: at === 0 ? [top, c.panels[1]] : [c.panels[0], top], innerAngle: 270 }
  })
  return { ...skin, panels, creases, area: panels.reduce((s, p) => s + p.area, 0), volume: 1 + 0.4 * 0.4 * 0.3 }
}

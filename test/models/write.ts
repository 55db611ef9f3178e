/** Writers of the three formats, for tests only: what the program reads, written by another hand. */
import type { Solid } from '../../src/solids/types'

type Point = readonly [number, number, number]
export interface Mesh {
  readonly vertices: readonly Point[]
  readonly faces: readonly (readonly number[])[]
}

export const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text)

export const meshOf = (solid: Solid): Mesh => ({
  vertices: solid.vertices,
  faces: solid.faces.map((f) => f.cycle),
})

/**
 * The filled regions as triangles. A regular star {n/d} is cut from its centre into 2n: its outline goes from tip to
 * tip by way of the outermost crossings, which lie at R cos(πd/n) / cos(π(d−1)/n) halfway between two tips.
 */
export const trianglesOf = (solid: Solid): Mesh => {
  const vertices: Point[] = [...solid.vertices]
  const faces: number[][] = []
  for (const { cycle, kind } of solid.faces) {
    const { n, d } = solid.kinds[kind]!
    if (d === 1) {
      for (let i = 1; i + 1 < n; i++) faces.push([cycle[0]!, cycle[i]!, cycle[i + 1]!])
      continue
    }
    const corners = cycle.map((v) => solid.vertices[v]!)
    const centre = [0, 1, 2].map((k) => corners.reduce((s, p) => s + p[k]! / n, 0)) as unknown as Point
    // Stepping through the cycle by the inverse of d modulo n goes round the tips in order.
    const step = Array.from({ length: n }, (_, k) => k).find((k) => (k * d) % n === 1)!
    const tips = cycle.map((_, i) => cycle[(i * step) % n]!)
    const ratio = Math.cos((Math.PI * d) / n) / Math.cos((Math.PI * (d - 1)) / n)
    const middle = vertices.length
    vertices.push(centre)
    tips.forEach((tip, i) => {
      const next = tips[(i + 1) % n]!
      const half = [0, 1, 2].map((k) => (solid.vertices[tip]![k]! + solid.vertices[next]![k]!) / 2 - centre[k]!)
      const k = ratio / Math.cos(Math.PI / n)
      vertices.push([0, 1, 2].map((a) => centre[a]! + k * half[a]!) as unknown as Point)
      faces.push([middle, tip, middle + 1 + i], [middle, middle + 1 + i, next])
    })
  }
  return { vertices, faces }
}

type Show = (x: number) => string

export const writeObj = (
  { vertices, faces }: Mesh,
  show: Show = String,
  material?: (face: number) => string | null,
): Uint8Array => {
  let last: string | null = null
  const lines = ['# a solid', ...vertices.map((p) => `v ${p.map(show).join(' ')}`)]
  faces.forEach((cycle, i) => {
    const name = material?.(i) ?? null
    if (name !== last && name !== null) lines.push(`usemtl ${name}`)
    last = name
    lines.push(`f ${cycle.map((v) => v + 1).join(' ')}`)
  })
  return bytesOf(`${lines.join('\n')}\n`)
}

export const writeTextStl = ({ vertices, faces }: Mesh, show: Show = String): Uint8Array => {
  const lines = ['solid model']
  for (const cycle of faces) {
    lines.push('  facet normal 0 0 0', '    outer loop')
    for (const v of cycle) lines.push(`      vertex ${vertices[v]!.map(show).join(' ')}`)
    lines.push('    endloop', '  endfacet')
  }
  return bytesOf(`${[...lines, 'endsolid model'].join('\n')}\n`)
}

export const writeBinaryStl = ({ vertices, faces }: Mesh, header = 'a solid'): Uint8Array => {
  const bytes = new Uint8Array(84 + 50 * faces.length)
  bytes.set(bytesOf(header.slice(0, 80)))
  const view = new DataView(bytes.buffer)
  view.setUint32(80, faces.length, true)
  faces.forEach((cycle, i) => {
    cycle.forEach((v, k) => {
      vertices[v]!.forEach((x, axis) => {
        view.setFloat32(84 + 50 * i + 12 + 12 * k + 4 * axis, x, true)
      })
    })
  })
  return bytes
}

export interface PlyStyle {
  readonly form: 'ascii' | 'binary_little_endian' | 'binary_big_endian'
  readonly real?: 'float' | 'double'
  /** Extra properties and an extra element that a reader must step over. */
  readonly extras?: boolean
  readonly colour?: (face: number) => readonly [number, number, number]
}

export const writePly = (
  { vertices, faces }: Mesh,
  { form, real = 'double', extras, colour }: PlyStyle,
): Uint8Array => {
  const header = [
    'ply',
    `format ${form} 1.0`,
    'comment a solid',
    `element vertex ${vertices.length}`,
    ...(extras ? ['property uchar quality', 'property list uchar short tags'] : []),
    `property ${real} x`,
    `property ${real} y`,
    `property ${real} z`,
    ...(extras ? ['element edge 2', 'property int vertex1', 'property list uint double weights'] : []),
    `element face ${faces.length}`,
    'property list uchar int vertex_indices',
    ...(colour ? ['property uchar red', 'property uchar green', 'property uchar blue'] : []),
    'end_header',
  ]
  const records: [type: string, value: number][][] = [
    ...vertices.map((p, i): [string, number][] => [
      ...(extras
        ? ([
            ['uchar', i % 200],
            ['uchar', 2],
            ['short', -1],
            ['short', 7],
          ] as [string, number][])
        : []),
      ...p.map((x): [string, number] => [real, x]),
    ]),
    ...(extras
      ? [0, 1].map((i): [string, number][] => [
          ['int', -i],
          ['uint', i],
          ...(i ? [['double', 0.5] as [string, number]] : []),
        ])
      : []),
    ...faces.map((cycle, i): [string, number][] => [
      ['uchar', cycle.length],
      ...cycle.map((v): [string, number] => ['int', v]),
      ...(colour ? colour(i).map((c): [string, number] => ['uchar', c]) : []),
    ]),
  ]
  const head = `${header.join('\n')}\n`
  if (form === 'ascii') return bytesOf(`${head}${records.map((r) => r.map(([, x]) => x).join(' ')).join('\n')}\n`)
  const size: Record<string, number> = { uchar: 1, short: 2, int: 4, uint: 4, float: 4, double: 8 }
  const total = records.flat().reduce((sum, [type]) => sum + size[type]!, 0)
  const begin = bytesOf(head)
  const bytes = new Uint8Array(begin.length + total)
  bytes.set(begin)
  const view = new DataView(bytes.buffer)
  const little = form === 'binary_little_endian'
  let at = begin.length
  for (const [type, x] of records.flat()) {
    if (type === 'uchar') view.setUint8(at, x)
    else if (type === 'short') view.setInt16(at, x, little)
    else if (type === 'int') view.setInt32(at, x, little)
    else if (type === 'uint') view.setUint32(at, x, little)
    else if (type === 'float') view.setFloat32(at, x, little)
    else view.setFloat64(at, x, little)
    at += size[type]!
  }
  return bytes
}

/**
 * Small pictures without a view, DOM or WebGL, and scene items from the raw faces of a solid. The z-buffer shows faces
 * that cut through each other as they are, so the Shelf needs no skin.
 */
import { add, cross, dot, norm, scale, sub, type Vec3 } from '../geometry/vec3'
import { Camera } from './camera'
import { filledRings } from './filled-rings'
import { Picture, type Pixels } from './picture'
import { Stage } from './stage'
import type { PreviewTheme, SceneItem } from './types'

/** As much of a solid as a picture needs; `Solid` of the catalogue fits. */
export interface FacesLike {
  readonly vertices: readonly Vec3[]
  readonly faces: readonly { readonly cycle: readonly number[]; readonly kind: number }[]
}

/**
 * Unit normal of a cycle (star polygons too), turned away from the origin; for a plane through it, as it comes. The sum of
 * the cross products has the direction of the signed area; where that cancels out (a crossed quadrilateral with two lobes
 * alike), the largest corner decides.
 */
const normalOf = (cycle: readonly Vec3[]): Vec3 => {
  let sum: Vec3 = [0, 0, 0]
  let corner: Vec3 = [0, 0, 0]
  cycle.forEach((p, i) => {
    const next = cycle[(i + 1) % cycle.length]!
    sum = add(sum, cross(p, next))
    const c = cross(sub(next, p), sub(cycle.at(i - 1)!, p))
    if (norm(c) > norm(corner)) corner = c
  })
  const across = norm(sum) > 1e-3 * norm(corner) ? sum : corner
  const n = norm(across)
  if (!(n > 0)) return [0, 0, 1]
  const unit = scale(across, 1 / n)
  return dot(unit, cycle[0]!) < -1e-9 ? scale(unit, -1) : unit
}

/**
 * The filled faces of a solid as scene items: id = face index, kind = `String(face.kind)`, group -1. Use with
 * `backs: 'same'`.
 *
 * @param colours CSS hex by face kind; repeats if shorter than there are kinds
 */
export const faceItems = (
  solid: FacesLike,
  colours: readonly string[],
  fill: 'nonzero' | 'evenodd' = 'nonzero',
): SceneItem[] =>
  solid.faces.map((face, id) => {
    const cycle = face.cycle.map((v) => solid.vertices[v]!)
    const normal = normalOf(cycle)
    const [rings = [], ...moreRings] = filledRings(cycle, normal, fill)
    const colour = colours[face.kind % Math.max(1, colours.length)] ?? '#c8c2b8'
    return { id, group: -1, kind: String(face.kind), colour, normal, rings, moreRings }
  })

export interface ThumbnailOptions {
  /** Side in pixels. */
  readonly size: number
  /** Outward direction that faces the viewer. */
  readonly direction?: Vec3
  /** Samples per pixel side; default 2. */
  readonly samples?: 1 | 2 | 3
  readonly backs?: 'dull' | 'same'
  readonly theme?: Partial<PreviewTheme>
}

/** Buffers kept from one thumbnail to the next of the same size. */
const picture = new Picture()

/**
 * A square picture with transparent background. Lines are drawn where two planes meet on the screen, the crossings of
 * faces included.
 */
export const renderThumbnail = (items: readonly SceneItem[], options: ThumbnailOptions): Pixels => {
  const stage = new Stage()
  if (options.theme) stage.setTheme(options.theme)
  stage.setScene(items, { backs: options.backs ?? 'same' })
  stage.update()
  stage.lines = []
  const camera = new Camera(options.direction)
  camera.resize(options.size, options.size)
  const { width, height, data } = picture.render(
    stage,
    camera,
    { scale: 1, samples: options.samples ?? 2 },
    planesOf(stage),
  )
  return { width, height, data: data.slice() }
}

/** A number per item, equal for items of one kind in one plane. */
const planesOf = (stage: Stage): Int32Array => {
  const { items, closed, edgeStart } = stage.model
  const known: { normal: Vec3; offset: number; kind: string }[] = []
  return Int32Array.from(items, ({ normal, kind }, i) => {
    const v = 3 * edgeStart[i]!
    const offset = dot(normal, [closed[v]!, closed[v + 1]!, closed[v + 2]!])
    const found = known.findIndex((k) => {
      const cosine = dot(k.normal, normal)
      return k.kind === kind && Math.abs(cosine) > 1 - 1e-9 && Math.abs(k.offset - Math.sign(cosine) * offset) < 1e-5
    })
    return found >= 0 ? found : known.push({ normal, offset, kind }) - 1
  })
}

/** Puts a thumbnail on a canvas of the page, which takes its size in pixels. */
export const paintThumbnail = (
  canvas: HTMLCanvasElement,
  items: readonly SceneItem[],
  options: ThumbnailOptions,
): void => {
  const { width, height, data } = renderThumbnail(items, options)
  canvas.width = width
  canvas.height = height
  canvas.getContext('2d')?.putImageData(new ImageData(data, width, height), 0, 0)
}

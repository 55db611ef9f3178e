/**
 * A whole picture in software: projects the stage, fills the z-buffer, draws the lines and resolves samples to pixels.
 * Runs anywhere; the canvas renderer and the thumbnails are thin wraps around it.
 */

import { backBias, layerBias, lineBias } from './bias'
import type { Camera } from './camera'
import { parseHex, type Rgb } from './colour'
import type { LineSet } from './lines'
import { clearLayer, createLayer, drawLines, drawTriangles, type Layer, type ScreenVertices } from './raster'
import { ghostAlpha, hatchPx, type Stage, tonesPerItem } from './stage'

/** RGBA, not premultiplied, rows from the top: what `ImageData` takes. */
export interface Pixels {
  readonly width: number
  readonly height: number
  readonly data: Uint8ClampedArray<ArrayBuffer>
}

export interface Sampling {
  /** Pixels per CSS px. */
  readonly scale: number
  /** Samples per pixel side: 1, 2 or 3. */
  readonly samples: number
}

/** Depth biases of outside and inside per item, for `drawTriangles`. */
export const itemBiases = (layer: Uint8Array): Float64Array => {
  const out = new Float64Array(2 * layer.length)
  layer.forEach((rank, i) => {
    out[2 * i] = rank * layerBias
    out[2 * i + 1] = rank * layerBias + backBias
  })
  return out
}

/** Projects x, y, z triples to the screen, times `scale`. */
export const projectAll = (points: Float64Array, camera: Camera, scale: number): ScreenVertices => {
  const count = points.length / 3
  const x = new Float64Array(count)
  const y = new Float64Array(count)
  const inverse = new Float64Array(count)
  const [[rx, ry, rz], [ux, uy, uz], [bx, by, bz]] = camera.rotation
  const { distance } = camera
  const focal = camera.focal * scale
  const mx = camera.middle[0] * scale
  const my = camera.middle[1] * scale
  for (let i = 0, p = 0; i < count; i++, p += 3) {
    const px = points[p]!
    const py = points[p + 1]!
    const pz = points[p + 2]!
    const w = 1 / (distance - (bx * px + by * py + bz * pz))
    x[i] = mx + focal * w * (rx * px + ry * py + rz * pz)
    y[i] = my - focal * w * (ux * px + uy * py + uz * pz)
    inverse[i] = w
  }
  return { x, y, inverse }
}

/** How a line is blended over what is below it. */
interface Ink {
  readonly colour: Rgb
  readonly alpha: number
}

export class Picture {
  width = 0
  height = 0
  private solid: Layer = createLayer(0, 0)
  private ghost: Layer = createLayer(0, 0)
  private pixels = new Uint8ClampedArray(0)
  private tones = new Uint8Array(0)
  private filledFor: { stage: Stage; camera: Camera; view: string } | null = null

  /** What lies nearest at each sample; valid until the next `render`. */
  get samples(): Layer {
    return this.solid
  }

  /**
   * @param borders planes per item (see `thumbnail.ts`): where two planes meet on the screen, a line in the edge colour
   */
  render(stage: Stage, camera: Camera, sampling: Sampling, borders?: Int32Array): Pixels {
    const columns = Math.max(1, Math.round(camera.width * sampling.scale))
    const rows = Math.max(1, Math.round(camera.height * sampling.scale))
    const width = columns * sampling.samples
    const height = rows * sampling.samples
    if (width !== this.width || height !== this.height) {
      this.width = width
      this.height = height
      this.solid = createLayer(width, height)
      this.ghost = createLayer(0, 0)
      this.filledFor = null
    }
    const scale = sampling.scale * sampling.samples
    const hasGhosts = stage.ghost.length > 0
    this.fill(stage, camera, scale)
    this.solid.line.fill(0)
    this.ghost.line.fill(0)
    const inks = stage.lines.map((set, i) => this.drawSet(set, i + 1, stage, camera, scale))
    if (borders) {
      inks.push({ colour: parseHex(stage.theme.edge), alpha: 0.55 })
      this.markBorders(borders, inks.length)
    }

    const needed = 4 * tonesPerItem * stage.model.items.length
    if (this.tones.length !== needed) this.tones = new Uint8Array(needed)
    stage.tones(camera.rotation, this.tones)
    if (this.pixels.length !== 4 * columns * rows) this.pixels = new Uint8ClampedArray(4 * columns * rows)
    this.resolve(columns, rows, sampling, stage, inks, hasGhosts)
    return { width: columns, height: rows, data: this.pixels }
  }

  /** Fills the depth and code layers, unless only marks and lines have changed since they were filled last. */
  private fill(stage: Stage, camera: Camera, scale: number): void {
    const { model, positions, triangles } = stage.versions
    const view = `${model} ${positions} ${triangles} ${camera.version} ${scale}`
    const last = this.filledFor
    if (last && last.stage === stage && last.camera === camera && last.view === view) return
    this.filledFor = { stage, camera, view }
    const { width, height } = this
    const vertices = projectAll(stage.positions, camera, scale)
    const biases = itemBiases(stage.model.layer)
    clearLayer(this.solid)
    drawTriangles(this.solid, width, height, vertices, stage.solid, stage.model.vertexItem, biases)
    if (stage.ghost.length === 0) return
    if (this.ghost.depth.length !== width * height) this.ghost = createLayer(width, height)
    else clearLayer(this.ghost)
    this.ghost.depth.set(this.solid.depth)
    drawTriangles(this.ghost, width, height, vertices, stage.ghost, stage.model.vertexItem, biases)
  }

  private drawSet(set: LineSet, mark: number, stage: Stage, camera: Camera, scale: number): Ink {
    const { style } = set
    const layer = style.depth === 'ghost' ? this.ghost : this.solid
    if (layer.depth.length > 0)
      drawLines(layer, this.width, this.height, projectAll(set.ends, camera, scale), {
        mark,
        width: Math.max(1, style.width * scale),
        dash: style.dash * scale,
        hides: style.depth !== 'through',
        bias: lineBias(style.width, camera.focal),
      })
    return { colour: style.colour, alpha: stage.lineAlpha(style, camera, scale) }
  }

  /** Lines where neighbouring samples show different planes, or ground and background. */
  private markBorders(planes: Int32Array, mark: number): void {
    const { code, line } = this.solid
    const { width, height } = this
    const planeAt = (at: number): number => {
      const c = code[at]!
      return c === 0 ? -1 : planes[(c - 1) >> 1]!
    }
    for (let y = 0; y < height; y++)
      for (let x = 0, at = y * width; x < width; x++, at++) {
        const here = planeAt(at)
        if (here < 0) continue
        const right = x + 1 < width ? planeAt(at + 1) : -1
        const below = y + 1 < height ? planeAt(at + width) : -1
        if (right !== here || below !== here) line[at] = mark
      }
  }

  private resolve(
    columns: number,
    rows: number,
    { scale, samples }: Sampling,
    stage: Stage,
    inks: readonly Ink[],
    hasGhosts: boolean,
  ): void {
    const { pixels, tones, width } = this
    const { code, line } = this.solid
    const { code: ghostCode, line: ghostLine } = this.ghost
    const { hatched } = stage
    const hatchStep = Math.max(1, Math.round(hatchPx * scale))
    const whole = samples * samples
    const inkOf = new Float64Array(4 * (inks.length + 1))
    inks.forEach((ink, i) => {
      inkOf.set([...ink.colour, ink.alpha], 4 * (i + 1))
    })
    const film = parseHex(stage.theme.ghost)

    // One packed number per tone, in the byte order of this machine.
    const packedTones = new Uint32Array(tones.buffer)
    const packed = new Uint32Array(pixels.buffer)
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const stripe = Math.floor((row + column) / hatchStep) & 1
        const index = row * columns + column
        const out = 4 * index
        const corner = row * samples * width + column * samples
        // Most pixels lie within one panel, or beside the model.
        const firstCode = code[corner]!
        let plain = !hasGhosts
        for (let j = 0; plain && j < samples; j++)
          for (let i = 0, at = corner + j * width; i < samples; i++, at++)
            if (code[at] !== firstCode || line[at] !== 0) plain = false
        if (plain) {
          packed[index] = firstCode === 0 ? 0 : packedTones[toneAt(firstCode, hatched, stripe) >> 2]!
          continue
        }
        let r = 0
        let g = 0
        let b = 0
        let alpha = 0
        for (let j = 0; j < samples; j++)
          for (let i = 0, at = corner + j * width; i < samples; i++, at++) {
            // Premultiplied, laid over each other from the ground up.
            let sr = 0
            let sg = 0
            let sb = 0
            let sa = 0
            const c = code[at]!
            if (c !== 0) {
              const t = toneAt(c, hatched, stripe)
              sr = tones[t]!
              sg = tones[t + 1]!
              sb = tones[t + 2]!
              sa = 1
            }
            const l = line[at]!
            if (l !== 0) {
              const k = inkOf[4 * l + 3]!
              sr += (inkOf[4 * l]! - sr) * k
              sg += (inkOf[4 * l + 1]! - sg) * k
              sb += (inkOf[4 * l + 2]! - sb) * k
              sa += (1 - sa) * k
            }
            if (hasGhosts) {
              if (ghostCode[at] !== 0) {
                sr += (film[0] - sr) * ghostAlpha
                sg += (film[1] - sg) * ghostAlpha
                sb += (film[2] - sb) * ghostAlpha
                sa += (1 - sa) * ghostAlpha
              }
              const gl = ghostLine[at]!
              if (gl !== 0) {
                const k = inkOf[4 * gl + 3]!
                sr += (inkOf[4 * gl]! - sr) * k
                sg += (inkOf[4 * gl + 1]! - sg) * k
                sb += (inkOf[4 * gl + 2]! - sb) * k
                sa += (1 - sa) * k
              }
            }
            r += sr
            g += sg
            b += sb
            alpha += sa
          }
        const share = alpha > 0 ? 1 / alpha : 0
        pixels[out] = r * share
        pixels[out + 1] = g * share
        pixels[out + 2] = b * share
        pixels[out + 3] = (255 * alpha) / whole
      }
    }
  }
}

/** Place of a sample's tone in the table: outside, inside, and the same two in a stripe of the hatch. */
const toneAt = (code: number, hatched: Uint8Array, stripe: number): number => {
  const item = (code - 1) >> 1
  const side = (code - 1) & 1
  return 4 * (tonesPerItem * item + side + (stripe === 1 && hatched[item] === 1 ? 2 : 0))
}

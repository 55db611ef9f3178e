/**
 * A z-buffer in plain typed arrays: no DOM, the same in a browser, a worker and Node. Triangles are convex spans with the
 * inverse distance as depth, which is linear on the screen. Each sample keeps a code (which item, which side), so
 * colouring is a table look-up afterwards and the buffer tells what is where.
 */

/** Half-finished picture of one layer: what lies nearest at each sample, and the line drawn over it. */
export interface Layer {
  /** Inverse distance of the nearest thing, 0 for none. */
  readonly depth: Float32Array
  /** 0 for nothing, else 1 + 2 × item + (1 if its inside is seen). */
  readonly code: Int32Array
  /** 0 for no line, else 1 + index of its style. */
  readonly line: Uint16Array
}

/** Vertices on the screen, in samples: x, y from the top left, and inverse distance. */
export interface ScreenVertices {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly inverse: Float64Array
}

export const createLayer = (width: number, height: number): Layer => ({
  depth: new Float32Array(width * height),
  code: new Int32Array(width * height),
  line: new Uint16Array(width * height),
})

export const clearLayer = (layer: Layer): void => {
  layer.depth.fill(0)
  layer.code.fill(0)
  layer.line.fill(0)
}

export const itemOf = (code: number): number => (code - 1) >> 1

/** Smaller than this (in half samples²) a triangle is seen edge on and covers nothing. */
const leastArea = 1e-7

/**
 * Draws triangles (counter-clockwise on the outside) into the layer. A sample belongs to a triangle when its middle
 * lies inside; of two triangles with a common edge exactly one takes a middle on it.
 *
 * @param bias two factors − 1 of the inverse distance per item: outside, inside
 */
export const drawTriangles = (
  layer: Layer,
  width: number,
  height: number,
  vertices: ScreenVertices,
  triangles: Uint32Array,
  vertexItem: Int32Array,
  bias: Float64Array,
): void => {
  const { depth, code } = layer
  const { x: xs, y: ys, inverse } = vertices
  for (let t = 0; t < triangles.length; t += 3) {
    let a = triangles[t]!
    let b = triangles[t + 1]!
    let c = triangles[t + 2]!
    let ax = xs[a]!
    let ay = ys[a]!
    let bx = xs[b]!
    let by = ys[b]!
    let cx = xs[c]!
    let cy = ys[c]!
    const twice = (bx - ax) * (cy - ay) - (cx - ax) * (by - ay)
    if (twice < leastArea && twice > -leastArea) continue
    // y runs downwards, so counter-clockwise has negative area here.
    const inside = twice > 0 ? 1 : 0
    const item = vertexItem[a]!
    const factor = 1 + bias[2 * item + inside]!
    const mark = 1 + 2 * item + inside
    const wa = inverse[a]! * factor
    const wb = inverse[b]! * factor - wa
    const wc = inverse[c]! * factor - wa
    const stepX = (wb * (cy - ay) - wc * (by - ay)) / twice
    const stepY = (wc * (bx - ax) - wb * (cx - ax)) / twice
    const base = wa - stepX * (ax - 0.5) - stepY * (ay - 0.5)

    // From here on a is the topmost corner and c the lowest.
    let swap: number
    if (by < ay) {
      swap = ay
      ay = by
      by = swap
      swap = ax
      ax = bx
      bx = swap
      swap = a
      a = b
      b = swap
    }
    if (cy < ay) {
      swap = ay
      ay = cy
      cy = swap
      swap = ax
      ax = cx
      cx = swap
      swap = a
      a = c
      c = swap
    }
    if (cy < by) {
      swap = by
      by = cy
      cy = swap
      swap = bx
      bx = cx
      cx = swap
      swap = b
      b = c
      c = swap
    }
    const top = ay < 0.5 ? 0 : Math.ceil(ay - 0.5) | 0
    const bottom = Math.min(height, Math.ceil(cy - 0.5)) | 0
    if (top >= bottom) continue
    const longSlope = (cx - ax) / (cy - ay)
    const upperSlope = by > ay ? (bx - ax) / (by - ay) : 0
    const lowerSlope = cy > by ? (cx - bx) / (cy - by) : 0
    const longIsLeft = ax + longSlope * (by - ay) < bx
    for (let row = top; row < bottom; row++) {
      const y = row + 0.5
      const long = ax + longSlope * (y - ay)
      const short = y < by ? ax + upperSlope * (y - ay) : bx + lowerSlope * (y - by)
      const from = longIsLeft ? long : short
      const to = longIsLeft ? short : long
      const first = from < 0.5 ? 0 : Math.ceil(from - 0.5) | 0
      const last = to > width + 0.5 ? width : Math.ceil(to - 0.5) | 0
      let at = row * width + first
      const end = row * width + last
      let w = base + stepX * first + stepY * row
      for (; at < end; at++, w += stepX) {
        if (w > depth[at]!) {
          depth[at] = w
          code[at] = mark
        }
      }
    }
  }
}

export interface LineBrush {
  /** Value for `Layer.line`: 1 + index of the style. */
  readonly mark: number
  /** Samples across, at least 1. */
  readonly width: number
  /** Period of dashes in samples, 0 solid. */
  readonly dash: number
  /** Hidden by the layer's depth. */
  readonly hides: boolean
  /** Factor − 1 of the inverse distance: how far the line stands out. */
  readonly bias: number
}

/**
 * Draws straight lines over the layer; depth stays as it is. Steps along the longer axis and sets a short run across it.
 *
 * @param ends two vertices per line
 */
export const drawLines = (
  layer: Layer,
  width: number,
  height: number,
  ends: ScreenVertices,
  brush: LineBrush,
): void => {
  const { depth, line } = layer
  const { mark, dash, hides } = brush
  const factor = 1 + brush.bias
  // Wide lines end half their width beyond their ends, so that corners close.
  const beyond = brush.width > 2 ? brush.width / 2 : 0
  for (let v = 0; v + 1 < ends.x.length; v += 2) {
    const x0 = ends.x[v]!
    const y0 = ends.y[v]!
    const dx = ends.x[v + 1]! - x0
    const dy = ends.y[v + 1]! - y0
    const length = Math.sqrt(dx * dx + dy * dy)
    if (length < 1e-9) continue
    const flat = Math.abs(dx) >= Math.abs(dy)
    const p0 = flat ? x0 : y0
    const q0 = flat ? y0 : x0
    const d = flat ? dx : dy
    const e = flat ? dy : dx
    const along = flat ? width : height
    const across = flat ? height : width
    const strideAlong = flat ? 1 : width
    const strideAcross = flat ? width : 1
    const slope = e / d
    const lengthPerStep = length / Math.abs(d)
    const run = Math.max(1, brush.width * lengthPerStep)
    const extra = beyond / lengthPerStep
    const low = Math.min(p0, p0 + d) - extra
    const high = Math.max(p0, p0 + d) + extra
    const first = Math.max(0, Math.ceil(low - 0.5))
    const last = Math.min(along - 1, Math.ceil(high - 0.5) - 1)
    const w0 = ends.inverse[v]! * factor
    const wStep = (ends.inverse[v + 1]! * factor - w0) / d
    for (let p = first; p <= last; p++) {
      const s = p + 0.5 - p0
      if (dash > 0 && (Math.abs(s) * lengthPerStep) % dash >= dash / 2) continue
      const w = w0 + wStep * s
      const q = q0 + slope * s - run / 2
      const from = Math.max(0, Math.ceil(q - 0.5))
      const to = Math.min(across, Math.ceil(q + run - 0.5))
      for (let k = from; k < to; k++) {
        const at = p * strideAlong + k * strideAcross
        if (!hides || w >= depth[at]!) line[at] = mark
      }
    }
  }
}

/**
 * What lies at a place of the screen. One way for both renderers, in double precision and independent of their
 * resolution, so a pick is the same with and without WebGL: the line of sight through the place, against the solid
 * triangles as they are projected for drawing.
 */
import type { Camera } from './camera'
import { itemBiases, projectAll } from './picture'
import type { ScreenVertices } from './raster'
import type { Stage } from './stage'

export class Picker {
  private key = ''
  private vertices: ScreenVertices = { x: new Float64Array(0), y: new Float64Array(0), inverse: new Float64Array(0) }
  private biases: Float64Array = new Float64Array(0)

  /** Index of the item nearest to the viewer at (x, y) in CSS px, or -1. Call after `stage.update()`. */
  itemAt(stage: Stage, camera: Camera, x: number, y: number): number {
    const key = `${stage.versions.model} ${stage.versions.positions} ${camera.version}`
    if (key !== this.key) {
      this.key = key
      this.vertices = projectAll(stage.positions, camera, 1)
      this.biases = itemBiases(stage.model.layer)
    }
    const { x: xs, y: ys, inverse } = this.vertices
    const { solid } = stage
    const { vertexItem } = stage.model
    let found = -1
    let nearest = 0
    for (let t = 0; t < solid.length; t += 3) {
      const a = solid[t]!
      const b = solid[t + 1]!
      const c = solid[t + 2]!
      const ax = xs[a]! - x
      const ay = ys[a]! - y
      const bx = xs[b]! - x
      const by = ys[b]! - y
      const cx = xs[c]! - x
      const cy = ys[c]! - y
      // Twice the signed areas that the place spans with each side: all of one sign inside.
      const sa = bx * cy - cx * by
      const sb = cx * ay - ax * cy
      const sc = ax * by - bx * ay
      if ((sa < 0 || sb < 0 || sc < 0) && (sa > 0 || sb > 0 || sc > 0)) continue
      const sum = sa + sb + sc
      if (sum === 0) continue
      const item = vertexItem[a]!
      const w =
        ((sa * inverse[a]! + sb * inverse[b]! + sc * inverse[c]!) / sum) *
        (1 + this.biases[2 * item + (sum > 0 ? 1 : 0)]!)
      if (w > nearest) {
        nearest = w
        found = item
      }
    }
    return found
  }
}

/** Draws with the z-buffer on a 2D canvas: no WebGL needed. */
import type { Camera } from './camera'
import { Picture, type Sampling } from './picture'
import type { Renderer } from './renderer'
import type { Stage } from './stage'

/** While the model moves, a frame slower than this lowers the resolution of the next; a much faster one raises it. */
const frameMs = { slow: 22, fast: 9 }
const movingScales = [1, 0.75, 0.5] as const
/** A still picture takes no more samples than this, whatever the screen. */
const mostSamples = 6e6

export class CanvasRenderer implements Renderer {
  readonly mode = 'canvas'
  private readonly context: CanvasRenderingContext2D
  private readonly picture = new Picture()
  private movingScale = 0

  constructor(readonly canvas: HTMLCanvasElement) {
    const context = canvas.getContext('2d')
    if (!context) throw new Error('This browser gives no 2D canvas.')
    this.context = context
  }

  render(stage: Stage, camera: Camera, moving: boolean): boolean {
    const start = performance.now()
    const { width, height, data } = this.picture.render(stage, camera, moving ? this.quick() : sharp(camera))
    if (this.canvas.width !== width || this.canvas.height !== height) {
      this.canvas.width = width
      this.canvas.height = height
    }
    this.context.putImageData(new ImageData(data, width, height), 0, 0)
    if (!moving) return true
    const took = performance.now() - start
    if (took > frameMs.slow) this.movingScale = Math.min(movingScales.length - 1, this.movingScale + 1)
    else if (took < frameMs.fast) this.movingScale = Math.max(0, this.movingScale - 1)
    return false
  }

  private quick(): Sampling {
    return { scale: movingScales[this.movingScale]!, samples: 1 }
  }

  dispose(): void {
    this.canvas.remove()
  }
}

/** Two samples per CSS px each way: averaged on a plain screen, shown as they are on a fine one. */
const sharp = (camera: Camera): Sampling => {
  const area = camera.width * camera.height
  if (4 * area > mostSamples) return { scale: 1, samples: 1 }
  return devicePixelRatio >= 1.75 ? { scale: 2, samples: 1 } : { scale: 1, samples: 2 }
}

import type { Camera } from './camera'
import type { Stage } from './stage'

/** What differs between the two ways of drawing. Everything else is shared. */
export interface Renderer {
  readonly mode: 'webgl' | 'canvas'
  readonly canvas: HTMLCanvasElement
  /**
   * Draws the stage (already updated) as the camera sees it.
   *
   * @param moving the next frame is near: speed counts more than sharpness
   * @returns true if the picture is as sharp as it gets; else one more call with `moving` false is wanted
   */
  render(stage: Stage, camera: Camera, moving: boolean): boolean
  dispose(): void
}

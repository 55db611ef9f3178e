export { filledRings } from './filled-rings'
export type { Pixels } from './picture'
export { type FacesLike, faceItems, paintThumbnail, renderThumbnail, type ThumbnailOptions } from './thumbnail'
export type {
  Lit,
  Pick,
  Preview,
  PreviewOptions,
  PreviewTheme,
  SceneItem,
  SceneOptions,
  SeamLine,
} from './types'
export { createPreview } from './view'

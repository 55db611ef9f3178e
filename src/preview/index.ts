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

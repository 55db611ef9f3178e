import type { Vec3 } from '../geometry/vec3'

/**
 * One flat region to draw: a panel of the skin, or (on the Shelf) one filled face.
 * Rings are in any unit and any place; the view centres and scales them.
 */
export interface SceneItem {
  /** Panel id (or face index): what a pick hands back. Unique within a scene; any integer. */
  readonly id: number
  /** Piece id, or -1: items of one group are lit and, if asked, pulled apart together. */
  readonly group: number
  /** Face kind or colour name, for `setVisibleKinds`. */
  readonly kind: string
  /** CSS hex colour of the card, `#rgb` or `#rrggbb`. */
  readonly colour: string
  /** Unit outward normal. */
  readonly normal: Vec3
  /** Outer ring counter-clockwise seen from outside, then holes clockwise; simple rings, no repeated last point. */
  readonly rings: readonly (readonly Vec3[])[]
  /**
   * More outer rings with their holes, for a region in several parts (star points under the even-odd rule).
   * Same rules as `rings`.
   */
  readonly moreRings?: readonly (readonly (readonly Vec3[])[])[]
}

export interface SceneOptions {
  /** What moves as one when pulled apart: every item (default) or every group (items of group -1 alone). */
  readonly explodeBy?: 'items' | 'groups'
  /** The inside of the card: a duller, darker tone (default), or the same colour (raw faces have no inside). */
  readonly backs?: 'dull' | 'same'
  /** Model centre in the rings' units; by default the centroid of the surface. */
  readonly centre?: Vec3
}

/** Something lit: thick outline with a casing plus a hatch in the accent colour, so never by colour alone. */
export interface Lit {
  readonly items?: ReadonlySet<number>
  readonly groups?: ReadonlySet<number>
  /** CSS hex; default the theme's accent. */
  readonly accent?: string
  /** Short text set beside what is lit (piece label); none by default. */
  readonly label?: string
}

/** A line to light on the model, e.g. a seam to glue now. */
export interface SeamLine {
  readonly id: number
  /** In the rings' units. */
  readonly ends: readonly [Vec3, Vec3]
  /** Item that the line moves with when panels are pulled apart; without it the line stays. */
  readonly item?: number
  /** Drawn thicker than the others: the one pointed at in the list. */
  readonly strong?: boolean
  /** Short text at the middle of the line; none by default. */
  readonly label?: string
}

export interface PreviewTheme {
  /** CSS hex colours. `edge`: ring lines; `accent`: what is lit; `casing`: thin border of accent lines; `ghost`: faint parts. */
  readonly edge: string
  readonly accent: string
  readonly casing: string
  readonly ghost: string
}

export interface PreviewOptions {
  /** Accessible name of the view, e.g. "Model of the great icosahedron". */
  readonly label: string
  readonly theme?: Partial<PreviewTheme>
  /**
   * 'auto' (default): WebGL where the browser gives it, else the z-buffer. 'fast': WebGL only where a GPU draws it;
   * without one the z-buffer is several times faster. 'canvas' never asks for WebGL.
   */
  readonly mode?: 'auto' | 'fast' | 'canvas'
  /** False: the view ignores wheel, drag, touch and keys (a small picture in a corner). Picks still work. Default true. */
  readonly interactive?: boolean
  /** Outward direction that faces the viewer at first. */
  readonly direction?: Vec3
}

export interface Pick {
  readonly item: number
  readonly group: number
}

/**
 * The 3D view. Every setter takes effect with the next frame and nothing is drawn while nothing changes.
 * An item is solid when its kind and its id are visible and it is no ghost; ghosts are drawn faint (kind permitting) and
 * never picked; the rest is hidden.
 */
export interface Preview {
  setScene(items: readonly SceneItem[], options?: SceneOptions): void
  /** 0 closed … 1 pulled well apart. */
  setExplode(fraction: number): void
  /** Show these kinds only; null for all. */
  setVisibleKinds(kinds: ReadonlySet<string> | null): void
  /** Show these items only (Bench: what is glued so far); null for all. */
  setVisibleItems(ids: ReadonlySet<number> | null): void
  /** Items drawn faint, whether or not in the visible ids (Bench: what is still to come); null for none. */
  setGhost(ids: ReadonlySet<number> | null): void
  /** What is lit; later entries lie on top. Items hidden or ghosts: outline only. Null for nothing. */
  setLit(lit: Lit | readonly Lit[] | null): void
  setSeams(lines: readonly SeamLine[]): void
  /** Turns by the shortest way so that this outward direction faces the viewer; 0 or reduced motion: at once. */
  lookAt(direction: Vec3, animateMs: number): void
  /** First direction, zoom and place again. */
  resetView(): void
  zoomBy(factor: number): void
  /** Turns the model as a drag would, in degrees: to the right and downwards. */
  orbitBy(rightDegrees: number, downDegrees: number): void
  setTheme(theme: Partial<PreviewTheme>): void
  /** Accessible name. */
  setLabel(label: string): void
  /** Where a model point (rings' units, pulled-apart offset of `item` added if given) is on the element, CSS px. */
  project(point: Vec3, item?: number): { readonly x: number; readonly y: number }
  /** What is at this place of the element (CSS px from its top left corner), as a click there would tell. */
  pickAt(x: number, y: number): Pick | null
  /** Call after the host changed size; the view also watches its host by itself. */
  resize(): void
  /**
   * 'hover' when what is under the pointer (or, turned by keys, under the middle mark) changes, null when nothing is;
   * 'click' on a click, tap or Enter, null beside the model.
   */
  onPick: (hit: Pick | null, event: 'hover' | 'click') => void
  /** The focusable element (inside `host`) that takes pointer and keys. */
  readonly element: HTMLElement
  /** May change from 'webgl' to 'canvas' when the browser takes the context away. */
  readonly mode: 'webgl' | 'canvas'
  /** Resolves when all that was set is on the screen at full sharpness (for pictures and tests). */
  settled(): Promise<void>
  dispose(): void
}

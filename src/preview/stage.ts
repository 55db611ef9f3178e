/**
 * What is to be seen at the moment, as plain lists that both renderers draw: vertex places, triangles, lines by style,
 * and one tone per item and side. All decisions about visibility, light and marks are taken here, once.
 */
import { cross, dot, type Mat3, scale, sub, type Vec3 } from '../geometry/vec3'
import type { Camera } from './camera'
import { parseHex, type Rgb } from './colour'
import { brightness, lightIn } from './light'
import { edgeLines, type LineSet, type LineStyle, outlineOf, seamLines } from './lines'
import { buildModel, type Model } from './model'
import type { Lit, PreviewTheme, SceneItem, SceneOptions, SeamLine } from './types'

export const defaultTheme: PreviewTheme = {
  edge: '#33373d',
  accent: '#c2410c',
  casing: '#ffffff',
  ghost: '#8b9096',
}

/** Tones per item: outside, inside, and the same two for the stripes of the hatch; RGBA each. */
export const tonesPerItem = 4
/** Hatch: stripes at 45 degrees, this wide in CSS px across the diagonal step. */
export const hatchPx = 4
const hatchStrength = 0.75
export const ghostAlpha = 0.14

export class Stage {
  model: Model = buildModel([])
  theme: PreviewTheme = defaultTheme
  /** Vertex places at the present explosion. */
  positions = new Float64Array(0)
  /** Radius of the smallest sphere about the centre that holds all vertices. */
  spread = 1
  /** Three vertices each. */
  solid = new Uint32Array(0)
  ghost = new Uint32Array(0)
  /** In drawing order. */
  lines: readonly LineSet[] = []
  /** Per item: 1 if its hatch is to be drawn. */
  hatched = new Uint8Array(0)
  /** Go up when the thing changes. */
  readonly versions = { model: 0, positions: 0, triangles: 0, lines: 0 }

  private explosion = 0
  private kinds: ReadonlySet<string> | null = null
  private visible: ReadonlySet<number> | null = null
  private ghosts: ReadonlySet<number> | null = null
  private lit: readonly Lit[] = []
  private seams: readonly SeamLine[] = []
  private stale = { positions: true, shown: true, edges: true, marks: true }
  private edgeSets: readonly LineSet[] = []

  setScene(items: readonly SceneItem[], options: SceneOptions = {}): void {
    this.model = buildModel(items, options)
    this.versions.model++
    this.stale = { positions: true, shown: true, edges: true, marks: true }
  }

  setExplode(fraction: number): void {
    const clamped = Math.min(1, Math.max(0, fraction))
    if (clamped === this.explosion) return
    this.explosion = clamped
    this.stale.positions = true
  }

  setVisibleKinds(kinds: ReadonlySet<string> | null): void {
    this.kinds = kinds
    this.stale.shown = true
  }

  setVisibleItems(ids: ReadonlySet<number> | null): void {
    this.visible = ids
    this.stale.shown = true
  }

  setGhost(ids: ReadonlySet<number> | null): void {
    this.ghosts = ids
    this.stale.shown = true
  }

  /** @throws InputError if a colour cannot be read */
  setLit(lit: readonly Lit[]): void {
    for (const { accent } of lit) if (accent !== undefined) parseHex(accent)
    this.lit = lit
    this.stale.marks = true
  }

  setSeams(seams: readonly SeamLine[]): void {
    this.seams = seams
    this.stale.marks = true
  }

  /** @throws InputError if a colour cannot be read */
  setTheme(theme: Partial<PreviewTheme>): void {
    // Read here, so that a mistake shows where it is made and not in some later frame.
    for (const colour of Object.values(theme)) parseHex(colour)
    this.theme = { ...this.theme, ...theme }
    this.stale.edges = true
  }

  /** Brings all lists up to date; cheap when nothing changed. */
  update(): void {
    if (this.stale.positions) this.movePositions()
    if (this.stale.shown) this.chooseTriangles()
    const newEdges = this.stale.positions || this.stale.shown || this.stale.edges
    const posed = { model: this.model, positions: this.positions, isApart: this.explosion > 0 }
    if (newEdges)
      this.edgeSets = edgeLines(
        posed,
        (i) => this.isSolid(i),
        (i) => this.isGhost(i),
        this.theme,
      )
    if (newEdges || this.stale.marks) {
      this.markHatched()
      const outlines = this.lit.flatMap((lit) =>
        outlineOf(posed, (i) => this.isLit(lit, i), lit.accent ?? this.theme.accent, this.theme),
      )
      const seams = seamLines(this.seams, (end, item) => this.place(end, item), this.theme)
      this.lines = [...this.edgeSets, ...outlines, ...seams].filter((set) => set.ends.length > 0)
      this.versions.lines++
    }
    this.stale = { positions: false, shown: false, edges: false, marks: false }
  }

  private movePositions(): void {
    const { closed, vertexItem, mover, moves } = this.model
    const positions = new Float64Array(closed.length)
    let far = 0
    for (let v = 0; v < vertexItem.length; v++) {
      const m = 3 * mover[vertexItem[v]!]!
      let square = 0
      for (let k = 0; k < 3; k++) {
        const p = closed[3 * v + k]! + this.explosion * moves[m + k]!
        positions[3 * v + k] = p
        square += p * p
      }
      far = Math.max(far, square)
    }
    this.positions = positions
    this.spread = far > 0 ? Math.sqrt(far) : 1
    this.versions.positions++
  }

  isSolid(item: number): boolean {
    const it = this.model.items[item]!
    return (
      (this.kinds?.has(it.kind) ?? true) && (this.visible?.has(it.id) ?? true) && !(this.ghosts?.has(it.id) ?? false)
    )
  }

  isGhost(item: number): boolean {
    const it = this.model.items[item]!
    return (this.kinds?.has(it.kind) ?? true) && (this.ghosts?.has(it.id) ?? false)
  }

  private chooseTriangles(): void {
    const { items, triangles, triangleStart } = this.model
    const gather = (wanted: (item: number) => boolean): Uint32Array<ArrayBuffer> => {
      const chosen = items.flatMap((_, i) => (wanted(i) ? [i] : []))
      const count = chosen.reduce((sum, i) => sum + triangleStart[i + 1]! - triangleStart[i]!, 0)
      const out = new Uint32Array(3 * count)
      let at = 0
      for (const i of chosen) {
        const part = triangles.subarray(3 * triangleStart[i]!, 3 * triangleStart[i + 1]!)
        out.set(part, at)
        at += part.length
      }
      return out
    }
    this.solid = gather((i) => this.isSolid(i))
    this.ghost = gather((i) => this.isGhost(i))
    this.versions.triangles++
  }

  private isLit(lit: Lit, item: number): boolean {
    const it = this.model.items[item]!
    return (lit.items?.has(it.id) ?? false) || (lit.groups?.has(it.group) ?? false)
  }

  /** Per item the accent of the last entry that lights it, or null. */
  private accents: (Rgb | null)[] = []

  private markHatched(): void {
    const { items } = this.model
    this.hatched = new Uint8Array(items.length)
    this.accents = items.map(() => null)
    for (const lit of this.lit) {
      const accent = parseHex(lit.accent ?? this.theme.accent)
      items.forEach((_, i) => {
        if (!this.isLit(lit, i) || !this.isSolid(i)) return
        this.hatched[i] = 1
        this.accents[i] = accent
      })
    }
  }

  /**
   * Tones for the present rotation, `tonesPerItem` × RGBA per item. Kept apart from `update` because it alone changes
   * with every turn of the model.
   */
  tones(rotation: Mat3, out = new Uint8Array(4 * tonesPerItem * this.model.items.length)): Uint8Array {
    const { items, outside, inside } = this.model
    const light = lightIn(rotation)
    for (let i = 0; i < items.length; i++) {
      const facing = dot(items[i]!.normal, light)
      const accent = this.accents[i]
      for (let side = 0; side < 2; side++) {
        const colours = side === 0 ? outside : inside
        const bright = brightness(side === 0 ? facing : -facing)
        const plain = 4 * (tonesPerItem * i + side)
        const stripe = plain + 8
        for (let k = 0; k < 3; k++) {
          const tone = Math.min(255, colours[3 * i + k]! * bright)
          out[plain + k] = tone
          out[stripe + k] = accent ? tone + (accent[k]! - tone) * hatchStrength : tone
        }
        out[plain + 3] = 255
        out[stripe + 3] = 255
      }
    }
    return out
  }

  /**
   * Opacity of a line: one that should be thinner than a pixel is drawn weaker instead, and edges are drawn weaker where
   * they crowd on the screen.
   *
   * @param scale pixels (or samples) per CSS px
   */
  lineAlpha(style: LineStyle, camera: Camera, scale: number): number {
    const meanEdgePx = (this.model.meanEdge * camera.focal) / camera.distance
    const crowding = style.thins ? Math.min(1, Math.max(0.22, meanEdgePx / 16)) : 1
    return style.alpha * Math.min(1, style.width * scale) * crowding
  }

  /** A point in the rings' units as it lies in the scene at the present explosion. */
  place(point: Vec3, itemId?: number): Vec3 {
    const { centre, radius, indexOf, mover, moves } = this.model
    const p = scale(sub(point, centre), 1 / radius)
    const item = itemId === undefined ? undefined : indexOf.get(itemId)
    if (item === undefined) return p
    const m = 3 * mover[item]!
    const e = this.explosion
    return [p[0] + e * moves[m]!, p[1] + e * moves[m + 1]!, p[2] + e * moves[m + 2]!]
  }

  /** Labels to set beside marks, with their places in the scene. */
  labels(): { text: string; at: Vec3 }[] {
    const out: { text: string; at: Vec3 }[] = []
    for (const lit of this.lit) {
      if (!lit.label) continue
      const at = this.middleOf((i) => this.isLit(lit, i))
      if (at) out.push({ text: lit.label, at })
    }
    for (const seam of this.seams) {
      if (!seam.label) continue
      const [a, b] = seam.ends.map((end) => this.place(end, seam.item)) as [Vec3, Vec3]
      out.push({ text: seam.label, at: [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2, (a[2] + b[2]) / 2] })
    }
    return out
  }

  /** Area-weighted middle of some items at the present explosion. */
  private middleOf(wanted: (item: number) => boolean): Vec3 | null {
    const { items, triangles, triangleStart } = this.model
    const sum = [0, 0, 0]
    let total = 0
    items.forEach((_, i) => {
      if (!wanted(i)) return
      for (let t = triangleStart[i]!; t < triangleStart[i + 1]!; t++) {
        const [a, b, c] = [0, 1, 2].map((k) => this.vertex(triangles[3 * t + k]!)) as [Vec3, Vec3, Vec3]
        const n = cross(sub(b, a), sub(c, a))
        const area = Math.hypot(...n)
        total += area
        for (let k = 0; k < 3; k++) sum[k]! += (area * (a[k]! + b[k]! + c[k]!)) / 3
      }
    })
    return total > 0 ? [sum[0]! / total, sum[1]! / total, sum[2]! / total] : null
  }

  private vertex(v: number): Vec3 {
    return [this.positions[3 * v]!, this.positions[3 * v + 1]!, this.positions[3 * v + 2]!]
  }
}

/**
 * What is to be seen at the moment, as plain lists that both renderers draw: vertex places, triangles, lines by style,
 * and one tone per item and side. All decisions about visibility, light and marks are taken here, once.
 */
import { cross, dot, type Mat3, scale, sub, type Vec3 } from '../geometry/vec3'
import type { Camera } from './camera'
import { parseHex, type Rgb } from './colour'
import { brightness, lightIn } from './light'
import { buildModel, type Model } from './model'
import type { Lit, PreviewTheme, SceneItem, SceneOptions, SeamLine } from './types'

export const defaultTheme: PreviewTheme = {
  edge: '#33373d',
  accent: '#c2410c',
  casing: '#ffffff',
  ghost: '#8b9096',
}

export interface LineStyle {
  /** CSS px. */
  readonly width: number
  readonly colour: Rgb
  readonly alpha: number
  /** Period of dashes (half on, half off) in CSS px; 0 solid. */
  readonly dash: number
  /** 'surface': hidden by what is in front; 'through': seen through the model; 'ghost': hidden by ghosts too. */
  readonly depth: 'surface' | 'through' | 'ghost'
  /** Drawn weaker where edges crowd on the screen (see `lineAlpha`). */
  readonly thins: boolean
}

export interface LineSet {
  readonly style: LineStyle
  /** x, y, z of both ends, line after line, centred and scaled. */
  readonly ends: Float64Array
}

/** Tones per item: outside, inside, and the same two for the stripes of the hatch; RGBA each. */
export const tonesPerItem = 4
/** Hatch: stripes at 45 degrees, this wide in CSS px across the diagonal step. */
export const hatchPx = 4
const hatchStrength = 0.75
export const ghostAlpha = 0.14

const hiddenDash = 6

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
    if (newEdges) this.edgeSets = this.edgeLines()
    if (newEdges || this.stale.marks) {
      this.markHatched()
      this.lines = [...this.edgeSets, ...this.litLines(), ...this.seamLines()].filter((set) => set.ends.length > 0)
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

  /** Edges to draw of the items wanted: one per place, or one per item once the items are apart. */
  private gatherEdges(
    wanted: (item: number) => boolean,
    keep: (edgeClass: number, item: number) => boolean,
  ): Float64Array {
    const { items, edges, edgeStart, edgeClass, edgeClasses, mover } = this.model
    const apart = this.explosion > 0
    const drawnWith = new Int32Array(edgeClasses).fill(-1)
    const out: number[] = []
    items.forEach((_, i) => {
      if (!wanted(i)) return
      for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
        const c = edgeClass[e]!
        const owner = apart ? mover[i]! : 0
        if (drawnWith[c] === owner || !keep(c, i)) continue
        drawnWith[c] = owner
        for (let end = 0; end < 2; end++) {
          const v = 3 * edges[2 * e + end]!
          out.push(this.positions[v]!, this.positions[v + 1]!, this.positions[v + 2]!)
        }
      }
    })
    return Float64Array.from(out)
  }

  private edgeLines(): LineSet[] {
    const { items, edgeStart, edgeClass, edgeClasses } = this.model
    // A class whose items belong to one piece is a fold, drawn lighter; −2 none yet, −3 several pieces.
    const groupOf = new Int32Array(edgeClasses).fill(-2)
    items.forEach((item, i) => {
      for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
        const c = edgeClass[e]!
        if (groupOf[c] === -2) groupOf[c] = item.group
        else if (groupOf[c] !== item.group) groupOf[c] = -3
      }
    })
    const grouped = items.some((item) => item.group >= 0)
    const isFold = (c: number): boolean => grouped && groupOf[c]! >= 0
    const edge = parseHex(this.theme.edge)
    const ghost = parseHex(this.theme.ghost)
    const solid = (i: number): boolean => this.isSolid(i)
    const style = { colour: edge, dash: 0, depth: 'surface', thins: true } as const
    return [
      { style: { ...style, width: 0.8, alpha: 0.6 }, ends: this.gatherEdges(solid, (c) => isFold(c)) },
      {
        style: { ...style, width: 1.1, alpha: grouped ? 0.95 : 0.75 },
        ends: this.gatherEdges(solid, (c) => !isFold(c)),
      },
      {
        style: { width: 0.8, colour: ghost, alpha: 0.5, dash: 0, depth: 'ghost', thins: true },
        ends: this.gatherEdges(
          (i) => this.isGhost(i),
          () => true,
        ),
      },
    ]
  }

  private litLines(): LineSet[] {
    const { items, edgeStart, edgeClass, edgeClasses, mover } = this.model
    const casing = parseHex(this.theme.casing)
    return this.lit.flatMap((lit) => {
      const members = items.flatMap((_, i) => (this.isLit(lit, i) ? [i] : []))
      const isMember = new Uint8Array(items.length)
      for (const i of members) isMember[i] = 1
      // An edge between two lit items is inside the lit part, unless the two have been pulled apart.
      const owners = new Map<number, number[]>()
      for (const i of members)
        for (let e = edgeStart[i]!; e < edgeStart[i + 1]!; e++) {
          const c = edgeClass[e]!
          const known = owners.get(c)
          if (known) known.push(i)
          else owners.set(c, [i])
        }
      const isOutline = (c: number, i: number): boolean =>
        (owners.get(c) ?? []).filter((j) => this.explosion === 0 || mover[j] === mover[i]).length === 1
      if (edgeClasses === 0) return []
      const ends = this.gatherEdges((i) => isMember[i] === 1, isOutline)
      return marked(ends, parseHex(lit.accent ?? this.theme.accent), casing, 3)
    })
  }

  private seamLines(): LineSet[] {
    const accent = parseHex(this.theme.accent)
    const casing = parseHex(this.theme.casing)
    const gather = (strong: boolean): Float64Array =>
      Float64Array.from(
        this.seams
          .filter((seam) => (seam.strong ?? false) === strong)
          .flatMap((seam) => seam.ends.flatMap((end) => [...this.place(end, seam.item)])),
      )
    return [...marked(gather(false), accent, casing, 4), ...marked(gather(true), accent, casing, 7)]
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

/** A marked line: dashes where it is hidden, then a casing, then the accent itself. */
const marked = (ends: Float64Array, accent: Rgb, casing: Rgb, width: number): LineSet[] => {
  const line = { colour: accent, dash: 0, depth: 'surface', thins: false } as const
  return [
    { style: { ...line, width: Math.max(1.4, width / 2), alpha: 0.9, dash: hiddenDash, depth: 'through' }, ends },
    { style: { ...line, width: width + 2.5, alpha: 0.9, colour: casing }, ends },
    { style: { ...line, width, alpha: 1 }, ends },
  ]
}

/** Turned boxes of text, and whether there is room for them. */
import { type Ring2, type Vec2, windingNumber } from '../geometry/vec2'
import { ptToMm } from '../units'
import { textWidthMm } from './text-width'

export interface TextBox {
  readonly at: Vec2
  /** Unit vector along the text. */
  readonly along: Vec2
  readonly halfWidth: number
  readonly halfHeight: number
}

/** Capital letters of Helvetica are 0.72 of the size high; nothing here has descenders that matter. */
const capitalHeight = 0.72

/** Clear space on every side, mm. */
const air = 0.25

/** The box of one line of text with its middle at `at`, mm and degrees; a little air on every side. */
export const textBox = (text: string, sizePt: number, at: Vec2, rotation: number): TextBox => ({
  at,
  along: [Math.cos((rotation * Math.PI) / 180), Math.sin((rotation * Math.PI) / 180)],
  halfWidth: textWidthMm(text, sizePt) / 2 + air,
  halfHeight: (capitalHeight * ptToMm(sizePt)) / 2 + air,
})

/** Separating axes of two rectangles. */
export const boxesMeet = (a: TextBox, b: TextBox): boolean => {
  const dx = b.at[0] - a.at[0]
  const dy = b.at[1] - a.at[1]
  for (const { along } of [a, b])
    for (const axis of [along, [-along[1], along[0]] as Vec2]) {
      const reach = (box: TextBox): number =>
        box.halfWidth * Math.abs(axis[0] * box.along[0] + axis[1] * box.along[1]) +
        box.halfHeight * Math.abs(-axis[0] * box.along[1] + axis[1] * box.along[0])
      if (Math.abs(axis[0] * dx + axis[1] * dy) > reach(a) + reach(b)) return false
    }
  return true
}

/** Does the segment touch the box? (Liang–Barsky in the box's frame.) */
export const segmentMeetsBox = (p: Vec2, q: Vec2, box: TextBox): boolean => {
  const local = (x: Vec2): Vec2 => {
    const dx = x[0] - box.at[0]
    const dy = x[1] - box.at[1]
    return [dx * box.along[0] + dy * box.along[1], -dx * box.along[1] + dy * box.along[0]]
  }
  const a = local(p)
  const b = local(q)
  let from = 0
  let to = 1
  for (const [start, step, limit] of [
    [a[0], b[0] - a[0], box.halfWidth],
    [a[1], b[1] - a[1], box.halfHeight],
  ] as const) {
    if (step === 0) {
      if (Math.abs(start) > limit) return false
      continue
    }
    const s = (-limit - start) / step
    const t = (limit - start) / step
    from = Math.max(from, Math.min(s, t))
    to = Math.min(to, Math.max(s, t))
    if (from > to) return false
  }
  return true
}

/** Is p inside the region (nonzero)? */
export const pointInside = (rings: readonly Ring2[], p: Vec2): boolean =>
  rings.reduce((w, ring) => w + windingNumber(ring, p), 0) !== 0

/** Is the whole box inside the region, clear of its edges? */
export const boxInside = (box: TextBox, rings: readonly Ring2[]): boolean => {
  if (!pointInside(rings, box.at)) return false
  for (const ring of rings)
    for (let i = 0; i < ring.length; i++) if (segmentMeetsBox(ring[i]!, ring[(i + 1) % ring.length]!, box)) return false
  return true
}

/** Distance in mm from p to the nearest edge of the rings. */
export const distanceToEdges = (rings: readonly Ring2[], p: Vec2): number => {
  let least = Number.POSITIVE_INFINITY
  for (const ring of rings)
    for (let i = 0; i < ring.length; i++) {
      const a = ring[i]!
      const b = ring[(i + 1) % ring.length]!
      const dx = b[0] - a[0]
      const dy = b[1] - a[1]
      const t = Math.max(0, Math.min(1, ((p[0] - a[0]) * dx + (p[1] - a[1]) * dy) / (dx * dx + dy * dy || 1)))
      least = Math.min(least, Math.hypot(p[0] - a[0] - t * dx, p[1] - a[1] - t * dy))
    }
  return least
}

/** The roomiest point of a grid over the region, and how far it is from the edges; null if no grid point is inside. */
export const roomiestPoint = (rings: readonly Ring2[], steps = 13): { at: Vec2; room: number } | null => {
  const outer = rings[0]!
  const xs = outer.map((p) => p[0])
  const ys = outer.map((p) => p[1])
  const [left, right, bottom, top] = [Math.min(...xs), Math.max(...xs), Math.min(...ys), Math.max(...ys)]
  let best: { at: Vec2; room: number } | null = null
  for (let i = 1; i < steps; i++)
    for (let j = 1; j < steps; j++) {
      const p: Vec2 = [left + ((right - left) * i) / steps, bottom + ((top - bottom) * j) / steps]
      if (!pointInside(rings, p)) continue
      const room = distanceToEdges(rings, p)
      if (!best || room > best.room + 1e-9) best = { at: p, room }
    }
  return best
}

/** Which square millimetres of a sheet are taken by pieces. */
export class Occupancy {
  private readonly taken: Uint8Array

  constructor(
    private readonly width: number,
    private readonly height: number,
  ) {
    this.taken = new Uint8Array(Math.ceil(width) * Math.ceil(height))
  }

  /** Marks every cell near the region: its inside at cell centres and all cells along its edges. */
  add(rings: readonly Ring2[]): void {
    const w = Math.ceil(this.width)
    const h = Math.ceil(this.height)
    const outer = rings[0]!
    const ys = outer.map((p) => p[1])
    const xs = outer.map((p) => p[0])
    for (let y = Math.max(0, Math.floor(Math.min(...ys))); y <= Math.min(h - 1, Math.max(...ys)); y++)
      for (let x = Math.max(0, Math.floor(Math.min(...xs))); x <= Math.min(w - 1, Math.max(...xs)); x++)
        if (pointInside(rings, [x + 0.5, y + 0.5])) this.taken[y * w + x] = 1
    for (const ring of rings)
      ring.forEach((a, i) => {
        const b = ring[(i + 1) % ring.length]!
        const steps = Math.max(1, Math.ceil(2 * Math.hypot(b[0] - a[0], b[1] - a[1])))
        for (let k = 0; k <= steps; k++)
          this.mark(a[0] + ((b[0] - a[0]) * k) / steps, a[1] + ((b[1] - a[1]) * k) / steps)
      })
  }

  private mark(x: number, y: number): void {
    if (x >= 0 && y >= 0 && x < this.width && y < this.height)
      this.taken[Math.floor(y) * Math.ceil(this.width) + Math.floor(x)] = 1
  }

  isTaken(x: number, y: number): boolean {
    if (x < 0 || y < 0 || x >= this.width || y >= this.height) return true
    return this.taken[Math.floor(y) * Math.ceil(this.width) + Math.floor(x)] === 1
  }

  /** Is every cell under the box free? */
  isFree(box: TextBox): boolean {
    const n = Math.ceil(4 * box.halfWidth)
    const m = Math.ceil(4 * box.halfHeight)
    for (let i = 0; i <= n; i++)
      for (let j = 0; j <= m; j++) {
        const a = box.halfWidth * ((2 * i) / n - 1)
        const b = box.halfHeight * ((2 * j) / m - 1)
        if (
          this.isTaken(box.at[0] + a * box.along[0] - b * box.along[1], box.at[1] + a * box.along[1] + b * box.along[0])
        )
          return false
      }
    return true
  }
}

/** Plane vector algebra and polygon basics. Rings are open lists: the last point is not the first again. */
export type Vec2 = readonly [number, number]
export type Ring2 = readonly Vec2[]

export const add2 = (a: Vec2, b: Vec2): Vec2 => [a[0] + b[0], a[1] + b[1]]
export const sub2 = (a: Vec2, b: Vec2): Vec2 => [a[0] - b[0], a[1] - b[1]]
export const scale2 = (a: Vec2, k: number): Vec2 => [a[0] * k, a[1] * k]
export const dot2 = (a: Vec2, b: Vec2): number => a[0] * b[0] + a[1] * b[1]
export const cross2 = (a: Vec2, b: Vec2): number => a[0] * b[1] - a[1] * b[0]
export const norm2 = (a: Vec2): number => Math.sqrt(a[0] * a[0] + a[1] * a[1])
export const distance2 = (a: Vec2, b: Vec2): number => norm2(sub2(a, b))
export const normalize2 = (a: Vec2): Vec2 => scale2(a, 1 / norm2(a))
/** `a` turned by +90 degrees. */
export const left2 = (a: Vec2): Vec2 => [-a[1], a[0]]

/** Signed area, positive when the ring runs counter-clockwise. */
export const signedArea = (ring: Ring2): number => {
  let twice = 0
  for (let i = 0, j = ring.length - 1; i < ring.length; j = i++) {
    const a = ring[j] as Vec2
    const b = ring[i] as Vec2
    twice += a[0] * b[1] - b[0] * a[1]
  }
  return twice / 2
}

/** Winding number of a closed ring (self-crossing allowed) about `p`; undefined on the ring itself. */
export const windingNumber = (ring: Ring2, p: Vec2): number => {
  let winding = 0
  for (let i = 0, j = ring.length - 1; i < ring.length; j = i++) {
    const a = ring[j] as Vec2
    const b = ring[i] as Vec2
    if (a[1] <= p[1]) {
      if (b[1] > p[1] && (b[0] - a[0]) * (p[1] - a[1]) - (p[0] - a[0]) * (b[1] - a[1]) > 0) winding++
    } else if (b[1] <= p[1] && (b[0] - a[0]) * (p[1] - a[1]) - (p[0] - a[0]) * (b[1] - a[1]) < 0) winding--
  }
  return winding
}

/**
 * A rigid motion of the plane, orientation kept: rotate by the angle whose cosine and sine are c and s, then add (x, y).
 */
export interface Motion2 {
  readonly c: number
  readonly s: number
  readonly x: number
  readonly y: number
}
export const identity2: Motion2 = { c: 1, s: 0, x: 0, y: 0 }
export const move2 = (m: Motion2, p: Vec2): Vec2 => [m.c * p[0] - m.s * p[1] + m.x, m.s * p[0] + m.c * p[1] + m.y]
/** First `inner`, then `outer`. */
export const compose2 = (outer: Motion2, inner: Motion2): Motion2 => {
  const [x, y] = move2(outer, [inner.x, inner.y])
  return {
    c: outer.c * inner.c - outer.s * inner.s,
    s: outer.s * inner.c + outer.c * inner.s,
    x,
    y,
  }
}
/** The motion that takes segment a→b onto c→d (equal lengths assumed; a lands on c exactly). */
export const motionBetween = (a: Vec2, b: Vec2, c: Vec2, d: Vec2): Motion2 => {
  const p = sub2(b, a)
  const q = sub2(d, c)
  const k = 1 / (norm2(p) * norm2(q))
  const cos = dot2(p, q) * k
  const sin = cross2(p, q) * k
  return { c: cos, s: sin, x: c[0] - (cos * a[0] - sin * a[1]), y: c[1] - (sin * a[0] + cos * a[1]) }
}

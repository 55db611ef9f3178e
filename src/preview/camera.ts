/**
 * Where the viewer stands, shared by both renderers. The model is centred and scaled to radius 1; the viewer keeps a
 * fixed distance and zooms and shifts the picture alone, so nothing is ever nearer than the near plane and no triangle
 * needs clipping.
 *
 * View space: x right, y up, z towards the viewer. Screen: CSS px, origin top left, y down.
 */
import {
  apply,
  cross,
  dot,
  identity3,
  type Mat3,
  multiply,
  norm,
  normalize,
  rotationAbout,
  scale,
  type Vec3,
} from '../geometry/vec3'

/** Distance of the viewer from the centre, in radii of what is shown: a mild perspective of about 23 degrees. */
const distanceInRadii = 5
/** Share of the smaller side that the model's sphere takes at zoom 1. */
const fill = 0.94
const zoomRange = [0.5, 60] as const

const identityTurn = (direction: Vec3): Mat3 => turnBetween(direction, [0, 0, 1])

/** The shortest rotation that takes unit vector a to unit vector b. */
export const turnBetween = (a: Vec3, b: Vec3, share = 1): Mat3 => {
  const axis = cross(a, b)
  const sine = norm(axis)
  const cosine = dot(a, b)
  if (sine < 1e-12) {
    if (cosine > 0) return identity3
    // Half a turn: any axis square to a will do; the one nearest to the vertical keeps the roll.
    const helper: Vec3 = Math.abs(a[1]) < 0.9 ? [0, 1, 0] : [1, 0, 0]
    return rotationAbout(normalize(cross(a, cross(helper, a))), Math.PI * share)
  }
  return rotationAbout(scale(axis, 1 / sine), Math.atan2(sine, cosine) * share)
}

/** Gram–Schmidt on the rows, against the drift of many small turns. */
const orthonormal = (m: Mat3): Mat3 => {
  const x = normalize(m[0])
  const k = dot(x, m[1])
  const y = normalize([m[1][0] - k * x[0], m[1][1] - k * x[1], m[1][2] - k * x[2]])
  return [x, y, cross(x, y)]
}

export class Camera {
  /** Rows: the viewer's right, up and backward directions in model space. */
  rotation: Mat3 = identity3
  zoom = 1
  /** Shift of the picture, in halves of the smaller side, y up; multiplied by zoom. */
  shift: readonly [number, number] = [0, 0]
  width = 1
  height = 1
  /** Radius of what is shown, 1 for the closed model. */
  spread = 1
  /** Goes up with every change. */
  version = 0

  constructor(readonly firstDirection: Vec3 = normalize([0.42, 0.3, 0.86])) {
    this.reset()
  }

  reset(): void {
    this.rotation = identityTurn(normalize(this.firstDirection))
    this.zoom = 1
    this.shift = [0, 0]
    this.version++
  }

  resize(width: number, height: number): void {
    if (width === this.width && height === this.height) return
    this.width = width
    this.height = height
    this.version++
  }

  setSpread(radius: number): void {
    if (radius === this.spread) return
    this.spread = radius
    this.version++
  }

  setRotation(rotation: Mat3): void {
    this.rotation = orthonormal(rotation)
    this.version++
  }

  /** Turns the model about the screen's axes, radians: positive x to the right, positive y downwards, roll counter-clockwise. */
  orbit(x: number, y: number, roll = 0): void {
    let turn = rotationAbout([0, 1, 0], x)
    turn = multiply(rotationAbout([1, 0, 0], y), turn)
    if (roll !== 0) turn = multiply(rotationAbout([0, 0, 1], roll), turn)
    this.setRotation(multiply(turn, this.rotation))
  }

  /** Zooms by `factor`, keeping what is at the screen place (x, y) there; the middle by default. */
  zoomAt(factor: number, x = this.width / 2, y = this.height / 2): void {
    const zoom = Math.min(zoomRange[1], Math.max(zoomRange[0], this.zoom * factor))
    const half = Math.min(this.width, this.height) / 2
    const px = (x - this.width / 2) / half
    const py = (this.height / 2 - y) / half
    const [sx, sy] = this.shift
    this.shift = [sx + px / zoom - px / this.zoom, sy + py / zoom - py / this.zoom]
    this.zoom = zoom
    this.keepInReach()
    this.version++
  }

  /** Moves the picture by CSS px, y down. */
  pan(dx: number, dy: number): void {
    const half = (Math.min(this.width, this.height) / 2) * this.zoom
    this.shift = [this.shift[0] + dx / half, this.shift[1] - dy / half]
    this.keepInReach()
    this.version++
  }

  setShift(shift: readonly [number, number]): void {
    this.shift = shift
    this.version++
  }

  private keepInReach(): void {
    const reach = (s: number): number => Math.min(1, Math.max(-1, s))
    this.shift = [reach(this.shift[0]), reach(this.shift[1])]
  }

  /** Distance from the viewer to the centre. */
  get distance(): number {
    return distanceInRadii * this.spread
  }

  /** CSS px per unit of x/w, where w is the distance along the line of sight. */
  get focal(): number {
    const half = (Math.min(this.width, this.height) / 2) * fill * this.zoom
    return half * Math.sqrt(distanceInRadii ** 2 - 1)
  }

  /** Screen place of the model's centre. */
  get middle(): readonly [number, number] {
    const half = (Math.min(this.width, this.height) / 2) * this.zoom
    return [this.width / 2 + this.shift[0] * half, this.height / 2 - this.shift[1] * half]
  }

  /** Screen place (CSS px) and inverse distance along the line of sight of a centred, scaled model point. */
  project(p: Vec3): { x: number; y: number; inverse: number } {
    const [x, y, z] = apply(this.rotation, p)
    const inverse = 1 / (this.distance - z)
    const [mx, my] = this.middle
    return { x: mx + this.focal * x * inverse, y: my - this.focal * y * inverse, inverse }
  }

  /** Origin and direction (model space, not unit) of the line of sight through a screen place. */
  ray(x: number, y: number): { origin: Vec3; direction: Vec3 } {
    const [mx, my] = this.middle
    const view: Vec3 = [(x - mx) / this.focal, (my - y) / this.focal, -1]
    const [r, u, b] = this.rotation
    const back = (v: Vec3): Vec3 => [
      r[0] * v[0] + u[0] * v[1] + b[0] * v[2],
      r[1] * v[0] + u[1] * v[1] + b[1] * v[2],
      r[2] * v[0] + u[2] * v[1] + b[2] * v[2],
    ]
    return { origin: back([0, 0, this.distance]), direction: back(view) }
  }

  /** Near and far plane outside the model's sphere, with room for lines that stand out (see `bias.ts`). */
  get depthRange(): readonly [number, number] {
    return [this.distance - 1.25 * this.spread, this.distance + 1.05 * this.spread]
  }

  /** The same projection for clip space (x right, y up, −w…w): column-major 4 × 4, for centred, scaled model points. */
  clipMatrix(): number[] {
    const [r, u, b] = this.rotation
    const [mx, my] = this.middle
    const [near, far] = this.depthRange
    const kx = (2 * this.focal) / this.width
    const ky = (2 * this.focal) / this.height
    const ox = (2 * mx) / this.width - 1
    const oy = 1 - (2 * my) / this.height
    const kz = (far + near) / (far - near)
    const d = this.distance
    // w = d − b·p; x = kx r·p + ox w; y = ky u·p + oy w; z = kz w − 2 f n / (f − n).
    const row = (m: Vec3, k: number, o: number, constant: number): number[] => [
      k * m[0] - o * b[0],
      k * m[1] - o * b[1],
      k * m[2] - o * b[2],
      o * d + constant,
    ]
    const rows = [
      row(r, kx, ox, 0),
      row(u, ky, oy, 0),
      row(b, 0, kz, (-2 * far * near) / (far - near)),
      row(b, 0, 1, 0),
    ]
    const out: number[] = []
    for (let column = 0; column < 4; column++) for (const line of rows) out.push(line[column]!)
    return out
  }

  /** Moves clip-space z by this much per unit of relative depth bias (see `bias.ts`). */
  get clipBias(): number {
    const [near, far] = this.depthRange
    return (2 * far * near) / (far - near)
  }
}

/** Plain vector algebra in space. Vectors are readonly triples; nothing here allocates more than its result. */
export type Vec3 = readonly [number, number, number]
/** Row-major 3 × 3 matrix: three rows. */
export type Mat3 = readonly [Vec3, Vec3, Vec3]

export const add = (a: Vec3, b: Vec3): Vec3 => [a[0] + b[0], a[1] + b[1], a[2] + b[2]]
export const sub = (a: Vec3, b: Vec3): Vec3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
export const scale = (a: Vec3, k: number): Vec3 => [a[0] * k, a[1] * k, a[2] * k]
export const dot = (a: Vec3, b: Vec3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
export const cross = (a: Vec3, b: Vec3): Vec3 => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
]
export const norm = (a: Vec3): number => Math.sqrt(dot(a, a))
export const distance = (a: Vec3, b: Vec3): number => norm(sub(a, b))
export const lerp = (a: Vec3, b: Vec3, t: number): Vec3 => add(a, scale(sub(b, a), t))

/** Unit vector along `a`; `a` must not be zero (the result would be NaN). */
export const normalize = (a: Vec3): Vec3 => scale(a, 1 / norm(a))

export const apply = (m: Mat3, a: Vec3): Vec3 => [dot(m[0], a), dot(m[1], a), dot(m[2], a)]
export const transpose = (m: Mat3): Mat3 => [
  [m[0][0], m[1][0], m[2][0]],
  [m[0][1], m[1][1], m[2][1]],
  [m[0][2], m[1][2], m[2][2]],
]
export const multiply = (a: Mat3, b: Mat3): Mat3 => {
  const t = transpose(b)
  return [apply(t, a[0]), apply(t, a[1]), apply(t, a[2])]
}
export const identity3: Mat3 = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
]
export const determinant = (m: Mat3): number => dot(m[0], cross(m[1], m[2]))

/** Rotation by `angle` (radians, counter-clockwise seen from the tip) about the unit vector `axis`; Rodrigues' formula. */
export const rotationAbout = (axis: Vec3, angle: number): Mat3 => {
  const [x, y, z] = axis
  const c = Math.cos(angle)
  const s = Math.sin(angle)
  const k = 1 - c
  return [
    [c + x * x * k, x * y * k - z * s, x * z * k + y * s],
    [y * x * k + z * s, c + y * y * k, y * z * k - x * s],
    [z * x * k - y * s, z * y * k + x * s, c + z * z * k],
  ]
}

/** Two unit vectors u, v with u × v = n, for a unit vector n: a right-handed frame of the plane seen from n's tip. */
export const planeFrame = (n: Vec3): { u: Vec3; v: Vec3 } => {
  const helper: Vec3 =
    Math.abs(n[0]) <= Math.abs(n[1]) && Math.abs(n[0]) <= Math.abs(n[2])
      ? [1, 0, 0]
      : Math.abs(n[1]) <= Math.abs(n[2])
        ? [0, 1, 0]
        : [0, 0, 1]
  const u = normalize(cross(helper, n))
  return { u, v: cross(n, u) }
}

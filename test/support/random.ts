/** Seeded randomness for tests: mulberry32 (public domain), uniform in [0, 1). Every test prints its seed in its name. */
export type Random = () => number

export const seeded = (seed: number): Random => {
  let a = seed >>> 0
  return () => {
    a = (a + 0x6d2b79f5) >>> 0
    let t = a
    t = Math.imul(t ^ (t >>> 15), t | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}

/** A unit vector, uniform on the sphere (Archimedes' hat-box theorem). */
export const randomDirection = (random: Random): [number, number, number] => {
  const z = 2 * random() - 1
  const a = 2 * Math.PI * random()
  const r = Math.sqrt(1 - z * z)
  return [r * Math.cos(a), r * Math.sin(a), z]
}

/** A rotation matrix, uniform (a random unit quaternion). */
export const randomRotation = (
  random: Random,
): [[number, number, number], [number, number, number], [number, number, number]] => {
  const u = random()
  const a = 2 * Math.PI * random()
  const b = 2 * Math.PI * random()
  const w = Math.sqrt(1 - u) * Math.sin(a)
  const x = Math.sqrt(1 - u) * Math.cos(a)
  const y = Math.sqrt(u) * Math.sin(b)
  const z = Math.sqrt(u) * Math.cos(b)
  return [
    [1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
    [2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
    [2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
  ]
}

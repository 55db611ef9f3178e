/** Numbers that look random and are the same on every machine. */
export interface Random {
  /** Uniform in [0, 1), with 32 bits. */
  next(): number
  /** Uniform integer in 0 … n − 1. */
  below(n: number): number
}

/** The 32-bit mixing generator known as mulberry32 (public domain); `seed` is taken modulo 2³². */
export const seededRandom = (seed: number): Random => {
  let state = seed >>> 0
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = Math.imul(state ^ (state >>> 15), state | 1)
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61)
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
  return { next, below: (n) => Math.floor(next() * n) }
}

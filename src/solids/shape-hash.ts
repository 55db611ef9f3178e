/** A number for the shape of a solid. */
import type { Solid } from './types'

/**
 * FNV-1a over coordinates, kinds and cycles, 32 bits: equal shapes have equal numbers, others almost never. Minus zero
 * counts as zero, as it does in a saved file.
 */
export const shapeHash = (solid: Solid): number => {
  let hash = 0x811c9dc5
  const numbers = new Float64Array([
    ...solid.vertices.flat().map((x) => x + 0),
    ...solid.faces.flatMap((f) => [f.kind, -1, ...f.cycle]),
  ])
  for (const byte of new Uint8Array(numbers.buffer)) hash = Math.imul(hash ^ byte, 0x01000193)
  return hash >>> 0
}

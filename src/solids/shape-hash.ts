/** A number for the shape of a solid. */
import type { Solid } from './types'

/** FNV-1a over coordinates, kinds and cycles, 32 bits: equal shapes have equal numbers, others almost never. */
export const shapeHash = (solid: Solid): number => {
  let hash = 0x811c9dc5
  const numbers = new Float64Array([...solid.vertices.flat(), ...solid.faces.flatMap((f) => [f.kind, -1, ...f.cycle])])
  for (const byte of new Uint8Array(numbers.buffer)) hash = Math.imul(hash ^ byte, 0x01000193)
  return hash >>> 0
}

/** Small linear systems. */
import type { Vec3 } from '../geometry/vec3'

/** Solves a symmetric positive definite system of three equations by Cramer's rule. */
export const solve3 = (m: readonly (readonly number[])[], rhs: readonly number[]): Vec3 => {
  const det3 = (a: readonly (readonly number[])[]): number =>
    a[0]![0]! * (a[1]![1]! * a[2]![2]! - a[1]![2]! * a[2]![1]!) -
    a[0]![1]! * (a[1]![0]! * a[2]![2]! - a[1]![2]! * a[2]![0]!) +
    a[0]![2]! * (a[1]![0]! * a[2]![1]! - a[1]![1]! * a[2]![0]!)
  const det = det3(m)
  const part = (k: number): number => det3(m.map((row, i) => row.map((value, j) => (j === k ? rhs[i]! : value)))) / det
  return [part(0), part(1), part(2)]
}

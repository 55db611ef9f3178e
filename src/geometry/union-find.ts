/** Disjoint sets over 0 … n−1, with path halving; the smaller root wins, so that results do not depend on call order. */
export class UnionFind {
  private readonly parent: Int32Array

  constructor(n: number) {
    this.parent = new Int32Array(n)
    for (let i = 0; i < n; i++) this.parent[i] = i
  }

  find(i: number): number {
    const p = this.parent
    while (p[i] !== i) {
      p[i] = p[p[i]!]!
      i = p[i]!
    }
    return i
  }

  /** Joins the sets of a and b; true if they were apart. */
  union(a: number, b: number): boolean {
    const x = this.find(a)
    const y = this.find(b)
    if (x === y) return false
    if (x < y) this.parent[y] = x
    else this.parent[x] = y
    return true
  }
}

/** Timing within one run: medians, ratios and a fitted exponent. Absolute times depend on the machine; ratios less so. */

/**
 * Median time in ms of `runs` calls. Before them it is called until the compiler has seen it for a while: cold code would
 * make the first row of every table the slowest.
 */
export const medianMs = (work: () => unknown, runs = 5, warmMs = 300): number => {
  const begun = performance.now()
  do work()
  while (performance.now() - begun < warmMs)
  const times = Array.from({ length: runs }, () => {
    const start = performance.now()
    work()
    return performance.now() - start
  }).sort((a, b) => a - b)
  return times[times.length >> 1]!
}

/** Slope and scatter of log y over log x by least squares: y grows like x to this power. */
export const fittedExponent = (points: readonly (readonly [x: number, y: number])[]): { power: number; r2: number } => {
  const logs = points.map(([x, y]) => [Math.log(x), Math.log(y)] as const)
  const mean = (i: 0 | 1): number => logs.reduce((sum, p) => sum + p[i], 0) / logs.length
  const [mx, my] = [mean(0), mean(1)]
  const sum = (f: (x: number, y: number) => number): number => logs.reduce((s, [x, y]) => s + f(x - mx, y - my), 0)
  const [xx, xy, yy] = [sum((x) => x * x), sum((x, y) => x * y), sum((_, y) => y * y)]
  return { power: xy / xx, r2: (xy * xy) / (xx * yy) }
}

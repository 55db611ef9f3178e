/**
 * Outlines on a raster, row by row as runs of cells. A mask holds every cell that the outline touches, so masks that share
 * no cell belong to outlines that do not overlap.
 */
import type { Ring2, Vec2 } from '../geometry/vec2'

export interface Mask {
  /** In cells. */
  readonly width: number
  readonly height: number
  /** Runs of row r: from runs[2k] up to, not including, runs[2k + 1], for k from starts[r] to starts[r + 1]. */
  readonly runs: Uint16Array
  readonly starts: Uint32Array
  readonly cells: number
  /** Rows, fullest first: the order in which a clash shows soonest. */
  readonly rows: Uint16Array
}

/**
 * @param rings region in mm (nonzero), anywhere in the first quadrant
 * @param cellMm side of a cell
 */
export const rasterize = (rings: readonly Ring2[], cellMm: number): Mask => {
  let right = 0
  let top = 0
  for (const ring of rings)
    for (const [x, y] of ring) {
      right = Math.max(right, x)
      top = Math.max(top, y)
    }
  const width = Math.max(1, Math.ceil(right / cellMm - 1e-9))
  const height = Math.max(1, Math.ceil(top / cellMm - 1e-9))
  const taken = new Uint8Array(width * height)
  const mark = (row: number, from: number, to: number): void => {
    const a = Math.max(0, Math.floor(from / cellMm))
    const b = Math.min(width - 1, Math.floor(to / cellMm))
    if (a <= b) taken.fill(1, row * width + a, row * width + b + 1)
  }
  // Every cell that an edge passes through.
  for (const ring of rings)
    ring.forEach((a, i) => {
      const b = ring[(i + 1) % ring.length]!
      const [low, high] = a[1] <= b[1] ? [a, b] : [b, a]
      // Rounding may put an edge a hair below the first row or above the last: it still counts to that row.
      const rowOf = (y: number): number => Math.max(0, Math.min(height - 1, Math.floor(y / cellMm)))
      const first = rowOf(low[1])
      const last = rowOf(high[1])
      for (let row = first; row <= last; row++) {
        const s = row === first ? low[0] : at(low, high, row * cellMm)
        const t = row === last ? high[0] : at(low, high, (row + 1) * cellMm)
        mark(row, Math.min(s, t), Math.max(s, t))
      }
    })
  // And every cell whose bottom edge is inside: where each edge crosses the rows' lower borders, then row by row.
  const crossings: { x: number; turn: number }[][] = Array.from({ length: height }, () => [])
  for (const ring of rings)
    ring.forEach((a, i) => {
      const b = ring[(i + 1) % ring.length]!
      const turn = a[1] <= b[1] ? 1 : -1
      const [low, high] = turn > 0 ? [a, b] : [b, a]
      const last = Math.min(height - 1, Math.ceil(high[1] / cellMm))
      for (let row = Math.max(1, Math.floor(low[1] / cellMm)); row <= last; row++) {
        const y = row * cellMm
        if (low[1] <= y && y < high[1]) crossings[row]!.push({ x: at(low, high, y), turn })
      }
    })
  crossings.forEach((list, row) => {
    list.sort((p, q) => p.x - q.x)
    let winding = 0
    for (let i = 0; i + 1 < list.length; i++) {
      winding += list[i]!.turn
      if (winding !== 0) mark(row, list[i]!.x, list[i + 1]!.x)
    }
  })
  const runs: number[] = []
  const starts: number[] = [0]
  const full: number[] = []
  for (let row = 0; row < height; row++) {
    let count = 0
    for (let x = 0; x < width; x++) {
      if (!taken[row * width + x]) continue
      const from = x
      while (x < width && taken[row * width + x]) x++
      runs.push(from, x)
      count += x - from
    }
    starts.push(runs.length / 2)
    full.push(count)
  }
  const rows = full.map((_, row) => row).sort((p, q) => full[q]! - full[p]! || p - q)
  return {
    width,
    height,
    runs: Uint16Array.from(runs),
    starts: Uint32Array.from(starts),
    cells: full.reduce((sum, n) => sum + n, 0),
    rows: Uint16Array.from(rows),
  }
}

/** x where the segment a–b reaches height y, kept within the segment. */
const at = (a: Vec2, b: Vec2, y: number): number => {
  if (a[1] === b[1]) return y <= a[1] ? a[0] : b[0]
  const t = Math.max(0, Math.min(1, (y - a[1]) / (b[1] - a[1])))
  return a[0] + t * (b[0] - a[0])
}

/** The cells of one sheet that are taken, row by row, kept so that a clash says at once how far to move on. */
export class Board {
  /** nearest[row · (width + 1) + x]: the last taken cell of the row left of x; −1 if there is none. */
  private readonly nearest: Int16Array
  free: number

  constructor(
    readonly width: number,
    readonly height: number,
  ) {
    this.nearest = new Int16Array((width + 1) * height).fill(-1)
    this.free = width * height
  }

  /** The least x ≤ lastX at which the mask, its lowest row at y, meets no taken cell; −1 if there is none. */
  firstFree(mask: Mask, y: number, lastX: number): number {
    const { nearest } = this
    const { runs, starts, rows, height } = mask
    const stride = this.width + 1
    let x = 0
    // Every clash moves the mask on until its run clears the taken cell; it fits when all rows in turn had no clash.
    for (let k = 0, quiet = 0; quiet < height; k = k + 1 === height ? 0 : k + 1, quiet++) {
      const row = rows[k]!
      const base = (y + row) * stride
      for (let r = starts[row]!; r < starts[row + 1]!; r++) {
        const taken = nearest[base + x + runs[2 * r + 1]!]!
        if (taken < x + runs[2 * r]!) continue
        x = taken + 1 - runs[2 * r]!
        if (x > lastX) return -1
        quiet = -1
        r = starts[row]! - 1
      }
    }
    return x
  }

  put(mask: Mask, x: number, y: number): void {
    const { nearest, width } = this
    for (let row = 0; row < mask.height; row++) {
      const base = (y + row) * (width + 1)
      for (let r = mask.starts[row]!; r < mask.starts[row + 1]!; r++) {
        const from = x + mask.runs[2 * r]!
        const to = x + mask.runs[2 * r + 1]!
        for (let i = from + 1; i <= to; i++) nearest[base + i] = i - 1
        for (let i = to + 1; i <= width && nearest[base + i]! < to - 1; i++) nearest[base + i] = to - 1
      }
    }
    this.free -= mask.cells
  }
}

/** Places for the words beside the sides of a flat figure: where they cover least. */

export interface Label {
  readonly text: string
  readonly x: number
  readonly y: number
}
export type Segment = readonly [readonly [number, number], readonly [number, number]]

/** Of the letters that the figures are lettered with, in the figure's unit. */
export const letter = { height: 17, width: 10 }

interface Box {
  readonly x: number
  readonly y: number
  readonly halfWidth: number
  readonly halfHeight: number
}

const overlap = (a: Box, b: Box): number =>
  Math.max(0, a.halfWidth + b.halfWidth - Math.abs(a.x - b.x)) *
  Math.max(0, a.halfHeight + b.halfHeight - Math.abs(a.y - b.y))

/** How many of the points spread along the lines the box covers. */
const covered = (box: Box, lines: readonly Segment[]): number => {
  let count = 0
  for (const [[x1, y1], [x2, y2]] of lines) {
    const steps = Math.max(1, Math.ceil(Math.hypot(x2 - x1, y2 - y1) / 4))
    for (let i = 0; i <= steps; i++) {
      const t = i / steps
      const inside =
        Math.abs(x1 + t * (x2 - x1) - box.x) < box.halfWidth && Math.abs(y1 + t * (y2 - y1) - box.y) < box.halfHeight
      if (inside) count++
    }
  }
  return count
}

/**
 * @param lines sides of the figure, the axis in the origin
 * @param texts by side; empty for none
 * @param reach half width and half height of the drawing, beyond which no label may lie
 */
export const placeLabels = (
  lines: readonly Segment[],
  texts: readonly string[],
  reach: readonly [number, number],
): Label[] => {
  const placed: Box[] = []
  return lines.flatMap(([[x1, y1], [x2, y2]], i) => {
    const text = texts[i]
    if (!text) return []
    const halfWidth = (text.length * letter.width) / 2
    const halfHeight = letter.height / 2
    const length = Math.hypot(x2 - x1, y2 - y1) || 1
    const [nx, ny] = [(y2 - y1) / length, (x1 - x2) / length]
    // The box touches the side when moved by its own extent along the normal.
    const away = Math.abs(nx) * halfWidth + Math.abs(ny) * halfHeight + 4
    let best: Box | null = null
    let least = Number.POSITIVE_INFINITY
    for (const share of [0.5, 0.35, 0.65, 0.2, 0.8])
      for (const hand of [1, -1]) {
        const [mx, my] = [x1 + share * (x2 - x1), y1 + share * (y2 - y1)]
        const x = mx + hand * away * nx
        const y = my + hand * away * ny
        const box = { x, y, halfWidth, halfHeight }
        const out = Math.max(0, Math.abs(x) + halfWidth - reach[0]) + Math.max(0, Math.abs(y) + halfHeight - reach[1])
        // Outside of the figure and near the middle of its side, other things being equal.
        const taste = 6 * Math.abs(share - 0.5) + (Math.hypot(x, y) < Math.hypot(mx, my) ? 2 : 0)
        const cost = 20 * out + 4 * covered(box, lines) + placed.reduce((sum, b) => sum + overlap(b, box), 0) + taste
        if (cost >= least) continue
        least = cost
        best = box
      }
    placed.push(best!)
    return [{ text, x: best!.x, y: best!.y }]
  })
}

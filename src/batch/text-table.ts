/** A table for reading in a terminal: columns as wide as their widest cell, numbers to the right. */
export type Cell = string | number | boolean | null

const show = (cell: Cell): string =>
  cell === null
    ? '–'
    : typeof cell === 'boolean'
      ? cell
        ? 'yes'
        : 'no'
      : typeof cell === 'number'
        ? number(cell)
        : cell

const number = (x: number): string => (Number.isInteger(x) ? String(x) : x.toFixed(Math.abs(x) < 100 ? 4 : 1))

export const textTable = (head: readonly string[], rows: readonly (readonly Cell[])[]): string => {
  const right = head.map((_, i) => rows.every((row) => typeof row[i] === 'number' || row[i] === null))
  const lines = [head, ...rows.map((row) => row.map(show))]
  const widths = head.map((_, i) => Math.max(...lines.map((line) => line[i]!.length)))
  return lines
    .map((line) =>
      line
        .map((cell, i) => (right[i] ? cell.padStart(widths[i]!) : cell.padEnd(widths[i]!)))
        .join('  ')
        .trimEnd(),
    )
    .join('\n')
}

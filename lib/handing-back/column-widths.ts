/**
 * Widths of the columns of a table in points, from the widths of its cells' words: as wide as the widest cell, and where that is more than there is
 * room for, the widest columns give way first. `gap` lies between columns.
 */
export function columnWidths(cells: readonly (readonly number[])[], room: number, gap: number): number[] {
  const count = cells[0]?.length ?? 0
  const wanted = Array.from({ length: count }, (_, k) => Math.max(0, ...cells.map((row) => row[k]!)))
  const there = room - gap * (count - 1)
  // Every column narrower than an even share of what is left keeps its width; the others share the rest.
  const widths = [...wanted]
  const order = wanted.map((width, k) => ({ width, k })).sort((a, b) => a.width - b.width)
  let left = there
  order.forEach(({ width, k }, done) => {
    widths[k] = Math.min(width, left / (count - done))
    left -= widths[k]
  })
  return widths
}

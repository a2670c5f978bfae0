/** Each row's column, and by how much the whole would cost more if that row could not have it. */
export type Matching = Readonly<{ columns: readonly number[]; margins: readonly number[] }>

/**
 * Gives every row a column of its own so that the costs add up to the least (the Hungarian method by shortest ways, O(rows² columns)).
 * @param costs row by row, finite, at least as many columns as rows
 */
export function leastCostMatching(costs: readonly (readonly number[])[]): Matching {
  const rows = costs.length
  const width = costs[0]?.length ?? 0
  const rowPrice = new Float64Array(rows)
  const columnPrice = new Float64Array(width)
  const rowOf = new Int32Array(width).fill(-1)
  const reduced = (row: number, column: number) => costs[row]![column]! - rowPrice[row]! - columnPrice[column]!
  for (let row = 0; row < rows; row++) {
    const { distance, before, end } = shortestWays(row, width, rowOf, reduced)
    const length = distance[end]!
    rowPrice[row]! += length
    for (let column = 0; column < width; column++)
      if (distance[column]! < length) {
        if (rowOf[column]! >= 0) rowPrice[rowOf[column]!]! += length - distance[column]!
        columnPrice[column]! -= length - distance[column]!
      }
    for (let column = end; column >= 0; ) {
      const from = before[column]!
      rowOf[column] = from >= 0 ? rowOf[from]! : row
      column = from
    }
  }
  const columns = new Array<number>(rows).fill(-1)
  rowOf.forEach((row, column) => { if (row >= 0) columns[row] = column })
  const margins = columns.map((own, row) => {
    // The row goes elsewhere and its column is left to whoever ends the way round; a column without a row may stay so or change for another at no cost.
    const afresh = (from: number, column: number) => (from < 0 ? -columnPrice[column]! : from === row && column === own ? Infinity : reduced(from, column))
    rowOf[own] = -2
    const { distance } = shortestWays(row, width, rowOf, afresh, own)
    rowOf[own] = row
    return Math.max(0, distance[own]!)
  })
  return { columns, margins }
}

/**
 * How far each column is from a row over columns that are taken (Dijkstra on dense costs), up to `until`, else up to the nearest free column.
 * With `until`, a free column is one that row -1 holds.
 */
function shortestWays(start: number, width: number, rowOf: Int32Array, cost: (row: number, column: number) => number, until?: number) {
  const distance = new Float64Array(width).fill(Infinity)
  const before = new Int32Array(width).fill(-1)
  const done = new Uint8Array(width)
  const spread = (row: number, from: number, way: number): void => {
    for (let column = 0; column < width; column++) {
      if (done[column]) continue
      const length = way + cost(row, column)
      if (length < distance[column]!) {
        distance[column] = length
        before[column] = from
      }
    }
  }
  spread(start, -1, 0)
  for (;;) {
    let nearest = -1
    for (let column = 0; column < width; column++) if (!done[column] && distance[column]! < Infinity && (nearest < 0 || distance[column]! < distance[nearest]!)) nearest = column
    if (nearest < 0 || nearest === until || (until === undefined && rowOf[nearest]! < 0)) return { distance, before, end: nearest }
    done[nearest] = 1
    spread(rowOf[nearest]!, nearest, distance[nearest]!)
  }
}

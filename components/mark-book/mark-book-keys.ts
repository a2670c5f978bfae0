export type CellPlace = Readonly<{ row: number; column: number }>

const steps: Readonly<Record<string, readonly [number, number]>> = { ArrowUp: [-1, 0], ArrowDown: [1, 0], ArrowLeft: [0, -1], ArrowRight: [0, 1] }

/**
 * Where an arrow, Home or End leads from a cell: the next cell that way that can be taken in hand (rows of absent students are
 * stepped over), or where it is when there is none. Null for any other key. `canStand` says which cells can be taken.
 */
export function moveInBook(at: CellPlace, key: string, size: { rows: number; columns: number }, canStand: (place: CellPlace) => boolean): CellPlace | null {
  const step = key === 'Home' ? ([0, -1] as const) : key === 'End' ? ([0, 1] as const) : steps[key]
  if (!step) return null
  const far = key === 'Home' || key === 'End'
  let found = at
  let place = { row: at.row + step[0], column: at.column + step[1] }
  while (place.row >= 0 && place.row < size.rows && place.column >= 0 && place.column < size.columns) {
    if (canStand(place)) found = place
    if (found !== at && !far) break
    place = { row: place.row + step[0], column: place.column + step[1] }
  }
  return found
}

import { describe, expect, it } from 'vitest'
import { moveInBook } from './mark-book-keys'

const size = { rows: 3, columns: 3 }
const rowOneIsAbsent = ({ row }: { row: number }) => row !== 1

describe('moving the cell in hand', () => {
  it('goes one cell by an arrow and stays at the edge', () => {
    expect(moveInBook({ row: 0, column: 0 }, 'ArrowRight', size, () => true)).toEqual({ row: 0, column: 1 })
    expect(moveInBook({ row: 0, column: 0 }, 'ArrowUp', size, () => true)).toEqual({ row: 0, column: 0 })
  })
  it('steps over the row of an absent student', () => {
    expect(moveInBook({ row: 0, column: 2 }, 'ArrowDown', size, rowOneIsAbsent)).toEqual({ row: 2, column: 2 })
    expect(moveInBook({ row: 2, column: 2 }, 'ArrowUp', size, rowOneIsAbsent)).toEqual({ row: 0, column: 2 })
  })
  it('goes to the ends of a row, and leaves other keys alone', () => {
    expect(moveInBook({ row: 0, column: 1 }, 'End', size, () => true)).toEqual({ row: 0, column: 2 })
    expect(moveInBook({ row: 0, column: 2 }, 'Home', size, () => true)).toEqual({ row: 0, column: 0 })
    expect(moveInBook({ row: 0, column: 1 }, 'a', size, () => true)).toBeNull()
  })
})

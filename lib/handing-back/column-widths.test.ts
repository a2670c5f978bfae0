import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { columnWidths } from './column-widths'

describe('the widths of columns', () => {
  it('are those of the words where there is room', () => {
    expect(columnWidths([[10, 20, 5], [30, 5, 5]], 200, 8)).toEqual([30, 20, 5])
  })
  it('are taken from the widest first where there is not', () => {
    expect(columnWidths([[20, 300, 200]], 136, 8)).toEqual([20, 50, 50])
  })
  it('never take more than the room', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 900, noNaN: true }), { minLength: 1, maxLength: 12 }), (row) => {
      expect(columnWidths([row], 500, 8).reduce((a, b) => a + b, 0)).toBeLessThanOrEqual(500 - 8 * (row.length - 1) + 1e-9)
    }))
  })
})

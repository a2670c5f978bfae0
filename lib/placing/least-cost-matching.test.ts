import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { leastCostMatching } from './least-cost-matching'

const tables = fc.tuple(fc.integer({ min: 1, max: 5 }), fc.integer({ min: 0, max: 2 })).chain(([rows, more]) =>
  fc.array(fc.array(fc.integer({ min: 0, max: 40 }), { minLength: rows + more, maxLength: rows + more }), { minLength: rows, maxLength: rows }))

/** Every way of giving each row a column of its own. */
function ways(rows: number, width: number): number[][] {
  if (rows === 0) return [[]]
  return ways(rows - 1, width).flatMap((way) => Array.from({ length: width }, (_, column) => column).filter((column) => !way.includes(column)).map((column) => [...way, column]))
}
const cost = (table: readonly (readonly number[])[], way: readonly number[]) => way.reduce((sum, column, row) => sum + table[row]![column]!, 0)

describe('the cheapest matching', () => {
  it('is one to one and costs no more than any other', () => {
    fc.assert(fc.property(tables, (table) => {
      const { columns } = leastCostMatching(table)
      expect(new Set(columns).size).toBe(table.length)
      expect(cost(table, columns)).toBe(Math.min(...ways(table.length, table[0]!.length).map((way) => cost(table, way))))
    }))
  })

  it('knows what each row would cost without its column', () => {
    fc.assert(fc.property(tables, (table) => {
      const { columns, margins } = leastCostMatching(table)
      for (const [row, own] of columns.entries()) {
        const others = ways(table.length, table[0]!.length).filter((way) => way[row] !== own).map((way) => cost(table, way))
        expect(margins[row]).toBeCloseTo(Math.min(...others) - cost(table, columns), 6)
      }
    }))
  })

  it('has nothing to say without rows', () => {
    expect(leastCostMatching([])).toEqual({ columns: [], margins: [] })
  })
})

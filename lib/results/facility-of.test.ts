import { describe, expect, it } from 'vitest'
import { halves, halvesOfMarks, sum } from '@/lib/core/marks'
import { checkValue } from '@/tests/make/check-value'
import { facilityOf } from './facility-of'
import { mean } from './mean'

type Expected = { totals: number[]; mean: number; facility: number[] }

describe('totals and facility (check-values: class-test-half-marks)', () => {
  const { data, expected, tolerance } = checkValue<{ max: number[]; marks: number[][] }, Expected>('class-test-half-marks')
  const scripts = data.marks.map((row) => row.map(halvesOfMarks))
  const totals = scripts.map(sum)
  const column = (k: number) => scripts.map((row) => row[k]!)
  // The source counts in marks, we in halves.
  const near = (value: number | null, wanted: number) => expect(Math.abs((value ?? Number.NaN) - wanted)).toBeLessThanOrEqual(tolerance)

  it('adds up the totals exactly', () => {
    expect(totals.map((total) => total / 2)).toEqual(expected.totals)
  })
  it('gives the mean', () => near(mean(totals)! / 2, expected.mean))
  it('gives the facility of every question', () => {
    for (const [k, max] of data.max.entries()) near(facilityOf(column(k), halvesOfMarks(max)).facility, expected.facility[k]!)
  })
  it('leaves out who has no mark, and shows how many were counted', () => {
    expect(facilityOf([halves(2), null, halves(0)], halves(2))).toEqual({ n: 2, mean: 1, facility: 0.5 })
    expect(facilityOf([null, null], halves(2))).toEqual({ n: 0, mean: null, facility: null })
  })
})

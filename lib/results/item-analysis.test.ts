import { describe, expect, it } from 'vitest'
import { halves, halvesOfMarks, sum } from '@/lib/core/marks'
import { checkValue } from '@/tests/make/check-value'
import { discriminationOf, facilityOf } from './item-analysis'
import { correlation, mean, quantile, sdSample } from './statistics'

type Expected = { totals: number[]; mean: number; median: number; quartilesType7: number[]; sdSample: number; facility: number[]; itemRest: number[]; itemTotal: number[] }

describe('facility, discrimination and spread (check-values: class-test-half-marks)', () => {
  const { data, expected, tolerance } = checkValue<{ max: number[]; marks: number[][] }, Expected>('class-test-half-marks')
  const scripts = data.marks.map((row) => row.map(halvesOfMarks))
  const totals = scripts.map(sum)
  const column = (k: number) => scripts.map((row) => row[k]!)
  // The source counts in marks, we in halves.
  const near = (value: number | null, wanted: number) => expect(Math.abs((value ?? Number.NaN) - wanted)).toBeLessThanOrEqual(tolerance)

  it('adds up the totals exactly', () => {
    expect(totals.map((total) => total / 2)).toEqual(expected.totals)
  })
  it('gives mean, median, quartiles and deviation', () => {
    near(mean(totals)! / 2, expected.mean)
    near(quantile(totals, 0.5)! / 2, expected.median)
    near(quantile(totals, 0.25)! / 2, expected.quartilesType7[0]!)
    near(quantile(totals, 0.75)! / 2, expected.quartilesType7[1]!)
    near(sdSample(totals)! / 2, expected.sdSample)
  })
  it('gives the facility and discrimination of every question', () => {
    for (const [k, max] of data.max.entries()) {
      near(facilityOf(column(k), halvesOfMarks(max)).facility, expected.facility[k]!)
      near(correlation(column(k), totals), expected.itemTotal[k]!)
      near(discriminationOf(column(k), totals), expected.itemRest[k]!)
    }
  })
  it('leaves out who has no mark, and shows how many were counted', () => {
    expect(facilityOf([halves(2), null, halves(0)], halves(2))).toEqual({ n: 2, mean: 1, facility: 0.5 })
    expect(facilityOf([null, null], halves(2))).toEqual({ n: 0, mean: null, facility: null })
  })
  it('says nothing where there is nothing to compare', () => {
    expect(discriminationOf([halves(1), halves(1)], [halves(2), halves(5)])).toBeNull()
    expect(sdSample([3])).toBeNull()
    expect(quantile([], 0.5)).toBeNull()
  })
})

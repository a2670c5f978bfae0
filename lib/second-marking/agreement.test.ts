import { describe, expect, it } from 'vitest'
import { halves, halvesOfMarks } from '@/lib/core/marks'
import { checkValue } from '@/tests/make/check-value'
import { agreementOf, withinTolerance } from './agreement'

describe('agreement of two markings', () => {
  it('counts a difference equal to the tolerance as inside (check-values: tolerance-boundary)', () => {
    const { data, expected } = checkValue<{ cases: { first: number; second: number; tolerance: number }[] }, { within: boolean[] }>('tolerance-boundary')
    const within = data.cases.map(({ first, second, tolerance }) => withinTolerance({ first: halvesOfMarks(first), second: halvesOfMarks(second), tolerance: halvesOfMarks(tolerance) }))
    expect(within).toEqual(expected.within)
  })
  it('gives the counts and the mean difference of twenty scripts (check-values: two-markers-half-marks)', () => {
    const { data, expected } = checkValue<{ first: number[]; second: number[] }, { n: number; exactAgreementCount: number; withinHalfCount: number; withinOneCount: number; meanDifference: number }>('two-markers-half-marks')
    const at = (tolerance: number) => agreementOf(data.first.map((first, k) => ({ first: halvesOfMarks(first), second: halvesOfMarks(data.second[k]!), tolerance: halves(tolerance) })))
    expect([at(1).n, at(1).exact, at(1).within, at(2).within]).toEqual([expected.n, expected.exactAgreementCount, expected.withinHalfCount, expected.withinOneCount])
    expect(at(1).meanDifference! / 2).toBeCloseTo(expected.meanDifference, 6)
    expect(at(1).few).toBe(false)
    expect(at(1).differences.reduce((total, { times }) => total + times, 0)).toBe(expected.n)
  })
  it('takes first minus second (check-values: tolerance-ncfe)', () => {
    const { data, expected } = checkValue<{ tolerance: number; centre: number[]; moderator: number[] }, { meanDifference: number; allWithinTolerance: boolean }>('tolerance-ncfe')
    const figures = agreementOf(data.centre.map((first, k) => ({ first: halvesOfMarks(first), second: halvesOfMarks(data.moderator[k]!), tolerance: halvesOfMarks(data.tolerance) })))
    expect(figures.meanDifference! / 2).toBeCloseTo(expected.meanDifference, 6)
    expect(figures.within === figures.n).toBe(expected.allWithinTolerance)
    expect(figures.few).toBe(true)
  })
  it('has no mean without pairs', () => {
    expect(agreementOf([])).toEqual({ n: 0, exact: 0, within: 0, meanDifference: null, few: true, differences: [] })
  })
})

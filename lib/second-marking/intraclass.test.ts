import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkValue } from '@/tests/make/check-value'
import { expectNear } from '@/tests/make/expect-near'
import { intraclassOf, meanSquares } from './intraclass'

type Six = 'icc1_1' | 'icc2_1' | 'icc3_1' | 'icc1_k' | 'icc2_k' | 'icc3_k'
const six = (ratings: readonly (readonly number[])[]) => {
  const { oneWay, agreement, consistency } = intraclassOf(ratings)
  return { icc1_1: oneWay.one, icc2_1: agreement.one, icc3_1: consistency.one, icc1_k: oneWay.mean, icc2_k: agreement.mean, icc3_k: consistency.mean }
}

describe('intraclass correlation', () => {
  it('gives mean squares, six forms and their intervals (check-values: icc-shrout-fleiss-1979)', () => {
    const { data, expected, tolerance } = checkValue<{ ratings: number[][] }, Record<Six | 'msBetweenTargets' | 'msWithin' | 'msJudges' | 'msResidual', number> & { ci95: Record<Six, [number, number]> }>('icc-shrout-fleiss-1979')
    const squares = meanSquares(data.ratings)
    expectNear([squares.between, squares.within, squares.judges, squares.residual], [expected.msBetweenTargets, expected.msWithin, expected.msJudges, expected.msResidual], tolerance)
    for (const [form, { figure, interval }] of Object.entries(six(data.ratings)) as [Six, ReturnType<typeof six>[Six]][]) {
      expectNear(figure.value, expected[form], tolerance)
      expectNear(interval!, expected.ci95[form], tolerance)
    }
  })
  it('gives the forms of two markers, marks held as halves (check-values: two-markers-half-marks)', () => {
    const { data, expected, tolerance } = checkValue<{ first: number[]; second: number[] }, Record<'icc1_1' | 'icc2_1' | 'icc3_1' | 'icc2_k' | 'icc3_k', number>>('two-markers-half-marks')
    const found = six(data.first.map((first, k) => [first * 2, data.second[k]! * 2]))
    for (const form of ['icc1_1', 'icc2_1', 'icc3_1', 'icc2_k', 'icc3_k'] as const) expectNear(found[form].figure.value, expected[form], tolerance)
  })
  it('leads from one mark to the mean of four (check-values: spearman-brown-sem)', () => {
    const { data } = checkValue<{ ratings: number[][] }, unknown>('icc-shrout-fleiss-1979')
    const { expected } = checkValue<unknown, { spearmanBrown: { r: number; n: number; value: number }[] }>('spearman-brown-sem')
    const found = six(data.ratings)
    const tied = expected.spearmanBrown.filter(({ r }) => [0.165742, 0.714841].includes(r))
    expectNear([found.icc1_k.figure.value, found.icc3_k.figure.value], tied.map(({ value }) => value), 1e-6)
  })
  it('is not defined for too few scripts or marks that do not vary, and says why', () => {
    const why = (ratings: number[][]) => Object.values(six(ratings)).map(({ figure }) => figure.why)
    expect(why([])).toEqual(Array(6).fill('no_pairs'))
    expect(why([[1, 2]])).toEqual(Array(6).fill('too_few'))
    expect(why([[1, 2], [3, 4]])).toEqual(Array(6).fill('too_few'))
    expect(why([[3, 3], [3, 3], [3, 3]])).toEqual(Array(6).fill('no_spread'))
  })
  it('is 1 for the same varied marks, without an interval', () => {
    for (const { figure, interval } of Object.values(six([[1, 1], [4, 4], [6, 6]]))) expect([figure.value, interval]).toEqual([1, null])
  })
  it('does not change with the order of scripts or markers, and is never above 1', () => {
    const rows = fc.array(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 40 })), { maxLength: 40 })
    fc.assert(fc.property(rows, (ratings) => {
      const found = six(ratings)
      expect(six([...ratings].reverse())).toEqual(found)
      expect(six(ratings.map(([a, b]) => [b, a]))).toEqual(found)
      for (const { figure, interval } of Object.values(found)) {
        if (figure.value !== null) expect(figure.value).toBeLessThanOrEqual(1 + 1e-12)
        for (const end of interval ?? []) expect(Number.isFinite(end)).toBe(true)
      }
    }))
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkValue } from '@/tests/make/check-value'
import { expectNear } from '@/tests/make/expect-near'
import { differenceFigures } from './difference-figures'
import { tQuantile } from './quantile'

type Meters = Readonly<{ wright1: number[]; mini1: number[] }>
type Published = Readonly<Record<'meanDifference' | 'sdDifference' | 't975df16', number> & Record<'limits2sd' | 'limits196sd' | 'ci95Mean' | 'ci95LowerLimit2sd' | 'ci95UpperLimit2sd', [number, number]>>

const within = (times?: number) => {
  const { data, ...rest } = checkValue<Meters, Published>('bland-altman-1986')
  return { ...rest, found: differenceFigures(data.wright1.map((reading, k) => reading - data.mini1[k]!), times) }
}

describe('mean, spread and limits of differences (check-values: bland-altman-1986)', () => {
  it('gives the mean, its interval and the standard deviation', () => {
    const { found, expected, tolerance } = within()
    expectNear(found.mean.value, expected.meanDifference, tolerance)
    expectNear(found.sd.value, expected.sdDifference, tolerance)
    expectNear(found.meanInterval!, expected.ci95Mean, tolerance)
    expectNear(tQuantile(0.975, 16), expected.t975df16, tolerance)
  })
  it('gives limits at 1.96 and at 2 standard deviations, these with the intervals of the paper', () => {
    const { expected, tolerance } = within()
    const [usual, two] = [within().found.limits, within(2).found.limits]
    if (usual.why !== null || two.why !== null) throw new Error('limits are defined')
    expectNear([usual.low, usual.high], expected.limits196sd, tolerance)
    expectNear([two.low, two.high], expected.limits2sd, tolerance)
    expectNear(two.lowInterval, expected.ci95LowerLimit2sd, tolerance)
    expectNear(two.highInterval, expected.ci95UpperLimit2sd, tolerance)
  })
  it('gives mean and standard deviation of six scripts (check-values: tolerance-ncfe)', () => {
    const { data, expected, tolerance } = checkValue<{ centre: number[]; moderator: number[] }, { meanDifference: number; sdDifference: number }>('tolerance-ncfe')
    const found = differenceFigures(data.centre.map((mark, k) => mark - data.moderator[k]!))
    expectNear([found.mean.value, found.sd.value], [expected.meanDifference, expected.sdDifference], tolerance)
  })
})

describe('differences of any kind', () => {
  const some = fc.array(fc.integer({ min: -400, max: 400 }), { maxLength: 60 })
  it('say why there is no figure', () => {
    expect(differenceFigures([])).toMatchObject({ mean: { value: null, why: 'no_pairs' }, sd: { why: 'no_pairs' }, limits: { why: 'no_pairs' } })
    expect(differenceFigures([3])).toEqual({ mean: { value: 3, why: null }, meanInterval: null, sd: { value: null, why: 'too_few' }, limits: { why: 'too_few' } })
    expect(differenceFigures([3, 1])).toMatchObject({ sd: { value: Math.SQRT2 }, limits: { why: 'too_few' } })
  })
  it('give figures that their order does not change, the mean between the limits and the intervals', () => {
    fc.assert(fc.property(some, (differences) => {
      const found = differenceFigures(differences)
      expect(differenceFigures([...differences].reverse())).toEqual(found)
      expect(differenceFigures([...differences].sort((a, b) => a - b))).toEqual(found)
      if (found.limits.why !== null) return
      const { low, high, lowInterval, highInterval } = found.limits
      const mean = found.mean.value!
      const order = [lowInterval[0], low, mean, high, highInterval[1]]
      expect(order.every(Number.isFinite) && order.every((value, k) => k === 0 || value >= order[k - 1]!)).toBe(true)
    }))
  })
  it('change sign with the order of the markers and nothing else', () => {
    fc.assert(fc.property(some, (differences) => {
      const [one, other] = [differenceFigures(differences), differenceFigures(differences.map((difference) => 0 - difference))]
      expect(other.sd).toEqual(one.sd)
      if (one.mean.value !== null) expect(other.mean.value! + one.mean.value).toBe(0)
    }))
  })
})

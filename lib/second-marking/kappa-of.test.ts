import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkValue } from '@/tests/make/check-value'
import { expectNear } from '@/tests/make/expect-near'
import { apartBy, kappaOf } from './kappa-of'

type Table = Readonly<{ table: number[][] }>
type Published = Readonly<{ n: number; kappa: number; kappaLinear: number; kappaQuadratic: number; seKappa?: number; seKappaLinear?: number; seKappaQuadratic?: number; customDisagreementWeights?: number[][]; kappaCustom?: number }>

/** Every pair of a table of counts, the first by its row and the second by its column. */
const pairsOf = (table: number[][]) => table.flatMap((row, first) => row.flatMap((times, second) => Array.from({ length: times }, (): [number, number] => [first, second])))

describe('kappa of published tables', () => {
  for (const id of ['kappa-cohen-1968', 'kappa-hout-agresti', 'kappa-landis-koch-winnipeg', 'kappa-landis-koch-neworleans', 'kappa-altman-xeromammogram']) {
    it(`gives plain, linear and quadratic kappa with standard errors (check-values: ${id})`, () => {
      const { data, expected, tolerance } = checkValue<Table, Published>(id)
      const pairs = pairsOf(data.table)
      expect(pairs).toHaveLength(expected.n)
      const [plain, linear, quadratic] = [kappaOf(pairs, apartBy.plain), kappaOf(pairs, apartBy.linear), kappaOf(pairs, apartBy.quadratic)]
      expectNear([plain.kappa.value, linear.kappa.value, quadratic.kappa.value], [expected.kappa, expected.kappaLinear, expected.kappaQuadratic], tolerance)
      if (expected.seKappa !== undefined) expectNear([plain.standardError, linear.standardError, quadratic.standardError], [expected.seKappa, expected.seKappaLinear!, expected.seKappaQuadratic!], tolerance)
    })
  }
  it('takes weights of its own (check-values: kappa-cohen-1968)', () => {
    const { data, expected, tolerance } = checkValue<Table, Published>('kappa-cohen-1968')
    expectNear(kappaOf(pairsOf(data.table), (a, b) => expected.customDisagreementWeights![a]![b]!).kappa.value, expected.kappaCustom!, tolerance)
  })
  it('weighs over every possible mark, not only those that were given (check-values: two-markers-half-marks)', () => {
    const { data, expected, tolerance } = checkValue<{ first: number[]; second: number[] }, Record<string, number>>('two-markers-half-marks')
    const pairs = data.first.map((first, k): [number, number] => [first * 2, data.second[k]! * 2])
    expectNear(kappaOf(pairs, apartBy.plain).kappa.value, expected.kappaFullScale!, tolerance)
    expectNear(kappaOf(pairs, apartBy.linear).kappa.value, expected.kappaLinearFullScale!, tolerance)
    expectNear(kappaOf(pairs, apartBy.quadratic).kappa.value, expected.kappaQuadraticFullScale!, tolerance)
    const given = [...new Set(pairs.flat())].sort((a, b) => a - b)
    const packed = pairs.map(([first, second]): [number, number] => [given.indexOf(first), given.indexOf(second)])
    expectNear(kappaOf(packed, apartBy.linear).kappa.value, expected.wrongKappaLinearObservedMarksOnly!, tolerance)
  })
  it('is not defined where chance agrees everywhere or nothing is there (check-values: kappa-edge)', () => {
    const { data, expected } = checkValue<{ cases: { a: number[]; b: number[] }[] }, { kappa: (number | null)[] }>('kappa-edge')
    for (const apart of Object.values(apartBy)) {
      const found = data.cases.map(({ a, b }) => kappaOf(a.map((first, k): [number, number] => [first, b[k]!]), apart).kappa)
      expect(found.map(({ value }) => value)).toEqual(expected.kappa)
      expect(found.map(({ why }) => why)).toEqual(['no_spread', null, 'no_pairs'])
    }
  })
})

describe('kappa of any pairs', () => {
  const mark = fc.integer({ min: 0, max: 20 })
  const some = fc.array(fc.tuple(mark, mark), { maxLength: 50 })
  it('is never above 1, says why it is none, and does not change with the order of the pairs or of the markers', () => {
    fc.assert(fc.property(some, fc.constantFrom(apartBy.plain, apartBy.linear, apartBy.quadratic), (pairs, apart) => {
      const found = kappaOf(pairs, apart)
      expect(kappaOf([...pairs].reverse(), apart)).toEqual(found)
      expect(kappaOf(pairs.map(([a, b]): [number, number] => [b, a]), apart).kappa).toEqual(found.kappa)
      if (found.kappa.value === null) expect(pairs.length < 3 || new Set(pairs.flat()).size === 1).toBe(true)
      else {
        expect(found.kappa.value).toBeLessThanOrEqual(1)
        expect(found.standardError! >= 0).toBe(true)
      }
    }))
  })
  it('is 1 only for the same marks', () => {
    fc.assert(fc.property(fc.array(mark, { minLength: 3, maxLength: 50 }), (marks) => {
      const found = kappaOf(marks.map((each): [number, number] => [each, each]), apartBy.quadratic).kappa
      expect(found.value).toBe(new Set(marks).size === 1 ? null : 1)
    }))
  })
})

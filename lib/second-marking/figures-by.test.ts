import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { halves, halvesOfMarks } from '@/lib/core/marks'
import { checkValue } from '@/tests/make/check-value'
import { expectNear } from '@/tests/make/expect-near'
import { figuresBy, type BothMarked } from './figures-by'

const columns = [{ id: 'q1', label: '1', maximum: halves(20), tolerance: halves(1) }, { id: 'q2', label: '2', maximum: halves(6), tolerance: halves(2) }]
const numbers = new Map(Array.from({ length: 60 }, (_, k) => [`s${k}`, k + 1]))
const answer = (k: number, questionId: string, markerId: string, first: number, second: number): BothMarked => ({ scriptId: `s${k}`, questionId, markerId, marker: `Marker ${markerId}`, first: halves(first), second: halves(second) })

describe('figures by question, marker and paper', () => {
  const { data, expected, tolerance } = checkValue<{ first: number[]; second: number[] }, Record<string, number> & { limits196sd: [number, number] }>('two-markers-half-marks')
  const published = data.first.map((first, k) => answer(k, 'q1', 'a', halvesOfMarks(first), halvesOfMarks(data.second[k]!)))

  it('reproduce the published figures of a question in halves (check-values: two-markers-half-marks)', () => {
    const [{ figures }] = figuresBy({ answers: published, columns, numbers }).questions as [ReturnType<typeof figuresBy>['questions'][number]]
    expect([figures.n, figures.exact, figures.within, figures.largest]).toEqual([expected.n, expected.exactAgreementCount, expected.withinHalfCount, expected.maxAbsoluteDifference! * 2])
    expectNear([figures.meanDifference! / 2, figures.sd.value! / 2], [expected.meanDifference!, expected.sdDifference!], tolerance)
    if (figures.limits.why !== null) throw new Error('limits are defined')
    expectNear([figures.limits.low / 2, figures.limits.high / 2], expected.limits196sd, tolerance)
    expectNear([figures.kappaLinear.figure.value, figures.kappaQuadratic.figure.value, figures.icc.agreement.one.figure.value], [expected.kappaLinearFullScale!, expected.kappaQuadraticFullScale!, expected.icc2_1!], tolerance)
  })
  it('hold totals of whole scripts alone, and no coefficient over unlike maxima', () => {
    const answers = [...published, ...published.slice(0, 5).map(({ scriptId }, k) => ({ ...answer(0, 'q2', 'b', 4, 4 - (k % 2)), scriptId }))]
    const found = figuresBy({ answers, columns, numbers })
    expect(found.comparedTotals).toHaveLength(5)
    expect(found.comparedTotals[1]).toEqual({ scriptId: 's1', scriptNumber: 2, first: 12, second: 11 })
    expect(found.totals).toMatchObject({ maximum: 26, figures: { n: 5, within: null, few: true } })
    expect(found.answers.figures).toMatchObject({ n: 25, kappaLinear: { figure: { value: null, why: 'unlike_maxima' } }, icc: { agreement: { one: { figure: { why: 'unlike_maxima' } } } } })
    expect(found.markers.map(({ label, maximum, figures: { n } }) => [label, maximum, n])).toEqual([['Marker a', 20, 20], ['Marker b', 6, 5]])
    expect(found.heat.map(({ markerId, questionId, n, mean }) => [markerId, questionId, n, mean])).toEqual([['a', 'q1', 20, 0.4], ['a', 'q2', 0, null], ['b', 'q1', 0, null], ['b', 'q2', 5, 0.4]])
  })
  it('have a row with no figure and its reason for a question nobody second-marked', () => {
    const found = figuresBy({ answers: published, columns, numbers })
    expect(found.questions[1]).toMatchObject({ label: '2', figures: { n: 0, meanDifference: null, sd: { value: null, why: 'no_pairs' }, limits: { why: 'no_pairs' }, kappaLinear: { figure: { why: 'no_pairs' } } } })
    expect(found.totals.figures.n).toBe(0)
  })
  it('are the same whatever order the answers come in, and hold every answer once by question and once by marker', () => {
    const some = fc.uniqueArray(fc.record({ k: fc.integer({ min: 0, max: 40 }), q: fc.constantFrom('q1', 'q2'), m: fc.constantFrom('a', 'b', 'c'), first: fc.integer({ min: 0, max: 6 }), second: fc.integer({ min: 0, max: 6 }) }), { selector: ({ k, q }) => `${k} ${q}`, maxLength: 60 })
    fc.assert(fc.property(some, fc.integer(), (drawn, turn) => {
      const answers = drawn.map(({ k, q, m, first, second }) => answer(k, q, m, first, second))
      const found = figuresBy({ answers, columns, numbers })
      const by = answers.length === 0 ? 0 : Math.abs(turn) % answers.length
      expect(figuresBy({ answers: [...answers.slice(by), ...answers.slice(0, by)].reverse(), columns, numbers })).toEqual(found)
      for (const rows of [found.questions, found.markers]) expect(rows.reduce((n, { figures }) => n + figures.n, 0)).toBe(answers.length)
      expect(JSON.stringify(found)).not.toContain('NaN')
      for (const { figures } of [...found.questions, ...found.markers, found.answers]) {
        expect(figures.exact).toBeLessThanOrEqual(figures.within!)
        expect(figures.within).toBeLessThanOrEqual(figures.n)
      }
    }), { numRuns: 60 })
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { halves, type HalfMarks } from '@/lib/core/marks'
import type { ResponseMark } from '@/lib/core/result'
import { effectOfAdjustment, type Adjusted, type Standing } from './effect-of-adjustment'

const questions = [{ id: '1', maximum: halves(6), withdrawn: null }, { id: '2', maximum: halves(10), withdrawn: null }]
const scale = { oddHalf: 'kept' as const, boundaries: [{ grade: 'B', lowest: halves(8) }, { grade: 'C', lowest: halves(4) }] }
const marks = (one: number | null, two: number | null): ResponseMark[] => [{ questionId: '1', raw: one as HalfMarks | null, adjustment: 0 }, { questionId: '2', raw: two as HalfMarks | null, adjustment: 0 }]
const script = (standing: Standing, one: number | null, two: number | null): Adjusted => ({ scriptId: `${standing} ${one} ${two}`, number: 1, name: null, standing, marks: marks(one, two) })
const effect = (by: number, ...scripts: Adjusted[]) => effectOfAdjustment({ questions, scale, questionId: '1', halves: by, scripts })

describe('the effect of an adjustment', () => {
  it('moves mark, total and grade of the marker’s own answers only', () => {
    const lines = effect(2, script('theirs', 3, 3), script('own', 3, 3), script('other', 3, 3), script('theirs', null, 3))
    expect(lines.map(({ kind, mark, total, grade }) => [kind, mark?.after ?? null, total.before, total.after, grade.before, grade.after])).toEqual([
      ['moves', 5, 6, 8, 'C', 'B'], ['own', 3, 6, 6, 'C', 'C'], ['other', 3, 6, 6, 'C', 'C'], ['other', null, 3, 3, null, null],
    ])
  })
  it('goes no further than nought and the maximum', () => {
    expect(effect(2, script('theirs', 5, 0), script('theirs', 6, 0)).map(({ kind, mark }) => [kind, mark!.after])).toEqual([['bound', 6], ['bound', 6]])
    expect(effect(-2, script('theirs', 1, 0))).toMatchObject([{ kind: 'bound', mark: { before: 1, after: 0 }, total: { before: 1, after: 0 } }])
  })
  it('keeps every mark within its bounds and on the step, and changes a total by what the mark moved', () => {
    const step = fc.constantFrom(1, 2)
    fc.assert(fc.property(step, fc.integer({ min: -4, max: 4 }), fc.array(fc.tuple(fc.constantFrom<Standing>('theirs', 'own', 'other'), fc.option(fc.nat(3)), fc.option(fc.nat(5))), { maxLength: 30 }), (by, shift, drawn) => {
      const scripts = drawn.map(([standing, one, two]) => script(standing, one === null ? null : one * 2, two === null ? null : two * 2))
      for (const { mark, total, kind } of effect(shift * by * 2, ...scripts)) {
        expect(total.after - total.before).toBe(mark === null ? 0 : mark.after - mark.before)
        if (mark === null) continue
        expect(mark.after >= 0 && mark.after <= 6 && mark.after % 2 === 0).toBe(true)
        if (kind === 'own' || kind === 'other') expect(mark.after).toBe(mark.before)
      }
    }))
  })
})

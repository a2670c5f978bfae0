import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { halves, type HalfMarks } from '@/lib/core/marks'
import { totalOf } from './total-of'

const question = (id: string, maximum: number, as?: 'out' | 'full') => ({ id, maximum: halves(maximum), withdrawn: as ? { as, reason: '' } : null })
const mark = (questionId: string, raw: number | null, adjustment = 0) => ({ questionId, raw: raw as HalfMarks | null, adjustment })

describe('the total of a script', () => {
  const questions = [question('1', 3), question('2', 4)]

  it('takes half a mark for the answer and half for the working as one mark (common practice, no source)', () => {
    const stamps = [{ worth: 1 }, { worth: 1 }]
    const raw = stamps.reduce((total, { worth }) => total + worth, 0)
    expect(totalOf([question('1', 2)], [mark('1', raw)])).toMatchObject({ final: 2, maximum: 2, toCome: 0 })
  })
  it('never counts an unmarked answer as nought: there is more to come', () => {
    expect(totalOf(questions, [mark('1', 3), mark('2', null)])).toEqual({ raw: 3, adjusted: 3, final: 3, maximum: 7, toCome: 1 })
    expect(totalOf(questions, [mark('1', 3), mark('2', 0)])).toMatchObject({ final: 3, toCome: 0 })
    expect(totalOf(questions, [])).toMatchObject({ final: 0, toCome: 2 })
  })
  it('keeps raw, adjusted and final apart', () => {
    const withdrawn = [question('1', 3, 'full'), question('2', 4)]
    expect(totalOf(withdrawn, [mark('1', 1), mark('2', 2, 1)])).toEqual({ raw: 3, adjusted: 4, final: 6, maximum: 7, toCome: 0 })
  })
  it('leaves a question out that was withdrawn as out, marked or not', () => {
    expect(totalOf([question('1', 3, 'out'), question('2', 4)], [mark('1', 3), mark('2', 2)])).toEqual({ raw: 5, adjusted: 5, final: 2, maximum: 4, toCome: 0 })
    expect(totalOf([question('1', 3, 'full'), question('2', 4)], [mark('2', 2)])).toMatchObject({ final: 5, toCome: 0 })
  })

  const script = fc.uniqueArray(fc.record({ id: fc.uuid(), maximum: fc.integer({ min: 1, max: 40 }), share: fc.option(fc.double({ min: 0, max: 1, noNaN: true })), adjustment: fc.integer({ min: -6, max: 6 }), as: fc.constantFrom(undefined, 'out' as const, 'full' as const) }), { selector: ({ id }) => id, maxLength: 14 })
  const made = (parts: readonly { id: string; maximum: number; share: number | null; adjustment: number; as: 'out' | 'full' | undefined }[]) => ({
    questions: parts.map(({ id, maximum, as }) => question(id, maximum, as)),
    marks: parts.map(({ id, maximum, share, adjustment }) => mark(id, share === null ? null : Math.round(share * maximum), adjustment)),
  })

  it('lies within nought and the maximum whatever was adjusted or withdrawn', () => {
    fc.assert(fc.property(script, (parts) => {
      const { questions, marks } = made(parts)
      const total = totalOf(questions, marks)
      return total.final >= 0 && total.final <= total.maximum && Number.isInteger(total.final)
    }))
  })
  it('does not depend on the order of questions or marks', () => {
    fc.assert(fc.property(script, (parts) => {
      const { questions, marks } = made(parts)
      expect(totalOf([...questions].reverse(), [...marks].reverse())).toEqual(totalOf(questions, marks))
    }))
  })
})

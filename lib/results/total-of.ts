import { halves, type HalfMarks } from '@/lib/core/marks'
import { paperMaximum, type Question } from '@/lib/core/paper'
import type { ResponseMark, ScriptTotal } from '@/lib/core/result'

type Counted = Pick<Question, 'id' | 'maximum' | 'withdrawn'>

/** A raw mark with its adjustment, kept within nought and the question's maximum. */
export function adjustedMark(raw: HalfMarks, adjustment: number, maximum: HalfMarks): HalfMarks {
  return halves(Math.min(maximum, Math.max(0, raw + adjustment)))
}

/** What one question gives a script in the end: full when withdrawn as full, nothing when left out, null while unmarked. */
function finalMark(question: Counted, mark: ResponseMark | undefined): HalfMarks | null {
  if (question.withdrawn) return question.withdrawn.as === 'full' ? question.maximum : halves(0)
  if (!mark || mark.raw === null) return null
  return adjustedMark(mark.raw, mark.adjustment, question.maximum)
}

/** The three totals of one script, kept apart. Marks of questions that were withdrawn stay in `raw` and leave `final`. */
export function totalOf(questions: readonly Counted[], marks: readonly ResponseMark[]): ScriptTotal {
  const byQuestion = new Map(marks.map((mark) => [mark.questionId, mark]))
  const total = { raw: 0, adjusted: 0, final: 0, toCome: 0 }
  for (const question of questions) {
    const mark = byQuestion.get(question.id)
    if (mark && mark.raw !== null) {
      total.raw += mark.raw
      total.adjusted += adjustedMark(mark.raw, mark.adjustment, question.maximum)
    }
    const final = finalMark(question, mark)
    if (final === null) total.toCome += 1
    else total.final += final
  }
  return { raw: halves(total.raw), adjusted: halves(total.adjusted), final: halves(total.final), toCome: total.toCome, maximum: paperMaximum(questions) }
}

import type { EffectKind, EffectLine } from '@/lib/core/adjusting'
import { gradeOf } from '@/lib/core/grade-of'
import type { GradeScale, Question } from '@/lib/core/paper'
import type { ResponseMark } from '@/lib/core/result'
import { adjustedMark, totalOf } from './total-of'

/** How one answer stands to an adjustment: the marker's own first mark, decided on by name, or none of theirs. */
export type Standing = 'theirs' | 'own' | 'other'
export type Adjusted = Readonly<{ scriptId: string; number: number; name: string | null; standing: Standing; marks: readonly ResponseMark[] }>

type Asked = Readonly<{ questions: readonly Pick<Question, 'id' | 'maximum' | 'withdrawn'>[]; scale: GradeScale; questionId: string; halves: number; scripts: readonly Adjusted[] }>

function kindOf(standing: Standing, moved: number, halves: number): EffectKind {
  if (standing !== 'theirs') return standing
  return moved === halves ? 'moves' : 'bound'
}

/** What an adjustment of `halves` on one question does to every script: mark, total and grade before and after, within nought and the maximum. */
export function effectOfAdjustment({ questions, scale, questionId, halves, scripts }: Asked): EffectLine[] {
  const { maximum } = questions.find(({ id }) => id === questionId)!
  return scripts.map(({ scriptId, number, name, standing, marks }) => {
    const mark = marks.find((one) => one.questionId === questionId)
    const theirs = standing === 'theirs' && mark !== undefined && mark.raw !== null
    const after = marks.map((one) => (theirs && one === mark ? { ...one, adjustment: one.adjustment + halves } : one))
    const [total, changed] = [totalOf(questions, marks).final, totalOf(questions, after).final]
    const now = mark && mark.raw !== null ? adjustedMark(mark.raw, mark.adjustment, maximum) : null
    const then = theirs ? adjustedMark(mark.raw!, mark.adjustment + halves, maximum) : now
    return {
      scriptId, number, name, kind: kindOf(theirs || standing !== 'theirs' ? standing : 'other', (then ?? 0) - (now ?? 0), halves),
      mark: now === null || then === null ? null : { before: now, after: then }, total: { before: total, after: changed },
      grade: { before: gradeOf(scale, total), after: gradeOf(scale, changed) },
    }
  })
}

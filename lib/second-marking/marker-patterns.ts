import type { MarkerPattern } from '@/lib/core/adjusting'
import type { HalfMarks, MarkingStep } from '@/lib/core/marks'
import { agreementOf } from './agreement'
import type { Column } from './figures-by'
import { patternOf } from './pattern-of'

type Sampled = Readonly<{ questionId: string; markerId: string; marker: string; first: HalfMarks; second: HalfMarks | null }>

/** The pattern of each first marker in each question of a sample in which something was second-marked; by question, then marker. */
export function markerPatterns(answers: readonly Sampled[], columns: readonly Column[], step: MarkingStep): MarkerPattern[] {
  return columns.flatMap(({ id: questionId, label, maximum, tolerance }) => {
    const asked = answers.filter((answer) => answer.questionId === questionId)
    const markers = new Map(asked.map(({ markerId, marker }) => [markerId, marker]))
    return [...markers].sort(([a], [b]) => (a < b ? -1 : 1)).flatMap(([markerId, marker]): MarkerPattern[] => {
      const theirs = asked.filter((answer) => answer.markerId === markerId)
      const pairs = theirs.flatMap(({ first, second }) => (second === null ? [] : [{ first, second, tolerance }]))
      const { n, few, meanDifference } = agreementOf(pairs)
      return n === 0 ? [] : [{ markerId, marker, questionId, label, n, few, mean: meanDifference!, pattern: patternOf({ pairs, sampled: theirs.length, maximum, step }) }]
    })
  })
}

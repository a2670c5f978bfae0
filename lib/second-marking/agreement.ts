import type { HalfMarks } from '@/lib/core/marks'
import type { AgreementFigures } from '@/lib/core/second-marking'

/** One response with both marks, in halves, and the tolerance it is held to. */
export type MarkPair = Readonly<{ first: HalfMarks; second: HalfMarks; tolerance: HalfMarks }>

/** Below this many pairs a figure carries the caution "few scripts" (a proposal of this project, no source). */
const fewPairs = 15

/** First minus second, in halves, signed. */
function differenceOf({ first, second }: Pick<MarkPair, 'first' | 'second'>): number {
  return first - second
}

/** A difference equal to the tolerance is inside it (check-values: tolerance-boundary). */
export function withinTolerance(pair: MarkPair): boolean {
  return Math.abs(differenceOf(pair)) <= pair.tolerance
}

/** Agreement over pairs of one kind: blind and seen second marks are never handed in together. */
export function agreementOf(pairs: readonly MarkPair[]): AgreementFigures {
  const differences = pairs.map(differenceOf)
  const times = new Map<number, number>()
  for (const difference of differences) times.set(difference, (times.get(difference) ?? 0) + 1)
  return {
    n: pairs.length,
    exact: differences.filter((difference) => difference === 0).length,
    within: pairs.filter(withinTolerance).length,
    meanDifference: pairs.length === 0 ? null : differences.reduce((a, b) => a + b, 0) / pairs.length,
    few: pairs.length < fewPairs,
    differences: [...times].map(([difference, n]) => ({ difference, times: n })).sort((a, b) => a.difference - b.difference),
  }
}

import type { HalfMarks } from './marks'

/**
 * How one response stands. `raw` is the sum of the settled marking that counts, null while there is none; `adjustment` is the
 * signed sum of the adjustments that hold, in halves. Unmarked is never nought.
 */
export type ResponseMark = Readonly<{ questionId: string; raw: HalfMarks | null; adjustment: number }>

/**
 * The marks of one script. `raw` as stamped, `adjusted` with adjustments, `final` with withdrawn questions as decided.
 * `toCome` counts the questions still without a mark: while it is not 0 the sums are only what has been given so far.
 */
export type ScriptTotal = Readonly<{ raw: HalfMarks; adjusted: HalfMarks; final: HalfMarks; maximum: HalfMarks; toCome: number }>

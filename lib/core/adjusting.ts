import type { HalfMarks } from './marks'

/** Why no adjustment is offered for a marker in a question. */
export type WhyNoAdjustment = 'unread' | 'all_inside' | 'too_few' | 'not_one_sided' | 'not_steady' | 'too_small'

/** The shift, in halves, that a one-sided and steady pattern calls for; or why there is none. */
export type Pattern = Readonly<{ shift: number; why: null } | { shift: null; why: WhyNoAdjustment }>

/** What a sample says of one marker in one question. `n`, and `mean` of first minus second in halves, are what it rests on. */
export type MarkerPattern = Readonly<{ markerId: string; marker: string; questionId: string; label: string; n: number; few: boolean; mean: number; pattern: Pattern }>

/** An adjustment that was decided, with who and when (milliseconds); `undone` when it was taken back. */
export type MarkerAdjustment = Readonly<{
  id: string
  questionId: string
  label: string
  markerId: string
  marker: string
  halves: number
  pairs: number
  mean: number
  /** Answers it was laid on. */
  answers: number
  by: string
  at: number
  undone: Readonly<{ by: string; at: number }> | null
}>

/**
 * What happens to an answer: `moves` by the shift; `bound`: by less, or not at all, since the mark stays between nought and the maximum;
 * `own`: decided on by name, or given by someone else after comparing, so it stays; `other`: another marker's, or none.
 */
export type EffectKind = 'moves' | 'bound' | 'own' | 'other'

/** One script before and after. `mark` is of the question, null where there is none. */
export type EffectLine = Readonly<{
  scriptId: string
  number: number
  name: string | null
  kind: EffectKind
  mark: Readonly<{ before: HalfMarks; after: HalfMarks }> | null
  total: Readonly<{ before: HalfMarks; after: HalfMarks }>
  grade: Readonly<{ before: string | null; after: string | null }>
}>

/** An adjustment before it is decided: every script of the class set, and a key that says exactly this effect. */
export type AdjustmentPlan = Readonly<{ paperId: string; sampleId: string; className: string; maximum: HalfMarks; graded: boolean; pattern: MarkerPattern; lines: readonly EffectLine[]; key: string }>

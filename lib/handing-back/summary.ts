import type { HalfMarks } from '@/lib/core/marks'
import type { PointResult, ScriptScore } from '@/lib/core/returned'

/** One question's line. `mark` is null while it is not to be shown as a figure (withdrawn); `remark` says "nothing written" and the like. */
export type QuestionResult = Readonly<{
  label: string
  points: readonly PointResult[]
  remark: string | null
  comments: readonly string[]
  mark: HalfMarks | null
  maximum: HalfMarks
}>

/**
 * All that the summary page says; it works nothing out. `total` is the final one, adjustments counted. Sentences (`about`, `gradeSays`,
 * `asking`) come ready, dates in words.
 */
export type Summary = ScriptScore & Readonly<{
  title: string
  /** "Kestrel Bay School, class 8K, spring test" */
  where: string
  student: string
  candidateNumber: string
  /** "handed back 18 March, marked by R. Adeyemi, sample second-marked" */
  about: string
  questions: readonly QuestionResult[]
  next: readonly string[]
  /** Model solutions by question, where they are handed back. */
  solutions: readonly string[]
  /** Text codes drawn on the pages, each with its meaning. */
  codes: readonly Readonly<{ code: string; means: string }>[]
  asking: string
  /** What is to be said of pages that are not the scan's own but copies. */
  copies?: string | null
}>

import type { MarkerAdjustment, MarkerPattern } from './adjusting'
import type { HalfMarks } from './marks'
import type { ModerationFigures } from './moderation-figures'
import type { StripPicture } from './run'
import type { Stamp } from './stamp'

/** Why a mark was changed or kept after comparing (the short list of a review). */
export const decisionReasons = [
  'judgement', 'scheme_misapplied', 'not_foreseen', 'totalling', 'work_missed', 'other_place', 'scan_fault', 'keying', 'transfer', 'unreadable', 'malpractice', 'other',
] as const
export type DecisionReason = (typeof decisionReasons)[number]

/** Which of the markings counts after comparing. */
export type Stands = 'first' | 'second' | 'agreed'

/** Agreement of blind second marks; `meanDifference` is first minus second, in halves. */
export type AgreementFigures = Readonly<{
  n: number
  exact: number
  within: number
  meanDifference: number | null
  few: boolean
  differences: readonly { difference: number; times: number }[]
}>

export type PersonChoice = Readonly<{ userId: string; name: string }>

/** A class set as it stands before a sample is drawn: `toMark` answers still lack a mark. */
export type SampleOffer = Readonly<{ classSetId: string; className: string; scripts: number; toMark: number; size: number; defaultSize: number; moderators: readonly PersonChoice[] }>

export type DrawnAs = 'highest' | 'lowest' | 'spread' | 'added'

/**
 * A script of a sample. `read`: answers the moderator has settled, of `answers`. `name` and
 * `drawnAs` only for an owner: why a script was drawn tells about its first marks.
 */
export type SampledScript = Readonly<{ scriptId: string; number: number; name: string | null; drawnAs: DrawnAs | null; read: number; answers: number }>

/**
 * One answer with both marks. `decided` null: nobody has decided, the first mark counts meanwhile, `adjusted` where an adjustment holds for it. `open`: outside the tolerance, and
 * neither a decision nor an adjustment has brought it in.
 */
export type ComparedAnswer = Readonly<{
  responseId: string
  questionId: string
  /** Who gave the first mark. */
  markerId: string
  scriptNumber: number
  first: HalfMarks
  second: HalfMarks
  within: boolean
  decided: Stands | null
  adjusted: HalfMarks | null
  open: boolean
}>

export type SampleQuestion = Readonly<{ questionId: string; label: string; maximum: HalfMarks; tolerance: HalfMarks; read: number; answers: number; compared: readonly ComparedAnswer[]; figures: AgreementFigures }>

export type SampleView = Readonly<{
  id: string
  classSetId: string
  className: string
  moderator: string
  mine: boolean
  seed: string
  size: number
  defaultSize: number
  drawnAt: number
  closedAt: number | null
  scripts: readonly SampledScript[]
  /** Scripts of the class set that may still be added, by running number. */
  addable: readonly { scriptId: string; number: number }[]
  questions: readonly SampleQuestion[]
  figures: AgreementFigures
  moderation: ModerationFigures
  patterns: readonly MarkerPattern[]
  adjustments: readonly MarkerAdjustment[]
  undecided: number
}>

export type SecondMarking = Readonly<{ paperId: string; owner: boolean; offers: readonly SampleOffer[]; samples: readonly SampleView[] }>

export type ComparedMarking = Readonly<{ markingId: string; marker: string; mark: HalfMarks; stamps: readonly Stamp[] }>

/** Both pens over one answer, after the second marking was settled. */
export type Comparison = Readonly<{
  paperId: string
  paperTitle: string
  className: string
  question: Readonly<{ id: string; label: string; text: string; maximum: HalfMarks }>
  responseId: string
  scriptNumber: number
  tolerance: HalfMarks
  pictures: readonly StripPicture[]
  first: ComparedMarking
  second: ComparedMarking
  agreed: (ComparedMarking & Readonly<{ settled: boolean }>) | null
  within: boolean
  decided: Readonly<{ stands: Stands; reason: string; by: string; at: number }> | null
  /** Blind second marks of this question that can be compared. */
  figures: AgreementFigures
  before: string | null
  after: string | null
}>

import type { HalfMarks } from './marks'
import type { AgreementFigures } from './second-marking'

/** Why there is no figure: nothing to compare, too few pairs, all marks alike, or answers marked out of different maxima. */
export type WhyNone = 'no_pairs' | 'too_few' | 'no_spread' | 'unlike_maxima'

/** A figure, or the reason why there is none; never NaN. */
export type Figure = Readonly<{ value: number; why: null } | { value: null; why: WhyNone }>

/** A 95 % interval. */
export type Interval = readonly [low: number, high: number]

/** A coefficient with its 95 % interval; null where the interval is not defined. */
export type Coefficient = Readonly<{ figure: Figure; interval: Interval | null }>

/**
 * Intraclass correlations: `oneWay` when every script may have other markers, `agreement` when a mark that is always higher counts as
 * disagreement, `consistency` when it does not; each of one mark and of the mean of all marks of a script.
 */
export type Intraclass = Readonly<Record<'oneWay' | 'agreement' | 'consistency', Readonly<{ one: Coefficient; mean: Coefficient }>>>

/** Limits of agreement, in halves, each with its 95 % interval; or why there are none. */
export type Limits = Readonly<{ low: number; high: number; lowInterval: Interval; highInterval: Interval; why: null } | { why: WhyNone }>

/**
 * How far first and second marks of one kind agree. Differences are first minus second, in halves. `within` is null where no
 * tolerance is set, as for totals of scripts. `few`: too few pairs to judge anybody by.
 */
export type MarkFigures = Omit<AgreementFigures, 'within'> & Readonly<{
  within: number | null
  meanInterval: Interval | null
  sd: Figure
  limits: Limits
  /** Largest difference either way, in halves; null without pairs. */
  largest: number | null
  kappaLinear: Coefficient
  kappaQuadratic: Coefficient
  icc: Intraclass
}>

/** Figures of one question, one marker or everything. `maximum` and `tolerance` are null where they are not one value. */
export type FigureRow = Readonly<{ key: string; label: string; maximum: HalfMarks | null; tolerance: HalfMarks | null; figures: MarkFigures }>

/** A whole script with both marks in every answer of the sample: first and second total, in halves. */
export type ComparedTotal = Readonly<{ scriptId: string; scriptNumber: number; first: HalfMarks; second: HalfMarks }>

/** One marker in one question; `mean` is first minus second in halves, null without pairs. */
export type HeatCell = Readonly<{ markerId: string; questionId: string; n: number; exact: number; within: number; mean: number | null; few: boolean }>

/** What a sample shows about the marking, from settled blind second marks only. */
export type ModerationFigures = Readonly<{
  questions: readonly FigureRow[]
  markers: readonly FigureRow[]
  /** Every answer, and every script that was second-marked whole. */
  answers: FigureRow
  totals: FigureRow
  comparedTotals: readonly ComparedTotal[]
  heat: readonly HeatCell[]
}>

import type { MarkerAdjustment, MarkerPattern } from '@/lib/core/adjusting'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { FigureRow, ModerationFigures, WhyNone } from '@/lib/core/moderation-figures'
import type { ModerationRecord, RecordSection } from '@/lib/core/moderation-record'
import { sayInstant } from '@/lib/core/say-day'
import { reasonWords, sayDifference, sayDrawnAs, sayMean, sayStands } from '@/lib/core/say-difference'
import { sayCoefficient, sayLimits, saySpread, sayWhy, sayWhyLong } from '@/lib/core/say-figure'
import { sayNoAdjustment, sayRests, sayShift, sayShifted } from '@/lib/core/say-pattern'
import type { SampledScript, Stands } from '@/lib/core/second-marking'

/** A decision by name on one answer; `mark` is that of the marking it chose, `superseded` when another decision came after it. */
export type RecordedDecision = Readonly<{ label: string; scriptNumber: number; first: HalfMarks; second: HalfMarks; mark: HalfMarks; stands: Stands; reason: string; by: string; at: number; superseded: boolean }>

export type Recorded = Readonly<{
  school: string; title: string; className: string; satOn: string; moderator: string
  seed: string; size: number; defaultSize: number; drawnBy: string; drawnAt: number; closed: Readonly<{ by: string; at: number }> | null
  scripts: readonly SampledScript[]
  moderation: ModerationFigures
  patterns: readonly MarkerPattern[]
  adjustments: readonly MarkerAdjustment[]
  decisions: readonly RecordedDecision[]
  undecided: number
}>

const section = (heading: string, lines: readonly string[], table: RecordSection['table'] = null): RecordSection => ({ heading, lines, table })

function sampleSection({ moderator, seed, size, defaultSize, drawnBy, drawnAt, scripts }: Recorded): RecordSection {
  return section('The sample', [
    `Drawn by ${drawnBy} on ${sayInstant(drawnAt)} for ${moderator}: ${size} asked, ${defaultSize} is usual for this class set, ${scripts.length} in it with those added. The highest and the lowest total and every marker of every question are in it.`,
    `The seed ${seed} draws the same scripts again.`,
  ], {
    heads: ['Script, in reading order', 'Student', 'In the sample as', 'Answers second-marked'], figures: false,
    rows: scripts.map(({ number, name, drawnAs, read, answers }) => [`Script ${number}`, name ?? '–', drawnAs ? sayDrawnAs[drawnAs] : '–', `${read} of ${answers}`]),
  })
}

function rowOf({ label, tolerance, figures }: FigureRow): string[] {
  const { n, exact, within } = figures
  return [
    label, String(n), n === 0 ? '–' : String(exact), n === 0 || within === null ? '–' : `${within}${tolerance === null ? '' : ` (±${sayMark(tolerance)})`}`, sayMean(figures.meanDifference), saySpread(figures.sd),
    sayLimits(figures.limits), sayCoefficient(figures.kappaLinear), sayCoefficient(figures.kappaQuadratic), sayCoefficient(figures.icc.agreement.one),
  ]
}

function figuresSection({ moderation: { questions, markers, answers, totals } }: Recorded): RecordSection {
  const rows = [...questions.map((row) => ({ ...row, label: `Question ${row.label}` })), ...markers, answers, totals]
  const few = [...questions, ...markers].some(({ figures }) => figures.n > 0 && figures.few)
  const reasons = [...new Set(rows.flatMap(({ figures }) => [figures.sd.why, figures.limits.why, figures.kappaQuadratic.figure.why, figures.icc.agreement.one.figure.why]))].filter((why): why is WhyNone => why !== null && why !== 'no_pairs')
  return section('Figures', [
    'Blind second marks only. Mean, standard deviation and limits of agreement (mean ± 1.96 SD) in marks, first minus second; a difference equal to the tolerance is inside it. Kappa is weighted over all possible marks; ICC is that of absolute agreement of one mark.',
    ...reasons.map((why) => `“${sayWhy[why]}”: ${sayWhyLong[why]}.`),
    ...(few ? ['Figures of fewer than 15 pairs are too few to judge a marker by.'] : []),
  ], {
    heads: ['Of what', 'n', 'Same', 'Inside', 'Mean', 'SD', 'Limits', 'Kappa lin.', 'Kappa quad.', 'ICC'], figures: true,
    rows: rows.map(rowOf),
  })
}

function decisionsSection({ decisions, undecided }: Recorded): RecordSection {
  const line = undecided > 0 ? `${undecided} answers outside the tolerance are not decided yet; their first marks count meanwhile.` : 'Wherever nothing is listed here the first mark stands, with the adjustments below.'
  return section('Decisions on single answers', [line], decisions.length === 0 ? null : {
    heads: ['Answer', 'First', 'Second', 'Difference', 'Decided', 'Mark', 'Reason', 'By', 'On'], figures: false,
    rows: decisions.map(({ label, scriptNumber, first, second, mark, stands, reason, by, at, superseded }) => [
      `${label}, script ${scriptNumber}`, sayMark(first), sayMark(second), sayDifference(first - second), `${sayStands[stands]}${superseded ? ' (later decided anew)' : ''}`, sayMark(mark), reasonWords(reason), by, sayInstant(at),
    ]),
  })
}

function adjustmentsSection({ adjustments, patterns }: Recorded): RecordSection {
  const leaning = patterns.filter(({ pattern }) => pattern.why !== 'all_inside' && pattern.why !== 'unread')
  return section('Markers and adjustments', [
    ...leaning.map((one) => `${one.marker} in ${one.label} (${sayRests(one)}): ${one.pattern.shift === null ? `no adjustment, ${sayNoAdjustment[one.pattern.why]}` : `one-sided and steady, ${sayShift(one.pattern.shift)} offered`}.`),
    ...adjustments.map(({ marker, label, halves, answers, by, at, undone }) => `${marker} in ${label}, ${answers} answers: ${sayShifted(halves)}, decided by ${by} on ${sayInstant(at)}.${undone ? ` Taken back by ${undone.by} on ${sayInstant(undone.at)}.` : ''}`),
    ...(adjustments.length === 0 ? ['No adjustment was made.'] : []),
  ])
}

function closingSection({ closed, scripts }: Recorded): RecordSection {
  const read = scripts.filter((script) => script.read === script.answers).length
  return section('Closing', [`${read} of ${scripts.length} scripts were second-marked whole.`, closed ? `Closed by ${closed.by} on ${sayInstant(closed.at)}.` : 'The second marking is not closed yet: this record is provisional.'])
}

/** The record of one sample in words: sample and seed, figures, decisions, adjustments, each with who and when. `asOf` in milliseconds. */
export function moderationRecord(recorded: Recorded, asOf: number): ModerationRecord {
  const { title, school, className, satOn } = recorded
  return {
    title: `Moderation record: ${title}`, where: `${school}, ${className}, sat on ${satOn}`, asOf: sayInstant(asOf),
    sections: [sampleSection(recorded), figuresSection(recorded), decisionsSection(recorded), adjustmentsSection(recorded), closingSection(recorded)],
  }
}

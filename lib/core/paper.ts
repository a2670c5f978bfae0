import type { HalfMarks, MarkingStep } from './marks'
import type { PaperRect } from './paper-space'

/** A question's place on the blank paper: a box in paper points on one page. A question may have several. */
export type AnswerSpace = Readonly<{ id: string; page: number; rect: PaperRect }>

/** M: method; A: accuracy, needs its method mark; B: independent. */
export type MarkPointKind = 'M' | 'A' | 'B'

export type MarkPoint = Readonly<{
  id: string
  label: string
  worth: HalfMarks
  kind: MarkPointKind | null
  /** The mark point that has to be given before this one counts. */
  dependsOn: string | null
  note: string
  withdrawn: boolean
}>

/** What was taken out after marking began: `out` leaves it out of the totals, `full` gives everyone full marks. */
export type Withdrawal = Readonly<{ as: 'out' | 'full'; reason: string }>

export type Question = Readonly<{
  id: string
  label: string
  position: number
  maximum: HalfMarks
  text: string
  answer: string
  modelSolution: string
  schemeNote: string
  /** Null: the paper's tolerance holds. */
  tolerance: HalfMarks | null
  spaces: readonly AnswerSpace[]
  points: readonly MarkPoint[]
  withdrawn: Withdrawal | null
}>

/** Size of a page of the blank paper in points. */
export type PaperPage = Readonly<{ page: number; width: number; height: number }>

/** Where the name, or one digit of the candidate number, is written. */
export type PaperBox = Readonly<{ kind: 'name' | 'number'; page: number; rect: PaperRect }>

/** What an odd half does before a total is compared with a boundary. */
export type OddHalf = 'kept' | 'up' | 'down'
/** A boundary is inclusive: its mark belongs to the grade. */
export type GradeBoundary = Readonly<{ grade: string; lowest: HalfMarks }>
export type GradeScale = Readonly<{ oddHalf: OddHalf; boundaries: readonly GradeBoundary[] }>

export type Paper = Readonly<{
  id: string
  title: string
  blankFileId: string | null
  step: MarkingStep
  tolerance: HalfMarks
  sampleSize: number | null
  namesHidden: boolean
  schemeVersion: number
  solutionsReleased: boolean
  keepUntil: string
  createdAt: number
  archivedAt: number | null
  pages: readonly PaperPage[]
  boxes: readonly PaperBox[]
  questions: readonly Question[]
  scale: GradeScale
}>

/** The most a paper can give: withdrawn-out questions left out. */
export function paperMaximum(questions: readonly Pick<Question, 'maximum' | 'withdrawn'>[]): HalfMarks {
  return questions.reduce((total, question) => (question.withdrawn?.as === 'out' ? total : total + question.maximum), 0) as HalfMarks
}

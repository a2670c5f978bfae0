import type { HalfMarks } from './marks'
import type { Pen } from './stamp'

/** A mark point as the student reads it: what it asked for, what it gave. */
export type PointResult = Readonly<{ says: string; earned: HalfMarks; worth: HalfMarks }>
/** A signed change beside the raw mark, with its reason as a sentence. */
export type AdjustmentLine = Readonly<{ says: string; by: HalfMarks }>

/** Where an answer stands on a page as it is shown upright, in shares of its width and height. `page` counts the script's own pages from 0. */
export type AnswerArea = Readonly<{ page: number; x: number; y: number; w: number; h: number }>

/** One question of a returned script. `mark` is null where no figure is shown; `remark` then says why. */
export type ReturnedQuestion = Readonly<{
  label: string
  text: string
  mark: HalfMarks | null
  maximum: HalfMarks
  pen: Pen
  remark: string | null
  points: readonly PointResult[]
  comments: readonly string[]
  /** Null while model solutions are not handed back. */
  modelSolution: string | null
  areas: readonly AnswerArea[]
  /** The stamps of the answer in words. */
  words: string
}>

/** A page of the script, its shape upright (width over height), and all on it in words. */
export type ReturnedPage = Readonly<{ shape: number; words: string }>

/** What a script came to: the sum of its ticks, what was adjusted beside them, and the grade with how it came about. */
export type ScriptScore = Readonly<{
  total: HalfMarks
  ticks: HalfMarks
  adjustments: readonly AdjustmentLine[]
  maximum: HalfMarks
  percent: number | null
  grade: string | null
  gradeSays: string
  pen: Pen
}>

/** What was handed back, frozen with the release: the student's page shows this and works nothing out. */
export type ReturnedDetail = ScriptScore & Readonly<{
  format: 1
  title: string
  className: string
  satOn: string
  givenName: string
  familyName: string
  candidateNumber: string
  questions: readonly ReturnedQuestion[]
  pages: readonly ReturnedPage[]
  next: readonly string[]
}>

/** A returned script as its student, or an owner of the paper, reads it. */
export type ReturnedScriptView = Readonly<{ id: string; revision: number; handedBackAt: number; detail: ReturnedDetail }>
/** A line of a student's list. */
export type ReturnedScriptLine = Readonly<{
  id: string; title: string; className: string; satOn: string; revision: number; handedBackAt: number; read: boolean
  total: HalfMarks; maximum: HalfMarks; grade: string | null; pen: Pen
}>

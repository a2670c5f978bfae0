import type { HalfMarks } from './marks'
import type { ScriptTotal } from './result'

/**
 * `hidden`: marks this person may not see before settling their own second mark. `missing`: no page of it was scanned.
 * `unmarked`: no settled mark yet, which is not nought. `mark` is the mark with adjustments, in halves; only `marked` has one.
 */
export type MarkBookCell = Readonly<{
  responseId: string
  state: 'hidden' | 'missing' | 'unmarked' | 'marked'
  mark: HalfMarks | null
  nothingWritten: boolean
  secondMarked: boolean
  agreed: boolean
  flagged: boolean
  adjusted: boolean
}>

export type Attendance = 'expected' | 'absent' | 'excused'

/** A student of the class set, or a script whose name is still open. Names are empty for who may not see them. */
export type MarkBookRow = Readonly<{
  key: string
  scriptId: string | null
  /** Running number of the script in its class set, from 1. */
  scriptNumber: number | null
  studentId: string | null
  candidateNumber: string
  familyName: string
  givenName: string
  /** False while the name is only suggested. */
  named: boolean
  attendance: Attendance
  /** One for each question, in order; null where the script has none or there is no script. */
  cells: readonly (MarkBookCell | null)[]
  total: ScriptTotal | null
  grade: string | null
}>

export type MarkBookQuestion = Readonly<{ id: string; label: string; maximum: HalfMarks; withdrawn: 'out' | 'full' | null }>

export type MarkBook = Readonly<{
  paperId: string
  title: string
  classSets: readonly { id: string; className: string; satOn: string }[]
  classSetId: string | null
  /** True for an owner: names, every question, totals and grades. False: one marker's own questions, no names. */
  whole: boolean
  questions: readonly MarkBookQuestion[]
  maximum: HalfMarks
  gradeNames: readonly string[]
  rows: readonly MarkBookRow[]
  facility: readonly { n: number; facility: number | null }[]
  /** Mean of the whole scripts' totals, in halves, and how many they are. */
  mean: number | null
  wholeScripts: number
}>

import { gradeOf } from '@/lib/core/grade-of'
import type { MarkBook, MarkBookCell, MarkBookQuestion, MarkBookRow } from '@/lib/core/mark-book'
import { halves, type HalfMarks } from '@/lib/core/marks'
import { paperMaximum, type GradeScale, type Question } from '@/lib/core/paper'
import { facilityOf } from './facility-of'
import type { Pair } from './mark-book-rows'
import { mean } from './mean'
import { adjustedMark, totalOf } from './total-of'

/** How one response stands, as it was read. */
export type Standing = Readonly<{
  responseId: string
  scriptId: string
  questionId: string
  hasPage: boolean
  raw: HalfMarks | null
  adjustment: number
  nothingWritten: boolean
  secondMarked: boolean
  agreed: boolean
  flagged: boolean
  /** True: this person may not see marks of it yet. */
  hidden: boolean
}>

type Sheet = Pick<MarkBook, 'questions' | 'maximum' | 'rows' | 'facility' | 'mean' | 'wholeScripts'>
type Made = Readonly<{ questions: readonly MarkBookQuestion[]; pairs: readonly Pair[]; standings: readonly Standing[]; scale: GradeScale; whole: boolean }>

function cellOf(question: MarkBookQuestion, standing: Standing | undefined): MarkBookCell | null {
  if (!standing) return null
  const { responseId, raw, adjustment, hasPage, hidden, flagged } = standing
  if (hidden) return { responseId, state: 'hidden', mark: null, nothingWritten: false, secondMarked: false, agreed: false, flagged, adjusted: false }
  const state = raw !== null ? 'marked' : hasPage ? 'unmarked' : 'missing'
  const mark = raw === null ? null : adjustedMark(raw, adjustment, question.maximum)
  return { responseId, state, mark, nothingWritten: standing.nothingWritten && raw === 0, secondMarked: standing.secondMarked, agreed: standing.agreed, flagged, adjusted: raw !== null && mark !== raw }
}

const counted = (question: MarkBookQuestion): Pick<Question, 'id' | 'maximum' | 'withdrawn'> =>
  ({ id: question.id, maximum: question.maximum, withdrawn: question.withdrawn ? { as: question.withdrawn, reason: '' } : null })

function rowOf({ student, script, named }: Pair, { questions, scale, whole }: Made, ofScript: ReadonlyMap<string, Standing>): MarkBookRow {
  const sat = script !== null && (student?.attendance ?? 'expected') === 'expected'
  const marks = questions.map(({ id }) => ofScript.get(id))
  const seen = whole && sat && !marks.some((one) => one?.hidden)
  const total = seen ? totalOf(questions.map(counted), marks.filter((one) => one !== undefined)) : null
  return {
    key: script?.scriptId ?? student!.studentId, scriptId: script?.scriptId ?? null, scriptNumber: script ? script.position + 1 : null,
    studentId: whole ? (student?.studentId ?? null) : null, candidateNumber: whole ? (student?.candidateNumber ?? '') : '',
    familyName: whole ? (student?.familyName ?? '') : '', givenName: whole ? (student?.givenName ?? '') : '', named,
    attendance: student?.attendance ?? 'expected',
    cells: questions.map((question, k) => (sat ? cellOf(question, marks[k]) : null)),
    total, grade: total && total.toCome === 0 ? gradeOf(scale, total.final) : null,
  }
}

/** The mark book of one class set from plain values: rows, totals, grades and the foot. Who was absent is in no figure. */
export function markBookOf(made: Made): Sheet {
  const { questions, pairs, standings, whole } = made
  const byScript = new Map<string, Map<string, Standing>>()
  for (const standing of standings) {
    const ofScript = byScript.get(standing.scriptId) ?? new Map<string, Standing>()
    byScript.set(standing.scriptId, ofScript.set(standing.questionId, standing))
  }
  const rows = pairs.map((pair) => rowOf(pair, made, byScript.get(pair.script?.scriptId ?? '') ?? new Map()))
  const finals = rows.flatMap(({ total }) => (total && total.toCome === 0 ? [total.final] : []))
  const facility = questions.map((question, k) => {
    const { n, facility } = facilityOf(rows.map(({ cells }) => cells[k]?.mark ?? null), question.maximum)
    return { n, facility }
  })
  return { questions, maximum: whole ? paperMaximum(questions.map(counted)) : halves(0), rows, facility, mean: mean(finals), wholeScripts: finals.length }
}

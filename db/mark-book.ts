import type { HalfMarks } from '@/lib/core/marks'
import type { Attendance, MarkBookQuestion } from '@/lib/core/mark-book'
import type { Db } from './knex'

export type StudentOfSet = Readonly<{ studentId: string; candidateNumber: string; givenName: string; familyName: string; attendance: Attendance }>
export type ScriptOfSet = Readonly<{ scriptId: string; position: number; studentId: string | null; suggestedStudentId: string | null }>
export type CellOfSet = Readonly<{
  responseId: string
  scriptId: string
  questionId: string
  hasPage: 0 | 1
  /** Sum of the stamps of the settled marking that counts; null while there is none. */
  raw: HalfMarks | null
  countingMarkingId: string | null
  countingMarkerId: string | null
  countingRound: string | null
  nothingWritten: 0 | 1
  secondMarked: 0 | 1
  flagged: 0 | 1
  /** The sum of the adjustments that hold for the marking that counts, in halves. */
  adjustment: number
}>

export async function listColumns(db: Db, paperId: string): Promise<MarkBookQuestion[]> {
  return db('questions').where({ paper_id: paperId }).orderBy('position').select('id', 'label', 'maximum', { withdrawn: 'withdrawn_as' })
}

export async function listStudentsOfSet(db: Db, classSetId: string): Promise<StudentOfSet[]> {
  return db('class_set_students').where({ class_set_id: classSetId })
    .select({ studentId: 'student_id', candidateNumber: 'candidate_number', givenName: 'given_name', familyName: 'family_name', attendance: 'attendance' })
}

export async function listScriptsOfSet(db: Db, classSetId: string): Promise<ScriptOfSet[]> {
  return db('scripts').where({ class_set_id: classSetId }).orderBy('position')
    .select({ scriptId: 'id', position: 'position', studentId: 'student_id', suggestedStudentId: 'suggested_student_id' })
}

// Every look-up beside a response goes by an index that starts with it; the whole class set is read in one go.
const cells = `
  select responses.id as responseId, responses.script_id as scriptId, responses.question_id as questionId,
    (not exists (select 1 from answer_spaces where question_id = responses.question_id) or exists (
      select 1 from answer_spaces join script_pages on script_pages.script_id = responses.script_id and script_pages.paper_page = answer_spaces.page
      where answer_spaces.question_id = responses.question_id and script_pages.leaf_id is not null)) as hasPage,
    case when counting.id is not null then coalesce((select sum(worth) from stamps where marking_id = counting.id and removed = 0), 0) end as raw,
    counting.id as countingMarkingId, counting.marker_id as countingMarkerId, counting.round as countingRound,
    exists (select 1 from stamps where marking_id = counting.id and removed = 0 and kind = 'nothing-written') as nothingWritten,
    exists (select 1 from markings where response_id = responses.id and round = 'second' and state = 'settled') as secondMarked,
    exists (select 1 from flags where response_id = responses.id and answered_at is null) as flagged,
    coalesce((select sum(halves) from adjustments where response_id = responses.id and undone_at is null and (marking_id is null or marking_id = counting.id)), 0) as adjustment
  from scripts join responses on responses.script_id = scripts.id
  left join counting_decisions on counting_decisions.response_id = responses.id and counting_decisions.superseded_at is null
  left join markings counting on counting.id = counting_decisions.marking_id and counting.state = 'settled'
  where scripts.class_set_id = ?`

/** How every response of a class set stands, in one statement. */
export async function listCells(db: Db, classSetId: string): Promise<CellOfSet[]> {
  return db.raw(cells, [classSetId]) as unknown as Promise<CellOfSet[]>
}

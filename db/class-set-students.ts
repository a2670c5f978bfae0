import type { Db } from './knex'

export type Attendance = 'expected' | 'absent' | 'excused'
/** A student as the list of one class set stood on its date, with the script that bears their name, if any. */
export type ListedStudent = Readonly<{ classSetId: string; studentId: string; candidateNumber: string; givenName: string; familyName: string; attendance: Attendance; scriptId: string | null }>
type Row = { class_set_id: string; student_id: string; candidate_number: string; given_name: string; family_name: string; attendance: Attendance; script_id: string | null }

/** The lists of some class sets, each in the order of its candidate numbers (as numbers where they are). */
export async function listClassSetStudents(db: Db, classSetIds: readonly string[]): Promise<ListedStudent[]> {
  const rows = (await db('class_set_students as s')
    .leftJoin('scripts', (join) => join.on('scripts.class_set_id', 's.class_set_id').andOn('scripts.student_id', 's.student_id'))
    .whereIn('s.class_set_id', classSetIds)
    .orderByRaw('s.class_set_id, length(s.candidate_number), s.candidate_number')
    .select('s.*', { script_id: 'scripts.id' })) as Row[]
  return rows.map((row) => ({
    classSetId: row.class_set_id, studentId: row.student_id, candidateNumber: row.candidate_number, givenName: row.given_name, familyName: row.family_name,
    attendance: row.attendance, scriptId: row.script_id,
  }))
}

export async function setAttendance(db: Db, classSetId: string, studentId: string, attendance: Attendance): Promise<void> {
  await db<Row>('class_set_students').where({ class_set_id: classSetId, student_id: studentId }).update({ attendance })
}

export type SittingClass = Readonly<{ classSetId: string; className: string; satOn: string; students: number }>

/** The class sets of a paper with the name of each class, by date and name. */
export async function listSittingClasses(db: Db, paperId: string): Promise<SittingClass[]> {
  const rows = (await db('class_sets').join('classes', 'classes.id', 'class_sets.class_id').where({ paper_id: paperId }).orderBy(['sat_on', 'classes.name'])
    .select({ id: 'class_sets.id', name: 'classes.name', sat_on: 'class_sets.sat_on' },
      db('class_set_students').whereRaw('class_set_students.class_set_id = class_sets.id').count('*').as('students'))) as { id: string; name: string; sat_on: string; students: number }[]
  return rows.map((row) => ({ classSetId: row.id, className: row.name, satOn: row.sat_on, students: row.students }))
}

export async function getAttendance(db: Db, classSetId: string, studentId: string): Promise<Attendance | null> {
  const row = await db<Row>('class_set_students').where({ class_set_id: classSetId, student_id: studentId }).first('attendance')
  return row?.attendance ?? null
}

/** The paper of a class set; null when there is no such class set. */
export async function paperOfClassSet(db: Db, classSetId: string): Promise<string | null> {
  const row = await db('class_sets').where({ id: classSetId }).first<{ paper_id: string } | undefined>('paper_id')
  return row?.paper_id ?? null
}

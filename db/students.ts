import type { Db } from './knex'

export type Student = Readonly<{ id: string; candidateNumber: string; givenName: string; familyName: string; email: string | null; userId: string | null }>
type StudentRow = { id: string; candidate_number: string; given_name: string; family_name: string; email: string | null; user_id: string | null; created_at: number; left_at: number | null }

const toStudent = (row: StudentRow): Student => ({
  id: row.id, candidateNumber: row.candidate_number, givenName: row.given_name, familyName: row.family_name, email: row.email, userId: row.user_id,
})

/** The students of a class, by name. */
export async function listStudentsOfClass(db: Db, classId: string): Promise<Student[]> {
  const rows = await db<StudentRow>('students').whereIn('id', db('class_students').where({ class_id: classId }).select('student_id')).orderBy(['family_name', 'given_name', 'candidate_number'])
  return rows.map(toStudent)
}

/** Those of the school's list who bear one of these candidate numbers. */
export async function findStudentsByNumber(db: Db, numbers: readonly string[]): Promise<Student[]> {
  const found: Student[] = []
  // SQLite takes only so many values in one statement.
  for (let from = 0; from < numbers.length; from += 500) {
    found.push(...(await db<StudentRow>('students').whereIn('candidate_number', numbers.slice(from, from + 500))).map(toStudent))
  }
  return found
}

export async function addStudent(db: Db, student: Omit<Student, 'userId'>, at: number): Promise<void> {
  await db<StudentRow>('students').insert({
    id: student.id, candidate_number: student.candidateNumber, given_name: student.givenName, family_name: student.familyName, email: student.email, user_id: null, created_at: at, left_at: null,
  })
}

export async function setStudentNames(db: Db, id: string, to: Readonly<{ givenName: string; familyName: string; email: string | null }>): Promise<void> {
  await db<StudentRow>('students').where({ id }).update({ given_name: to.givenName, family_name: to.familyName, email: to.email })
}

/** Ties an account to a student of the list. */
export async function setStudentUser(db: Db, id: string, userId: string): Promise<void> {
  await db<StudentRow>('students').where({ id }).update({ user_id: userId })
}

export async function getStudent(db: Db, id: string): Promise<Student | null> {
  const row = await db<StudentRow>('students').where({ id }).first()
  return row ? toStudent(row) : null
}

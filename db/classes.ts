import type { Db } from './knex'

export type SchoolClass = Readonly<{ id: string; name: string }>
type ClassRow = { id: string; name: string; created_at: number; archived_at: number | null }

export async function getClass(db: Db, id: string): Promise<SchoolClass | null> {
  const row = await db<ClassRow>('classes').where({ id }).first('id', 'name')
  return row ?? null
}

export async function findClassByName(db: Db, name: string): Promise<SchoolClass | null> {
  const row = await db<ClassRow>('classes').where({ name }).first('id', 'name')
  return row ?? null
}

export async function addClassRow(db: Db, made: SchoolClass, at: number): Promise<void> {
  await db<ClassRow>('classes').insert({ ...made, created_at: at, archived_at: null })
}

export async function setClassName(db: Db, id: string, name: string): Promise<void> {
  await db<ClassRow>('classes').where({ id }).update({ name })
}

/** Every class, or those one person teaches, with how many students each has. */
export async function listClassRows(db: Db, teacherId: string | null): Promise<(SchoolClass & { students: number })[]> {
  const query = db('classes').whereNull('archived_at').select('id', 'name')
    .select(db('class_students').where('class_id', db.ref('classes.id')).count('*').as('students'))
  if (teacherId !== null) query.whereIn('id', db('class_teachers').where({ user_id: teacherId }).select('class_id'))
  return query as unknown as Promise<(SchoolClass & { students: number })[]>
}

export async function isTeacherOf(db: Db, userId: string, classId: string): Promise<boolean> {
  return (await db('class_teachers').where({ class_id: classId, user_id: userId }).first('class_id')) !== undefined
}

export type ClassTeacher = Readonly<{ classId: string; userId: string; givenName: string; familyName: string }>

/** The teachers of some classes, by family name. */
export async function listTeachers(db: Db, classIds: readonly string[]): Promise<ClassTeacher[]> {
  const rows = await db('class_teachers').join('users', 'users.id', 'class_teachers.user_id').whereIn('class_id', [...classIds])
    .orderBy(['family_name', 'given_name']).select<{ class_id: string; user_id: string; given_name: string; family_name: string }[]>('class_id', 'user_id', 'given_name', 'family_name')
  return rows.map((row) => ({ classId: row.class_id, userId: row.user_id, givenName: row.given_name, familyName: row.family_name }))
}

export async function setTeachers(db: Db, classId: string, userIds: readonly string[]): Promise<void> {
  await db('class_teachers').where({ class_id: classId }).delete()
  if (userIds.length > 0) await db('class_teachers').insert(userIds.map((user_id) => ({ class_id: classId, user_id })))
}

export async function putInClass(db: Db, classId: string, studentId: string): Promise<void> {
  await db('class_students').insert({ class_id: classId, student_id: studentId }).onConflict(['class_id', 'student_id']).ignore()
}

export async function takeOutOfClass(db: Db, classId: string, studentId: string): Promise<boolean> {
  return (await db('class_students').where({ class_id: classId, student_id: studentId }).delete()) > 0
}

/** The classes each of these students is in. */
export async function listClassesOfStudents(db: Db, studentIds: readonly string[]): Promise<{ classId: string; studentId: string }[]> {
  const rows = await db('class_students').whereIn('student_id', [...studentIds]).select<{ class_id: string; student_id: string }[]>('class_id', 'student_id')
  return rows.map((row) => ({ classId: row.class_id, studentId: row.student_id }))
}

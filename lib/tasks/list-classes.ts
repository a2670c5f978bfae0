import { db } from '@/db/knex'
import { listClassRows, listTeachers } from '@/db/classes'
import { assertMaySchool, type Actor } from '@/lib/core/actor'

export type ClassLine = Readonly<{ classId: string; name: string; students: number; teachers: readonly string[] }>

/** The classes someone may manage: all for an admin, the taught ones for a teacher; 9B before 10A. */
export async function listClasses(actor: Actor): Promise<ClassLine[]> {
  assertMaySchool(actor, 'classes')
  const classes = await listClassRows(db(), actor.roles.includes('admin') ? null : actor.userId)
  const teachers = await listTeachers(db(), classes.map(({ id }) => id))
  return classes
    .map(({ id, name, students }) => ({ classId: id, name, students, teachers: teachers.filter(({ classId }) => classId === id).map((one) => `${one.givenName.charAt(0)}. ${one.familyName}`) }))
    .toSorted((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true }))
}

import type { Db } from '@/db/knex'
import { getClass, isTeacherOf, type SchoolClass } from '@/db/classes'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'

/** The one gate before anything of a class: an admin, or a teacher who teaches it. not_found for the teachers of others. */
export async function gateClass(db: Db, actor: Actor, classId: string): Promise<SchoolClass> {
  assertMaySchool(actor, 'classes')
  const found = await getClass(db, classId)
  const may = actor.roles.includes('admin') || (await isTeacherOf(db, actor.userId, classId))
  if (!found || !may) throw new AppError('not_found')
  return found
}

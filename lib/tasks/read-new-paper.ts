import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { listClassesOfTeacher, type ClassChoice } from '@/db/class-sets'
import { db } from '@/db/knex'

/** What the form of a new paper offers: the teacher's own classes. */
export async function readNewPaper(actor: Actor): Promise<{ classes: ClassChoice[] }> {
  assertMaySchool(actor, 'new-paper')
  return { classes: await listClassesOfTeacher(db(), actor.userId) }
}

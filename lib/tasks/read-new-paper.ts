import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { listClassRows, type SchoolClass } from '@/db/classes'
import { db } from '@/db/knex'

/** What the form of a new paper offers: the teacher's own classes. */
export async function readNewPaper(actor: Actor): Promise<{ classes: (SchoolClass & { students: number })[] }> {
  assertMaySchool(actor, 'new-paper')
  const classes = await listClassRows(db(), actor.userId)
  return { classes: classes.sort((a, b) => a.name.localeCompare(b.name, 'en', { numeric: true })) }
}

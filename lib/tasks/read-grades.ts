import type { Actor } from '@/lib/core/actor'
import type { GradesPage } from '@/lib/core/grades-page'
import { listClassSets } from '@/db/class-sets'
import { db } from '@/db/knex'
import { getScale } from '@/db/grade-scales'
import { gatePaper } from './gate-paper'
import { readMarkBook } from './read-mark-book'

/** The grade scale of a paper with the totals it is tried on; owners only. */
export async function readGrades(actor: Actor, paperId: string): Promise<GradesPage> {
  await gatePaper(db(), actor, 'change', paperId)
  const { oddHalf, boundaries } = await getScale(db(), paperId)
  const first = await readMarkBook(actor, paperId)
  const books = [first]
  for (const { id } of await listClassSets(db(), paperId)) if (id !== first.classSetId) books.push(await readMarkBook(actor, paperId, id))
  const totals = books.flatMap(({ rows }) => rows.flatMap(({ total }) => (total ? [total] : [])))
  const whole = totals.filter(({ toCome }) => toCome === 0).map(({ final }) => final)
  return { paperId, maximum: first.maximum, scale: { oddHalf, boundaries }, totals: whole, notWhole: totals.length - whole.length }
}

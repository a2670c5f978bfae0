import type { PaperStanding } from '@/lib/core/actor'
import { noStanding } from '@/lib/core/actor'
import type { Db } from './knex'

/** How a person stands to a paper: owner, marker of which questions, moderator of one of its class sets. */
export async function getPaperStanding(db: Db, userId: string, paperId: string): Promise<PaperStanding> {
  const paper = await db('papers').where({ id: paperId }).first<{ id: string } | undefined>('id')
  if (!paper) return noStanding
  const owner = await db('paper_owners').where({ paper_id: paperId, user_id: userId }).first<unknown>('user_id')
  const marks = (await db('paper_markers').where({ paper_id: paperId, user_id: userId }).pluck('question_id')) as (string | null)[]
  const moderates = await db('samples').join('class_sets', 'class_sets.id', 'samples.class_set_id').where({ 'class_sets.paper_id': paperId, 'samples.moderator_id': userId }).first<unknown>('samples.id')
  return { owner: Boolean(owner), marks: marks.includes(null) ? 'all' : (marks as string[]), moderates: Boolean(moderates) }
}

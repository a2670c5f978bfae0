import { mayOnPaper, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { db } from '@/db/knex'
import { listRunProgress, type RunProgress } from '@/db/run-progress'
import { gatePaper } from './gate-paper'

/** The questions of a paper that this person may mark, with how far each is. Throws not_found or not_allowed. */
export async function listRuns(actor: Actor, paperId: string): Promise<RunProgress[]> {
  const standing = await gatePaper(db(), actor, 'see', paperId)
  if (!standing.owner && standing.marks.length === 0) throw new AppError('not_allowed')
  return (await listRunProgress(db(), paperId)).filter((run) => mayOnPaper(actor, 'mark', standing, run.questionId))
}

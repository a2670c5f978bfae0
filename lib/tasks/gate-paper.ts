import { assertMayOnPaper, type Actor, type PaperAct, type PaperStanding } from '@/lib/core/actor'
import type { Db } from '@/db/knex'
import { getPaperStanding } from '@/db/paper-standing'

/** The one gate before anything of a paper: role and standing. Throws not_found or not_allowed; gives the standing back. */
export async function gatePaper(db: Db, actor: Actor, act: PaperAct, paperId: string, questionId?: string): Promise<PaperStanding> {
  const standing = await getPaperStanding(db, actor.userId, paperId)
  assertMayOnPaper(actor, act, standing, questionId)
  return standing
}

import { assertMayOnPaper, carriedStanding, type Actor, type PaperAct, type PaperStanding } from '@/lib/core/actor'
import type { Db } from '@/db/knex'
import { getPaperStanding } from '@/db/paper-standing'

/** The one gate before anything of a paper: role and standing. Throws not_found or not_allowed; gives back the standing as far as the roles carry it. */
export async function gatePaper(db: Db, actor: Actor, act: PaperAct, paperId: string, questionId?: string): Promise<PaperStanding> {
  const standing = carriedStanding(actor, await getPaperStanding(db, actor.userId, paperId))
  assertMayOnPaper(actor, act, standing, questionId)
  return standing
}

import { mayOnPaper, type Actor, type PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Db } from '@/db/knex'
import { sampledScriptIds } from '@/db/runs'
import { gatePaper } from './gate-paper'

/** The gate before a script's pages: its owners, its markers (with `questionId`, those of that question), and a moderator of a sample it is in. Throws not_found or not_allowed. */
export async function gateScript(db: Db, actor: Actor, at: Readonly<{ paperId: string; scriptId: string; questionId?: string }>): Promise<PaperStanding> {
  const standing = await gatePaper(db, actor, 'see', at.paperId)
  const marks = at.questionId === undefined ? actor.roles.includes('marker') && standing.marks.length > 0 : mayOnPaper(actor, 'mark', standing, at.questionId)
  if (marks || mayOnPaper(actor, 'change', standing)) return standing
  if (mayOnPaper(actor, 'second-mark', standing) && (await sampledScriptIds(db, actor.userId, at.paperId)).has(at.scriptId)) return standing
  throw new AppError('not_allowed')
}

import { mayOnPaper, type Actor, type PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { stageNames, type PaperStages, type StageName } from '@/lib/core/paper-stages'
import { db } from '@/db/knex'
import { countPaper, paperTitle } from '@/db/paper-counts'
import { gatePaper } from './gate-paper'

function stagesOpenTo(actor: Actor, standing: PaperStanding): StageName[] {
  if (mayOnPaper(actor, 'change', standing)) return [...stageNames]
  const marks = actor.roles.includes('marker') && standing.marks.length > 0
  return [...(marks ? (['Mark'] as const) : []), ...(mayOnPaper(actor, 'second-mark', standing) ? (['Second-mark'] as const) : [])]
}

/** What the top of every page of a paper says: title, classes, what is left at each stage, and the stages this person may open. */
export async function readStages(actor: Actor, paperId: string): Promise<PaperStages> {
  const standing = await gatePaper(db(), actor, 'see', paperId)
  const paper = await paperTitle(db(), paperId)
  if (!paper) throw new AppError('not_found')
  return { paperId, ...paper, open: stagesOpenTo(actor, standing), counts: await countPaper(db(), paperId) }
}

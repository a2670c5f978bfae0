import type { Actor, PaperAct, PaperStanding } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Paper, Question } from '@/lib/core/paper'
import type { Scheme } from '@/lib/core/press-rules'
import type { Round } from '@/lib/core/stamp'
import type { Db } from '@/db/knex'
import { listMarkingsOfResponse } from '@/db/markings'
import { getPaper } from '@/db/papers'
import { getResponse, sampledScriptIds } from '@/db/runs'
import { blindResponseIds, sampleResponseIds } from '@/db/samples'
import { gatePaper } from './gate-paper'

/** The rounds that can be marked at the desk, and what a person has to be allowed to do for each. */
export const actOfRound: Partial<Record<Round, PaperAct>> = { first: 'mark', second: 'second-mark', agreed: 'agree' }

export type GatedResponse = Readonly<{ responseId: string; scriptId: string; round: Round; paper: Paper; question: Question; scheme: Scheme; standing: PaperStanding }>

/**
 * The one gate before anything of a response in a round: the paper's gate, then the round's own rule. A second mark is given only by the moderator of the sample and never on one's
 * own first marking; an agreed mark only once one's own second mark is settled. Throws not_found, not_allowed, own_first_marking, or bad_input for a round the desk does not know.
 */
export async function gateResponse(db: Db, actor: Actor, round: Round, responseId: string): Promise<GatedResponse> {
  const act = actOfRound[round]
  if (!act) throw new AppError('bad_input', { round })
  const response = await getResponse(db, responseId)
  const paper = response && (await getPaper(db, response.paperId))
  if (!response || !paper) throw new AppError('not_found')
  const standing = await gatePaper(db, actor, act, paper.id, response.questionId)
  if (round === 'second') await assertSampled(db, actor, responseId, response.questionId)
  if (round === 'agreed') await assertMayAgree(db, actor, standing, { responseId, scriptId: response.scriptId, paperId: paper.id })
  const question = paper.questions.find((candidate) => candidate.id === response.questionId)!
  return { responseId, scriptId: response.scriptId, round, paper, question, standing, scheme: { maximum: question.maximum, step: paper.step, points: question.points } }
}

async function assertSampled(db: Db, actor: Actor, responseId: string, questionId: string): Promise<void> {
  if ((await sampleResponseIds(db, actor.userId, questionId)).includes(responseId)) return
  const first = await listMarkingsOfResponse(db, responseId, 'first')
  throw new AppError(first.some((marking) => marking.markerId === actor.userId) ? 'own_first_marking' : 'not_allowed')
}

async function assertMayAgree(db: Db, actor: Actor, standing: PaperStanding, at: { responseId: string; scriptId: string; paperId: string }): Promise<void> {
  const blind = (await blindResponseIds(db, actor.userId, at.paperId)).has(at.responseId)
  const sampled = standing.owner || (await sampledScriptIds(db, actor.userId, at.paperId)).has(at.scriptId)
  if (blind || !sampled) throw new AppError('not_allowed')
}

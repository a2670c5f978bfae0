import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Question } from '@/lib/core/paper'
import type { Db } from '@/db/knex'
import { getQuestion } from '@/db/questions'
import { gatePaper } from './gate-paper'

/** A question whose paper this person may change; throws not_found or not_allowed. */
export async function gateQuestion(trx: Db, actor: Actor, questionId: string): Promise<Question & { paperId: string }> {
  const question = await getQuestion(trx, questionId)
  if (!question) throw new AppError('not_found')
  await gatePaper(trx, actor, 'change', question.paperId)
  return question
}

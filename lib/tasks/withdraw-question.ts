import type { Actor } from '@/lib/core/actor'
import { transaction } from '@/db/knex'
import { setQuestionWithdrawn } from '@/db/questions'
import { gateQuestion } from './gate-question'
import { markSchemeChanged } from './store-setting'

export type WithdrawQuestion = Readonly<{ questionId: string; as: 'out' | 'full'; reason: string }>

/** Takes a question out of the totals, or gives everyone full marks for it. Its stamps stay. Done twice it is done once. */
export async function withdrawQuestion(actor: Actor, { questionId, as, reason }: WithdrawQuestion): Promise<void> {
  await transaction(async (trx) => {
    const question = await gateQuestion(trx, actor, questionId)
    if (question.withdrawn?.as === as && question.withdrawn.reason === reason) return
    await setQuestionWithdrawn(trx, questionId, { by: actor.userId, reason, as })
    await markSchemeChanged(trx, actor, question.paperId, `question.withdrawn-${as}`, 'question', questionId)
  })
}

import type { Actor } from '@/lib/core/actor'
import { transaction } from '@/db/knex'
import { setQuestionWithdrawn } from '@/db/questions'
import { gateQuestion } from './gate-question'
import { markSchemeChanged } from './store-setting'

/** Lets a withdrawn question count again, with all its stamps. */
export async function bringBackQuestion(actor: Actor, { questionId }: { questionId: string }): Promise<void> {
  await transaction(async (trx) => {
    const question = await gateQuestion(trx, actor, questionId)
    if (question.withdrawn === null) return
    await setQuestionWithdrawn(trx, questionId, null)
    await markSchemeChanged(trx, actor, question.paperId, 'question.brought-back', 'question', questionId)
  })
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { transaction } from '@/db/knex'
import { setPointWithdrawn } from '@/db/questions'
import { gateQuestion } from './gate-question'
import { markSchemeChanged } from './store-setting'

/** Offers a withdrawn mark point to markers again. */
export async function bringBackMarkPoint(actor: Actor, { questionId, pointId }: { questionId: string; pointId: string }): Promise<void> {
  await transaction(async (trx) => {
    const question = await gateQuestion(trx, actor, questionId)
    const point = question.points.find(({ id }) => id === pointId)
    if (!point) throw new AppError('not_found')
    if (!point.withdrawn) return
    await setPointWithdrawn(trx, pointId, null)
    await markSchemeChanged(trx, actor, question.paperId, 'mark-point.brought-back', 'mark_point', pointId)
  })
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { transaction } from '@/db/knex'
import { setPointWithdrawn } from '@/db/questions'
import { gateQuestion } from './gate-question'
import { markSchemeChanged } from './store-setting'

export type WithdrawMarkPoint = Readonly<{ questionId: string; pointId: string; reason: string }>

/** A withdrawn mark point is no longer offered to markers; stamps that name it stay and keep their worth. */
export async function withdrawMarkPoint(actor: Actor, { questionId, pointId, reason }: WithdrawMarkPoint): Promise<void> {
  await transaction(async (trx) => {
    const question = await gateQuestion(trx, actor, questionId)
    const point = question.points.find(({ id }) => id === pointId)
    if (!point) throw new AppError('not_found')
    if (point.withdrawn) return
    await setPointWithdrawn(trx, pointId, { by: actor.userId, reason })
    await markSchemeChanged(trx, actor, question.paperId, 'mark-point.withdrawn', 'mark_point', pointId)
  })
}

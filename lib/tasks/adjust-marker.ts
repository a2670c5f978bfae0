import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { sayAdjustment } from '@/lib/second-marking/say-adjustment'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { addMarkerAdjustment, listMarkerAdjustments } from '@/db/marker-adjustments'
import { gateSample } from './gate-sample'
import { planAdjustment, type AskedAdjustment } from './plan-adjustment'

/**
 * Lays one adjustment on a marker's answers to a question, decided by an owner who has been shown its effect: `key` says which. No stamp and no raw mark changes. Throws what the gate
 * says, not_allowed, no_pattern, already_there while one holds, or out_of_date when the effect is no longer what was shown.
 */
export async function adjustMarker(actor: Actor, { key, ...asked }: AskedAdjustment & Readonly<{ key: string }>): Promise<{ adjustmentId: string }> {
  return transaction(async (trx) => {
    const { owner, ...sample } = await gateSample(trx, actor, asked.sampleId)
    if (!owner) throw new AppError('not_allowed')
    const held = (await listMarkerAdjustments(trx, sample.paperId)).some((one) => one.sampleId === sample.id && one.questionId === asked.questionId && one.markerId === asked.markerId && one.undone === null)
    if (held) throw new AppError('already_there')
    const plan = await planAdjustment(trx, sample, asked)
    if (plan.key !== key) throw new AppError('out_of_date')
    const [id, decidedAt] = [newId(), Date.now()]
    await addMarkerAdjustment(trx, { ...asked, id, halves: plan.shift, pairs: plan.pattern.n, mean: plan.pattern.mean, decidedBy: actor.userId, decidedAt }, plan.answers, sayAdjustment(plan.shift, decidedAt))
    await addAuditLine(trx, actor, { act: 'marker.adjusted', objectKind: 'marker-adjustment', objectId: id, paperId: sample.paperId, from: asked.markerId, to: plan.shift })
    return { adjustmentId: id }
  })
}

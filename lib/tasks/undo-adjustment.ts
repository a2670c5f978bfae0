import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { getMarkerAdjustment, undoMarkerAdjustment } from '@/db/marker-adjustments'
import { gatePaper } from './gate-paper'

/** Takes an adjustment back, also after its sample was closed: every mark is again what the stamps say. Done twice it is done once. Throws not_found or not_allowed. */
export async function undoAdjustment(actor: Actor, adjustmentId: string): Promise<void> {
  await transaction(async (trx) => {
    const adjustment = await getMarkerAdjustment(trx, adjustmentId)
    if (!adjustment) throw new AppError('not_found')
    await gatePaper(trx, actor, 'change', adjustment.paperId)
    if (adjustment.undone) return
    await undoMarkerAdjustment(trx, adjustmentId, actor.userId)
    await addAuditLine(trx, actor, { act: 'marker.adjustment-undone', objectKind: 'marker-adjustment', objectId: adjustmentId, paperId: adjustment.paperId, from: adjustment.halves, to: 0 })
  })
}

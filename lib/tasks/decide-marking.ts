import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { markOf } from '@/lib/core/marking'
import type { DecisionReason, Stands } from '@/lib/core/second-marking'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { decideAnew } from '@/db/markings'
import { comparedMarkings } from './compared-markings'
import { gateResponse } from './gate-response'

type Asked = Readonly<{ responseId: string; stands: Stands; reason: DecisionReason }>

/**
 * Decides after comparing which marking of an answer counts, with a reason; the decision before it stays on record and no stamp
 * changes. Throws what the gate says, marking_unsettled (also for an agreed marking still in work), or sample_closed.
 */
export async function decideMarking(actor: Actor, { responseId, stands, reason }: Asked): Promise<void> {
  await transaction(async (trx) => {
    const gated = await gateResponse(trx, actor, 'agreed', responseId)
    const compared = await comparedMarkings(trx, actor, gated)
    if (compared.sample.closedAt !== null) throw new AppError('sample_closed')
    const chosen = compared[stands]
    if (!chosen || chosen.state !== 'settled') throw new AppError('marking_unsettled')
    await decideAnew(trx, { responseId, markingId: chosen.id, reason, decidedBy: actor.userId })
    await addAuditLine(trx, actor, { act: `marking.${stands}-stands`, objectKind: 'response', objectId: responseId, paperId: gated.paper.id, from: markOf(compared.first.stamps), to: markOf(chosen.stamps) })
  })
}

import type { Actor } from '@/lib/core/actor'
import type { Round } from '@/lib/core/stamp'
import { addAuditLine } from '@/db/audit'
import { addFlag } from '@/db/flags'
import { transaction } from '@/db/knex'
import { gateResponse } from './gate-response'

/** Asks the paper's teacher about one response. The answer shows on the same strip. */
export async function raiseFlag(actor: Actor, { responseId, round, note }: Readonly<{ responseId: string; round: Round; note: string }>): Promise<{ id: string }> {
  return transaction(async (trx) => {
    const { paper } = await gateResponse(trx, actor, round, responseId)
    const id = await addFlag(trx, { responseId, note, raisedBy: actor.userId })
    await addAuditLine(trx, actor, { act: 'flag.raised', objectKind: 'response', objectId: responseId, paperId: paper.id })
    return { id }
  })
}

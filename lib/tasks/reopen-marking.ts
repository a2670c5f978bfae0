import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { markOf } from '@/lib/core/marking'
import type { Round } from '@/lib/core/stamp'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { setMarkingState } from '@/db/markings'
import { gateResponse } from './gate-response'
import { markingInHand } from './marking-in-hand'

/**
 * Takes a settled marking back into work: it stays the one that counts, and counts nothing until it is settled again. Twice is once. Throws marking_settled for a second
 * marking: settling it shows its moderator the first one, so what is changed after that would not be blind.
 */
export async function reopenMarking(actor: Actor, { responseId, round }: Readonly<{ responseId: string; round: Round }>): Promise<void> {
  await transaction(async (trx) => {
    const { paper } = await gateResponse(trx, actor, round, responseId)
    const marking = await markingInHand(trx, actor, responseId, round)
    if (!marking || marking.state === 'open') return
    if (round === 'second') throw new AppError('marking_settled', { round })
    await setMarkingState(trx, marking.id, 'open')
    await addAuditLine(trx, actor, { act: 'marking.reopened', objectKind: 'marking', objectId: marking.id, paperId: paper.id, from: markOf(marking.stamps) })
  })
}

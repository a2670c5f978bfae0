import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { kept } from '@/lib/core/marking'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { addMarking, listMarkingsOfResponse } from '@/db/markings'
import { putStamp } from '@/db/stamps'
import { gateResponse } from './gate-response'
import { begun, markingInHand } from './marking-in-hand'

/**
 * Begins the agreed marking of a response as a copy of one of its settled markings, to be changed at the desk. One that has begun is left as it is. Throws what the gate says,
 * not_found when the marking is not of this response, marking_unsettled while it is in work.
 */
export async function beginAgreedMarking(actor: Actor, { responseId, copyOf }: Readonly<{ responseId: string; copyOf: string }>): Promise<{ markingId: string }> {
  return transaction(async (trx) => {
    const { paper } = await gateResponse(trx, actor, 'agreed', responseId)
    const there = await markingInHand(trx, actor, responseId, 'agreed')
    if (there && begun(there)) return { markingId: there.id }
    const given = [...(await listMarkingsOfResponse(trx, responseId, 'first')), ...(await listMarkingsOfResponse(trx, responseId, 'second'))]
    const chosen = given.find((marking) => marking.id === copyOf)
    if (!chosen) throw new AppError('not_found')
    if (chosen.state !== 'settled') throw new AppError('marking_unsettled')
    const marking = there ?? (await addMarking(trx, { responseId, round: 'agreed', markerId: actor.userId }))
    for (const stamp of kept(chosen.stamps)) await putStamp(trx, { ...stamp, id: newId(), markingId: marking.id, version: 1 })
    await addAuditLine(trx, actor, { act: 'marking.begun-as-copy', objectKind: 'marking', objectId: marking.id, paperId: paper.id, from: chosen.id })
    return { markingId: marking.id }
  })
}

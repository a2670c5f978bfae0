import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { markOf, type Marking } from '@/lib/core/marking'
import type { HalfMarks } from '@/lib/core/marks'
import { assertSettles } from '@/lib/core/press-rules'
import type { Round } from '@/lib/core/stamp'
import { addAuditLine } from '@/db/audit'
import { transaction, type Db } from '@/db/knex'
import { countingMarkingId, decideCounting, getMarking, setMarkingState } from '@/db/markings'
import { gateResponse } from './gate-response'
import { markingInHand } from './marking-in-hand'

/**
 * Finishes a marking: its mark counts from now on, if it is a first or an agreed one. A second mark counts for nothing until it is agreed. Settling twice is settling once. Throws
 * what the gate says, nothing_stamped, base_missing, over_maximum or off_step.
 */
export async function settleMarking(actor: Actor, { responseId, round }: Readonly<{ responseId: string; round: Round }>): Promise<{ mark: HalfMarks }> {
  return transaction(async (trx) => {
    const { scheme, paper, question } = await gateResponse(trx, actor, round, responseId)
    const marking = await markingInHand(trx, actor, responseId, round)
    if (!marking) throw new AppError('nothing_stamped')
    const mark = markOf(marking.stamps)
    if (marking.state === 'settled') return { mark }
    if (question.withdrawn) throw new AppError('question_withdrawn')
    assertSettles(marking.stamps, scheme)
    await setMarkingState(trx, marking.id, 'settled')
    await decide(trx, actor, marking)
    await addAuditLine(trx, actor, { act: 'marking.settled', objectKind: 'marking', objectId: marking.id, paperId: paper.id, to: mark })
    return { mark }
  })
}

/** A first marking counts unless a later round has been decided on since; an agreed one always. */
async function decide(db: Db, actor: Actor, { id: markingId, responseId, round }: Marking): Promise<void> {
  if (round === 'second') return
  const now = await countingMarkingId(db, responseId)
  const stands = now === null ? null : await getMarking(db, now)
  if (round === 'first' && stands && stands.round !== 'first') return
  await decideCounting(db, { responseId, markingId, reason: round === 'first' ? 'first_mark' : 'agreed', decidedBy: actor.userId })
}

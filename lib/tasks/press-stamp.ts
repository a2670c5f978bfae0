import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { markOf, type Marking } from '@/lib/core/marking'
import type { HalfMarks } from '@/lib/core/marks'
import { assertFits } from '@/lib/core/press-rules'
import type { PressedStamp, Stamp } from '@/lib/core/stamp'
import { addAuditLine } from '@/db/audit'
import { transaction, type Db } from '@/db/knex'
import { addMarking } from '@/db/markings'
import { getScriptPage } from '@/db/runs'
import { markingIdOfStamp, putStamp } from '@/db/stamps'
import { gateResponse } from './gate-response'
import { markingInHand } from './marking-in-hand'

/** What came of a stamp: the marking's mark now, and whether this version was news. */
export type Pressed = Readonly<{ mark: HalfMarks; kept: boolean }>

/**
 * Presses, changes or takes back a stamp: a stamp taken back is one more version with `removed`. The marking begins with its first stamp. Sent twice it is stored once; an older
 * version than the one here is left out, quietly. Throws what the gate, the round and the rules of pressing say; nothing is written then.
 */
export async function pressStamp(actor: Actor, pressed: PressedStamp): Promise<Pressed> {
  return transaction(async (trx) => {
    const gated = await gateResponse(trx, actor, pressed.round, pressed.responseId)
    const inHand = await markingInHand(trx, actor, pressed.responseId, pressed.round)
    await assertOwnId(trx, pressed.id, inHand)
    const before = inHand?.stamps.find((stamp) => stamp.id === pressed.id)
    if (before && before.version >= pressed.version) return { mark: markOf(inHand!.stamps), kept: false }
    if (inHand?.state === 'settled') throw new AppError('marking_settled', { round: pressed.round })
    if (gated.question.withdrawn) throw new AppError('question_withdrawn')
    await assertOnScript(trx, pressed, gated.scriptId)
    const stamp = toStamp(pressed, inHand?.id ?? '')
    const after = [...(inHand?.stamps ?? []).filter((other) => other.id !== stamp.id), stamp]
    assertFits(after, stamp, gated.scheme)
    const marking = inHand ?? (await addMarking(trx, { responseId: pressed.responseId, round: pressed.round, markerId: actor.userId }))
    await putStamp(trx, { ...stamp, markingId: marking.id })
    await audit(trx, actor, { paperId: gated.paper.id, markingId: marking.id, before, after: stamp, from: markOf(marking.stamps), to: markOf(after) })
    return { mark: markOf(after), kept: true }
  })
}

function toStamp({ responseId: _response, round: _round, ...stamp }: PressedStamp, markingId: string): Stamp {
  return { ...stamp, markingId }
}

/** An id is one stamp for ever: one of another marking cannot be written over. */
async function assertOwnId(db: Db, id: string, marking: Marking | null): Promise<void> {
  const at = await markingIdOfStamp(db, id)
  if (at !== null && at !== marking?.id) throw new AppError('bad_input', { id })
}

async function assertOnScript(db: Db, pressed: PressedStamp, scriptId: string): Promise<void> {
  if (pressed.scriptPageId === null) return
  const page = await getScriptPage(db, pressed.scriptPageId)
  if (page?.scriptId !== scriptId) throw new AppError('bad_input', { scriptPageId: pressed.scriptPageId })
}

type Change = Readonly<{ paperId: string; markingId: string; before: Stamp | undefined; after: Stamp; from: HalfMarks; to: HalfMarks }>

/** A line for each stamp that comes or goes, and for each change of a mark or of words; moving a stamp says nothing new. */
async function audit(db: Db, actor: Actor, { paperId, markingId, before, after, from, to }: Change): Promise<void> {
  const there = before !== undefined && !before.removed
  if (there && !after.removed && from === to && before.text === after.text) return
  if (!there && after.removed) return
  const act = after.removed ? 'stamp.taken-back' : there ? 'stamp.changed' : 'stamp.pressed'
  await addAuditLine(db, actor, { act, objectKind: 'marking', objectId: markingId, paperId, from, to })
}

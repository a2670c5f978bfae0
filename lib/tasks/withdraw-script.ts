import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { withdrawReturned } from '@/db/returned-scripts'
import { placeOfScript } from '@/db/runs'
import { now } from '@/lib/infra/clock'
import { gatePaper } from './gate-paper'

/** Takes one student's script back, every revision of it; the others stay with their students. Throws not_found, not_allowed or not_released. */
export async function withdrawScript(actor: Actor, scriptId: string): Promise<void> {
  await transaction(async (trx) => {
    const place = await placeOfScript(trx, scriptId)
    if (!place) throw new AppError('not_found')
    await gatePaper(trx, actor, 'change', place.paperId)
    const ids = await withdrawReturned(trx, scriptId, actor.userId, now())
    if (ids.length === 0) throw new AppError('not_released')
    for (const id of ids) await addAuditLine(trx, actor, { act: 'returned-script.withdrawn', objectKind: 'returned-script', objectId: id, paperId: place.paperId })
  })
}

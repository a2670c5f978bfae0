import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { callOffWaiting } from '@/db/releases'
import { now } from '@/lib/infra/clock'
import { gateClassSet } from './gate-class-set'

/** Calls a release off that waits for its day: nothing of it was built or seen. Throws not_released when none waits. */
export async function callOffRelease(actor: Actor, classSetId: string): Promise<void> {
  await transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const id = await callOffWaiting(trx, classSetId, actor.userId, now())
    if (id === null) throw new AppError('not_released')
    await addAuditLine(trx, actor, { act: 'release.called-off', objectKind: 'release', objectId: id, paperId: set.paperId })
  })
}

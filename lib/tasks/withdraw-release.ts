import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { withdrawReleases } from '@/db/releases'
import { now } from '@/lib/infra/clock'
import { gateClassSet } from './gate-class-set'

/** Takes back all that stands handed back of a class set: students see nothing of it any more, the files stay as proof. Throws not_released when nothing is. */
export async function withdrawRelease(actor: Actor, classSetId: string): Promise<void> {
  await transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const ids = await withdrawReleases(trx, classSetId, actor.userId, now())
    if (ids.length === 0) throw new AppError('not_released')
    for (const id of ids) await addAuditLine(trx, actor, { act: 'release.withdrawn', objectKind: 'release', objectId: id, paperId: set.paperId })
  })
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { classSetInUse, dropClassSet, getClassSet } from '@/db/class-sets'
import { transaction } from '@/db/knex'
import { gateClassSet } from './gate-class-set'
import { gatePaper } from './gate-paper'

/** Takes a class set away again while nothing hangs on it; throws class_set_used otherwise. Sent twice is fine. */
export async function removeClassSet(actor: Actor, { paperId, classSetId }: { paperId: string; classSetId: string }): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    if (!(await getClassSet(trx, classSetId))) return
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    if (await classSetInUse(trx, classSetId)) throw new AppError('class_set_used')
    await dropClassSet(trx, classSetId)
    await addAuditLine(trx, actor, { act: 'class-set.removed', objectKind: 'class_set', objectId: classSetId, paperId: set.paperId })
  })
}

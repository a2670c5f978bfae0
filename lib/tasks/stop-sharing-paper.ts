import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { dropOwner, listOwners } from '@/db/paper-people'
import { gatePaper } from './gate-paper'

/** Takes an owner's part in a paper away. The last one stays: throws last_owner. */
export async function stopSharingPaper(actor: Actor, { paperId, userId }: { paperId: string; userId: string }): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    const owners = await listOwners(trx, paperId)
    if (!owners.some((owner) => owner.userId === userId)) return
    if (owners.length === 1) throw new AppError('last_owner')
    await dropOwner(trx, paperId, userId)
    await addAuditLine(trx, actor, { act: 'paper.unshared', objectKind: 'paper', objectId: paperId, paperId, from: userId })
  })
}

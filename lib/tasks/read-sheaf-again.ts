import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { addJob } from '@/db/jobs'
import { transaction } from '@/db/knex'
import { getSheaf, reopenSheaf } from '@/db/sheaves'
import { gatePaper } from './gate-paper'

/** Puts a sheaf whose reading failed back in the queue; what was read of it is kept. */
export async function readSheafAgain(actor: Actor, sheafId: string): Promise<void> {
  await transaction(async (trx) => {
    const sheaf = await getSheaf(trx, sheafId)
    if (!sheaf) throw new AppError('not_found')
    await gatePaper(trx, actor, 'change', sheaf.paperId)
    if (sheaf.state !== 'failed') throw new AppError('out_of_date')
    await reopenSheaf(trx, sheafId)
    await addJob(trx, 'read-sheaf', sheafId)
    await addAuditLine(trx, actor, { act: 'sheaf.read-again', objectKind: 'sheaf', objectId: sheafId, paperId: sheaf.paperId })
  })
}

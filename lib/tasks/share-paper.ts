import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { addOwner, listOwners, listPeopleWith } from '@/db/paper-people'
import { listSamples } from '@/db/samples'
import { gatePaper } from './gate-paper'

/** Makes another teacher an owner too: they may do all that this one may. Throws moderator_not_blind for who second-marks a sample of the paper. */
export async function sharePaper(actor: Actor, { paperId, userId }: { paperId: string; userId: string }): Promise<void> {
  await transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    if (!(await listPeopleWith(trx, 'teacher')).some((person) => person.userId === userId)) throw new AppError('not_found')
    if ((await listOwners(trx, paperId)).some((owner) => owner.userId === userId)) return
    if ((await listSamples(trx, paperId)).some((sample) => sample.moderatorId === userId)) throw new AppError('moderator_not_blind', { moderates: true })
    await addOwner(trx, paperId, userId)
    await addAuditLine(trx, actor, { act: 'paper.shared', objectKind: 'paper', objectId: paperId, paperId, to: userId })
  })
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { closeSample as close } from '@/db/samples'
import { gateSample } from './gate-sample'
import { readSecondMarking } from './read-second-marking'

/**
 * Ends the second marking of a sample: what is inside the tolerance keeps its first mark. An owner's act; a moderator may have
 * stopped before the last script, and the record says how many were read. Throws moderation_open while something outside is undecided.
 */
export async function closeSample(actor: Actor, sampleId: string): Promise<void> {
  await transaction(async (trx) => {
    const { owner, paperId } = await gateSample(trx, actor, sampleId)
    if (!owner) throw new AppError('not_allowed')
    const sample = (await readSecondMarking(actor, paperId, trx)).samples.find(({ id }) => id === sampleId)!
    if (sample.undecided > 0) throw new AppError('moderation_open', { answers: sample.undecided })
    await close(trx, sampleId, actor.userId)
    await addAuditLine(trx, actor, { act: 'sample.closed', objectKind: 'sample', objectId: sampleId, paperId, to: sample.scripts.filter(({ read, answers }) => read === answers).length })
  })
}

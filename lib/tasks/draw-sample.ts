import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { drawSample as draw } from '@/lib/second-marking/draw-sample'
import { defaultSampleSize } from '@/lib/second-marking/default-sample-size'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { listOwners, listPeopleWith } from '@/db/paper-people'
import { getPaper } from '@/db/papers'
import { addSample, findSample, firstMarkerIds } from '@/db/samples'
import { gateClassSet } from './gate-class-set'
import { sampleCandidates } from './sample-candidates'

type Asked = Readonly<{ classSetId: string; moderatorId: string; size?: number }>

/**
 * Draws the sample of a class set for one moderator, once, by a seed that is kept. Without a size the paper's number holds, else the
 * default table. Throws not_found (no such moderator), moderator_not_blind (an owner, or a first marker of the class set),
 * already_there, or not_marked_yet while answers lack a first mark.
 */
export async function drawSample(actor: Actor, { classSetId, moderatorId, size }: Asked): Promise<{ sampleId: string }> {
  return transaction(async (trx) => {
    const { paperId } = await gateClassSet(trx, actor, 'change', classSetId)
    if (!(await listPeopleWith(trx, 'moderator')).some(({ userId }) => userId === moderatorId)) throw new AppError('not_found')
    const owns = (await listOwners(trx, paperId)).some(({ userId }) => userId === moderatorId)
    if (owns || (await firstMarkerIds(trx, classSetId)).has(moderatorId)) throw new AppError('moderator_not_blind')
    if (await findSample(trx, classSetId, moderatorId)) throw new AppError('already_there')
    const { candidates, toMark } = await sampleCandidates(trx, paperId, classSetId)
    if (toMark > 0 || candidates.length === 0) throw new AppError('not_marked_yet', { answers: toMark })
    const paper = (await getPaper(trx, paperId))!
    const defaultSize = defaultSampleSize(candidates.length)
    const [sampleId, seed] = [newId(), newId()]
    const wanted = size ?? paper.sampleSize ?? defaultSize
    const drawn = draw(candidates, wanted, seed)
    await addSample(trx, { id: sampleId, classSetId, moderatorId, seed, size: wanted, defaultSize, tolerance: paper.tolerance }, actor.userId, drawn)
    await addAuditLine(trx, actor, { act: 'sample.drawn', objectKind: 'sample', objectId: sampleId, paperId, from: seed, to: drawn.length })
    return { sampleId }
  })
}

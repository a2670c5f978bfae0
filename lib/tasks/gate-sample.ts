import { mayOnPaper, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Db } from '@/db/knex'
import { getSample, type Sample } from '@/db/samples'
import { gatePaper } from './gate-paper'

/** A sample by way of its paper: for an owner of the paper, or the sample's own moderator. Throws not_found, not_allowed or, for a closed one, sample_closed. */
export async function gateSample(db: Db, actor: Actor, sampleId: string): Promise<Sample & { owner: boolean }> {
  const sample = await getSample(db, sampleId)
  if (!sample) throw new AppError('not_found')
  const standing = await gatePaper(db, actor, 'agree', sample.paperId)
  const owner = mayOnPaper(actor, 'change', standing)
  if (!owner && sample.moderatorId !== actor.userId) throw new AppError('not_allowed')
  if (sample.closedAt !== null) throw new AppError('sample_closed')
  return { ...sample, owner }
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import type { Marking } from '@/lib/core/marking'
import type { Db } from '@/db/knex'
import { listMarkingsOfResponse } from '@/db/markings'
import { getResponse } from '@/db/runs'
import { findSample, type Sample } from '@/db/samples'
import type { GatedResponse } from './gate-response'

type Compared = Readonly<{ first: Marking; second: Marking; agreed: Marking | null; sample: Sample }>

/**
 * The settled markings of an answer that are compared, with the sample they belong to: a moderator's own second marking, or for an
 * owner the one that was settled first. Throws marking_unsettled while either is missing or in work.
 */
export async function comparedMarkings(db: Db, actor: Actor, { responseId, standing }: Pick<GatedResponse, 'responseId' | 'standing'>): Promise<Compared> {
  const response = await getResponse(db, responseId)
  const settled = (await listMarkingsOfResponse(db, responseId, 'second')).filter(({ state, markerId }) => state === 'settled' && (standing.owner || markerId === actor.userId))
  for (const second of settled) {
    const sample = await findSample(db, response!.classSetId, second.markerId)
    const first = (await listMarkingsOfResponse(db, responseId, 'first')).find(({ state, markerId }) => state === 'settled' && markerId !== second.markerId)
    if (sample && first) return { first, second, sample, agreed: (await listMarkingsOfResponse(db, responseId, 'agreed'))[0] ?? null }
  }
  throw new AppError('marking_unsettled')
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { kept, type Marking } from '@/lib/core/marking'
import type { Round } from '@/lib/core/stamp'
import type { Db } from '@/db/knex'
import { listMarkingsOfResponse } from '@/db/markings'

/** Whether anything of a marking stands: what was begun and taken back whole leaves the response to others. */
export function begun(marking: Pick<Marking, 'state' | 'stamps'>): boolean {
  return marking.state === 'settled' || kept(marking.stamps).length > 0
}

/**
 * The marking this person would go on with; null when it has still to begin. An agreed mark belongs to both, so whoever comes second goes on with the one there is. Throws
 * begun_by_other when another person's first marking stands on the response.
 */
export async function markingInHand(db: Db, actor: Actor, responseId: string, round: Round): Promise<Marking | null> {
  const markings = await listMarkingsOfResponse(db, responseId, round)
  if (round === 'agreed') return markings[0] ?? null
  if (round === 'first' && markings.some((marking) => marking.markerId !== actor.userId && begun(marking))) throw new AppError('begun_by_other')
  return markings.find((marking) => marking.markerId === actor.userId) ?? null
}

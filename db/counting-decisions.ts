import type { Db } from './knex'

export type CountingDecision = Readonly<{ markingId: string; round: string; reason: string; decidedBy: string | null; decidedAt: number }>

/** The decision that holds for a response, with the round of the marking it chose; null when there is none. */
export async function getCountingDecision(db: Db, responseId: string): Promise<CountingDecision | null> {
  const row = (await db('counting_decisions').join('markings', 'markings.id', 'counting_decisions.marking_id').where('counting_decisions.response_id', responseId).whereNull('counting_decisions.superseded_at')
    .first({ markingId: 'markings.id', round: 'markings.round', reason: 'counting_decisions.reason', decidedBy: 'counting_decisions.decided_by', decidedAt: 'counting_decisions.decided_at' })) as CountingDecision | undefined
  return row ?? null
}

import type { Db } from './knex'

export type CountingDecision = Readonly<{ markingId: string; round: string; reason: string; decidedBy: string | null; decidedAt: number }>

/** The responses of a class set whose mark somebody decided on by name after comparing, whichever marking it was. */
export async function comparedResponseIds(db: Db, classSetId: string): Promise<Set<string>> {
  const ids = (await db('scripts').join('responses', 'responses.script_id', 'scripts.id').join('counting_decisions', 'counting_decisions.response_id', 'responses.id')
    .where('scripts.class_set_id', classSetId).whereNull('counting_decisions.superseded_at').whereNot('counting_decisions.reason', 'first_mark').pluck('responses.id')) as string[]
  return new Set(ids)
}

/** The decision that holds for a response, with the round of the marking it chose; null when there is none. */
export async function getCountingDecision(db: Db, responseId: string): Promise<CountingDecision | null> {
  const row = (await db('counting_decisions').join('markings', 'markings.id', 'counting_decisions.marking_id').where('counting_decisions.response_id', responseId).whereNull('counting_decisions.superseded_at')
    .first({ markingId: 'markings.id', round: 'markings.round', reason: 'counting_decisions.reason', decidedBy: 'counting_decisions.decided_by', decidedAt: 'counting_decisions.decided_at' })) as CountingDecision | undefined
  return row ?? null
}

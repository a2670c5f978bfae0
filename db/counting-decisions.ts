import type { HalfMarks } from '@/lib/core/marks'
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

export type SampleDecision = Readonly<{ responseId: string; round: string; reason: string; mark: HalfMarks; by: string; at: number; superseded: 0 | 1 }>

/** Every decision by name on the answers of a sample, also those decided anew since, oldest first, with the mark of the marking it chose and who decided. */
export async function listSampleDecisions(db: Db, sampleId: string): Promise<SampleDecision[]> {
  return db.raw(`
    select responses.id as responseId, markings.round, counting_decisions.reason,
      coalesce((select sum(worth) from stamps where marking_id = markings.id and removed = 0), 0) as mark,
      substr(users.given_name, 1, 1) || '. ' || users.family_name as "by", counting_decisions.decided_at as at, counting_decisions.superseded_at is not null as superseded
    from sample_scripts join responses on responses.script_id = sample_scripts.script_id
    join counting_decisions on counting_decisions.response_id = responses.id and counting_decisions.reason <> 'first_mark'
    join markings on markings.id = counting_decisions.marking_id join users on users.id = counting_decisions.decided_by
    where sample_scripts.sample_id = ? order by counting_decisions.decided_at, counting_decisions.id`, [sampleId]) as unknown as Promise<SampleDecision[]>
}

import type { HalfMarks } from '@/lib/core/marks'
import type { Db } from './knex'

/** An answer of a sampled script with a settled first mark, and who gave it ("R. Adeyemi"). `second` is null until the moderator of the sample has settled theirs. Marks in halves. */
export type SampledAnswer = Readonly<{
  sampleId: string
  scriptId: string
  questionId: string
  responseId: string
  markerId: string
  marker: string
  first: HalfMarks
  second: HalfMarks | null
  /** The sum of the adjustments that hold for the marking that counts, in halves. */
  adjustment: number
  countingRound: string | null
  reason: string | null
}>

// The first marking is the earliest settled one that is not the moderator's own. Each look-up goes by an index that starts with the response.
const statement = `
  select samples.id as sampleId, sample_scripts.script_id as scriptId, responses.question_id as questionId, responses.id as responseId,
    first.marker_id as markerId, substr(users.given_name, 1, 1) || '. ' || users.family_name as marker,
    coalesce((select sum(worth) from stamps where marking_id = first.id and removed = 0), 0) as first,
    case when second.id is not null then coalesce((select sum(worth) from stamps where marking_id = second.id and removed = 0), 0) end as second,
    coalesce((select sum(halves) from adjustments where response_id = responses.id and undone_at is null and (marking_id is null or marking_id = counting.id)), 0) as adjustment,
    counting.round as countingRound, counting_decisions.reason as reason
  from class_sets
  join samples on samples.class_set_id = class_sets.id
  join sample_scripts on sample_scripts.sample_id = samples.id
  join responses on responses.script_id = sample_scripts.script_id
  join questions on questions.id = responses.question_id and questions.withdrawn_as is null
  join markings first on first.id = (select id from markings where response_id = responses.id and round = 'first' and state = 'settled' and marker_id <> samples.moderator_id order by created_at, id limit 1)
  join users on users.id = first.marker_id
  left join markings second on second.response_id = responses.id and second.round = 'second' and second.marker_id = samples.moderator_id and second.state = 'settled'
  left join counting_decisions on counting_decisions.response_id = responses.id and counting_decisions.superseded_at is null
  left join markings counting on counting.id = counting_decisions.marking_id
  where class_sets.paper_id = ?
  order by samples.drawn_at, sample_scripts.position, questions.position`

/** Every answer that the samples of a paper cover, in reading order. */
export async function listSampledAnswers(db: Db, paperId: string): Promise<SampledAnswer[]> {
  return db.raw(statement, [paperId]) as unknown as Promise<SampledAnswer[]>
}

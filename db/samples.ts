import type { Db } from './knex'

// A person's own first marking is never among what they second-mark, whatever the sample says.
const notOwnFirst = `not exists (select 1 from markings own where own.response_id = responses.id and own.round in ('first', 're-mark') and own.marker_id = samples.moderator_id)`

/** The responses of one question that this person second-marks, in reading order (highest, lowest, middle, the rest). Closed samples are over. */
export async function sampleResponseIds(db: Db, userId: string, questionId: string): Promise<string[]> {
  return db('samples')
    .join('sample_scripts', 'sample_scripts.sample_id', 'samples.id')
    .join('responses', 'responses.script_id', 'sample_scripts.script_id')
    .where({ 'samples.moderator_id': userId, 'responses.question_id': questionId })
    .whereNull('samples.closed_at')
    .whereRaw(notOwnFirst)
    .orderBy(['samples.drawn_at', 'sample_scripts.position'])
    .pluck('responses.id')
}

/**
 * The responses of a paper whose other markings this person may not see yet: those of their open samples that they have not
 * settled themselves. Whatever shows a mark asks here first.
 */
export async function blindResponseIds(db: Db, userId: string, paperId: string): Promise<Set<string>> {
  const ids = (await db('class_sets')
    .join('samples', 'samples.class_set_id', 'class_sets.id')
    .join('sample_scripts', 'sample_scripts.sample_id', 'samples.id')
    .join('responses', 'responses.script_id', 'sample_scripts.script_id')
    .where({ 'class_sets.paper_id': paperId, 'samples.moderator_id': userId })
    .whereNull('samples.closed_at')
    .whereRaw(notOwnFirst)
    .whereNotExists((settled) => settled.select(db.raw('1')).from('markings').whereRaw('markings.response_id = responses.id')
      .where({ 'markings.round': 'second', 'markings.marker_id': userId, 'markings.state': 'settled' }))
    .pluck('responses.id')) as string[]
  return new Set(ids)
}

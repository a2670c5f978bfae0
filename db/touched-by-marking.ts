import type { HalfMarks } from '@/lib/core/marks'
import type { Db } from './knex'

/** What marking has touched in a paper: ids with stamps (also taken back ones) or flags, and the most given on a response of each question. */
export type TouchedRows = Readonly<{ questions: ReadonlySet<string>; points: ReadonlySet<string>; given: ReadonlyMap<string, HalfMarks>; oddHalves: boolean }>

export async function touchedByMarking(db: Db, paperId: string): Promise<TouchedRows> {
  const stamps = () => db('stamps').join('markings', 'markings.id', 'stamps.marking_id').join('responses', 'responses.id', 'markings.response_id')
    .join('questions', 'questions.id', 'responses.question_id').where('questions.paper_id', paperId)
  const stamped = (await stamps().distinct('questions.id').pluck('questions.id')) as string[]
  const flagged = (await db('flags').join('responses', 'responses.id', 'flags.response_id').join('questions', 'questions.id', 'responses.question_id')
    .where('questions.paper_id', paperId).distinct('questions.id').pluck('questions.id')) as string[]
  const points = (await stamps().whereNotNull('stamps.mark_point_id').distinct('stamps.mark_point_id').pluck('stamps.mark_point_id')) as string[]
  const odd = await stamps().where('stamps.removed', 0).whereRaw('stamps.worth % 2 = 1').first<unknown>('stamps.id')
  const perMarking = stamps().where('stamps.removed', 0).groupBy('markings.id', 'questions.id').select({ question: 'questions.id', given: db.raw('sum(stamps.worth)') })
  const given = (await db.from(perMarking.as('given_marks')).groupBy('question').select('question').max({ given: 'given' })) as { question: string; given: HalfMarks }[]
  return { questions: new Set([...stamped, ...flagged]), points: new Set(points), given: new Map(given.map((row) => [row.question, row.given])), oddHalves: Boolean(odd) }
}

/** Whether anything in the paper has been stamped at all. */
export async function hasStamps(db: Db, paperId: string): Promise<boolean> {
  return (await touchedByMarking(db, paperId)).questions.size > 0
}

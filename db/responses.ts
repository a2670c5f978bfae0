import { newId } from '@/lib/core/ids'
import { nothingWritten } from '@/lib/core/nothing-written'
import type { Db } from './knex'

/** One response for each script and question of a paper; adds those that are missing and touches no other. */
export async function ensureResponses(db: Db, paperId: string): Promise<void> {
  const missing = (await db('scripts')
    .join('class_sets', 'class_sets.id', 'scripts.class_set_id')
    .join('questions', 'questions.paper_id', 'class_sets.paper_id')
    .leftJoin('responses', (join) => join.on('responses.script_id', 'scripts.id').andOn('responses.question_id', 'questions.id'))
    .where('class_sets.paper_id', paperId)
    .whereNull('responses.id')
    .select({ script_id: 'scripts.id', question_id: 'questions.id' })) as { script_id: string; question_id: string }[]
  for (let from = 0; from < missing.length; from += 200) {
    await db('responses').insert(missing.slice(from, from + 200).map((row) => ({ id: newId(), ...row })))
  }
}

export type ResponseInk = Readonly<{ scriptId: string; questionId: string; ink: number | null }>

/** Keeps how much is written in responses, in square millimetres of ink; null where that is not known. */
export async function setInk(db: Db, inks: readonly ResponseInk[]): Promise<void> {
  for (const { scriptId, questionId, ink } of inks) await db('responses').where({ script_id: scriptId, question_id: questionId }).update({ ink })
}

/** Responses of a question in which nothing seems to be written, the emptiest first. A script with an extra page may be answered there, so it is left out. */
export async function listUnwritten(db: Db, questionId: string): Promise<{ responseId: string; scriptId: string; ink: number }[]> {
  const extra = db('script_pages').whereRaw('script_pages.script_id = responses.script_id').where({ extra: 1 })
  return (await db('responses').where({ question_id: questionId }).where('ink', '<=', nothingWritten).whereNotExists(extra).orderBy(['ink', 'id'])
    .select({ responseId: 'id', scriptId: 'script_id', ink: 'ink' })) as { responseId: string; scriptId: string; ink: number }[]
}

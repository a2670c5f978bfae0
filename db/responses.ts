import { newId } from '@/lib/core/ids'
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

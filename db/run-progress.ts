import type { HalfMarks } from '@/lib/core/marks'
import type { Db } from './knex'

/** How far the first marking of a question is: answers that can be seen or are settled, settled ones, and those begun and not settled. */
export type RunProgress = Readonly<{ questionId: string; label: string; text: string; maximum: HalfMarks; answers: number; settled: number; open: number }>

// An answer whose page was never scanned is not waited for.
const seen = `(not exists (select 1 from answer_spaces where question_id = questions.id) or exists (
  select 1 from answer_spaces join script_pages on script_pages.script_id = responses.script_id and script_pages.paper_page = answer_spaces.page
  where answer_spaces.question_id = questions.id and script_pages.leaf_id is not null))`

/** Every question of a paper that is not withdrawn, in order. A response marked by several people counts once. */
export async function listRunProgress(db: Db, paperId: string): Promise<RunProgress[]> {
  const marked = (state: 'settled' | 'open') => db.raw(
    `count(distinct case when exists (select 1 from markings m where m.response_id = responses.id and m.round = 'first' and m.state = ?
      ${state === 'open' ? "and exists (select 1 from stamps s where s.marking_id = m.id and s.removed = 0) and not exists (select 1 from markings d where d.response_id = responses.id and d.round = 'first' and d.state = 'settled')" : ''}) then responses.id end) as ${state}`, [state])
  const rows = (await db('questions').leftJoin('responses', 'responses.question_id', 'questions.id').where('questions.paper_id', paperId).whereNull('questions.withdrawn_at')
    .groupBy('questions.id').orderBy('questions.position')
    .select({ questionId: 'questions.id', label: 'questions.label', text: 'questions.text', maximum: 'questions.maximum' }, db.raw(`count(distinct case when ${seen} or exists (select 1 from markings m where m.response_id = responses.id and m.round = 'first' and m.state = 'settled') then responses.id end) as answers`), marked('settled'), marked('open'))) as unknown as RunProgress[]
  return rows
}

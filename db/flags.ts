import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

type FlagRow = {
  id: string; response_id: string; note: string; raised_by: string; raised_at: number; answer: string | null; answered_by: string | null; answered_at: number | null
}
export type Flag = Readonly<{ id: string; responseId: string; note: string; raisedBy: string; answer: string | null }>

/** A question to the teacher about one response. */
export async function addFlag(db: Db, flag: Readonly<{ responseId: string; note: string; raisedBy: string }>): Promise<string> {
  const id = newId()
  await db<FlagRow>('flags').insert({ id, response_id: flag.responseId, note: flag.note, raised_by: flag.raisedBy, raised_at: Date.now() })
  return id
}

/** The flags of a question's responses, oldest first. */
export async function listFlagsOfQuestion(db: Db, questionId: string): Promise<Flag[]> {
  const rows = (await db<FlagRow>('flags').join('responses', 'responses.id', 'flags.response_id').where('responses.question_id', questionId).orderBy('flags.raised_at').select('flags.*')) as FlagRow[]
  return rows.map((row) => ({ id: row.id, responseId: row.response_id, note: row.note, raisedBy: row.raised_by, answer: row.answer }))
}

import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import type { Round } from '@/lib/core/stamp'
import { responseOf } from './paper'

type Wanted = Readonly<{ script: string; question: string; by: string; worth: number; round?: Round; settled?: boolean; counts?: boolean; kind?: string }>

/** A marking with one stamp of `worth` halves, settled and counting unless said otherwise. Gives its id. */
export async function aMarking({ script, question, by, worth, round = 'first', settled = true, counts = round === 'first', kind = 'tick' }: Wanted): Promise<string> {
  const { responseId, scriptPageId } = await responseOf(script, question)
  const id = newId()
  const at = Date.now()
  await db()('markings').insert({ id, response_id: responseId, round, marker_id: by, state: settled ? 'settled' : 'open', created_at: at, settled_at: settled ? at : null })
  await db()('stamps').insert({ id: newId(), marking_id: id, version: 1, kind, worth, script_page_id: scriptPageId, x: 100, y: 180, w: 0, h: 0, text: '', path: '[]', saved_at: at })
  if (settled && counts) await db()('counting_decisions').insert({ id: newId(), response_id: responseId, marking_id: id, reason: 'first_mark', decided_by: by, decided_at: at })
  return id
}

import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

type Row = { id: string; number: number; paper_id: string; act: string; before: string; after: string; decided_by: string; decided_at: number; undone_at: number | null }
/** What was decided at the sorting table, with the touched rows before and after, as values of the caller. */
export type SortingDecision<Rows> = Readonly<{ id: string; act: string; before: Rows; after: Rows }>

export async function addSortingDecision<Rows>(db: Db, decision: { paperId: string; act: string; before: Rows; after: Rows; decidedBy: string }): Promise<void> {
  const last = await db('sorting_decisions').max({ number: 'number' }).first<{ number: number | null }>()
  await db<Row>('sorting_decisions').insert({
    id: newId(), number: (last?.number ?? 0) + 1, paper_id: decision.paperId, act: decision.act, before: JSON.stringify(decision.before), after: JSON.stringify(decision.after),
    decided_by: decision.decidedBy, decided_at: Date.now(),
  })
}

/** The newest decision of a person on a paper that is not undone. */
export async function lastSortingDecision<Rows>(db: Db, paperId: string, userId: string): Promise<SortingDecision<Rows> | null> {
  const row = await db<Row>('sorting_decisions').where({ paper_id: paperId, decided_by: userId, undone_at: null }).orderBy('number', 'desc').first()
  return row ? { id: row.id, act: row.act, before: JSON.parse(row.before) as Rows, after: JSON.parse(row.after) as Rows } : null
}

export async function setSortingUndone(db: Db, id: string): Promise<void> {
  await db<Row>('sorting_decisions').where({ id }).update({ undone_at: Date.now() })
}

/** Drops what was decided about the leaves of a sheaf, and the scripts in it, that are going away: it can be neither shown nor undone without them. */
export async function dropDecisionsOnSheaf(db: Db, sheafId: string, scriptIds: readonly string[]): Promise<void> {
  const onLeaf = "exists (select 1 from json_each(sorting_decisions.before, '$.leaves') touched join leaves on leaves.id = touched.key where leaves.sheaf_id = ?)"
  const onScript = "exists (select 1 from json_each(sorting_decisions.before, '$.scripts') touched join json_each(?) gone on gone.value = touched.key)"
  await db<Row>('sorting_decisions').whereRaw(onLeaf, [sheafId]).orWhereRaw(onScript, [JSON.stringify(scriptIds)]).delete()
}

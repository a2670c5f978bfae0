import { newId } from '@/lib/core/ids'
import type { Marking, MarkingState } from '@/lib/core/marking'
import type { Round, Stamp } from '@/lib/core/stamp'
import type { Db } from './knex'
import { listStamps } from './stamps'

export type MarkingRow = {
  id: string; response_id: string; round: Round; marker_id: string; state: MarkingState; reason: string | null; created_at: number; settled_at: number | null
}

async function withStamps(db: Db, rows: readonly MarkingRow[]): Promise<Marking[]> {
  const stamps = await listStamps(db, rows.map((row) => row.id))
  const of = new Map<string, Stamp[]>(rows.map((row) => [row.id, []]))
  for (const stamp of stamps) of.get(stamp.markingId)?.push(stamp)
  return rows.map((row) => ({ id: row.id, responseId: row.response_id, round: row.round, markerId: row.marker_id, state: row.state, stamps: of.get(row.id) ?? [] }))
}

/** One marking with its stamps; null when there is none. */
export async function getMarking(db: Db, id: string): Promise<Marking | null> {
  const row = await db<MarkingRow>('markings').where({ id }).first()
  return row ? (await withStamps(db, [row]))[0]! : null
}

/** Every marking of one response in one round, with its stamps, in the order they were begun. */
export async function listMarkingsOfResponse(db: Db, responseId: string, round: Round): Promise<Marking[]> {
  return withStamps(db, await db<MarkingRow>('markings').where({ response_id: responseId, round }).orderBy('created_at'))
}

/** The markings of a question in one round, with their stamps. */
export async function listMarkingsOfQuestion(db: Db, questionId: string, round: Round): Promise<Marking[]> {
  const rows = await db<MarkingRow>('markings').join('responses', 'responses.id', 'markings.response_id')
    .where({ 'responses.question_id': questionId, 'markings.round': round }).orderBy('markings.created_at').select('markings.*')
  return withStamps(db, rows as MarkingRow[])
}

/** Begins a marking. Unique for response, round and marker. */
export async function addMarking(db: Db, marking: Pick<Marking, 'responseId' | 'round' | 'markerId'>): Promise<Marking> {
  const id = newId()
  await db<MarkingRow>('markings').insert({ id, response_id: marking.responseId, round: marking.round, marker_id: marking.markerId, state: 'open', created_at: Date.now() })
  return { ...marking, id, state: 'open', stamps: [] }
}

export async function setMarkingState(db: Db, id: string, state: MarkingState): Promise<void> {
  await db<MarkingRow>('markings').where({ id }).update({ state, settled_at: state === 'settled' ? Date.now() : null })
}

type DecisionRow = { id: string; response_id: string; marking_id: string; reason: string; decided_by: string | null; decided_at: number; superseded_at: number | null }

/** The marking that counts for a response, settled or not; null when nobody has decided yet. */
export async function countingMarkingId(db: Db, responseId: string): Promise<string | null> {
  const row = await db<DecisionRow>('counting_decisions').where({ response_id: responseId }).whereNull('superseded_at').first('marking_id')
  return row?.marking_id ?? null
}

type Decision = Readonly<{ responseId: string; markingId: string; reason: string; decidedBy: string }>

/** Decides, with its date, which marking counts; the decision before it stays on record. The same marking again changes nothing. */
export async function decideCounting(db: Db, decision: Decision): Promise<void> {
  if ((await countingMarkingId(db, decision.responseId)) === decision.markingId) return
  await decideAnew(db, decision)
}

/** A decision of its own date and reason even when the marking that counts stays the same: after comparing, "the first mark stands" is one. */
export async function decideAnew(db: Db, decision: Decision): Promise<void> {
  const at = Date.now()
  await db<DecisionRow>('counting_decisions').where({ response_id: decision.responseId }).whereNull('superseded_at').update({ superseded_at: at })
  await db<DecisionRow>('counting_decisions').insert({
    id: newId(), response_id: decision.responseId, marking_id: decision.markingId, reason: decision.reason, decided_by: decision.decidedBy, decided_at: at, superseded_at: null,
  })
}

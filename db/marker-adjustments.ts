import { newId } from '@/lib/core/ids'
import type { MarkerAdjustment } from '@/lib/core/adjusting'
import type { Db } from './knex'

type Added = Readonly<{ id: string; sampleId: string; questionId: string; markerId: string; halves: number; pairs: number; mean: number; decidedBy: string; decidedAt: number }>

/** Keeps an adjustment and lays it on each answer, for the marking that counts there now; `reason` is what the returned script says. */
export async function addMarkerAdjustment(db: Db, added: Added, answers: readonly Readonly<{ responseId: string; markingId: string }>[], reason: string): Promise<void> {
  await db('marker_adjustments').insert({
    id: added.id, sample_id: added.sampleId, question_id: added.questionId, marker_id: added.markerId, halves: added.halves, pairs: added.pairs, mean: added.mean,
    decided_by: added.decidedBy, decided_at: added.decidedAt,
  })
  for (const { responseId, markingId } of answers) {
    await db('adjustments').insert({
      id: newId(), response_id: responseId, halves: added.halves, reason, decided_by: added.decidedBy, decided_at: added.decidedAt, marker_adjustment_id: added.id, marking_id: markingId,
    })
  }
}

/** Takes an adjustment back from every answer; what it was stays on record. */
export async function undoMarkerAdjustment(db: Db, id: string, undoneBy: string): Promise<void> {
  const at = Date.now()
  await db('marker_adjustments').where({ id }).whereNull('undone_at').update({ undone_at: at, undone_by: undoneBy })
  await db('adjustments').where({ marker_adjustment_id: id }).whereNull('undone_at').update({ undone_at: at })
}

type Row = Readonly<{
  id: string; sampleId: string; paperId: string; questionId: string; label: string; markerId: string; marker: string; halves: number; pairs: number; mean: number; answers: number
  by: string; at: number; undoneBy: string | null; undoneAt: number | null
}>
export type KeptAdjustment = MarkerAdjustment & Readonly<{ sampleId: string; paperId: string }>

const named = (table: string) => `substr(${table}.given_name, 1, 1) || '. ' || ${table}.family_name`
const statement = (where: string) => `
  select kept.id, kept.sample_id as sampleId, class_sets.paper_id as paperId, kept.question_id as questionId, questions.label, kept.marker_id as markerId, ${named('marker')} as marker,
    kept.halves, kept.pairs, kept.mean, (select count(*) from adjustments where marker_adjustment_id = kept.id) as answers,
    ${named('decider')} as "by", kept.decided_at as at, ${named('undoer')} as undoneBy, kept.undone_at as undoneAt
  from marker_adjustments kept join samples on samples.id = kept.sample_id join class_sets on class_sets.id = samples.class_set_id join questions on questions.id = kept.question_id
  join users marker on marker.id = kept.marker_id join users decider on decider.id = kept.decided_by left join users undoer on undoer.id = kept.undone_by
  where ${where} order by kept.decided_at, kept.id`

function kept({ undoneBy, undoneAt, ...row }: Row): KeptAdjustment {
  return { ...row, undone: undoneAt === null ? null : { by: undoneBy ?? '', at: undoneAt } }
}

/** Every adjustment of a paper's samples, taken back or not, in the order they were decided. */
export async function listMarkerAdjustments(db: Db, paperId: string): Promise<KeptAdjustment[]> {
  return ((await db.raw(statement('class_sets.paper_id = ?'), [paperId])) as unknown as Row[]).map(kept)
}

export async function getMarkerAdjustment(db: Db, id: string): Promise<KeptAdjustment | null> {
  const [row] = (await db.raw(statement('kept.id = ?'), [id])) as unknown as Row[]
  return row ? kept(row) : null
}

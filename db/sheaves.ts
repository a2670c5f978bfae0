import type { ErrorDetail } from '@/lib/core/errors'
import type { Db } from './knex'

export type SheafState = 'waiting' | 'reading' | 'placed' | 'failed'
type SheafRow = {
  id: string; paper_id: string; file_id: string; state: SheafState; leaf_count: number | null; problem: string | null; problem_detail: string | null
  created_by: string | null; created_at: number; started_at: number | null; finished_at: number | null
}

/** One uploaded file of scanned pages. `problem` is the code of what stopped its reading. */
export type Sheaf = Readonly<{
  id: string; paperId: string; fileId: string; name: string; sha256: string; state: SheafState; leafCount: number | null
  problem: string | null; problemDetail: ErrorDetail; createdAt: number; startedAt: number | null; finishedAt: number | null
}>
type JoinedRow = SheafRow & { original_name: string; sha256: string }

const joined = (db: Db) => db('sheaves').join('stored_files', 'stored_files.id', 'sheaves.file_id').select('sheaves.*', 'stored_files.original_name', 'stored_files.sha256')

function toSheaf(row: JoinedRow): Sheaf {
  return {
    id: row.id, paperId: row.paper_id, fileId: row.file_id, name: row.original_name, sha256: row.sha256, state: row.state, leafCount: row.leaf_count, problem: row.problem,
    problemDetail: row.problem_detail ? (JSON.parse(row.problem_detail) as ErrorDetail) : {}, createdAt: row.created_at, startedAt: row.started_at, finishedAt: row.finished_at,
  }
}

export async function addSheaf(db: Db, sheaf: { id: string; paperId: string; fileId: string; leafCount: number; classSetIds: readonly string[]; createdBy: string | null }): Promise<void> {
  await db('sheaves').insert({ id: sheaf.id, paper_id: sheaf.paperId, file_id: sheaf.fileId, leaf_count: sheaf.leafCount, created_by: sheaf.createdBy, created_at: Date.now() })
  await db('sheaf_class_sets').insert(sheaf.classSetIds.map((classSetId) => ({ sheaf_id: sheaf.id, class_set_id: classSetId })))
}

export async function getSheaf(db: Db, id: string): Promise<Sheaf | null> {
  const row = (await joined(db).where('sheaves.id', id).first()) as JoinedRow | undefined
  return row ? toSheaf(row) : null
}

/** The sheaves of a paper, the oldest first. */
export async function listSheaves(db: Db, paperId: string): Promise<Sheaf[]> {
  return ((await joined(db).where('sheaves.paper_id', paperId).orderBy('sheaves.created_at')) as JoinedRow[]).map(toSheaf)
}

/** The sheaf of a paper that holds these very bytes, if there is one. */
export async function findSheafOfBytes(db: Db, paperId: string, sha256: string): Promise<Sheaf | null> {
  const row = (await joined(db).where({ 'sheaves.paper_id': paperId, 'stored_files.sha256': sha256 }).first()) as JoinedRow | undefined
  return row ? toSheaf(row) : null
}

/** The class sets of one paper whose scripts may lie in a sheaf, the longest standing first. */
export async function listSheafClassSets(db: Db, sheafId: string, paperId: string): Promise<string[]> {
  return (await db('sheaf_class_sets').join('class_sets', 'class_sets.id', 'sheaf_class_sets.class_set_id').where({ sheaf_id: sheafId, 'class_sets.paper_id': paperId })
    .orderBy(['class_sets.sat_on', 'class_sets.created_at']).pluck('class_sets.id')) as string[]
}

/** The papers whose scripts may lie in a sheaf: its own first, others in an order that stays. */
export async function listSheafPapers(db: Db, sheaf: Pick<Sheaf, 'id' | 'paperId'>): Promise<string[]> {
  const all = (await db('sheaf_class_sets').join('class_sets', 'class_sets.id', 'sheaf_class_sets.class_set_id').where({ sheaf_id: sheaf.id })
    .distinct('class_sets.paper_id').orderBy('class_sets.paper_id').pluck('class_sets.paper_id')) as string[]
  return [sheaf.paperId, ...all.filter((id) => id !== sheaf.paperId)]
}

export async function startSheaf(db: Db, id: string, leafCount: number): Promise<void> {
  await db<SheafRow>('sheaves').where({ id }).update({ state: 'reading', leaf_count: leafCount, problem: null, problem_detail: null, started_at: Date.now() })
}

export async function endSheaf(db: Db, id: string, end: { state: 'placed' } | { state: 'failed'; problem: string; detail: ErrorDetail }): Promise<void> {
  await db<SheafRow>('sheaves').where({ id }).update({
    state: end.state, problem: end.state === 'failed' ? end.problem : null, problem_detail: end.state === 'failed' ? JSON.stringify(end.detail) : null, finished_at: Date.now(),
  })
}

/** Puts a sheaf that failed back to be read. */
export async function reopenSheaf(db: Db, id: string): Promise<void> {
  await db<SheafRow>('sheaves').where({ id, state: 'failed' }).update({ state: 'waiting', problem: null, problem_detail: null, finished_at: null })
}

/** Removes a sheaf with its leaves, none of which lies in a script any more. */
export async function dropSheaf(db: Db, id: string): Promise<void> {
  await db('leaves').where({ sheaf_id: id }).delete()
  await db<SheafRow>('sheaves').where({ id }).delete()
}

import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

/** What the worker can be asked to do. The subject's own row says how far it has come. */
export type JobKind = 'read-sheaf' | 'build-release' | 'prune-cuts'
export type Job = Readonly<{ id: string; kind: JobKind; subjectId: string; attempts: number }>

type JobRow = {
  id: string; kind: JobKind; subject_id: string; state: 'waiting' | 'running' | 'done' | 'failed'; attempts: number; run_after: number
  lease_until: number | null; worker: string | null; error_code: string | null; created_at: number; finished_at: number | null
}

/** Asks for work, in the transaction of the rows it is about; not before `delayMs` are over. Asked twice while open, it is one job. */
export async function addJob(db: Db, kind: JobKind, subjectId: string, delayMs = 0): Promise<void> {
  const at = Date.now()
  const open = await db<JobRow>('jobs').where({ kind, subject_id: subjectId }).whereIn('state', ['waiting', 'running']).first()
  if (open) return
  await db<JobRow>('jobs').insert({ id: newId(), kind, subject_id: subjectId, state: 'waiting', attempts: 0, run_after: at + delayMs, created_at: at })
}

/** Takes the next job for `leaseMs`; one statement, so two workers never take the same. A job whose lease ran out is taken again. */
export async function claimJob(db: Db, worker: string, leaseMs: number): Promise<Job | null> {
  const at = Date.now()
  const rows = (await db.raw(
    `update jobs set state = 'running', attempts = attempts + 1, lease_until = ?, worker = ?
     where id = (select id from jobs where (state = 'waiting' and run_after <= ?) or (state = 'running' and lease_until < ?) order by run_after, created_at limit 1)
     returning id, kind, subject_id, attempts`,
    [at + leaseMs, worker, at, at],
  )) as JobRow[]
  const row = rows[0]
  return row ? { id: row.id, kind: row.kind, subjectId: row.subject_id, attempts: row.attempts } : null
}

/** Keeps the lease while the work goes on; false when another worker has taken it over. */
export async function renewJob(db: Db, id: string, worker: string, leaseMs: number): Promise<boolean> {
  return (await db<JobRow>('jobs').where({ id, worker, state: 'running' }).update({ lease_until: Date.now() + leaseMs })) === 1
}

export async function finishJob(db: Db, id: string, worker: string, error: string | null): Promise<void> {
  await db<JobRow>('jobs').where({ id, worker }).update({ state: error ? 'failed' : 'done', error_code: error, finished_at: Date.now(), lease_until: null })
}

/** Puts a job back to be tried again later. */
export async function postponeJob(db: Db, id: string, worker: string, delayMs: number, error: string): Promise<void> {
  await db<JobRow>('jobs').where({ id, worker }).update({ state: 'waiting', run_after: Date.now() + delayMs, error_code: error, lease_until: null })
}

/** Gives a job back that a worker stopped half way on purpose: this try does not count. */
export async function releaseJob(db: Db, id: string, worker: string): Promise<void> {
  await db<JobRow>('jobs').where({ id, worker, state: 'running' }).update({ state: 'waiting', run_after: Date.now(), lease_until: null, attempts: db.raw('attempts - 1') })
}

/** Takes back all work asked for on a subject that is going away; a worker in the middle of it finds its lease lost. */
export async function dropJobs(db: Db, kind: JobKind, subjectId: string): Promise<void> {
  await db<JobRow>('jobs').where({ kind, subject_id: subjectId }).delete()
}

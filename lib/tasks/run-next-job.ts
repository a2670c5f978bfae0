import { AppError, type ErrorDetail } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { claimJob, finishJob, postponeJob, releaseJob, renewJob, type Job, type JobKind } from '@/db/jobs'
import { db, transaction } from '@/db/knex'
import { endSheaf } from '@/db/sheaves'
import { log } from '@/lib/infra/log'
import { buildRelease, releaseFailed } from './build-release'
import { pruneCuts } from './prune-cuts'
import { readSheaf } from './read-sheaf'

/** How long a job is a worker's own without a sign of life; renewed three times as often. */
const leaseMs = 12_000
const mostAttempts = 3
/** Claimed so often without an end, a job takes its worker down with it each time. */
const mostClaims = 8
const waitMs = [2_000, 15_000]

/** What a kind of job does. `goOn` turns false when the worker is to stop or has lost the job; false says that it stopped half way. */
export type JobWork = Readonly<{ run: (subjectId: string, goOn: () => boolean) => Promise<boolean>; failed: (subjectId: string, code: string, detail: ErrorDetail) => Promise<void> }>

const works: Partial<Record<JobKind, JobWork>> = {
  'read-sheaf': { run: readSheaf, failed: sheafFailed },
  'build-release': { run: buildRelease, failed: releaseFailed },
  // What was not swept away lies there until the next sweep.
  'prune-cuts': { run: pruneCuts, failed: async () => undefined },
}

/** Takes the next job and does it. False when there was none. A job that fails for a fault of ours is tried three times in all. */
export async function runNextJob(worker: string, stopping: () => boolean): Promise<boolean> {
  const job = await claimJob(db(), worker, leaseMs)
  if (!job) return false
  let mine = true
  const renewing = setInterval(() => {
    renewJob(db(), job.id, worker, leaseMs).then((still) => { mine = still }, (error: unknown) => log.warn({ err: error, job: job.id }, 'lease not renewed'))
  }, leaseMs / 3)
  try {
    const work = works[job.kind]
    if (!work) throw new AppError('not_found')
    if (job.attempts > mostClaims) throw new Error('this job never comes to an end')
    const whole = await work.run(job.subjectId, () => mine && !stopping())
    if (whole) await finishJob(db(), job.id, worker, null)
    else if (mine) await releaseJob(db(), job.id, worker)
  } catch (error) {
    if (mine) await afterFailure(job, worker, error)
  } finally {
    clearInterval(renewing)
  }
  return true
}

/** Expected trouble will not go away by itself; a fault of ours may (memory, a full disk). */
async function afterFailure(job: Job, worker: string, error: unknown): Promise<void> {
  const known = error instanceof AppError ? error : null
  log[known ? 'info' : 'error']({ err: error, job: job.id, kind: job.kind, attempt: job.attempts }, 'job failed')
  if (!known && job.attempts < mostAttempts) return postponeJob(db(), job.id, worker, waitMs[job.attempts - 1] ?? 60_000, 'failed')
  const code = known?.code ?? 'failed'
  await works[job.kind]?.failed(job.subjectId, code, known?.detail ?? {})
  await finishJob(db(), job.id, worker, code)
}

async function sheafFailed(sheafId: string, code: string, detail: ErrorDetail): Promise<void> {
  await transaction(async (trx) => {
    await endSheaf(trx, sheafId, { state: 'failed', problem: code, detail })
    await addAuditLine(trx, null, { act: 'sheaf.failed', objectKind: 'sheaf', objectId: sheafId, to: code })
  })
}

import { hostname } from 'node:os'
import { setTimeout as wait } from 'node:timers/promises'
import { putDb } from '@/db/knex'
import { log } from '@/lib/infra/log'
import { runNextJob } from '@/lib/tasks/run-next-job'

// The school's second process: reads sheaves and does whatever else takes long. A signal ends it between two leaves.
const worker = `${hostname()}-${process.pid}-${Date.now()}`
const pollMs = 500
const stop = new AbortController()
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => stop.abort())

log.info({ worker }, 'worker started')
while (!stop.signal.aborted) {
  const worked = await runNextJob(worker, () => stop.signal.aborted).catch((error: unknown) => {
    log.error({ err: error }, 'worker could not take a job')
    return false
  })
  if (!worked) await wait(pollMs, undefined, { signal: stop.signal }).catch(() => undefined)
}
await putDb(null)
log.info({ worker }, 'worker stopped')

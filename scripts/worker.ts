import { hostname } from 'node:os'
import { setTimeout as wait } from 'node:timers/promises'
import { putDb } from '@/db/knex'
import { log } from '@/lib/infra/log'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { sendMails } from '@/lib/tasks/send-mails'

// The school's second process: reads sheaves, does whatever else takes long, and sends the mails. A signal ends it between two leaves.
const worker = `${hostname()}-${process.pid}-${Date.now()}`
const pollMs = 500
const stop = new AbortController()
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => stop.abort())

log.info({ worker }, 'worker started')

/** Does `once` again and again; waits a little when there was nothing to do. */
async function loop(what: string, once: () => Promise<boolean>): Promise<void> {
  while (!stop.signal.aborted) {
    const worked = await once().catch((error: unknown) => {
      log.error({ err: error }, `${what} failed`)
      return false
    })
    if (!worked) await wait(pollMs, undefined, { signal: stop.signal }).catch(() => undefined)
  }
}

// Mails do not wait for a long sheaf.
await Promise.all([
  loop('job', () => runNextJob(worker, () => stop.signal.aborted)),
  loop('mail', async () => (await sendMails()).sent > 0),
])
await putDb(null)
log.info({ worker }, 'worker stopped')

import { hostname } from 'node:os'
import { setTimeout as wait } from 'node:timers/promises'
import { putDb, transaction } from '@/db/knex'
import { collectAtOnce } from '@/lib/infra/collect-at-once'
import { env } from '@/lib/infra/env'
import { log } from '@/lib/infra/log'
import { askToPrune, everyPaper } from '@/lib/tasks/prune-cuts'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { sendMails } from '@/lib/tasks/send-mails'
import { startFakeMailServer } from './start-fake-mail-server'

// The school's second process: reads sheaves, builds what is handed back, and sends mails. A signal ends it between two steps.
const worker = `${hostname()}-${process.pid}-${Date.now()}`
const pollMs = 500
const stop = new AbortController()
collectAtOnce()
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => stop.abort())

/** Does one thing over and over until the signal; when there was nothing to do it waits. A fault is logged and does not end the loop. */
async function loop(what: string, once: () => Promise<boolean>): Promise<void> {
  while (!stop.signal.aborted) {
    const worked = await once().catch((error: unknown) => {
      log.error({ err: error }, `worker: ${what} failed`)
      return false
    })
    if (!worked) await wait(pollMs, undefined, { signal: stop.signal }).catch(() => undefined)
  }
}

// Without a mail server of its own the school keeps its mails on this machine.
const kept = env.SHEAFMARK_SMTP_URL ? null : await startFakeMailServer()
log.info({ worker }, 'worker started')
await transaction((trx) => askToPrune(trx, everyPaper))
await Promise.all([
  loop('job', () => runNextJob(worker, () => stop.signal.aborted)),
  loop('mail', async () => (await sendMails()).sent > 0),
])
await kept?.close()
await putDb(null)
log.info({ worker }, 'worker stopped')

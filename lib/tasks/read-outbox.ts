import { listMailsNotSent, listMailsSent, type MailState } from '@/db/outbox-mails'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { env } from '@/lib/infra/env'
import { listReceived, type ReceivedMail } from '@/lib/infra/received-mails'
import { maySeeOutbox } from './may-see-outbox'

export type OutboxLine = Readonly<{ id: string; to: string; subject: string; state: MailState; attempts: number; sendAfter: number; sentAt: number | null; error: string | null }>
/** `received` are the mails that the fake server on this machine took; null when mails really leave. */
export type Outbox = Readonly<{ waiting: readonly OutboxLine[]; sent: readonly OutboxLine[]; received: readonly ReceivedMail[] | null }>

const shown = 100

/** What waits, what was given up, and what left. The words of a mail that really left are its reader's alone. */
export async function readOutbox(actor: Actor): Promise<Outbox> {
  if (!maySeeOutbox(actor)) throw new AppError('not_allowed')
  const local = env.SHEAFMARK_SMTP_URL === undefined
  const lines = async (list: typeof listMailsSent) => (await list(db(), shown)).map(({ id, to, subject, state, attempts, sendAfter, sentAt, error }) => ({ id, to, subject, state, attempts, sendAfter, sentAt, error }))
  return { waiting: await lines(listMailsNotSent), sent: local ? [] : await lines(listMailsSent), received: local ? await listReceived(shown) : null }
}

import { claimMail, markMail, type OutboxMail } from '@/db/outbox-mails'
import { db, transaction } from '@/db/knex'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { log } from '@/lib/infra/log'
import { openMailer, type Delivery, type Mailer } from '@/lib/infra/mailer'
import { withTokens } from './link-placeholder'

const minute = 60_000
/** Longer than the mailer waits for an answer. */
export const lease = 3 * minute
/** Waits between tries: soon at first, then for a mail server that is down over a weekend. */
const waits = [1, 5, 15, 60, 180, 360, 720, 1440, 1440].map((minutes) => minutes * minute)

/**
 * Sends every mail that is due and says how it went; call it again and again. A mail is claimed before it is sent: a sender
 * that dies in between leaves it to the next after the lease, under the same Message-ID, so that a reader's mailbox can
 * tell a doubled one.
 */
export async function sendMails(open: () => Mailer = openMailer): Promise<{ sent: number; later: number; failed: number }> {
  const count = { sent: 0, later: 0, failed: 0 }
  let mailer: Mailer | undefined
  try {
    for (let mail = await claimMail(db(), now(), lease); mail; mail = await claimMail(db(), now(), lease)) {
      mailer ??= open()
      const told = await mailer.send(asSent(mail))
      count[await store(mail, told)] += 1
      // Nobody answers: the others wait for the next call instead of each waiting in turn.
      if (!told.sent && told.why === 'later') break
    }
  } finally {
    mailer?.close()
  }
  return count
}

function asSent(mail: OutboxMail) {
  const messageId = `<${mail.id}@${new URL(env.url).hostname}>`
  return { to: mail.to, subject: mail.subject, text: withTokens(mail.text), html: withTokens(mail.html), messageId }
}

async function store(mail: OutboxMail, told: Delivery): Promise<'sent' | 'later' | 'failed'> {
  const wait = waits[mail.attempts - 1]
  const how = told.sent ? 'sent' : told.why === 'refused' || wait === undefined ? 'failed' : 'later'
  const state = how === 'later' ? 'waiting' : how
  await transaction((trx) => markMail(trx, mail, { state, at: now() + (how === 'later' ? wait! : 0), error: told.sent ? null : told.error }))
  if (!told.sent) log.warn({ mail: mail.id, attempt: mail.attempts, how, error: told.error }, 'mail not sent')
  return how
}

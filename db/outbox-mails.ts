import { newId } from '@/lib/core/ids'
import type { Db } from './knex'

export type NewMail = Readonly<{ onceKey: string; kind: string; to: string; subject: string; text: string; html: string }>

/** Puts a mail in the outbox in the transaction of what it tells; the same once-key never twice. */
export async function addMail(db: Db, mail: NewMail): Promise<void> {
  const at = Date.now()
  await db('outbox_mails')
    .insert({ id: newId(), once_key: mail.onceKey, kind: mail.kind, to_address: mail.to, subject: mail.subject, text: mail.text, html: mail.html, send_after: at, created_at: at })
    .onConflict('once_key').ignore()
}

export type MailState = 'waiting' | 'sending' | 'sent' | 'failed'
export type OutboxMail = Readonly<{
  id: string; kind: string; to: string; subject: string; text: string; html: string
  state: MailState; attempts: number; sendAfter: number; sentAt: number | null; error: string | null; createdAt: number
}>
type MailRow = {
  id: string; once_key: string; kind: string; to_address: string; subject: string; text: string; html: string; state: MailState
  attempts: number; send_after: number; lease_until: number | null; sent_at: number | null; error: string | null; created_at: number
}

const toMail = (row: MailRow): OutboxMail => ({
  id: row.id, kind: row.kind, to: row.to_address, subject: row.subject, text: row.text, html: row.html,
  state: row.state, attempts: row.attempts, sendAfter: row.send_after, sentAt: row.sent_at, error: row.error, createdAt: row.created_at,
})

/** Takes the next mail that is due, or one whose sender died, for `lease` milliseconds. One statement: two senders never take the same. */
export async function claimMail(db: Db, at: number, lease: number): Promise<OutboxMail | null> {
  const next = db<MailRow>('outbox_mails').select('id')
    .where((due) => due.where({ state: 'waiting' }).where('send_after', '<=', at))
    .orWhere((dead) => dead.where({ state: 'sending' }).where('lease_until', '<=', at))
    .orderBy(['send_after', 'created_at']).limit(1)
  const [row] = await db<MailRow>('outbox_mails').where('id', next).update({ state: 'sending', attempts: db.raw('attempts + 1'), lease_until: at + lease }).returning('*')
  return row ? toMail(row as MailRow) : null
}

/** `attempt` says whose turn it was: a sender whose lease ran out does not overwrite the next one's word. */
export async function markMail(db: Db, mail: Readonly<{ id: string; attempts: number }>, to: Readonly<{ state: 'sent' | 'failed' | 'waiting'; at: number; error: string | null }>): Promise<void> {
  await db<MailRow>('outbox_mails').where({ id: mail.id, attempts: mail.attempts, state: 'sending' }).update({
    state: to.state, lease_until: null, error: to.error, ...(to.state === 'sent' ? { sent_at: to.at } : to.state === 'waiting' ? { send_after: to.at } : {}),
  })
}

/** Mails not yet gone (waiting, being sent, given up), newest first. */
export async function listMailsNotSent(db: Db, limit: number): Promise<OutboxMail[]> {
  return (await db<MailRow>('outbox_mails').whereNot({ state: 'sent' }).orderBy('created_at', 'desc').limit(limit)).map(toMail)
}

/** The newest mails that left. */
export async function listMailsSent(db: Db, limit: number): Promise<OutboxMail[]> {
  return (await db<MailRow>('outbox_mails').where({ state: 'sent' }).orderBy('sent_at', 'desc').limit(limit)).map(toMail)
}

/** A given-up mail waits again. */
export async function retryMail(db: Db, id: string, at: number): Promise<boolean> {
  return (await db<MailRow>('outbox_mails').where({ id, state: 'failed' }).update({ state: 'waiting', attempts: 0, send_after: at, error: null })) > 0
}

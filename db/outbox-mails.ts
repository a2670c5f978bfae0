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

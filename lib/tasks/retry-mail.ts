import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { retryMail as retry } from '@/db/outbox-mails'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'

/** Lets a mail that was given up wait to be sent again. */
export async function retryMail(actor: Actor, mailId: string): Promise<void> {
  assertMaySchool(actor, 'outbox')
  await transaction(async (trx) => {
    if (!(await retry(trx, mailId, now()))) throw new AppError('not_found')
    await addAuditLine(trx, actor, { act: 'mail.retried', objectKind: 'mail', objectId: mailId })
  })
}

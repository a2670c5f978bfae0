import type { Db } from '@/db/knex'
import { addMail } from '@/db/outbox-mails'
import { listAddressed } from '@/db/returned-scripts'
import { plainMail } from '@/lib/core/plain-mail'
import { env } from '@/lib/infra/env'

/** Puts a mail down for every student of a release who has an address, in the transaction that hands it back. No mark, no grade, no family name. */
export async function mailReleased(trx: Db, releaseId: string, title: string): Promise<void> {
  for (const { id, givenName, email } of await listAddressed(trx, releaseId)) {
    const { text, html } = plainMail({
      greeting: `Dear ${givenName},`,
      lines: [`your test “${title}” has been marked and handed back. You can read every mark on your own pages.`],
      link: { says: 'Open your returned scripts', href: `${env.url}/my-scripts` },
      school: env.schoolName,
    })
    await addMail(trx, { onceKey: `returned/${id}`, kind: 'release', to: email, subject: `Handed back: ${title}`, text, html })
  }
}

import { addAuditLine } from '@/db/audit'
import type { Db } from '@/db/knex'
import { putLink, type LinkKind } from '@/db/one-time-links'
import { addMail } from '@/db/outbox-mails'
import type { User } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { plainMail } from '@/lib/core/plain-mail'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { hashOfToken, newCode, tokenOfLink } from '@/lib/infra/link-token'
import { linkPlaceholder } from './link-placeholder'

const days = 86_400_000
/** How long a link opens: an invitation waits for a holiday, a reset for a morning, a printed code for the next lessons. */
export const linkLasts = { invitation: 7 * days, reset: days / 4, code: 28 * days }

/**
 * Puts a one-time link and its mail, in the transaction of what it belongs to. `actor` null: the person asked for it
 * themselves. Throws no_address for an account without e-mail.
 */
export async function issueLink(trx: Db, actor: Actor | null, user: User, kind: LinkKind): Promise<void> {
  if (user.email === null) throw new AppError('no_address')
  const id = newId()
  await putLink(trx, { id, userId: user.id, kind, tokenHash: hashOfToken(tokenOfLink(id)), expiresAt: now() + linkLasts[kind] }, now())
  await addMail(trx, { onceKey: `link ${id}`, kind, to: user.email, ...mailOf(kind, user.givenName, id) })
  await addAuditLine(trx, actor, { act: `link.${kind}`, objectKind: 'user', objectId: user.id })
}

/** A code to print instead of a mail; it is given back once and only its hash stays. */
export async function issueCode(trx: Db, actor: Actor, user: User): Promise<string> {
  const code = newCode()
  await putLink(trx, { id: newId(), userId: user.id, kind: 'invitation', tokenHash: hashOfToken(code), expiresAt: now() + linkLasts.code }, now())
  await addAuditLine(trx, actor, { act: 'link.code', objectKind: 'user', objectId: user.id })
  return code
}

function mailOf(kind: LinkKind, givenName: string, linkId: string): { subject: string; text: string; html: string } {
  const invited = kind === 'invitation'
  return {
    subject: invited ? `Your account at ${env.schoolName}` : 'A new password for Sheafmark',
    ...plainMail({
      greeting: `Dear ${givenName},`,
      lines: [invited ? 'There is an account for you on Sheafmark, the school’s marking station. Choose a password for it.' : 'Someone, we hope you, asked for a new password.'],
      link: { says: 'Choose your password', href: `${env.url}/new-password/${linkPlaceholder(linkId)}` },
      after: [invited ? 'The link works once, for 7 days.' : 'The link works once, for 6 hours. If you did not ask, leave it: nothing changes.'],
      school: env.schoolName,
    }),
  }
}

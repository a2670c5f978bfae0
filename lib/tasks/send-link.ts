import { transaction } from '@/db/knex'
import { getUser } from '@/db/users'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { issueCode, issueLink } from './issue-link'

/** Sends a person a link to choose a password; an account without e-mail gets a code instead, given back once. */
export async function sendLink(actor: Actor, userId: string): Promise<{ code: string | null }> {
  assertMaySchool(actor, 'people')
  return transaction(async (trx) => {
    const user = await getUser(trx, userId)
    if (!user) throw new AppError('not_found')
    if (user.disabledAt !== null) throw new AppError('not_allowed')
    if (user.email === null) return { code: await issueCode(trx, actor, user) }
    await issueLink(trx, actor, user, user.passwordHash === null ? 'invitation' : 'reset')
    return { code: null }
  })
}

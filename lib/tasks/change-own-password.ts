import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { db, transaction } from '@/db/knex'
import { closeLinks } from '@/db/one-time-links'
import { addSignInAttempt, countFailures } from '@/db/sign-in-attempts'
import { endSessions, getUser, setPassword } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { hashPassword, passwordFits } from '@/lib/infra/passwords'
import { failuresAllowed } from './check-sign-in'
import { assertPassword } from './set-password-by-link'

export const OwnPassword = z.object({ old: z.string().max(400), password: z.string().max(400) })

/** One's own password, with the old one asked for. Ends every session; gives the account back to sign in with again. */
export async function changeOwnPassword(actor: Actor, input: z.output<typeof OwnPassword>): Promise<{ account: string }> {
  assertPassword(input.password)
  const user = await getUser(db(), actor.userId)
  if (!user) throw new AppError('signed_out')
  await assertOld(user.id, user.passwordHash, input.old)
  const passwordHash = await hashPassword(input.password)
  await transaction(async (trx) => {
    await setPassword(trx, user.id, passwordHash)
    await endSessions(trx, user.id)
    await closeLinks(trx, user.id, now())
    await addAuditLine(trx, actor, { act: 'password.changed', objectKind: 'user', objectId: user.id })
  })
  return { account: user.email ?? user.userName! }
}

/** An open screen must not become a place to guess at the password: as many tries as at the door. */
async function assertOld(userId: string, passwordHash: string | null, old: string): Promise<void> {
  const tries = { account: `own ${userId}`, address: 'own password', at: now() }
  const failed = await countFailures(db(), tries.account, tries.address, tries.at - 15 * 60_000)
  if (failed.account >= failuresAllowed.account) throw new AppError('too_many_attempts', { minutes: 15 })
  const ok = await passwordFits(passwordHash, old)
  await transaction((trx) => addSignInAttempt(trx, { ...tries, ok }))
  if (!ok) throw new AppError('password_wrong')
}

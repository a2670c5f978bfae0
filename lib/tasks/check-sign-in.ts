import { AppError } from '@/lib/core/errors'
import { addSignInAttempt, countFailures } from '@/db/sign-in-attempts'
import { db, transaction } from '@/db/knex'
import { findUserByAccount } from '@/db/users'
import { now } from '@/lib/infra/clock'
import { passwordFits } from '@/lib/infra/passwords'

const window = 15 * 60_000
/** An account is slowed down first; an address much later, since a whole class shares one. */
export const failuresAllowed = { account: 8, address: 240 }

export type SignInClaims = Readonly<{ userId: string; sessionNumber: number }>

/**
 * Checks e-mail or user name and password. Null when they do not fit (or the person is disabled: nobody learns which);
 * throws too_many_attempts when the account or the address has to wait.
 */
export async function checkSignIn(input: { account: string; password: string; address: string }): Promise<SignInClaims | null> {
  const account = input.account.trim().toLowerCase()
  const at = now()
  const failed = await countFailures(db(), account, input.address, at - window)
  if (failed.account >= failuresAllowed.account || failed.address >= failuresAllowed.address) throw new AppError('too_many_attempts', { minutes: 15 })
  const user = await findUserByAccount(db(), account)
  const fits = (await passwordFits(user?.passwordHash ?? null, input.password)) && user !== null && user.disabledAt === null
  await transaction((trx) => addSignInAttempt(trx, { account, address: input.address, ok: fits, at }))
  return fits ? { userId: user.id, sessionNumber: user.sessionNumber } : null
}

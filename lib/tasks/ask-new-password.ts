import { z } from 'zod'
import { transaction } from '@/db/knex'
import { addSignInAttempt, countFailures } from '@/db/sign-in-attempts'
import { findUserByAccount } from '@/db/users'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { issueLink } from './issue-link'

/** Links asked for in an hour, by account and by address (a whole class shares one). */
export const asksAllowed = { account: 3, address: 90 }
export const AskForm = z.object({ account: z.string().trim().toLowerCase().min(1, 'is missing').max(200) })

/** Mails a link when there is such an account with an address. The answer is the same when there is none. */
export async function askNewPassword(input: z.output<typeof AskForm>, address: string): Promise<void> {
  await transaction(async (trx) => {
    const asked = { account: `link ${input.account}`, address: `link ${address}`, at: now() }
    const count = await countFailures(trx, asked.account, asked.address, asked.at - 3_600_000)
    if (count.account >= asksAllowed.account || count.address >= asksAllowed.address) throw new AppError('too_many_attempts', { minutes: 60 })
    await addSignInAttempt(trx, { ...asked, ok: false })
    const user = await findUserByAccount(trx, input.account)
    if (!user || user.disabledAt !== null || user.email === null) return
    await issueLink(trx, null, user, user.passwordHash === null ? 'invitation' : 'reset')
  })
}

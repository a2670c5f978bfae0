import { createHash, timingSafeEqual } from 'node:crypto'
import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { db, transaction } from '@/db/knex'
import { addSignInAttempt, countFailures } from '@/db/sign-in-attempts'
import { addUser, countUsers } from '@/db/users'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { now } from '@/lib/infra/clock'
import { hashPassword } from '@/lib/infra/passwords'
import { secrets } from '@/lib/infra/secrets'
import { assertPassword } from './set-password-by-link'

export const FirstAdminForm = z.object({
  code: z.string().max(80),
  givenName: z.string().trim().min(1, 'Write this down').max(80),
  familyName: z.string().trim().min(1, 'Write this down').max(80),
  email: z.string().trim().toLowerCase().pipe(z.email('This is not an e-mail address')),
  password: z.string().max(400),
})

/** The first account of an empty school, by whoever holds the set-up code. not_found once there is any account. */
export async function makeFirstAdmin(input: z.output<typeof FirstAdminForm>, address: string): Promise<{ account: string }> {
  if ((await countUsers(db())) > 0) throw new AppError('not_found')
  await assertCode(input.code, address)
  assertPassword(input.password)
  const passwordHash = await hashPassword(input.password)
  const userId = newId()
  await transaction(async (trx) => {
    if ((await countUsers(trx)) > 0) throw new AppError('not_found')
    await addUser(trx, { id: userId, email: input.email, userName: null, givenName: input.givenName, familyName: input.familyName, passwordHash, roles: ['admin'] })
    await addAuditLine(trx, { userId }, { act: 'person.first_admin', objectKind: 'user', objectId: userId })
  })
  return { account: input.email }
}

async function assertCode(code: string, address: string): Promise<void> {
  const tries = { account: 'set-up code', address: `set-up ${address}`, at: now() }
  const failed = await countFailures(db(), tries.account, tries.address, tries.at - 15 * 60_000)
  if (failed.account >= 20) throw new AppError('too_many_attempts', { minutes: 15 })
  const digest = (text: string) => createHash('sha256').update(text.replace(/[\s-]/g, '').toLowerCase()).digest()
  if (timingSafeEqual(digest(code), digest(secrets().setUpCode))) return
  await transaction((trx) => addSignInAttempt(trx, { ...tries, ok: false }))
  throw new AppError('set_up_code_wrong')
}

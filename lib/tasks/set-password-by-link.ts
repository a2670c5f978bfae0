import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { closeLinks, findOpenLink } from '@/db/one-time-links'
import { endSessions, getUser, setPassword } from '@/db/users'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { hashOfToken } from '@/lib/infra/link-token'
import { hashPassword } from '@/lib/infra/passwords'

const leastPassword = 10
export const LinkPassword = z.object({ token: z.string().min(1).max(200), password: z.string().max(400) })

/** Throws password_weak under ten characters. Length alone is asked for: rules on signs make people write passwords down. */
export function assertPassword(password: string): void {
  if ([...password].length < leastPassword || password.trim() === '') throw new AppError('password_weak')
}

/** Sets a password by a one-time link, uses the link up and ends every session. Signs nobody in. Throws link_used. */
export async function setPasswordByLink(input: z.output<typeof LinkPassword>): Promise<void> {
  assertPassword(input.password)
  const passwordHash = await hashPassword(input.password)
  await transaction(async (trx) => {
    const link = await findOpenLink(trx, hashOfToken(input.token), now())
    const user = link && (await getUser(trx, link.userId))
    if (!user || user.disabledAt !== null) throw new AppError('link_used')
    await closeLinks(trx, user.id, now())
    await setPassword(trx, user.id, passwordHash)
    await endSessions(trx, user.id)
    await addAuditLine(trx, { userId: user.id }, { act: 'password.by_link', objectKind: 'user', objectId: user.id })
  })
}

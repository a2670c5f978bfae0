import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { closeLinks } from '@/db/one-time-links'
import { endSessions, getUser, setDisabled } from '@/db/users'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { now } from '@/lib/infra/clock'
import { assertNotLastAdmin } from './assert-not-last-admin'

/** Shuts an account at once: sessions end, open links stop working. What the person did stays theirs. */
export async function disablePerson(actor: Actor, userId: string): Promise<void> {
  assertMaySchool(actor, 'people')
  await transaction(async (trx) => {
    const user = await getUser(trx, userId)
    if (!user) throw new AppError('not_found')
    if (user.disabledAt !== null) return
    await assertNotLastAdmin(trx, user)
    await setDisabled(trx, userId, now())
    await endSessions(trx, userId)
    await closeLinks(trx, userId, now())
    await addAuditLine(trx, actor, { act: 'person.disabled', objectKind: 'user', objectId: userId })
  })
}

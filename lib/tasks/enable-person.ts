import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { getUser, setDisabled } from '@/db/users'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'

/** Opens a shut account again, with the password and roles it had. */
export async function enablePerson(actor: Actor, userId: string): Promise<void> {
  assertMaySchool(actor, 'people')
  await transaction(async (trx) => {
    const user = await getUser(trx, userId)
    if (!user) throw new AppError('not_found')
    if (user.disabledAt === null) return
    await setDisabled(trx, userId, null)
    await addAuditLine(trx, actor, { act: 'person.enabled', objectKind: 'user', objectId: userId })
  })
}

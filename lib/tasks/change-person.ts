import { addAuditLine } from '@/db/audit'
import { transaction } from '@/db/knex'
import { getUser, setNames, setRoles, type User } from '@/db/users'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { assertFree, type PersonForm } from './add-person'
import { assertNotLastAdmin } from './assert-not-last-admin'

/** Other names, e-mail or roles for a person of the staff. A student's account follows the school's list instead. */
export async function changePerson(actor: Actor, userId: string, to: PersonForm): Promise<void> {
  assertMaySchool(actor, 'people')
  await transaction(async (trx) => {
    const user = await getUser(trx, userId)
    if (!user || user.roles.includes('student')) throw new AppError('not_found')
    await assertFree(trx, to, userId)
    if (!to.roles.includes('admin')) await assertNotLastAdmin(trx, user)
    await setNames(trx, userId, to)
    await setRoles(trx, userId, to.roles)
    for (const line of changes(user, to)) await addAuditLine(trx, actor, { ...line, objectKind: 'user', objectId: userId })
  })
}

/** Roles are values; that a name or an address changed is told without saying to what. */
function changes(from: User, to: PersonForm): { act: string; from?: string; to?: string }[] {
  const roles = { from: [...from.roles].sort().join(' '), to: [...to.roles].sort().join(' ') }
  const named = from.givenName !== to.givenName || from.familyName !== to.familyName || from.email !== to.email || from.userName !== to.userName
  return [...(roles.from === roles.to ? [] : [{ act: 'person.roles', ...roles }]), ...(named ? [{ act: 'person.renamed' }] : [])]
}

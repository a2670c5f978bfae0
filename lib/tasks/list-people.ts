import { db } from '@/db/knex'
import { listUsers } from '@/db/users'
import { assertMaySchool, type Actor, type Role } from '@/lib/core/actor'
import { staffRoles } from './add-person'

export type PersonLine = Readonly<{
  userId: string; givenName: string; familyName: string; email: string | null; userName: string | null
  roles: readonly Role[]; disabled: boolean; hasPassword: boolean
}>

/** The accounts of the staff, or those of the students. */
export async function listPeople(actor: Actor, who: 'staff' | 'students'): Promise<PersonLine[]> {
  assertMaySchool(actor, 'people')
  const users = await listUsers(db(), who === 'students' ? ['student'] : staffRoles)
  return users.map(({ id, givenName, familyName, email, userName, roles, disabledAt, passwordHash }) => ({
    userId: id, givenName, familyName, email, userName, roles, disabled: disabledAt !== null, hasPassword: passwordHash !== null,
  }))
}

import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { transaction, type Db } from '@/db/knex'
import { addUser, findUserByAccount, getUser } from '@/db/users'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { issueCode, issueLink } from './issue-link'

const name = z.string().trim().min(1, 'Write this down').max(80, 'Use at most 80 letters')
export const staffRoles = ['teacher', 'marker', 'moderator', 'admin'] as const

/** What is written down for a person of the staff. One of e-mail and user name is enough. */
export const PersonForm = z.object({
  givenName: name,
  familyName: name,
  email: z.union([z.literal('').transform(() => null), z.string().trim().toLowerCase().pipe(z.email('This is not an e-mail address')), z.null()]),
  userName: z.union([z.literal('').transform(() => null), z.string().trim().toLowerCase().regex(/^[a-z0-9][a-z0-9._-]{1,38}$/, 'Use 2 to 39 letters, figures, dots or dashes'), z.null()]),
  roles: z.array(z.enum(staffRoles)).min(1, 'Choose at least one role'),
}).refine((person) => person.email !== null || person.userName !== null, { path: ['email'], message: 'Write this down, or a user name' })
export type PersonForm = z.output<typeof PersonForm>

/** A new account of the staff. With an e-mail address an invitation goes out; without one the code to hand over comes back, once. */
export async function addPerson(actor: Actor, person: PersonForm): Promise<{ userId: string; code: string | null }> {
  assertMaySchool(actor, 'people')
  return transaction(async (trx) => {
    await assertFree(trx, person, null)
    const userId = newId()
    await addUser(trx, { ...person, id: userId, passwordHash: null })
    await addAuditLine(trx, actor, { act: 'person.added', objectKind: 'user', objectId: userId, to: person.roles.join(' ') })
    const user = (await getUser(trx, userId))!
    if (user.email === null) return { userId, code: await issueCode(trx, actor, user) }
    await issueLink(trx, actor, user, 'invitation')
    return { userId, code: null }
  })
}

/** Throws email_taken or user_name_taken when another account is signed in to by the same words. */
export async function assertFree(db: Db, names: Readonly<{ email: string | null; userName: string | null }>, self: string | null): Promise<void> {
  for (const [account, code] of [[names.email, 'email_taken'], [names.userName, 'user_name_taken']] as const) {
    const holder = account === null ? null : await findUserByAccount(db, account)
    if (holder && holder.id !== self) throw new AppError(code)
  }
}

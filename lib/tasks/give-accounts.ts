import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { transaction, type Db } from '@/db/knex'
import { listStudentsOfClass, setStudentUser, type Student } from '@/db/students'
import { addUser, findUserByAccount, getUser, type User } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { freeUserName } from './follow-list'
import { gateClass } from './gate-class'
import { issueCode, issueLink } from './issue-link'

export const AccountsForm = z.object({
  studentIds: z.array(z.uuid()).min(1).max(500),
  /** `mail`: to whoever has an address of their own, a slip for the rest; `slips`: a slip for everyone. */
  by: z.enum(['mail', 'slips']),
})
export type Slip = Readonly<{ name: string; userName: string; code: string }>
export type AccountsGiven = Readonly<{ mailed: number; slips: readonly Slip[] }>

/**
 * Gives students of a class an account, or those who have one a new way in. The codes of the slips come back this once;
 * only their hashes stay. A disabled account is passed over. Throws password_there when a slip would open an account that has a password to whoever holds the slip: only an
 * admin may print that one.
 */
export async function giveAccounts(actor: Actor, classId: string, input: z.output<typeof AccountsForm>): Promise<AccountsGiven> {
  return transaction(async (trx) => {
    await gateClass(trx, actor, classId)
    const students = await listStudentsOfClass(trx, classId)
    const chosen = students.filter(({ id }) => input.studentIds.includes(id))
    if (chosen.length !== new Set(input.studentIds).size) throw new AppError('not_found')
    let mailed = 0
    const slips: Slip[] = []
    for (const student of chosen) {
      const user = await accountOf(trx, actor, student)
      if (user.disabledAt !== null) continue
      if (input.by === 'mail' && user.email !== null) {
        await issueLink(trx, actor, user, user.passwordHash === null ? 'invitation' : 'reset')
        mailed += 1
      } else {
        if (user.passwordHash !== null && !actor.roles.includes('admin')) throw new AppError('password_there')
        slips.push({ name: `${student.givenName} ${student.familyName}`, userName: user.userName ?? user.email!, code: await issueCode(trx, actor, user) })
      }
    }
    return { mailed, slips }
  })
}

/** The student's account, made where there is none. An address that another account has already stays with that one. */
async function accountOf(trx: Db, actor: Actor, student: Student): Promise<User> {
  const existing = student.userId === null ? null : await getUser(trx, student.userId)
  // An account that can do more than read its own script is not a teacher's to open.
  if (existing?.roles.some((role) => role !== 'student')) throw new AppError('not_allowed')
  if (existing) return existing
  const email = student.email !== null && (await findUserByAccount(trx, student.email)) === null ? student.email : null
  const id = newId()
  const userName = await freeUserName(trx, student.candidateNumber)
  await addUser(trx, { id, email, userName, givenName: student.givenName, familyName: student.familyName, passwordHash: null, roles: ['student'] })
  await setStudentUser(trx, student.id, id)
  await addAuditLine(trx, actor, { act: 'account.given', objectKind: 'user', objectId: id, to: student.id })
  return (await getUser(trx, id))!
}

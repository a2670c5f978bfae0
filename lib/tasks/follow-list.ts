import type { Db } from '@/db/knex'
import { getStudent } from '@/db/students'
import type { Actor } from '@/lib/core/actor'
import { findUserByAccount, getUser, setNames } from '@/db/users'

/**
 * A student's account bears what the list says. An address another account signs in with stays the other's, and the address of an account with a password changes by an admin's
 * list alone: whoever reads its mail can open it.
 */
export async function followList(trx: Db, actor: Actor, studentId: string): Promise<void> {
  const student = await getStudent(trx, studentId)
  const user = student?.userId ? await getUser(trx, student.userId) : null
  if (!student || !user || user.roles.some((role) => role !== 'student')) return
  const holder = student.email === null ? null : await findUserByAccount(trx, student.email)
  const free = holder === null || holder.id === user.id
  const kept = user.passwordHash !== null && !actor.roles.includes('admin')
  const email = kept ? user.email : free ? student.email : null
  const userName = user.userName ?? (await freeUserName(trx, student.candidateNumber))
  await setNames(trx, user.id, { givenName: student.givenName, familyName: student.familyName, email, userName })
}

/** The candidate number, or with a figure behind it where someone signs in by that already. */
export async function freeUserName(db: Db, candidateNumber: string): Promise<string> {
  const base = candidateNumber.toLowerCase()
  for (let n = 1; ; n++) {
    const name = n === 1 ? base : `${base}.${n}`
    if ((await findUserByAccount(db, name)) === null) return name
  }
}

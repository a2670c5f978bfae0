import { addAuditLine } from '@/db/audit'
import { listTeachers, setTeachers } from '@/db/classes'
import { transaction } from '@/db/knex'
import { listUsers } from '@/db/users'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { gateClass } from './gate-class'

/** Who teaches a class. Only teachers; a teacher may hand it on but not leave it to nobody (an admin may). */
export async function setClassTeachers(actor: Actor, classId: string, userIds: readonly string[]): Promise<void> {
  await transaction(async (trx) => {
    await gateClass(trx, actor, classId)
    const teachers = new Set((await listUsers(trx, ['teacher'])).map(({ id }) => id))
    const chosen = [...new Set(userIds)]
    if (chosen.some((id) => !teachers.has(id))) throw new AppError('not_found')
    if (chosen.length === 0 && !actor.roles.includes('admin')) throw new AppError('bad_input', { lines: [{ path: 'teachers', says: 'need at least one name' }] })
    const before = (await listTeachers(trx, [classId])).map(({ userId }) => userId)
    await setTeachers(trx, classId, chosen)
    await addAuditLine(trx, actor, { act: 'class.teachers', objectKind: 'class', objectId: classId, from: before.sort().join(' '), to: chosen.sort().join(' ') })
  })
}

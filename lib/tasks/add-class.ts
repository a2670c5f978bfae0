import { z } from 'zod'
import { addAuditLine } from '@/db/audit'
import { addClassRow, findClassByName, setTeachers } from '@/db/classes'
import { transaction } from '@/db/knex'
import { assertMaySchool, type Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { now } from '@/lib/infra/clock'

export const ClassName = z.string().trim().min(1, 'Write a name').max(40, 'Use at most 40 letters')

/** A new class; whoever makes it as a teacher teaches it. Throws already_there for a name that is taken. */
export async function addClass(actor: Actor, name: string): Promise<{ classId: string }> {
  assertMaySchool(actor, 'classes')
  return transaction(async (trx) => {
    if (await findClassByName(trx, name)) throw new AppError('already_there')
    const classId = newId()
    await addClassRow(trx, { id: classId, name }, now())
    if (actor.roles.includes('teacher')) await setTeachers(trx, classId, [actor.userId])
    await addAuditLine(trx, actor, { act: 'class.added', objectKind: 'class', objectId: classId })
    return { classId }
  })
}

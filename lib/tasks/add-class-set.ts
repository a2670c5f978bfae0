import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { addAuditLine } from '@/db/audit'
import { addClassSet as storeClassSet, findClassSet, getClassSet } from '@/db/class-sets'
import { isTeacherOf } from '@/db/classes'
import { transaction } from '@/db/knex'
import { gatePaper } from './gate-paper'

export type AddClassSet = Readonly<{ paperId: string; classId: string; satOn: string; /** A class set of the same paper that this one re-sits. */ resitOf: string | null }>

/** A class that sits the paper on a date, with its list as it stands now. The same class and date twice is one class set. */
export async function addClassSet(actor: Actor, { paperId, classId, satOn, resitOf }: AddClassSet): Promise<{ classSetId: string }> {
  return transaction(async (trx) => {
    await gatePaper(trx, actor, 'change', paperId)
    if (!(await isTeacherOf(trx, actor.userId, classId))) throw new AppError('not_allowed')
    if (resitOf !== null && (await getClassSet(trx, resitOf))?.paperId !== paperId) throw new AppError('not_found')
    const there = await findClassSet(trx, paperId, classId, satOn)
    if (there) return { classSetId: there.id }
    const id = newId()
    await storeClassSet(trx, { id, paperId, classId, satOn, resitOf })
    await addAuditLine(trx, actor, { act: 'class-set.added', objectKind: 'class_set', objectId: id, paperId })
    return { classSetId: id }
  })
}

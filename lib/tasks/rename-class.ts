import { addAuditLine } from '@/db/audit'
import { findClassByName, setClassName } from '@/db/classes'
import { transaction } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { gateClass } from './gate-class'

/** Another name for a class. Throws already_there when another class has it. */
export async function renameClass(actor: Actor, classId: string, name: string): Promise<void> {
  await transaction(async (trx) => {
    const found = await gateClass(trx, actor, classId)
    if (found.name === name) return
    if (await findClassByName(trx, name)) throw new AppError('already_there')
    await setClassName(trx, classId, name)
    await addAuditLine(trx, actor, { act: 'class.renamed', objectKind: 'class', objectId: classId, from: found.name, to: name })
  })
}

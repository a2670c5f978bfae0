import type { Actor } from '@/lib/core/actor'
import { addAuditLine } from '@/db/audit'
import { copyClassList } from '@/db/class-sets'
import { transaction } from '@/db/knex'
import { gateClassSet } from './gate-class-set'

/** Adds students who joined the class since; nobody on the list as it stood is changed or lost. */
export async function renewClassSet(actor: Actor, { classSetId }: { classSetId: string }): Promise<{ added: number }> {
  return transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const added = await copyClassList(trx, classSetId)
    if (added > 0) await addAuditLine(trx, actor, { act: 'class-set.renewed', objectKind: 'class_set', objectId: classSetId, paperId: set.paperId, from: set.students, to: set.students + added })
    return { added }
  })
}

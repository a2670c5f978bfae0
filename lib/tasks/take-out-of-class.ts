import { addAuditLine } from '@/db/audit'
import { takeOutOfClass as takeOut } from '@/db/classes'
import { transaction } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { gateClass } from './gate-class'

/** Takes a student off a class's list. The student stays on the school's, and in every script already written. */
export async function takeOutOfClass(actor: Actor, classId: string, studentId: string): Promise<void> {
  await transaction(async (trx) => {
    await gateClass(trx, actor, classId)
    if (await takeOut(trx, classId, studentId)) await addAuditLine(trx, actor, { act: 'class.left', objectKind: 'student', objectId: studentId, from: classId })
  })
}

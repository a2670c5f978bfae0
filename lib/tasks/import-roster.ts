import { addAuditLine } from '@/db/audit'
import { putInClass } from '@/db/classes'
import { transaction, type Db } from '@/db/knex'
import { addStudent, setStudentNames } from '@/db/students'
import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import { now } from '@/lib/infra/clock'
import type { RosterStep } from '@/lib/setting/plan-roster'
import { planFor } from './check-roster'
import { followList } from './follow-list'
import { gateClass } from './gate-class'

export type RosterCounts = Readonly<Record<RosterStep['does'] | 'leftAlone', number>>

/**
 * Brings a class list in: new students are added, known ones (by candidate number) updated, nobody doubled or taken out.
 * Throws roster_invalid with the faulty lines, and then nothing is imported.
 */
export async function importRoster(actor: Actor, classId: string, bytes: Uint8Array): Promise<RosterCounts> {
  return transaction(async (trx) => {
    await gateClass(trx, actor, classId)
    const { steps, faults, leftAlone } = await planFor(trx, actor, classId, bytes)
    if (faults.length > 0) throw new AppError('roster_invalid', { lines: faults })
    for (const step of steps) await carryOut(trx, actor, classId, step)
    const count = (does: RosterStep['does']) => steps.filter((step) => step.does === does).length
    const counts = { new: count('new'), changed: count('changed'), joins: count('joins'), unchanged: count('unchanged'), leftAlone }
    await addAuditLine(trx, actor, { act: 'roster.imported', objectKind: 'class', objectId: classId, to: `new ${counts.new}, changed ${counts.changed}, joins ${counts.joins}, unchanged ${counts.unchanged}` })
    return counts
  })
}

async function carryOut(trx: Db, actor: Actor, classId: string, step: RosterStep): Promise<void> {
  const studentId = step.studentId ?? newId()
  if (step.studentId === null) await addStudent(trx, { ...step, id: studentId }, now())
  if (step.does === 'changed') {
    await setStudentNames(trx, studentId, step)
    await followList(trx, actor, studentId)
  }
  await putInClass(trx, classId, studentId)
}

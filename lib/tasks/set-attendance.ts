import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { addAuditLine } from '@/db/audit'
import { listClassSetStudents, setAttendance as storeAttendance, type Attendance } from '@/db/class-set-students'
import { transaction } from '@/db/knex'
import { gateClassSet } from './gate-class-set'

export type SetAttendance = Readonly<{ classSetId: string; studentId: string; attendance: Attendance }>

/** Whether a student of a class set is expected to have a script, was absent, or is excused. */
export async function setAttendance(actor: Actor, { classSetId, studentId, attendance }: SetAttendance): Promise<void> {
  await transaction(async (trx) => {
    const set = await gateClassSet(trx, actor, 'change', classSetId)
    const before = (await listClassSetStudents(trx, [classSetId])).find((student) => student.studentId === studentId)?.attendance
    if (!before) throw new AppError('not_found')
    if (before === attendance) return
    await storeAttendance(trx, classSetId, studentId, attendance)
    await addAuditLine(trx, actor, { act: 'attendance.set', objectKind: 'class_set_student', objectId: `${classSetId}/${studentId}`, paperId: set.paperId, from: before, to: attendance })
  })
}

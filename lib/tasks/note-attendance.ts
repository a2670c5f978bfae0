import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { paperOfClassSet, setAttendance, type Attendance } from '@/db/class-set-students'
import { db } from '@/db/knex'
import { findScriptOfStudent } from '@/db/scripts'
import { assertListed } from './script-for'
import { decideSorting } from './sorting-record'

/** Notes that a student without a script was absent, excused, or is still expected. Throws out_of_date when a script bears the name. */
export async function noteAttendance(actor: Actor, { classSetId, studentId, attendance }: { classSetId: string; studentId: string; attendance: Attendance }): Promise<void> {
  const paperId = await paperOfClassSet(db(), classSetId)
  if (!paperId) throw new AppError('not_found')
  await decideSorting(actor, paperId, 'student.attendance', { kind: 'student', id: studentId, to: attendance }, async (trx, touch) => {
    await assertListed(trx, paperId, classSetId, studentId)
    if (attendance !== 'expected' && (await findScriptOfStudent(trx, classSetId, studentId))) throw new AppError('out_of_date')
    await touch.student(classSetId, studentId)
    await setAttendance(trx, classSetId, studentId, attendance)
  })
}

import type { Actor } from '@/lib/core/actor'
import { AppError } from '@/lib/core/errors'
import { newId } from '@/lib/core/ids'
import type { PlaceTarget } from '@/lib/core/sorting'
import { now } from '@/lib/infra/clock'
import { getAttendance, paperOfClassSet, setAttendance } from '@/db/class-set-students'
import type { Db } from '@/db/knex'
import { addScript, findScriptOfStudent, getScript, nextScriptPosition } from '@/db/scripts'
import type { Touch } from './sorting-record'

/**
 * The script a sheet is put into. A student without one gets a new script of that name: a person said so. Who hands a sheet in was
 * not absent. Throws not_found for what is not of this paper.
 */
export async function scriptFor(trx: Db, touch: Touch, actor: Actor, paperId: string, target: PlaceTarget): Promise<string> {
  if ('scriptId' in target) {
    if ((await getScript(trx, target.scriptId))?.paperId !== paperId) throw new AppError('not_found')
    return target.scriptId
  }
  const { classSetId, studentId } = target
  await assertListed(trx, paperId, classSetId, studentId)
  const named = await findScriptOfStudent(trx, classSetId, studentId)
  if (named) return named.id
  const id = newId()
  await touch.script(id)
  await markPresent(trx, touch, classSetId, studentId)
  await addScript(trx, { id, classSetId, position: await nextScriptPosition(trx, paperId), studentId, suggestedStudentId: null, suggestionReason: null, suggestionCertainty: null, confirmedBy: actor.userId, confirmedAt: now() })
  return id
}

/** Throws not_found unless the student is on the list of a class set of this paper. */
export async function assertListed(trx: Db, paperId: string, classSetId: string, studentId: string): Promise<void> {
  if ((await paperOfClassSet(trx, classSetId)) !== paperId || (await getAttendance(trx, classSetId, studentId)) === null) throw new AppError('not_found')
}

/** A student whose script is here was not absent. */
export async function markPresent(trx: Db, touch: Touch, classSetId: string, studentId: string): Promise<void> {
  if ((await getAttendance(trx, classSetId, studentId)) === 'expected') return
  await touch.student(classSetId, studentId)
  await setAttendance(trx, classSetId, studentId, 'expected')
}

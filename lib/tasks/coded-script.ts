import { newId } from '@/lib/core/ids'
import { now } from '@/lib/infra/clock'
import { getAttendance, setAttendance } from '@/db/class-set-students'
import type { Db } from '@/db/knex'
import { getSpareScript, setSpareScript } from '@/db/print-runs'
import { addScript, findScriptOfStudent, nextScriptPosition } from '@/db/scripts'
import { whoseIs } from './printed-codes-of'

/**
 * The script that pages with a printed code go into. It bears the name that was printed on them, and who hands a sheet in was not absent; spare
 * sheets make a script without a name. Pages that come later join it. Null when the student is on the list no more.
 */
export async function codedScript(trx: Db, paperId: string, key: string): Promise<string | null> {
  const whose = whoseIs(key)
  if ('printedScriptId' in whose) return spareScript(trx, paperId, whose.printedScriptId)
  const { classSetId, studentId } = whose
  const attendance = await getAttendance(trx, classSetId, studentId)
  if (attendance === null) return null
  const there = await findScriptOfStudent(trx, classSetId, studentId)
  if (there) return there.id
  if (attendance !== 'expected') await setAttendance(trx, classSetId, studentId, 'expected')
  return started(trx, paperId, classSetId, studentId)
}

async function spareScript(trx: Db, paperId: string, printedScriptId: string): Promise<string | null> {
  const spare = await getSpareScript(trx, paperId, printedScriptId)
  if (!spare) return null
  if (spare.scriptId) return spare.scriptId
  const id = await started(trx, paperId, spare.classSetId, null)
  await setSpareScript(trx, printedScriptId, id)
  return id
}

async function started(trx: Db, paperId: string, classSetId: string, studentId: string | null): Promise<string> {
  const id = newId()
  await addScript(trx, {
    id, classSetId, position: await nextScriptPosition(trx, paperId), studentId, suggestedStudentId: null, suggestionReason: studentId && 'printed_code', suggestionCertainty: null,
    confirmedBy: null, confirmedAt: studentId === null ? null : now(),
  })
  return id
}

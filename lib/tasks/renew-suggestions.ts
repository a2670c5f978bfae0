import { listClassSetStudents, listSittingClasses } from '@/db/class-set-students'
import type { Db } from '@/db/knex'
import { listScripts, setScriptName } from '@/db/scripts'
import { suggestNames } from '@/lib/placing/suggest-names'

const key = (classSetId: string, studentId: string) => `${classSetId}/${studentId}`

/** Works out anew whose the unnamed scripts of a paper may be. A script that is only suggested to a student of another class set goes there. */
export async function renewSuggestions(db: Db, paperId: string): Promise<void> {
  const classSetIds = (await listSittingClasses(db, paperId)).map(({ classSetId }) => classSetId)
  const listed = await listClassSetStudents(db, classSetIds)
  const inOrder = classSetIds.flatMap((id) => listed.filter((one) => one.classSetId === id))
  const list = inOrder.filter((one) => one.attendance === 'expected' || one.scriptId !== null)
  const scripts = await listScripts(db, paperId)
  const suggested = suggestNames(
    scripts.map(({ id, classSetId, studentId }) => ({ id, student: studentId && key(classSetId, studentId) })),
    list.map((one) => key(one.classSetId, one.studentId)),
  )
  for (const script of scripts) {
    if (script.studentId !== null) continue
    const to = suggested.get(script.id) ?? null
    const [classSetId = script.classSetId, studentId = null] = to?.split('/') ?? []
    if (studentId === script.suggestedStudentId && classSetId === script.classSetId) continue
    await setScriptName(db, script.id, { classSetId, studentId: null, suggestedStudentId: studentId, suggestionReason: studentId && 'list_order', confirmedBy: null, confirmedAt: null })
  }
}

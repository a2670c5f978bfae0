import { listClassSetStudents, listSittingClasses } from '@/db/class-set-students'
import type { Db } from '@/db/knex'
import { listScripts, setScriptName } from '@/db/scripts'
import { assignNames } from '@/lib/placing/assign-names'
import { readNumbers } from './read-numbers'

const key = (classSetId: string, studentId: string) => `${classSetId}/${studentId}`

/**
 * Works out anew whose the unnamed scripts of a paper may be: by the candidate numbers in their boxes and the order of the list, over
 * the whole pile. A script that is only suggested to a student of another class set goes there.
 */
export async function renewSuggestions(db: Db, paperId: string): Promise<void> {
  const classSetIds = (await listSittingClasses(db, paperId)).map(({ classSetId }) => classSetId)
  const listed = await listClassSetStudents(db, classSetIds)
  const inOrder = classSetIds.flatMap((id) => listed.filter((one) => one.classSetId === id))
  const list = inOrder.filter((one) => one.attendance === 'expected' || one.scriptId !== null)
  const scripts = await listScripts(db, paperId)
  const numbers = await readNumbers(db, paperId)
  const suggested = assignNames(
    scripts.map(({ id, classSetId, studentId }) => ({ id, student: studentId && key(classSetId, studentId), boxes: numbers.get(id)?.shares ?? null })),
    list.map((one) => ({ student: key(one.classSetId, one.studentId), number: one.candidateNumber })),
  )
  for (const script of scripts) {
    if (script.studentId !== null) continue
    const said = suggested.get(script.id)
    const [classSetId = script.classSetId, studentId = null] = said?.student.split('/') ?? []
    const [by, certainty] = [said?.by ?? null, said?.certainty ?? null]
    if (studentId === script.suggestedStudentId && classSetId === script.classSetId && by === script.suggestionReason && certainty === script.suggestionCertainty) continue
    await setScriptName(db, script.id, { classSetId, studentId: null, suggestedStudentId: studentId, suggestionReason: by, suggestionCertainty: certainty, confirmedBy: null, confirmedAt: null })
  }
}

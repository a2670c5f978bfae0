import type { Question } from '@/lib/core/paper'
import { totalOf } from '@/lib/results/total-of'
import type { Candidate } from '@/lib/second-marking/draw-sample'
import type { Db } from '@/db/knex'
import { listCells, listColumns, listScriptsOfSet, listStudentsOfSet } from '@/db/mark-book'

/** The scripts of a class set that may be drawn (who was absent is not counted), and how many of their answers still lack a first mark. */
export async function sampleCandidates(db: Db, paperId: string, classSetId: string): Promise<{ candidates: (Candidate & { number: number })[]; toMark: number }> {
  const columns = await listColumns(db, paperId)
  const questions = columns.map(({ id, maximum, withdrawn }): Pick<Question, 'id' | 'maximum' | 'withdrawn'> => ({ id, maximum, withdrawn: withdrawn && { as: withdrawn, reason: '' } }))
  const away = new Set((await listStudentsOfSet(db, classSetId)).filter(({ attendance }) => attendance !== 'expected').map(({ studentId }) => studentId))
  const scripts = (await listScriptsOfSet(db, classSetId)).filter(({ studentId, suggestedStudentId }) => !away.has(studentId ?? suggestedStudentId ?? ''))
  const live = new Set(questions.filter(({ withdrawn }) => !withdrawn).map(({ id }) => id))
  const cells = await listCells(db, classSetId)
  const sat = new Set(scripts.map(({ scriptId }) => scriptId))
  const toMark = cells.filter((cell) => sat.has(cell.scriptId) && live.has(cell.questionId) && cell.raw === null && cell.hasPage === 1).length
  const candidates = scripts.map(({ scriptId, position }) => {
    const own = cells.filter((cell) => cell.scriptId === scriptId)
    const markedBy = own.filter((cell) => live.has(cell.questionId) && cell.countingMarkerId !== null).map((cell) => `${cell.questionId} ${cell.countingMarkerId}`)
    return { scriptId, number: position + 1, total: totalOf(questions, own).final, markedBy }
  })
  return { candidates, toMark }
}

import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { setGradeScale } from '@/db/papers'
import { newId } from '@/lib/core/ids'
import { halves } from '@/lib/core/marks'
import { exportMarkBook } from '@/lib/tasks/export-mark-book'
import { readMarkBook } from '@/lib/tasks/read-mark-book'
import { placeLeaves } from '@/tests/make/leaves'
import { aMarking } from '@/tests/make/marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the mark book', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  async function aBook() {
    const teacher = await anActor('teacher')
    const made = await aPaper({ owner: teacher.userId, students: 4 })
    return { teacher, ...made, q1: made.questionIds[0]!, q2: made.questionIds[1]! }
  }
  const cellsOf = async (...asked: Parameters<typeof readMarkBook>) => (await readMarkBook(...asked)).rows.map(({ cells }) => cells.map((cell) => cell && [cell.state, cell.mark]))

  it('keeps nought, nothing written, unmarked and missing apart', async () => {
    const { teacher, paperId, scriptIds, q1, q2 } = await aBook()
    const { scriptPageId } = await responseOf(scriptIds[3]!, q1)
    await placeLeaves(paperId, [scriptPageId])
    await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 0, kind: 'nought' })
    await aMarking({ script: scriptIds[0]!, question: q2, by: teacher.userId, worth: 0, kind: 'nothing-written' })
    await aMarking({ script: scriptIds[1]!, question: q1, by: teacher.userId, worth: 1, settled: false })
    const { rows } = await readMarkBook(teacher, paperId)
    expect(rows.map(({ cells }) => cells.map((cell) => [cell!.state, cell!.mark, cell!.nothingWritten]))).toEqual([
      [['marked', 0, false], ['marked', 0, true]],
      [['unmarked', null, false], ['unmarked', null, false]],
      [['unmarked', null, false], ['unmarked', null, false]],
      [['missing', null, false], ['missing', null, false]],
    ])
    expect(rows.map(({ total }) => [total!.final, total!.toCome])).toEqual([[0, 0], [0, 2], [0, 2], [0, 2]])
  })

  it('gives a grade only to whole scripts and leaves the absent out of every figure', async () => {
    const { teacher, paperId, scriptIds, studentIds, classSetId, q1, q2 } = await aBook()
    await placeLeaves(paperId)
    await setGradeScale(db(), paperId, 'kept', [{ grade: 'A', lowest: halves(5) }, { grade: 'B', lowest: halves(0) }])
    await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 2 })
    await aMarking({ script: scriptIds[0]!, question: q2, by: teacher.userId, worth: 3 })
    await aMarking({ script: scriptIds[1]!, question: q1, by: teacher.userId, worth: 1 })
    await aMarking({ script: scriptIds[2]!, question: q1, by: teacher.userId, worth: 0 })
    await db()('class_set_students').where({ class_set_id: classSetId, student_id: studentIds[2] }).update({ attendance: 'absent' })
    const book = await readMarkBook(teacher, paperId)
    expect(book.rows.map(({ grade, total }) => [grade, total?.final ?? null])).toEqual([['A', 5], [null, 1], [null, null], [null, 0]])
    expect(book.facility[0]).toEqual({ n: 2, facility: 0.75 })
    expect([book.mean, book.wholeScripts]).toEqual([5, 1])
  })

  it('counts an adjustment beside the raw mark, and forgets it once undone', async () => {
    const { teacher, paperId, scriptIds, q1 } = await aBook()
    await placeLeaves(paperId)
    await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 1 })
    const { responseId } = await responseOf(scriptIds[0]!, q1)
    await db()('adjustments').insert({ id: 'adj', response_id: responseId, halves: 1, reason: 'severe', decided_by: teacher.userId, decided_at: 1 })
    expect((await readMarkBook(teacher, paperId)).rows[0]).toMatchObject({ cells: [{ mark: 2, adjusted: true }, {}], total: { raw: 1, adjusted: 2, final: 2 } })
    await db()('adjustments').where({ id: 'adj' }).update({ undone_at: 2 })
    expect((await readMarkBook(teacher, paperId)).rows[0]).toMatchObject({ cells: [{ mark: 1, adjusted: false }, {}], total: { raw: 1, adjusted: 1 } })
  })

  it('does not count a stamp that was taken back', async () => {
    const { teacher, paperId, scriptIds, q1 } = await aBook()
    const marking = await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 2 })
    await db()('stamps').where({ marking_id: marking }).update({ removed: 1 })
    expect((await cellsOf(teacher, paperId))[0]![0]).toEqual(['marked', 0])
  })

  it('shows a marker the columns of their own questions without names or totals', async () => {
    const { teacher, paperId, scriptIds, q1, q2 } = await aBook()
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId, question_id: q2 })
    await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 2 })
    const book = await readMarkBook(marker, paperId)
    expect(book).toMatchObject({ whole: false, questions: [{ id: q2 }] })
    expect(book.rows.every(({ familyName, givenName, candidateNumber, total, studentId }) => familyName + givenName + candidateNumber === '' && total === null && studentId === null)).toBe(true)
    expect(JSON.stringify(book)).not.toContain('Family0')
    await expect(exportMarkBook(marker, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('is not there for strangers, and not for who only moderates', async () => {
    const { teacher, paperId, classSetId } = await aBook()
    await expect(readMarkBook(await anActor('teacher'), paperId)).rejects.toMatchObject({ code: 'not_found' })
    await expect(readMarkBook(await anActor('admin'), paperId)).rejects.toMatchObject({ code: 'not_found' })
    const moderator = await anActor('moderator')
    await db()('samples').insert({ id: newId(), class_set_id: classSetId, moderator_id: moderator.userId, seed: 's', size: 1, default_size: 1, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
    await expect(readMarkBook(moderator, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('hides from a marker who moderates the first marks of what they have yet to second-mark', async () => {
    const { teacher, paperId, classSetId, scriptIds, q1 } = await aBook()
    const both = await anActor('marker', 'moderator')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: both.userId })
    await aMarking({ script: scriptIds[0]!, question: q1, by: teacher.userId, worth: 2 })
    await db()('samples').insert({ id: 'sam', class_set_id: classSetId, moderator_id: both.userId, seed: 's', size: 1, default_size: 1, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
    await db()('sample_scripts').insert({ sample_id: 'sam', script_id: scriptIds[0]!, position: 0, drawn_as: 'highest' })
    expect((await cellsOf(both, paperId))[0]![0]).toEqual(['hidden', null])
    await aMarking({ script: scriptIds[0]!, question: q1, by: both.userId, worth: 1, round: 'second' })
    expect((await cellsOf(both, paperId))[0]![0]).toEqual(['marked', 2])
  })

  it('takes only class sets of the paper, and writes down that it was saved as a file', async () => {
    const { teacher, paperId, classSetId } = await aBook()
    const other = await aPaper({ owner: teacher.userId })
    await expect(readMarkBook(teacher, paperId, other.classSetId)).rejects.toMatchObject({ code: 'not_found' })
    const { csv } = await exportMarkBook(teacher, paperId, classSetId)
    expect(csv).toContain('Family0')
    expect(await db()('audit_lines').where({ act: 'mark_book.exported' }).first()).toMatchObject({ object_id: classSetId, paper_id: paperId })
  })
})

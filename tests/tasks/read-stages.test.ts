import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import { readStages } from '@/lib/tasks/read-stages'
import { placeLeaves } from '@/tests/make/leaves'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the stages of a paper', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('counts what is there and what is left', async () => {
    const teacher = await anActor('teacher')
    const { paperId, questionIds, scriptIds, studentIds, classSetId } = await aPaper({ owner: teacher.userId, students: 4 })
    const missing = await responseOf(scriptIds[3]!, questionIds[0]!)
    await placeLeaves(paperId, [missing.scriptPageId])
    await db()('class_set_students').where({ class_set_id: classSetId, student_id: studentIds[2] }).update({ attendance: 'absent' })
    const { responseId } = await responseOf(scriptIds[0]!, questionIds[0]!)
    const markingId = newId()
    await db()('markings').insert({ id: markingId, response_id: responseId, round: 'first', marker_id: teacher.userId, state: 'settled', created_at: 1, settled_at: 2 })
    await db()('counting_decisions').insert({ id: newId(), response_id: responseId, marking_id: markingId, reason: 'first_mark', decided_at: 2 })
    const { counts, classes, open } = await readStages(teacher, paperId)
    expect(counts).toMatchObject({ questions: 2, marks: 6, leaves: 3, scripts: 4, pagesMissing: 1, answersLeft: 3, answersMarked: 1, looseSheets: 0, namesOpen: 0 })
    expect(classes).toHaveLength(1)
    expect(open).toHaveLength(6)
  })

  it('leads a marker to marking alone and tells a stranger nothing', async () => {
    const teacher = await anActor('teacher')
    const marker = await anActor('marker')
    const { paperId } = await aPaper({ owner: teacher.userId })
    await expect(readStages(marker, paperId)).rejects.toMatchObject({ code: 'not_found' })
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId })
    expect((await readStages(marker, paperId)).open).toEqual(['Mark'])
  })
})

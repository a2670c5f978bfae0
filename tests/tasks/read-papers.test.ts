import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import type { Actor } from '@/lib/core/actor'
import { readPapers } from '@/lib/tasks/read-papers'
import { addClassSet } from '@/lib/tasks/add-class-set'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aClass } from '@/tests/make/setting'

describe('what the home page reads', () => {
  let teacher: Actor
  let made: Awaited<ReturnType<typeof aPaper>>
  beforeEach(async () => {
    await openSchool()
    teacher = await anActor('teacher', 'marker')
    made = await aPaper({ owner: teacher.userId })
  })
  afterEach(closeSchool)

  /** A leaf behind page 1 of each script, so that its answers have a picture. */
  async function scanned() {
    const fileId = newId()
    const sheafId = newId()
    await db()('stored_files').insert({ id: fileId, sha256: 'x', size: 1, media_type: 'application/pdf', original_name: 's', created_at: 1 })
    await db()('sheaves').insert({ id: sheafId, paper_id: made.paperId, file_id: fileId, state: 'placed', created_at: 1 })
    await db()('sheaf_class_sets').insert({ sheaf_id: sheafId, class_set_id: made.classSetId })
    const pages = (await db()('script_pages').pluck('id')) as string[]
    for (const [position, id] of pages.entries()) {
      const leafId = newId()
      await db()('leaves').insert({ id: leafId, sheaf_id: sheafId, position, state: 'placed', script_page_id: id })
      await db()('script_pages').where({ id }).update({ leaf_id: leafId })
    }
  }

  it('counts each class set of a paper for itself', async () => {
    await scanned()
    const { classId } = await aClass(teacher.userId, 5)
    await addClassSet(teacher, { paperId: made.paperId, classId, satOn: '2026-12-01', resitOf: null })
    const { lines, mayMake } = await readPapers(teacher)
    expect(mayMake).toBe(true)
    const seen = lines.sort((a, b) => a.students - b.students).map(({ students, counts, questions }) => [students, counts.scripts, counts.leaves, counts.answersLeft, questions.map(({ left }) => left)])
    expect(seen).toEqual([[3, 3, 3, 6, [3, 3]], [5, 0, 0, 0, []]])
  })

  it('leaves out who was absent and counts what is settled as marked', async () => {
    await scanned()
    await db()('class_set_students').where({ student_id: made.studentIds[2]! }).update({ attendance: 'absent' })
    const response = await db()('responses').where({ script_id: made.scriptIds[0]!, question_id: made.questionIds[0]! }).first<{ id: string }>('id')
    const markingId = newId()
    await db()('markings').insert({ id: markingId, response_id: response.id, round: 'first', marker_id: teacher.userId, state: 'settled', settled_at: 1, created_at: 1 })
    await db()('counting_decisions').insert({ id: newId(), response_id: response.id, marking_id: markingId, reason: 'first_mark', decided_at: 1 })
    const [line] = (await readPapers(teacher)).lines
    expect(line!.questions.map(({ left, marked }) => [left, marked])).toEqual([[1, 1], [2, 0]])
    expect([line!.counts.answersLeft, line!.counts.answersMarked]).toEqual([3, 1])
  })

  it('shows a marker only their questions, a moderator only their sample, and no one else anything', async () => {
    await scanned()
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: made.paperId, user_id: marker.userId, question_id: made.questionIds[1]! })
    const moderator = await anActor('moderator')
    const sampleId = newId()
    await db()('samples').insert({ id: sampleId, class_set_id: made.classSetId, moderator_id: moderator.userId, seed: 's', size: 2, default_size: 2, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
    for (const [position, scriptId] of made.scriptIds.slice(0, 2).entries()) await db()('sample_scripts').insert({ sample_id: sampleId, script_id: scriptId, position, drawn_as: 'spread' })
    const own = (await readPapers(marker)).lines
    expect(own.map(({ part, questions }) => [part, questions.map(({ id }) => id)])).toEqual([['marker', [made.questionIds[1]]]])
    expect((await readPapers(moderator)).lines.map(({ part, sample }) => [part, sample])).toEqual([['moderator', { read: 0, of: 2 }]])
    expect((await readPapers(await anActor('teacher', 'marker', 'moderator'))).lines).toEqual([])
    expect((await readPapers(await anActor('admin'))).lines).toEqual([])
    await expect(readPapers(await anActor('student'))).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('shows a paper nobody sits yet to its owner, and not to its marker', async () => {
    await db()('papers').insert({ id: 'bare', title: 'Bare', keep_until: '2028-01-01', created_by: teacher.userId, created_at: 1 })
    await db()('paper_owners').insert({ paper_id: 'bare', user_id: teacher.userId })
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: 'bare', user_id: marker.userId })
    expect((await readPapers(teacher)).lines.find(({ paperId }) => paperId === 'bare')).toMatchObject({ classSetId: null, hasBlank: false })
    expect((await readPapers(marker)).lines).toEqual([])
  })
})

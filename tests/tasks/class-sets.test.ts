import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { getPaperStanding } from '@/db/paper-standing'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { addClassSet } from '@/lib/tasks/add-class-set'
import { assignMarker } from '@/lib/tasks/assign-marker'
import { readPaperDetails } from '@/lib/tasks/read-paper-details'
import { removeClassSet } from '@/lib/tasks/remove-class-set'
import { renewClassSet } from '@/lib/tasks/renew-class-set'
import { sharePaper } from '@/lib/tasks/share-paper'
import { stopSharingPaper } from '@/lib/tasks/stop-sharing-paper'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aClass, aStudentOf } from '@/tests/make/setting'

describe('the classes and people of a paper', () => {
  let teacher: Actor
  let paperId: string
  let classSetId: string
  let questionIds: string[]
  beforeEach(async () => {
    await openSchool()
    teacher = await anActor('teacher')
    ;({ paperId, classSetId, questionIds } = await aPaper({ owner: teacher.userId }))
  })
  afterEach(closeSchool)

  it('copies a class list as it stands; who joins later comes in by a renewal, and nobody goes', async () => {
    const { classId, studentIds: listed } = await aClass(teacher.userId, 2)
    const set = await addClassSet(teacher, { paperId, classId, satOn: '2026-11-20', resitOf: classSetId })
    expect(await addClassSet(teacher, { paperId, classId, satOn: '2026-11-20', resitOf: null })).toEqual(set)
    await db()('class_students').where({ class_id: classId, student_id: listed[0]! }).delete()
    const late = await aStudentOf(classId)
    const list = async () => db()('class_set_students').where({ class_set_id: set.classSetId }).pluck('student_id')
    expect((await list()).sort()).toEqual([...listed].sort())
    expect(await renewClassSet(teacher, set)).toEqual({ added: 1 })
    expect(await renewClassSet(teacher, set)).toEqual({ added: 0 })
    expect((await list()).sort()).toEqual([...listed, late].sort())
  })

  it('takes only the teacher’s own classes, and a re-sit only of the same paper', async () => {
    const { classId } = await aClass((await anActor('teacher')).userId)
    await expect(addClassSet(teacher, { paperId, classId, satOn: '2026-11-20', resitOf: null })).rejects.toMatchObject({ code: 'not_allowed' })
    const own = await aClass(teacher.userId)
    await expect(addClassSet(teacher, { paperId, classId: own.classId, satOn: '2026-11-20', resitOf: newId() })).rejects.toMatchObject({ code: 'not_found' })
    await expect(addClassSet(await anActor('teacher'), { paperId, classId: own.classId, satOn: '2026-11-20', resitOf: null })).rejects.toMatchObject({ code: 'not_found' })
  })

  it('lets a class set go only while nothing hangs on it', async () => {
    await expect(removeClassSet(teacher, { paperId, classSetId })).rejects.toMatchObject({ code: 'class_set_used' })
    const { classId } = await aClass(teacher.userId)
    const set = await addClassSet(teacher, { paperId, classId, satOn: '2026-11-20', resitOf: null })
    await expect(removeClassSet(await anActor('teacher'), { paperId, ...set })).rejects.toMatchObject({ code: 'not_found' })
    await removeClassSet(teacher, { paperId, ...set })
    await removeClassSet(teacher, { paperId, ...set })
    expect((await readPaperDetails(teacher, paperId)).classSets).toHaveLength(1)
  })

  it('shares a paper with another teacher, and keeps at least one owner', async () => {
    const other = await anActor('teacher')
    await sharePaper(teacher, { paperId, userId: other.userId })
    await sharePaper(teacher, { paperId, userId: other.userId })
    expect((await getPaperStanding(db(), other.userId, paperId)).owner).toBe(true)
    await expect(sharePaper(teacher, { paperId, userId: (await anActor('marker')).userId })).rejects.toMatchObject({ code: 'not_found' })
    await stopSharingPaper(other, { paperId, userId: teacher.userId })
    await expect(stopSharingPaper(teacher, { paperId, userId: other.userId })).rejects.toMatchObject({ code: 'not_found' })
    await expect(stopSharingPaper(other, { paperId, userId: other.userId })).rejects.toMatchObject({ code: 'last_owner' })
  })

  it('gives a marker some questions, all, or none any more', async () => {
    const marker = await anActor('marker')
    const marks = async () => (await getPaperStanding(db(), marker.userId, paperId)).marks
    const assign = (wanted: readonly string[] | null) => assignMarker(teacher, { paperId, userId: marker.userId, questionIds: wanted })
    await assign([questionIds[0]!])
    await assign([questionIds[0]!])
    expect(await marks()).toEqual([questionIds[0]])
    await assign(null)
    expect(await marks()).toBe('all')
    await assign([])
    expect(await marks()).toEqual([])
    expect(await db()('audit_lines').where({ act: 'marker.assigned' })).toHaveLength(3)
    await expect(assign([newId()])).rejects.toMatchObject({ code: 'not_found' })
    await expect(assignMarker(teacher, { paperId, userId: (await anActor('admin')).userId, questionIds: null })).rejects.toMatchObject({ code: 'not_found' })
    await expect(assignMarker(marker, { paperId, userId: marker.userId, questionIds: null })).rejects.toMatchObject({ code: 'not_found' })
  })
})

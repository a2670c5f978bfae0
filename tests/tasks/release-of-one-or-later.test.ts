import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { callOffRelease } from '@/lib/tasks/call-off-release'
import { openReturnedPdf, readMyScripts } from '@/lib/tasks/read-returned-script'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { startRelease } from '@/lib/tasks/start-release'
import { withdrawScript } from '@/lib/tasks/withdraw-script'
import { aMarkedClassSet, anAccountOf } from '@/tests/make/marked-class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

beforeEach(openSchool)
afterEach(closeSchool)

const hour = 3_600_000
const work = async () => { while (await runNextJob('test', () => false)); }
async function aSchool() {
  const teacher = await anActor('teacher')
  const made = await aMarkedClassSet(teacher, 2)
  const [one, mate] = made.scripts
  return { teacher, ...made, one: one!, mate: mate!, student: await anAccountOf(one!.studentId), other: await anAccountOf(mate!.studentId) }
}

describe('one script alone', () => {
  it('goes to its student and to nobody else, whatever keeps the others back', async () => {
    const { teacher, classSetId, one, mate, student, other } = await aSchool()
    await db()('scripts').where({ id: mate.scriptId }).update({ student_id: null, suggested_student_id: mate.studentId })
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'checks_open' })
    await expect(startRelease(teacher, classSetId, { scriptIds: [mate.scriptId] })).rejects.toMatchObject({ code: 'checks_open' })
    await startRelease(teacher, classSetId, { scriptIds: [one.scriptId] })
    await work()
    expect(await readMyScripts(student)).toHaveLength(1)
    expect(await readMyScripts(other)).toEqual([])
  })

  it('is taken back alone, and goes out again as the next revision', async () => {
    const { teacher, classSetId, one, student, other } = await aSchool()
    await startRelease(teacher, classSetId)
    await work()
    const [line] = await readMyScripts(student)
    await expect(withdrawScript(await anActor('teacher'), one.scriptId)).rejects.toMatchObject({ code: 'not_found' })
    await withdrawScript(teacher, one.scriptId)
    expect(await readMyScripts(student)).toEqual([])
    await expect(openReturnedPdf(student, line!.id)).rejects.toMatchObject({ code: 'not_found' })
    expect(await readMyScripts(other)).toHaveLength(1)
    await expect(withdrawScript(teacher, one.scriptId)).rejects.toMatchObject({ code: 'not_released' })
    await startRelease(teacher, classSetId, { scriptIds: [one.scriptId] })
    await work()
    expect(await readMyScripts(student)).toMatchObject([{ revision: 2 }])
  })
})

describe('a release on a day', () => {
  it('is not seen before, and goes out by itself on its day with the marks of then', async () => {
    const { teacher, classSetId, student } = await aSchool()
    const id = await startRelease(teacher, classSetId, { dueAt: Date.now() + hour })
    await work()
    expect(await readMyScripts(student)).toEqual([])
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'already_there' })
    await db()('jobs').where({ subject_id: id }).update({ run_after: Date.now() - 1 })
    await work()
    expect(await readMyScripts(student)).toHaveLength(1)
  })

  it('can be called off while it waits, and never goes out then', async () => {
    const { teacher, classSetId, student } = await aSchool()
    await expect(callOffRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'not_released' })
    const id = await startRelease(teacher, classSetId, { dueAt: Date.now() + hour })
    await callOffRelease(teacher, classSetId)
    await db()('jobs').where({ subject_id: id }).update({ run_after: Date.now() - 1 })
    await work()
    expect(await readMyScripts(student)).toEqual([])
    await startRelease(teacher, classSetId)
    await work()
    expect(await readMyScripts(student)).toHaveLength(1)
  })

  it('is not put off for ever', async () => {
    const { teacher, classSetId } = await aSchool()
    await expect(startRelease(teacher, classSetId, { dueAt: Date.now() + 400 * 24 * hour })).rejects.toMatchObject({ code: 'bad_input' })
  })
})

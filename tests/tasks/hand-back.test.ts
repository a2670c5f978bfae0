import { createHash } from 'node:crypto'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { buildRelease } from '@/lib/tasks/build-release'
import { openReturnedPdf, readMyScripts, readReturnedScript } from '@/lib/tasks/read-returned-script'
import { readHandBack } from '@/lib/tasks/read-hand-back'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { signOffCheck } from '@/lib/tasks/sign-off-check'
import { startRelease } from '@/lib/tasks/start-release'
import { withdrawRelease } from '@/lib/tasks/withdraw-release'
import { aMarkedClassSet, anAccountOf } from '@/tests/make/marked-class-set'
import { asFile, assertClean, codedImages, imageCount, pageCountOf, wordsOf } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

beforeEach(openSchool)
afterEach(closeSchool)

const work = async () => { while (await runNextJob('test', () => false)); }
async function handBack(teacher: Actor, classSetId: string): Promise<string> {
  const id = await startRelease(teacher, classSetId)
  await work()
  return id
}
async function aSchool(most = 3) {
  const teacher = await anActor('teacher')
  const made = await aMarkedClassSet(teacher, most)
  return { teacher, ...made, first: made.scripts[0]!, student: await anAccountOf(made.scripts[0]!.studentId) }
}
const mails = async () => (await db()('outbox_mails').where({ kind: 'release' })) as { to_address: string; text: string; html: string }[]

describe('handing back', () => {
  it('gives a student their own pages with the marking, under a summary, and nothing before all is built', async () => {
    const { teacher, classSetId, student, first, scan } = await aSchool()
    const releaseId = await startRelease(teacher, classSetId)
    expect(await readMyScripts(student)).toEqual([])
    await work()
    const [line] = await readMyScripts(student)
    expect(line).toMatchObject({ title: 'Percentages, ratio and area', revision: 1, read: false })
    const { bytes } = await openReturnedPdf(student, line!.id)
    const file = asFile(bytes)
    assertClean(file)
    expect(pageCountOf(file)).toBe(1 + first.leaves.length)
    expect(imageCount(file)).toBe(first.leaves.length)
    expect(codedImages(file)).toEqual(first.leaves.flatMap((index) => codedImages(scan, index + 1, index + 1)))
    const { detail } = await readReturnedScript(student, line!.id)
    expect(wordsOf(file, 1)).toContain(`${detail.givenName} ${detail.familyName}`)
    expect(wordsOf(file, 1)).toContain('The sum of the ticks')
    expect(detail.total).toBe(detail.questions.reduce((sum, { mark }) => sum + (mark ?? 0), 0))
    expect(detail.pages).toHaveLength(2)
    expect(detail.pages[0]!.words).toContain('Question 1a: Tick, half a mark; mark ½.')
    const row = await db()('returned_scripts').join('stored_files', 'stored_files.id', 'returned_scripts.file_id').where({ 'returned_scripts.id': line!.id }).first<{ sha256: string; first_read_at: number | null }>()
    expect(row.sha256).toBe(createHash('sha256').update(bytes).digest('hex'))
    expect(row.first_read_at).toBeGreaterThan(0)
    const summary = await db()('score_summaries').where({ returned_script_id: line!.id }).first<{ total: number; maximum: number }>()
    expect([summary.total, summary.maximum]).toEqual([detail.total, detail.maximum])
    expect(await db()('audit_lines').where({ object_id: releaseId }).orderBy('id').pluck('act')).toEqual(['release.started', 'release.released'])
  })

  it('refuses another student’s script, one not released yet, one withdrawn, and staff it does not concern', async () => {
    const { teacher, classSetId, student, scripts } = await aSchool()
    await startRelease(teacher, classSetId)
    await buildRelease((await db()('releases').first<{ id: string }>('id')).id, stopAfter(2))
    const ids = new Map(((await db()('returned_scripts').select('id', 'script_id')) as { id: string; script_id: string }[]).map(({ id, script_id }) => [script_id, id]))
    const own = ids.get(scripts[0]!.scriptId)!
    await expect(openReturnedPdf(student, own)).rejects.toMatchObject({ code: 'not_found' })
    await work()
    await openReturnedPdf(student, own)
    await expect(openReturnedPdf(student, ids.get(scripts[1]!.scriptId)!)).rejects.toMatchObject({ code: 'not_found' })
    await expect(readReturnedScript(student, ids.get(scripts[1]!.scriptId)!)).rejects.toMatchObject({ code: 'not_found' })
    await expect(openReturnedPdf(await anActor('teacher'), own)).rejects.toMatchObject({ code: 'not_found' })
    await expect(openReturnedPdf(await anActor('admin'), own)).rejects.toMatchObject({ code: 'not_found' })
    await withdrawRelease(teacher, classSetId)
    await expect(openReturnedPdf(student, own)).rejects.toMatchObject({ code: 'not_found' })
    expect(await readMyScripts(student)).toEqual([])
    await openReturnedPdf(teacher, own)
    await expect(withdrawRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'not_released' })
  })

  it('goes on where a killed worker broke off, with each script built once and each mail written once', async () => {
    const { teacher, classSetId, scripts } = await aSchool(4)
    const releaseId = await startRelease(teacher, classSetId)
    expect(await buildRelease(releaseId, stopAfter(2))).toBe(false)
    const before = await db()('returned_scripts').whereNotNull('built_at').select('id', 'file_id', 'built_at')
    expect(before).toHaveLength(2)
    expect(await mails()).toEqual([])
    await work()
    expect(await buildRelease(releaseId, () => true)).toBe(true)
    const after = (await db()('returned_scripts').select('id', 'file_id', 'built_at')) as unknown[]
    expect(after).toHaveLength(scripts.length)
    expect(after).toEqual(expect.arrayContaining(before))
    expect(await db()('score_summaries').count({ n: '*' }).first()).toEqual({ n: scripts.length })
    expect(await mails()).toHaveLength(1)
  })

  it('writes to the student by first name alone, and to no address two students share', async () => {
    const { teacher, classSetId, student, scripts } = await aSchool()
    await db()('students').whereIn('id', [scripts[1]!.studentId, scripts[2]!.studentId]).update({ email: 'family@kestrelbay.example' })
    await handBack(teacher, classSetId)
    const [mail, ...more] = await mails()
    expect(more).toEqual([])
    const { email } = await db()('users').where({ id: student.userId }).first<{ email: string }>('email')
    const { given_name: given, family_name: family } = await db()('students').where({ id: student.studentId }).first<{ given_name: string; family_name: string }>()
    expect(mail!.to_address).toBe(email)
    expect(mail!.text).toContain(`Dear ${given},`)
    expect(mail!.text).toContain('/my-scripts')
    expect(mail!.text + mail!.html).not.toContain(family)
  })

  it('builds only what has changed when it hands back again, as the next revision', async () => {
    const { teacher, classSetId, student, first } = await aSchool()
    await handBack(teacher, classSetId)
    const [before] = await readMyScripts(student)
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'nothing_to_return' })
    await db()('stamps').whereIn('marking_id', db()('markings').join('responses', 'responses.id', 'markings.response_id').where({ script_id: first.scriptId }).limit(1).select('markings.id')).update({ worth: 0, kind: 'cross' })
    await handBack(teacher, classSetId)
    const [after, ...more] = await readMyScripts(student)
    expect(more).toEqual([])
    expect(after).toMatchObject({ revision: 2 })
    expect(after!.total).toBeLessThan(before!.total)
    expect(await db()('returned_scripts').where({ script_id: first.scriptId }).orderBy('revision').pluck('revision')).toEqual([1, 2])
    expect(await db()('returned_scripts').count({ n: '*' }).first()).toEqual({ n: 4 })
    await expect(openReturnedPdf(student, before!.id)).rejects.toMatchObject({ code: 'not_found' })
  })
})

describe('the clerical check', () => {
  const unsettle = (scriptId: string) => db()('markings').whereIn('response_id', db()('responses').where({ script_id: scriptId }).limit(1).select('id')).update({ state: 'open', settled_at: null })

  it('notices a page that was scanned again since', async () => {
    const { teacher, classSetId, paperId, first } = await aSchool(2)
    await handBack(teacher, classSetId)
    const changed = async () => (await readHandBack(teacher, paperId, classSetId)).students.filter((student) => student.changed).map(({ key }) => key)
    expect(await changed()).toEqual([])
    const page = await db()('script_pages').where({ script_id: first.scriptId, paper_page: 1 }).first<{ id: string; leaf_id: string }>()
    const leaf = (await db()('leaves').where({ id: page.leaf_id }).first())!
    const [sheafId, leafId] = [newId(), newId()]
    const sheaf = (await db()('sheaves').where({ id: leaf.sheaf_id }).first())!
    await db()('sheaves').insert({ ...sheaf, id: sheafId })
    await db()('leaves').insert({ ...leaf, id: leafId, sheaf_id: sheafId })
    await db()('script_pages').where({ id: page.id }).update({ leaf_id: leafId })
    expect(await changed()).toEqual([first.scriptId])
  })

  it('lets nothing go while marks are missing, and nobody sign that away: the script stays behind by name', async () => {
    const { teacher, classSetId, student, first, scripts } = await aSchool()
    await unsettle(first.scriptId)
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'checks_open', detail: { open: 1 } })
    await signOffCheck(teacher, { classSetId, check: 'unsettled', subjects: [first.scriptId], reason: 'Marked after half-term' })
    await handBack(teacher, classSetId)
    expect(await readMyScripts(student)).toEqual([])
    expect(new Set(await db()('returned_scripts').pluck('script_id'))).toEqual(new Set(scripts.slice(1).map(({ scriptId }) => scriptId)))
  })

  it('asks for a confirmed name', async () => {
    const { teacher, classSetId, first } = await aSchool()
    await db()('scripts').where({ id: first.scriptId }).update({ student_id: null, suggested_student_id: first.studentId })
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'checks_open' })
  })

  it('takes a signature for a loose sheet, and asks again for the next one', async () => {
    const { teacher, classSetId, paperId, scripts } = await aSchool()
    const sheaf = await db()('sheaves').where({ paper_id: paperId }).first<{ id: string }>('id')
    const loose = async (position: number) => { const id = newId(); await db()('leaves').insert({ id, sheaf_id: sheaf.id, position, state: 'loose' }); return id }
    const leaf = await loose(900)
    await expect(signOffCheck(await anActor('teacher'), { classSetId, check: 'loose', subjects: [leaf], reason: 'a cover sheet' })).rejects.toMatchObject({ code: 'not_found' })
    await expect(signOffCheck(teacher, { classSetId, check: 'loose', subjects: ['another'], reason: 'a cover sheet' })).rejects.toMatchObject({ code: 'out_of_date' })
    await signOffCheck(teacher, { classSetId, check: 'loose', subjects: [leaf], reason: 'a cover sheet' })
    await loose(901)
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'checks_open', detail: { open: 1 } })
    await db()('leaves').where({ position: 901 }).update({ state: 'set_aside' })
    await handBack(teacher, classSetId)
    expect(await db()('returned_scripts').count({ n: '*' }).first()).toEqual({ n: scripts.length })
  })

  it('hands back a script whose missing page was signed for, without a grade', async () => {
    const { teacher, classSetId, student, first, questionIds } = await aSchool()
    const page = await db()('script_pages').where({ script_id: first.scriptId, paper_page: 2 }).first<{ id: string }>('id')
    await db()('script_pages').where({ id: page.id }).update({ leaf_id: null })
    const gone = (await db()('responses').join('answer_spaces', 'answer_spaces.question_id', 'responses.question_id').where({ script_id: first.scriptId, page: 2 }).pluck('responses.id')) as string[]
    await db()('counting_decisions').whereIn('response_id', gone).delete()
    await expect(startRelease(teacher, classSetId)).rejects.toMatchObject({ code: 'checks_open', detail: { open: 1 } })
    await signOffCheck(teacher, { classSetId, check: 'missing', subjects: [first.scriptId], reason: 'handed in one sheet only' })
    await handBack(teacher, classSetId)
    const [line] = await readMyScripts(student)
    const { detail } = await readReturnedScript(student, line!.id)
    expect(detail.questions.filter(({ remark }) => remark === 'no page handed in')).toHaveLength(gone.length)
    expect(detail.questions).toHaveLength(questionIds.length)
    expect([detail.grade, detail.pages.length]).toEqual([null, 1])
  })
})

/** A worker that is killed before it stores script number `n` + 1. */
function stopAfter(n: number): () => boolean {
  let asked = 0
  return () => asked++ < n
}

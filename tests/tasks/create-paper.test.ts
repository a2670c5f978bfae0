import { PDFDocument } from 'pdf-lib'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import { getStoredFile } from '@/db/stored-files'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { readKept } from '@/lib/infra/file-store'
import { createPaper, type CreatePaper } from '@/lib/tasks/create-paper'
import { exportPaper } from '@/lib/tasks/export-paper'
import { importPaper } from '@/lib/tasks/import-paper'
import { putBlankPaper } from '@/lib/tasks/put-blank-paper'
import { readPaperDetails } from '@/lib/tasks/read-paper-details'
import { savePaperDetails } from '@/lib/tasks/save-paper-details'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aClass, aStamp, realPaper } from '@/tests/make/setting'

async function aPdf(sizes: readonly (readonly [number, number])[]): Promise<Uint8Array> {
  const pdf = await PDFDocument.create()
  for (const size of sizes) pdf.addPage([...size])
  return pdf.save()
}
const a4 = [595.28, 841.89] as const

describe('making a paper', () => {
  let teacher: Actor
  beforeEach(async () => {
    await openSchool()
    teacher = await anActor('teacher')
  })
  afterEach(closeSchool)

  const everyday = realPaper('everyday')
  const wanted = (more: Partial<CreatePaper> = {}): CreatePaper => ({ id: newId(), title: '', step: 1, classSets: [], blank: { bytes: everyday.pdf, name: 'paper.pdf' }, paperFile: everyday.file, ...more })

  it('takes a real paper in: questions, boxes, pages, class list, keeping date, and the PDF byte for byte', async () => {
    const { classId } = await aClass(teacher.userId, 3)
    const { paperId } = await createPaper(teacher, wanted({ classSets: [{ classId, satOn: '2026-11-12' }] }))
    const paper = (await getPaper(db(), paperId))!
    expect([paper.title, paper.questions.length, paper.pages.length, paper.boxes.length, paper.keepUntil]).toEqual(['Percentages, ratio and area', 11, 2, 5, '2028-01-12'])
    const file = (await getStoredFile(db(), paper.blankFileId!))!
    expect((await readKept(file.sha256)).equals(everyday.pdf)).toBe(true)
    expect((await readPaperDetails(teacher, paperId)).classSets[0]!.list).toHaveLength(3)
    expect(JSON.parse((await exportPaper(teacher, paperId)).text)).toMatchObject({ title: everyday.file.title, candidate_number_boxes: everyday.file.candidate_number_boxes })
  })

  it('sent twice makes one paper', async () => {
    const input = wanted()
    await createPaper(teacher, input)
    await createPaper(teacher, input)
    expect(await db()('papers')).toHaveLength(1)
    await expect(createPaper(await anActor('teacher'), input)).rejects.toMatchObject({ code: 'already_there' })
  })

  it('makes nothing when anything is wrong', async () => {
    const broken = { ...everyday.file, pages: 3 }
    await expect(createPaper(teacher, wanted({ paperFile: broken }))).rejects.toMatchObject({ code: 'paper_invalid' })
    const { classId } = await aClass((await anActor('teacher')).userId)
    await expect(createPaper(teacher, wanted({ classSets: [{ classId, satOn: '2026-11-12' }] }))).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(createPaper(teacher, wanted({ paperFile: undefined }))).rejects.toMatchObject({ code: 'bad_input' })
    await expect(createPaper(await anActor('marker', 'admin'), wanted())).rejects.toMatchObject({ code: 'not_allowed' })
    expect(await db()('papers')).toHaveLength(0)
  })

  it.each([
    ['an empty file', async () => new Uint8Array(), 'file_empty'],
    ['another kind of file', async () => Buffer.from('hello'), 'file_not_pdf'],
    ['a broken PDF', async () => Buffer.from('%PDF-1.7\nnothing more'), 'file_damaged'],
    ['a PDF of 41 pages', () => aPdf(Array.from({ length: 41 }, () => a4)), 'too_many_pages'],
    ['a sheet of another size', () => aPdf([[300, 300]]), 'paper_invalid'],
  ])('refuses %s', async (_what, bytes, code) => {
    await expect(createPaper(teacher, { ...wanted({ title: 'Light', paperFile: undefined }), blank: { bytes: await bytes(), name: 'x.pdf' } })).rejects.toMatchObject({ code })
  })

  describe('that stands already', () => {
    let paperId: string
    beforeEach(async () => {
      paperId = (await createPaper(teacher, wanted())).paperId
    })
    const version = async () => (await getPaper(db(), paperId))!.schemeVersion

    it('takes another print of the same pages, and refuses one the spaces fall off', async () => {
      expect(await putBlankPaper(teacher, { paperId, bytes: await aPdf([a4, a4]), name: 'again.pdf' })).toEqual({ pages: 2 })
      await expect(putBlankPaper(teacher, { paperId, bytes: await aPdf([a4]), name: 'one.pdf' })).rejects.toMatchObject({ code: 'pages_differ' })
      await expect(putBlankPaper(teacher, { paperId, bytes: await aPdf([a4, [841.89, 595.28]]), name: 'lying.pdf' })).rejects.toMatchObject({ code: 'pages_differ' })
      expect((await putBlankPaper(teacher, { paperId, bytes: await aPdf([a4, a4, a4]), name: 'three.pdf' })).pages).toBe(3)
      await expect(putBlankPaper(await anActor('teacher'), { paperId, bytes: everyday.pdf, name: 'x.pdf' })).rejects.toMatchObject({ code: 'not_found' })
    })

    it('sent the same blank twice keeps one', async () => {
      const before = (await getPaper(db(), paperId))!.blankFileId
      await putBlankPaper(teacher, { paperId, bytes: everyday.pdf, name: 'paper.pdf' })
      expect((await getPaper(db(), paperId))!.blankFileId).toBe(before)
    })

    it('is replaced by a paper.json while nothing is stamped, out of date when made on an older version', async () => {
      const questions = (everyday.file.questions as object[]).slice(0, 4)
      const old = await version()
      const next = await importPaper(teacher, { paperId, version: old, paperFile: { ...everyday.file, questions } })
      expect((await getPaper(db(), paperId))!.questions).toHaveLength(4)
      expect(next).toBe(old + 1)
      await expect(importPaper(teacher, { paperId, version: old, paperFile: everyday.file })).rejects.toMatchObject({ code: 'out_of_date' })
      await expect(importPaper(await anActor('teacher'), { paperId, version: next, paperFile: everyday.file })).rejects.toMatchObject({ code: 'not_found' })
    })

    it('saves its details once, and says when they were changed meanwhile', async () => {
      const { details } = await readPaperDetails(teacher, paperId)
      const after = { ...details, keepUntil: '2030-01-01', namesHidden: false }
      await savePaperDetails(teacher, { paperId, before: details, after })
      await savePaperDetails(teacher, { paperId, before: details, after })
      expect(await db()('audit_lines').whereIn('act', ['paper.keepUntil', 'paper.namesHidden'])).toHaveLength(2)
      await expect(savePaperDetails(teacher, { paperId, before: details, after: { ...details, title: 'Other' } })).rejects.toMatchObject({ code: 'out_of_date' })
      await expect(savePaperDetails(await anActor('teacher'), { paperId, before: after, after: details })).rejects.toMatchObject({ code: 'not_found' })
    })
  })

  it('with stamps a paper.json may add and change, never leave out', async () => {
    const made = await aPaper({ owner: teacher.userId, questions: [{ label: '1', worths: [2] }] })
    await aStamp(made.scriptIds[0]!, made.questionIds[0]!, teacher.userId, 2)
    const file = JSON.parse((await exportPaper(teacher, made.paperId)).text) as { questions: Record<string, unknown>[] }
    const more = { ...file.questions[0]!, label: '2' }
    await expect(importPaper(teacher, { paperId: made.paperId, version: 1, paperFile: { ...file, questions: [more] } })).rejects.toMatchObject({ code: 'has_stamps' })
    await importPaper(teacher, { paperId: made.paperId, version: 1, paperFile: { ...file, questions: [{ ...file.questions[0]!, text: 'New words' }, more] } })
    const { questions } = (await getPaper(db(), made.paperId))!
    expect(questions.map(({ label, text }) => [label, text])).toEqual([['1', 'New words'], ['2', '']])
    expect(questions[0]!.id).toBe(made.questionIds[0])
  })
})

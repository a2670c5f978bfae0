import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { makePrintPack } from '@/lib/tasks/make-print-pack'
import { readPrintPage } from '@/lib/tasks/read-print-page'
import { readSheaf } from '@/lib/tasks/read-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { saveCodeSpots } from '@/lib/tasks/save-code-spots'
import { suggestCodeSpots } from '@/lib/tasks/suggest-code-spots'
import { aClassSetPaper } from '@/tests/make/class-set'
import { asFile, assertClean, fontLines, imageCount, pageCountOf, wordsOf } from '@/tests/make/pdf-tools'
import { aScannedPack, codesByZbar, drawnPages } from '@/tests/make/scanned-pack'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let classSetId: string
/** Candidate numbers of those who are expected, in order. */
const expected = ['8101', '8102', '8103', '8105']
const names: Record<string, [string, string]> = { '8101': ['Zoë', 'Ångström-Lindqvist'], '8102': ['Γιώργος', 'Παπαδόπουλος'], '8103': ['Юлия', 'Щербакова'], '8105': ['Ana-Sofia Maria Guadalupe', 'de la Fuente y Castellanos-Villavicencio'] }

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId } = await aClassSetPaper(teacher.userId, 'everyday'))
  await db()('class_set_students').where({ class_set_id: classSetId }).whereNotIn('candidate_number', expected).update({ attendance: 'absent' })
  for (const [candidate_number, [given_name, family_name]] of Object.entries(names)) await db()('class_set_students').where({ class_set_id: classSetId, candidate_number }).update({ given_name, family_name })
})
afterEach(closeSchool)

const spotted = async () => saveCodeSpots(teacher, { paperId, spots: await suggestCodeSpots(teacher, { paperId, same: false }) })
const pack = (spares = 0, twoSided = false) => makePrintPack(teacher, { paperId, classSetId, spares, twoSided })
/** Tokens of the print runs, the oldest first, in printing order. */
const tokens = async () => (await db()('printed_pages').join('printed_scripts', 'printed_scripts.id', 'printed_script_id').join('print_runs', 'print_runs.id', 'print_run_id')
  .orderBy(['print_runs.created_at', 'printed_scripts.position', 'printed_pages.page']).pluck('token')) as string[]
async function scanned(bytes: Uint8Array, pages: Parameters<typeof aScannedPack>[1]): Promise<void> {
  const sheafId = await aWaitingSheaf(paperId, classSetId, await aScannedPack(bytes, pages), pages.length)
  expect(await readSheaf(sheafId, () => true)).toBe(true)
}

describe('the place of the code', () => {
  it('is suggested clear of print and answer spaces, and refused over them', async () => {
    await spotted()
    const { spots } = await readPrintPage(teacher, paperId)
    expect(spots.map(({ page }) => page)).toEqual([1, 2])
    const put = (x: number, y: number) => saveCodeSpots(teacher, { paperId, spots: [{ page: 1, rect: { x, y, w: 56.69, h: 56.69 } }] })
    await expect(put(60, 24)).rejects.toMatchObject({ code: 'code_place_bad', detail: { page: 1, why: 'over_print' } })
    await expect(put(300, 200)).rejects.toMatchObject({ detail: { why: 'over_space' } })
    await expect(put(590, 20)).rejects.toMatchObject({ detail: { why: 'off_page' } })
    expect((await readPrintPage(teacher, paperId)).spots).toEqual(spots)
    await expect(saveCodeSpots(await anActor('teacher'), { paperId, spots })).rejects.toMatchObject({ code: 'not_found' })
  })
  it('is asked for page by page before anything is printed, and looked at again', async () => {
    await expect(pack()).rejects.toMatchObject({ code: 'code_place_missing', detail: { page: 1 } })
    await spotted()
    const { spots } = await readPrintPage(teacher, paperId)
    await db()('answer_spaces').where({ page: 2 }).update(spots[1]!.rect)
    await expect(pack()).rejects.toMatchObject({ code: 'code_place_bad', detail: { page: 2, why: 'over_space' } })
    expect(await tokens()).toEqual([])
  })
})

describe('the print pack', () => {
  it('is the blank paper as drawings, with each name in its own alphabet, and codes that an outside reader reads', async () => {
    await spotted()
    const { bytes, name } = await pack(1)
    const file = asFile(bytes)
    assertClean(file)
    expect(name).toMatch(/^Percentages, ratio and area, .*\.pdf$/)
    expect(pageCountOf(file)).toBe(10)
    expect(imageCount(file)).toBe(0)
    expect(fontLines(file).filter((line) => line.includes('SHEAF')).every((line) => /yes yes yes/.test(line))).toBe(true)
    for (const [k, number] of expected.entries()) {
      const words = wordsOf(file, 2 * k + 1)
      expect(words).toContain(names[number]![1].slice(0, 10))
      expect(words).toContain(number)
      expect(wordsOf(file, 2 * k + 2)).toContain('page 2 of 2')
    }
    expect(wordsOf(file, 9)).toContain('Spare 1')
    const read = drawnPages(bytes, 150).map(codesByZbar)
    expect(read).toEqual((await tokens()).map((token) => [token]))
    expect(new Set(read.flat()).size).toBe(10)
    expect(Buffer.from(bytes).includes('8101')).toBe(false)
  })
  it('starts each script of a paper with one page on a sheet of its own', async () => {
    const one = await aClassSetPaper(teacher.userId, 'one-page')
    await saveCodeSpots(teacher, { paperId: one.paperId, spots: await suggestCodeSpots(teacher, { paperId: one.paperId, same: true }) })
    const { bytes } = await makePrintPack(teacher, { paperId: one.paperId, classSetId: one.classSetId, spares: 0, twoSided: true })
    expect(pageCountOf(asFile(bytes))).toBe(2 * Object.keys(one.students).length)
  })
})

describe('a scanned pack', () => {
  it('goes to the students whose names were printed, whatever the order; a second scan stays loose', async () => {
    await spotted()
    const { bytes } = await pack(1)
    // 8103 hands in page 1 alone; page 2 of 8101 is scanned twice; 9 and 10 are the spare script
    await scanned(bytes, [{ page: 8 }, { page: 2, upsideDown: true }, { page: 10 }, { page: 5 }, { page: 1 }, { page: 4, upsideDown: true }, { page: 9 }, { page: 2 }, { page: 7 }, { page: 3 }])
    const table = await readSortingTable(teacher, paperId)
    const numberOf = (studentId: string | null) => table.students.find((one) => one.studentId === studentId)?.candidateNumber ?? null
    const scripts = table.scripts.map(({ studentId, pages, missing }) => ({ number: numberOf(studentId), pages: pages.map(({ paperPage }) => paperPage), missing }))
    expect(scripts.sort((a, b) => (a.number ?? '9').localeCompare(b.number ?? '9'))).toEqual([
      { number: '8101', pages: [1, 2], missing: [] }, { number: '8102', pages: [1, 2], missing: [] }, { number: '8103', pages: [1], missing: [2] },
      { number: '8105', pages: [1, 2], missing: [] }, { number: null, pages: [1, 2], missing: [] },
    ])
    expect(table.loose.map(({ number, reasons }) => ({ number, reasons }))).toEqual([{ number: 8, reasons: ['duplicate_page'] }])

    // the lost page is printed anew and comes later: it joins
    const again = await pack()
    await scanned(again.bytes, [{ page: 6 }, { page: 5 }])
    const later = await readSortingTable(teacher, paperId)
    expect(later.scripts.find(({ studentId }) => numberOf(studentId) === '8103')!.missing).toEqual([])
    expect(later.scripts).toHaveLength(5)
    expect(later.loose.map(({ reasons }) => reasons)).toEqual([['duplicate_page'], ['duplicate_page']])

    // a page that came out badly is scanned anew in a sheaf of its own: the new scan takes the old one's place
    const current = async () => (await db()('script_pages').join('leaves', 'leaves.id', 'leaf_id').join('scripts', 'scripts.id', 'script_id').where({ student_id: table.students.find(({ candidateNumber }) => candidateNumber === '8102')!.studentId, 'script_pages.paper_page': 2 }).first<{ sheaf_id: string }>('sheaf_id')).sheaf_id
    const before = await current()
    await scanned(bytes, [{ page: 4 }])
    expect(await current()).not.toBe(before)
    expect((await readSortingTable(teacher, paperId)).loose).toHaveLength(2)
  }, 240_000)
})

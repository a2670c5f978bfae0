import { readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { PDFDocument } from 'pdf-lib'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'
import { layLeaf } from '@/lib/tasks/lay-leaf'
import { openRun } from '@/lib/tasks/open-run'
import { placeLeaf } from '@/lib/tasks/place-leaf'
import { pressStamp } from '@/lib/tasks/press-stamp'
import { readSheaf } from '@/lib/tasks/read-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { readStripPicture } from '@/lib/tasks/read-strip-picture'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'
import { aStamp } from '@/tests/make/stamp'

let teacher: Actor
let paperId: string
let classSetId: string
let truth: Awaited<ReturnType<typeof aClassSetPaper>>['truth']

/** Four scripts of the everyday pile: their leaves by candidate number and page. */
const pile: { number: string; leaves: [number, number] }[] = []
let made = 0

/** These leaves of the everyday pile as a sheaf of their own, read and placed. `turned`: put on the copier the other way up. */
async function scanned(leaves: readonly number[], turned = false): Promise<string> {
  const pdf = await PDFDocument.create()
  const source = await PDFDocument.load(readFileSync(classSetFile('everyday', 'scan.pdf')), { updateMetadata: false })
  for (const page of await pdf.copyPages(source, [...leaves])) pdf.addPage(page)
  // a file of its own even when it holds the same leaves
  pdf.setTitle(`${++made}`)
  if (turned) for (const page of pdf.getPages()) page.setRotation({ type: 'degrees', angle: 180 } as never)
  const file = path.join(env.dataFolder, `late-${made}.pdf`)
  writeFileSync(file, await pdf.save())
  const sheafId = await aWaitingSheaf(paperId, classSetId, file, leaves.length)
  await readSheaf(sheafId, () => true)
  return sheafId
}
/** As if page 2 of these scripts had not gone through the copier. */
async function without(...scripts: number[]): Promise<void> {
  const before = (await table()).scripts
  for (const n of scripts) await layLeaf(teacher, { leafId: before[n]!.pages.find(({ paperPage }) => paperPage === 2)!.leafId!, to: 'set_aside' })
}
const table = () => readSortingTable(teacher, paperId)
const stamps = () => db()('stamps').orderBy('id')
const leafAt = async (sheafId: string, position: number) => (await db()('leaves').where({ sheaf_id: sheafId, position }).first<{ id: string; state: string; script_page_id: string | null }>())!

/** A tick on the answer to the first question on a page of script `n`, and where its strip is found. */
async function marked(scriptId: string, page: number) {
  const question = (await db()('questions').join('answer_spaces', 'answer_spaces.question_id', 'questions.id').where({ paper_id: paperId, page }).orderBy('questions.position').first<{ question_id: string; id: string }>('answer_spaces.question_id', 'answer_spaces.id'))!
  const strip = async () => {
    const run = await openRun(teacher, { paperId, questionId: question.question_id, round: 'first' })
    const response = await db()('responses').where({ script_id: scriptId, question_id: question.question_id }).first<{ id: string }>('id')
    return run.strips.find(({ responseId }) => responseId === response!.id)!
  }
  const { responseId, pictures } = await strip()
  await pressStamp(teacher, aStamp({ responseId, scriptPageId: pictures[0]!.scriptPageId, x: pictures[0]!.rect.x + 40, y: pictures[0]!.rect.y + 30 }))
  return { strip, spaceId: question.id, responseId }
}

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId, truth } = await aClassSetPaper(teacher.userId, 'everyday'))
  pile.length = 0
  for (const number of [...new Set(truth.flatMap(({ candidate_number }) => candidate_number ?? []))]) {
    const own = (page: number) => truth.findIndex((leaf) => leaf.kind === 'script' && leaf.candidate_number === number && leaf.paper_page === page)
    if (own(1) >= 0 && own(2) >= 0 && pile.length < 4) pile.push({ number, leaves: [own(1), own(2)] })
  }
  // the class is these four and nobody else
  await db()('class_set_students').whereNotIn('candidate_number', pile.map(({ number }) => number)).delete()
})
afterEach(closeSchool)

describe('a page that comes after marking has begun', () => {
  it('joins the one script that lacks it; what was marked stays and its strips can be cut', async () => {
    await scanned(pile.flatMap(({ leaves }) => leaves))
    await without(1)
    const { scripts } = await table()
    const lacking = scripts.find(({ missing }) => missing.length > 0)!
    expect(scripts.map(({ missing }) => missing)).toEqual([[], [2], [], []])
    const { strip } = await marked(lacking.id, 1)
    const before = { stamps: await stamps(), shown: await strip() }

    const late = await scanned([pile[1]!.leaves[1]])
    expect(await leafAt(late, 0)).toMatchObject({ state: 'placed' })
    const now = (await table()).scripts
    expect(now).toHaveLength(4)
    expect(now.find(({ id }) => id === lacking.id)).toMatchObject({ missing: [] })
    expect(await stamps()).toEqual(before.stamps)
    expect(await strip()).toEqual({ ...before.shown, pages: expect.anything() as unknown })
    const { strip: second, spaceId, responseId } = await marked(lacking.id, 2)
    expect((await second()).pictures[0]!.src).not.toBeNull()
    expect((await readStripPicture(teacher, { responseId, spaceId, dpi: 100, key: null })).bytes.length).toBeGreaterThan(500)
  }, 240_000)

  it('is offered to those that lack it when it may be either’s, and goes there by one key', async () => {
    await scanned(pile.flatMap(({ leaves }) => leaves))
    await without(0, 1)
    const lacking = (await table()).scripts.filter(({ missing }) => missing.length > 0)
    expect(lacking).toHaveLength(2)
    await scanned([pile[1]!.leaves[1]])
    const { loose, scripts } = await table()
    expect(scripts).toHaveLength(4)
    expect(loose).toHaveLength(1)
    expect(loose[0]!.reasons).toContain('late_unsure')
    expect(loose[0]!.places.map(({ target, reason }) => ['scriptId' in target && lacking.some(({ id }) => id === target.scriptId), reason])).toEqual([[true, 'lacks_page'], [true, 'lacks_page']])
    await placeLeaf(teacher, { leafId: loose[0]!.id, target: { scriptId: lacking[1]!.id }, paperPage: 2 })
    expect((await table()).scripts.find(({ id }) => id === lacking[1]!.id)!.missing).toEqual([])
  }, 240_000)
})

describe('a new scan of a page', () => {
  it('takes the old one’s place: stamps stay where they were on the paper, strips are cut anew, the old scan is kept and can come back', async () => {
    const first = await scanned(pile.flatMap(({ leaves }) => leaves))
    const { scripts } = await table()
    const script = scripts[2]!
    const { strip, spaceId, responseId } = await marked(script.id, 2)
    const before = { stamps: await stamps(), shown: await strip(), picture: await readStripPicture(teacher, { responseId, spaceId, dpi: 100, key: null }) }
    expect(before.shown.rescanned).toBe(false)

    const second = await scanned([pile[2]!.leaves[1]], true)
    const leaf = await leafAt(second, 0)
    const page = script.pages.find(({ paperPage }) => paperPage === 2)!
    expect(leaf).toMatchObject({ state: 'placed', script_page_id: page.id })
    expect((await table()).scripts).toHaveLength(4)
    expect(await stamps()).toEqual(before.stamps)
    const after = await strip()
    expect(after.marking).toEqual(before.shown.marking)
    expect(after.rescanned).toBe(true)
    expect(after.pictures[0]!.rect).toEqual(before.shown.pictures[0]!.rect)
    expect(after.pictures[0]!.src).not.toBe(before.shown.pictures[0]!.src)
    expect((await readStripPicture(teacher, { responseId, spaceId, dpi: 100, key: null })).key).not.toBe(before.picture.key)
    // the older scan is still a leaf of that page, and holds again when the new one is taken out
    const old = await leafAt(first, pile.slice(0, 2).length * 2 + 1)
    expect(old).toMatchObject({ state: 'placed', script_page_id: page.id })
    await layLeaf(teacher, { leafId: leaf.id, to: 'loose' })
    expect((await strip()).pictures).toEqual(before.shown.pictures)
    expect(await stamps()).toEqual(before.stamps)
  }, 240_000)

  it('of a whole script makes no second script of it', async () => {
    await scanned(pile.flatMap(({ leaves }) => leaves))
    const before = (await table()).scripts.map(({ id }) => id)
    await scanned([...pile[0]!.leaves, ...pile[3]!.leaves])
    const { scripts, loose } = await table()
    expect(scripts.map(({ id }) => id)).toEqual(before)
    expect(loose).toEqual([])
  }, 240_000)
})

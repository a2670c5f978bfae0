import { readFileSync } from 'node:fs'
import sharp from 'sharp'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addStoredFile } from '@/db/stored-files'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { keepBytes } from '@/lib/infra/file-store'
import { openRun } from '@/lib/tasks/open-run'
import { readScriptPagePicture, readStripPicture } from '@/lib/tasks/read-strip-picture'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const folder = 'seeds/class-sets/everyday'
type TruthPage = { index: number; kind: string; paper_page: number; width_px: number; height_px: number; homography: number[][] }
const truth = JSON.parse(readFileSync(`${folder}/truth.json`, 'utf8')) as { pages: TruthPage[] }
const leaf = truth.pages.find((page) => page.kind === 'script' && page.paper_page === 1)!

let teacher: Actor
let paper: Awaited<ReturnType<typeof aPaper>>
let responseId: string
let scriptPageId: string
let spaceId: string

/** A real page of a real scan behind the first script. */
beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  paper = await aPaper({ owner: teacher.userId, students: 2 })
  ;({ responseId, scriptPageId } = await responseOf(paper.scriptIds[0]!, paper.questionIds[0]!))
  const kept = await keepBytes(readFileSync(`${folder}/scan.pdf`))
  const [fileId, sheafId, leafId] = [newId(), newId(), newId()]
  await addStoredFile(db(), { id: fileId, ...kept, mediaType: 'application/pdf', originalName: 'scan.pdf', createdBy: teacher.userId })
  await db()('sheaves').insert({ id: sheafId, paper_id: paper.paperId, file_id: fileId, state: 'placed', created_at: 1 })
  await db()('leaves').insert({ id: leafId, sheaf_id: sheafId, position: leaf.index, state: 'placed', width: leaf.width_px, height: leaf.height_px, homography: JSON.stringify(leaf.homography), paper_page: 1, script_page_id: scriptPageId })
  await db()('script_pages').where({ id: scriptPageId }).update({ leaf_id: leafId })
  spaceId = (await db()('answer_spaces').where({ question_id: paper.questionIds[0] }).first<{ id: string }>('id')).id
})
afterEach(closeSchool)

/** The shades within a box of a picture of a whole A4 page (box in paper points). */
async function shadesIn(bytes: Buffer, box: { x: number; y: number; w: number; h: number }): Promise<{ dark: number; light: number }> {
  const { width = 0 } = await sharp(bytes).metadata()
  const scale = width / 595.28
  const region = { left: Math.round(box.x * scale), top: Math.round(box.y * scale), width: Math.round(box.w * scale), height: Math.round(box.h * scale) }
  const data = await sharp(bytes).extract(region).greyscale().raw().toBuffer()
  return { dark: data.reduce((least, value) => Math.min(least, value), 255), light: data.reduce((most, value) => Math.max(most, value), 0) }
}
const nameBox = { x: 92, y: 92, w: 246, h: 26 }
const page = (actor: Actor) => readScriptPagePicture(actor, { scriptPageId, dpi: 100, key: null })

describe('pictures of a script', () => {
  it('cuts an answer space at the size asked for, under the address its run gave', async () => {
    const run = await openRun(teacher, { paperId: paper.paperId, questionId: paper.questionIds[0]!, round: 'first' })
    const src = run.strips.find((strip) => strip.responseId === responseId)!.pictures[0]!.src!
    const picture = await readStripPicture(teacher, { responseId, spaceId, dpi: 120, key: null })
    expect(src).toBe(`/api/strips/${responseId}/${spaceId}?v=${picture.key}`)
    const { width, height, format } = await sharp(picture.bytes).metadata()
    expect([width, height, format]).toEqual([832, 157, 'webp'])
  })

  it('covers the name while names are hidden, and shows it when the teacher shows names', async () => {
    const hidden = await shadesIn((await page(teacher)).bytes, nameBox)
    expect(hidden.dark).toBeGreaterThan(215)
    expect(hidden.light).toBeLessThan(242)
    await db()('papers').update({ names_hidden: 0 })
    expect((await shadesIn((await page(teacher)).bytes, nameBox)).dark).toBeLessThan(150)
  })

  it('never shows a name to a moderator, and only scripts of the sample', async () => {
    const moderator = await anActor('moderator')
    await db()('papers').update({ names_hidden: 0 })
    await expect(page(moderator)).rejects.toMatchObject({ code: 'not_found' })
    const sampleId = newId()
    await db()('samples').insert({ id: sampleId, class_set_id: paper.classSetId, moderator_id: moderator.userId, seed: 's', size: 1, default_size: 15, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
    await expect(page(moderator)).rejects.toMatchObject({ code: 'not_allowed' })
    await db()('sample_scripts').insert({ sample_id: sampleId, script_id: paper.scriptIds[0], position: 0, drawn_as: 'spread' })
    expect((await shadesIn((await page(moderator)).bytes, nameBox)).dark).toBeGreaterThan(215)
    const open = (await page(teacher)).key
    expect((await readScriptPagePicture(moderator, { scriptPageId, dpi: 100, key: open })).key).not.toBe(open)
  })

  it('is for those who mark the question, and for no student', async () => {
    for (const stranger of [await anActor('teacher'), await anActor('student'), await anActor('admin'), await anActor('marker')]) {
      await expect(page(stranger)).rejects.toMatchObject({ code: 'not_found' })
      await expect(readStripPicture(stranger, { responseId, spaceId, dpi: 100, key: null })).rejects.toMatchObject({ code: 'not_found' })
    }
    const other = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paper.paperId, user_id: other.userId, question_id: paper.questionIds[1] })
    await expect(readStripPicture(other, { responseId, spaceId, dpi: 100, key: null })).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('has nothing to show of a page that was not scanned', async () => {
    const other = await responseOf(paper.scriptIds[1]!, paper.questionIds[0]!)
    await expect(readStripPicture(teacher, { responseId: other.responseId, spaceId, dpi: 100, key: null })).rejects.toMatchObject({ code: 'not_found' })
  })
})

import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addStoredFile } from '@/db/stored-files'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { answersCutAgain, settingOf } from '@/lib/core/setting'
import { getPaper } from '@/db/papers'
import { env } from '@/lib/infra/env'
import { keepBytes } from '@/lib/infra/file-store'
import { openRun } from '@/lib/tasks/open-run'
import { everyPaper, pruneCuts } from '@/lib/tasks/prune-cuts'
import { readScriptPagePicture, readStripPicture } from '@/lib/tasks/read-strip-picture'
import { readSetting } from '@/lib/tasks/read-setting'
import { saveSetting } from '@/lib/tasks/save-setting'
import { aMarking } from '@/tests/make/marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

const folder = 'seeds/class-sets/everyday'
const truth = JSON.parse(readFileSync(`${folder}/truth.json`, 'utf8')) as { pages: { index: number; kind: string; paper_page: number; width_px: number; height_px: number; homography: number[][] }[] }
const leaf = truth.pages.find((page) => page.kind === 'script' && page.paper_page === 1)!

let teacher: Actor
let paper: Awaited<ReturnType<typeof aPaper>>
let leafId: string
let responseId: string
let scriptPageId: string
const cuts = () => readdirSync(path.join(env.dataFolder, 'cuts', leafId)).sort()
const strip = async () => (await openRun(teacher, { paperId: paper.paperId, questionId: paper.questionIds[0]!, round: 'first' })).strips.find((one) => one.responseId === responseId)!
const draw = async () => {
  const space = await db()('answer_spaces').where({ question_id: paper.questionIds[0] }).first<{ id: string }>('id')
  return readStripPicture(teacher, { responseId, spaceId: space.id, dpi: 100, key: null })
}
/** Moves the space of the first question by some points, as the Set page saves it. */
async function move(by: number): Promise<void> {
  const { setting, version } = await readSetting(teacher, paper.paperId)
  const questions = setting.questions.map((question, k) => (k === 0 ? { ...question, spaces: question.spaces.map((space) => ({ ...space, rect: { ...space.rect, y: space.rect.y + by } })) } : question))
  await saveSetting(teacher, { paperId: paper.paperId, version, setting: { ...setting, questions } })
}

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  paper = await aPaper({ owner: teacher.userId, students: 2 })
  ;({ responseId, scriptPageId } = await responseOf(paper.scriptIds[0]!, paper.questionIds[0]!))
  const [fileId, sheafId] = [newId(), newId()]
  leafId = newId()
  await addStoredFile(db(), { id: fileId, ...(await keepBytes(readFileSync(`${folder}/scan.pdf`))), mediaType: 'application/pdf', originalName: 'scan.pdf', createdBy: teacher.userId })
  await db()('sheaves').insert({ id: sheafId, paper_id: paper.paperId, file_id: fileId, state: 'placed', created_at: 1 })
  await db()('leaves').insert({ id: leafId, sheaf_id: sheafId, position: leaf.index, state: 'placed', width: leaf.width_px, height: leaf.height_px, homography: JSON.stringify(leaf.homography), paper_page: 1, script_page_id: scriptPageId })
  await db()('script_pages').where({ id: scriptPageId }).update({ leaf_id: leafId })
})
afterEach(closeSchool)

describe('moving an answer space', () => {
  it('cuts its answers out anew and leaves every stamp where it is', async () => {
    await aMarking({ script: paper.scriptIds[0]!, question: paper.questionIds[0]!, by: teacher.userId, worth: 2 })
    const stamps = await db()('stamps')
    const before = await strip()
    await move(6)
    const after = await strip()
    expect(await db()('stamps')).toEqual(stamps)
    expect(after.marking).toEqual(before.marking)
    expect(after.pictures[0]!.src).not.toBe(before.pictures[0]!.src)
    expect((await readSetting(teacher, paper.paperId)).scanned).toEqual({ 1: 1 })
    expect(await db()('jobs').where({ kind: 'prune-cuts', subject_id: paper.paperId }).pluck('state')).toEqual(['waiting'])
  })

  it('counts the answers that are cut out anew: those with a scan, once for each question', async () => {
    const setting = settingOf((await getPaper(db(), paper.paperId))!)
    const moved = { questions: setting.questions.map((question) => ({ ...question, spaces: question.spaces.map((space) => ({ ...space, rect: { ...space.rect, x: 1 } })) })) }
    expect(answersCutAgain(setting, moved, { 1: 30 })).toBe(60)
    expect(answersCutAgain(setting, moved, {})).toBe(0)
    expect(answersCutAgain(setting, { questions: setting.questions.map((question) => ({ ...question, label: 'x' })) }, { 1: 30 })).toBe(0)
  })
})

describe('sweeping away cuts', () => {
  it('takes those that nothing shows any more and keeps the others', async () => {
    const old = await draw()
    await readScriptPagePicture(teacher, { scriptPageId, dpi: 72, key: null })
    await move(6)
    const now = await draw()
    expect(cuts()).toHaveLength(4)
    await pruneCuts(paper.paperId, () => true, 0)
    expect(cuts()).toHaveLength(3)
    expect(cuts().some((name) => name.startsWith(old.key))).toBe(false)
    expect(cuts().some((name) => name.startsWith(now.key))).toBe(true)
    // kept a moment ago, a picture may still be in use
    await move(6)
    await pruneCuts(paper.paperId, () => true)
    expect(cuts()).toHaveLength(3)
  })

  it('lets readers draw and read meanwhile', async () => {
    for (let round = 0; round < 4; round++) {
      await move(1)
      const answers = await Promise.all([draw(), pruneCuts(everyPaper, () => true, 0), draw(), pruneCuts(everyPaper, () => true, 0), draw()])
      for (const answer of answers) if (typeof answer === 'object') expect(answer.bytes.length).toBeGreaterThan(500)
    }
  })

  it('takes what is left of leaves that are gone, with their folders', async () => {
    const gone = path.join(env.dataFolder, 'cuts', newId())
    mkdirSync(gone, { recursive: true })
    writeFileSync(path.join(gone, 'leaf'), 'x')
    await draw()
    await pruneCuts(paper.paperId, () => true, 0)
    expect(existsSync(gone)).toBe(true)
    await pruneCuts(everyPaper, () => true, 0)
    expect(existsSync(gone)).toBe(false)
    expect(cuts()).toHaveLength(2)
  })

  it('stops when it is told to', async () => {
    await draw()
    expect(await pruneCuts(everyPaper, () => false, 0)).toBe(false)
  })
})

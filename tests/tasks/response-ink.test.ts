import { deflateRawSync } from 'node:zlib'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addLeafReading } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { listUnwritten } from '@/db/responses'
import { getSheaf, startSheaf } from '@/db/sheaves'
import type { Actor } from '@/lib/core/actor'
import type { StrokeMap } from '@/lib/core/leaf'
import { mmPerPoint, type PaperRect } from '@/lib/core/paper-space'
import { settingOf } from '@/lib/core/setting'
import { addExtraPage } from '@/lib/tasks/add-extra-page'
import { layLeaf } from '@/lib/tasks/lay-leaf'
import { placeSheaf } from '@/lib/tasks/place-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { saveSetting } from '@/lib/tasks/save-setting'
import { undoSorting } from '@/lib/tasks/undo-sorting'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let classSetId: string

const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
const straight = [[2.7778, 0, 0], [0, 2.7778, 0], [0, 0, 1]] as const
const columns = 211

/** A page with a stroke of so many pixels in the middle of each of these boxes. */
function strokesIn(boxes: readonly PaperRect[], pixels: number): StrokeMap {
  const counts = new Uint8Array(columns * 297)
  for (const { x, y, w, h } of boxes) counts[Math.floor((y + h / 2) * mmPerPoint) * columns + Math.floor((x + w / 2) * mmPerPoint)] = pixels
  return { columns, cells: deflateRawSync(counts).toString('base64') }
}
const questions = async () => (await getPaper(db(), paperId))!.questions
/** One script whose first page has writing in every answer space but the first question's, and a sheet nobody knows. */
async function oneScript(): Promise<void> {
  const boxes = (await questions()).slice(1).flatMap(({ spaces }) => spaces)
  const sheafId = await aWaitingSheaf(paperId, classSetId, classSetFile('everyday', 'scan.pdf'), 3)
  await db().transaction(async (trx) => {
    await startSheaf(trx, sheafId, 3)
    for (const page of [1, 2]) {
      const guesses = [{ paperPage: page, rotation: 0, homography: straight, confidence: 0.9 }] as const
      await addLeafReading(trx, sheafId, { index: page - 1, image, empty: false, clear: true, ink: null, guesses, strokes: strokesIn(boxes.filter((space) => space.page === page).map(({ rect }) => rect), 80) })
    }
    await addLeafReading(trx, sheafId, { index: 2, image, empty: false, clear: false, ink: null, guesses: [] })
    await placeSheaf(trx, (await getSheaf(trx, sheafId))!, 2)
  })
}
const inks = async () => {
  const rows = (await db()('responses').join('questions', 'questions.id', 'question_id').orderBy('questions.position').pluck('ink')) as (number | null)[]
  return rows.map((ink) => (ink === null ? null : Math.round(ink * 10) / 10))
}

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId } = await aClassSetPaper(teacher.userId, 'everyday'))
  await oneScript()
})
afterEach(closeSchool)

describe('how much is written in a response', () => {
  it('is known as soon as its pages are placed, the emptiest first', async () => {
    const all = await questions()
    expect(await inks()).toEqual(all.map((_, k) => (k === 0 ? 0 : 5.2)))
    expect(await listUnwritten(db(), all[0]!.id)).toMatchObject([{ ink: 0 }])
    expect(await listUnwritten(db(), all[1]!.id)).toEqual([])
  })

  it('is measured again where an answer space was moved', async () => {
    const paper = (await getPaper(db(), paperId))!
    const setting = settingOf(paper)
    const moved = setting.questions.map((question, k) => (k === 0 ? { ...question, spaces: setting.questions[1]!.spaces.map((space) => ({ ...space, id: question.spaces[0]!.id })) } : question))
    await saveSetting(teacher, { paperId, version: paper.schemeVersion, setting: { ...setting, questions: moved } })
    expect((await inks())[0]).toBe(5.2)
  })

  it('is unknown once its page is taken out, and known again when that is undone', async () => {
    const before = await inks()
    const { scripts } = await readSortingTable(teacher, paperId)
    await layLeaf(teacher, { leafId: scripts[0]!.pages[0]!.leafId!, to: 'loose' })
    const all = await questions()
    expect(await inks()).toEqual(before.map((ink, k) => (all[k]!.spaces.some(({ page }) => page === 1) ? null : ink)))
    await undoSorting(teacher, paperId)
    expect(await inks()).toEqual(before)
  })

  it('says nothing of a script that has an extra page: the answer may stand there', async () => {
    const { loose, scripts } = await readSortingTable(teacher, paperId)
    await addExtraPage(teacher, { leafId: loose[0]!.id, target: { scriptId: scripts[0]!.id } })
    expect(await listUnwritten(db(), (await questions())[0]!.id)).toEqual([])
  })
})

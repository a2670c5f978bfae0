import path from 'node:path'
import sharp from 'sharp'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { listScriptPages } from '@/db/runs'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { env } from '@/lib/infra/env'
import { addExtraPage } from '@/lib/tasks/add-extra-page'
import { layLeaf } from '@/lib/tasks/lay-leaf'
import { placeLeaf } from '@/lib/tasks/place-leaf'
import { readLeafCrop } from '@/lib/tasks/read-leaf-crop'
import { readLeafPicture } from '@/lib/tasks/read-leaf-picture'
import { readScriptPagePicture } from '@/lib/tasks/read-strip-picture'
import { readSheaf } from '@/lib/tasks/read-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { aClassSetPaper } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aTwoUpScan } from '@/tests/make/two-up'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string

// Sheets of two pages: two students' whole scripts, and a third's first page alone on its sheet.
beforeAll(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  const made = await aClassSetPaper(teacher.userId, 'everyday')
  paperId = made.paperId
  const scan = path.join(env.dataFolder, `${newId()}.pdf`)
  await aTwoUpScan(scan, made.scan, [[0, 1], [2, 3], [4, null]])
  const sheafId = await aWaitingSheaf(paperId, made.classSetId, scan, 3)
  expect(await readSheaf(sheafId, () => true)).toBe(true)
})
afterAll(closeSchool)

const leaves = () => db()('leaves').orderBy(['position', 'half']).select<{ id: string; position: number; half: number; state: string; paper_page: number | null }[]>('id', 'position', 'half', 'state', 'paper_page')

it('a sheaf of two-page images becomes a leaf for each page, in scripts', async () => {
  expect((await leaves()).map(({ position, half, state, paper_page }) => [position, half, state, paper_page])).toEqual([
    [0, 0, 'placed', 1], [0, 1, 'placed', 2], [1, 0, 'placed', 1], [1, 1, 'placed', 2], [2, 0, 'placed', 1], [2, 1, 'blank', null],
  ])
  const { scripts, blank } = await readSortingTable(teacher, paperId)
  expect(scripts.map(({ pages, missing }) => [pages.length, missing])).toEqual([[2, []], [2, []], [1, [2]]])
  expect(blank).toMatchObject([{ number: 3, half: 1 }])
})

it('each leaf is shown by itself, and cut from its own half', async () => {
  const [left, right] = await leaves()
  const pictures = await Promise.all([left!, right!].map(({ id }) => readLeafPicture(teacher, { leafId: id, width: 4000 })))
  for (const picture of pictures) {
    const { width, height } = await sharp(picture).metadata()
    expect(width / height).toBeLessThan(0.8)
  }
  expect(Buffer.compare(Buffer.from(pictures[0]!), Buffer.from(pictures[1]!))).not.toBe(0)
  const box = await readLeafCrop(teacher, { leafId: left!.id, box: 'name' })
  const { channels } = await sharp(box.bytes).stats()
  expect(channels[0]!.min).toBeLessThan(120)
})

it('a leaf that a person takes out and puts back lies on its own half again', async () => {
  const right = (await leaves())[3]!
  const before = await db()('leaves').where({ id: right.id }).first<{ homography: string; script_page_id: string }>()
  const { script_id } = (await db()('script_pages').where({ id: before.script_page_id }).first<{ script_id: string }>())
  await layLeaf(teacher, { leafId: right.id, to: 'loose' })
  const { loose } = await readSortingTable(teacher, paperId)
  expect(loose).toMatchObject([{ id: right.id, half: 1 }])
  expect(loose[0]!.width! / loose[0]!.height!).toBeLessThan(0.8)
  await placeLeaf(teacher, { leafId: right.id, target: { scriptId: script_id }, paperPage: 2 })
  expect((await db()('leaves').where({ id: right.id }).first<{ homography: string }>()).homography).toBe(before.homography)
})

it('a leaf put in as an extra page shows its own half alone, not the student beside it', async () => {
  const [left] = await leaves()
  const scripts = (await readSortingTable(teacher, paperId)).scripts
  await addExtraPage(teacher, { leafId: left!.id, target: { scriptId: scripts[1]!.id } })
  const extra = (await listScriptPages(db(), scripts[1]!.id)).at(-1)!
  const { width, height } = await sharp((await readScriptPagePicture(teacher, { scriptPageId: extra.id, dpi: 72, key: null })).bytes).metadata()
  expect(extra.paperPage).toBeNull()
  expect(width / height).toBeLessThan(0.8)
})

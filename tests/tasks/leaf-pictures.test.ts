import { afterEach, beforeEach, expect, it } from 'vitest'
import sharp from 'sharp'
import { db, transaction } from '@/db/knex'
import { addLeafReading } from '@/db/leaves'
import { newId } from '@/lib/core/ids'
import type { Actor } from '@/lib/core/actor'
import type { Homography } from '@/lib/core/paper-space'
import { readLeafCrop } from '@/lib/tasks/read-leaf-crop'
import { readLeafPicture } from '@/lib/tasks/read-leaf-picture'
import { aClassSetPaper } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let leafId: string

// Leaf 17 of this set lay upside down: its true place is known.
beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  const made = await aClassSetPaper(teacher.userId, 'everyday')
  paperId = made.paperId
  const sheafId = await aWaitingSheaf(paperId, made.classSetId, made.scan, made.truth.length)
  const { index, homography } = made.truth[16]!
  const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
  await transaction((trx) => addLeafReading(trx, sheafId, { index, image, empty: false, clear: true, ink: null, guesses: [{ paperPage: 1, rotation: 180, homography: homography as unknown as Homography, confidence: 0.9 }] }))
  leafId = (await db()('leaves').first<{ id: string }>('id')).id
})
afterEach(closeSchool)

it('shows a leaf upright, as wide as asked and no wider than scanned', async () => {
  const upright = await sharp(await readLeafPicture(teacher, { leafId, width: 4000 })).greyscale().raw().toBuffer({ resolveWithObject: true })
  const asScanned = await sharp(await readLeafPicture(teacher, { leafId, width: 4000, turn: 0 })).greyscale().raw().toBuffer()
  expect(upright.info.width).toBe(1654)
  const turnedBack = Buffer.from(asScanned).reverse()
  const apart = upright.data.reduce((sum, value, k) => sum + Math.abs(value - turnedBack[k]!), 0) / upright.data.length
  expect(apart).toBeLessThan(6)
  expect((await sharp(await readLeafPicture(teacher, { leafId, width: 400 })).metadata()).width).toBe(400)
})

it('cuts the number boxes straight out of a leaf that lay upside down: the frame of the boxes runs round the cut', async () => {
  const { bytes } = await readLeafCrop(teacher, { leafId, box: 'number' })
  const { data, info } = await sharp(bytes).greyscale().raw().toBuffer({ resolveWithObject: true })
  const dark = (from: number, to: number) => Math.max(...Array.from({ length: to - from }, (_, y) => data.subarray((from + y) * info.width, (from + y + 1) * info.width).filter((value) => value < 150).length)) / info.width
  // the printed upper and lower edge, each within the first and last quarter
  expect(dark(0, Math.round(info.height / 4))).toBeGreaterThan(0.8)
  expect(dark(Math.round((info.height * 3) / 4), info.height)).toBeGreaterThan(0.8)
})

it('is for the owner alone: whole pages bear names', async () => {
  const marker = await anActor('marker')
  await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId, question_id: null })
  for (const [actor, code] of [[marker, 'not_allowed'], [await anActor('teacher'), 'not_found'], [await anActor('student'), 'not_found'], [await anActor('admin'), 'not_found']] as const) {
    await expect(readLeafPicture(actor, { leafId, width: 100 })).rejects.toMatchObject({ code })
    await expect(readLeafCrop(actor, { leafId, box: 'name' })).rejects.toMatchObject({ code })
  }
})

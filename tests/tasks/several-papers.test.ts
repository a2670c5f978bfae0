import { afterEach, beforeEach, expect, it } from 'vitest'
import { db, transaction } from '@/db/knex'
import { addLeafReading, getLeafEvidence } from '@/db/leaves'
import { getSheaf, listSheafPapers, startSheaf } from '@/db/sheaves'
import type { Actor } from '@/lib/core/actor'
import type { LeafReading } from '@/lib/core/leaf'
import { placeSheaf } from '@/lib/tasks/place-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let first: string
let second: string

const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
const straight = [[2.7778, 0, 0], [0, 2.7778, 0], [0, 0, 1]] as const
/** A leaf that is clearly a page of the first (0) or second (1) paper. */
const leaf = (index: number, paper: number, paperPage: number): LeafReading => ({ index, image, empty: false, clear: true, ink: null, guesses: [{ paper, paperPage, rotation: 0, homography: straight, confidence: 0.9 }] })

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  const [one, other] = [await aClassSetPaper(teacher.userId, 'everyday'), await aClassSetPaper(teacher.userId, 'one-page')]
  first = one.paperId
  second = other.paperId
  const sheafId = await aWaitingSheaf(first, one.classSetId, classSetFile('everyday', 'scan.pdf'), 6)
  await db()('sheaf_class_sets').insert({ sheaf_id: sheafId, class_set_id: other.classSetId })
  const sheaf = (await getSheaf(db(), sheafId))!
  expect(await listSheafPapers(db(), sheaf)).toEqual([first, second])
  await transaction(async (trx) => {
    await startSheaf(trx, sheafId, 6)
    for (const [index, [paper, page]] of ([[0, 1], [0, 2], [0, 1], [0, 2], [1, 1], [1, 1]] as const).entries()) await addLeafReading(trx, sheafId, leaf(index, paper, page))
    await placeSheaf(trx, (await getSheaf(trx, sheafId))!, 2, [{ paperId: second, pages: 1 }])
  })
})
afterEach(closeSchool)

it('a sheaf for two papers gives each paper its own scripts', async () => {
  const [one, other] = [await readSortingTable(teacher, first), await readSortingTable(teacher, second)]
  expect(one.scripts.map(({ pages }) => pages.length)).toEqual([2, 2])
  expect(other.scripts.map(({ pages }) => pages.length)).toEqual([1, 1])
  expect([one.loose.length, other.loose.length]).toEqual([0, 0])
})

it('a leaf of the other paper is that paper\'s from then on, and what was seen on it speaks of that paper alone', async () => {
  const leaves = await db()('leaves').orderBy('position').select<{ id: string; paper_id: string | null }[]>('id', 'paper_id')
  expect(leaves.map(({ paper_id }) => paper_id)).toEqual([null, null, null, null, second, second])
  const evidence = (await getLeafEvidence(db(), [leaves[4]!.id])).get(leaves[4]!.id)!
  expect(evidence.reading.guesses).toEqual([{ paperPage: 1, rotation: 0, homography: straight, confidence: 0.9 }])
})

import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addLeafReading } from '@/db/leaves'
import { getPaper } from '@/db/papers'
import { getSheaf, startSheaf } from '@/db/sheaves'
import type { Actor } from '@/lib/core/actor'
import { settingOf } from '@/lib/core/setting'
import { certainName } from '@/lib/core/sorting'
import { confirmCertainNames } from '@/lib/tasks/confirm-certain-names'
import { confirmName } from '@/lib/tasks/confirm-name'
import { placeSheaf } from '@/lib/tasks/place-sheaf'
import { saveSetting } from '@/lib/tasks/save-setting'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { undoSorting } from '@/lib/tasks/undo-sorting'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let classSetId: string
let students: Readonly<Record<string, string>>

const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
const straight = [[2.7778, 0, 0], [0, 2.7778, 0], [0, 0, 1]] as const
const sure = (digit: string) => Array.from({ length: 10 }, (_, k) => (k === Number(digit) ? 0.97 : 0.002))

/** Scripts of two pages whose first shows these numbers in its boxes; a dot is a box the reader could not tell. */
async function read(...numbers: string[]): Promise<void> {
  const boxes = (await getPaper(db(), paperId))!.boxes.filter(({ kind }) => kind === 'number').map(({ rect }) => rect)
  const sheafId = await aWaitingSheaf(paperId, classSetId, classSetFile('everyday', 'scan.pdf'), numbers.length * 2)
  await db().transaction(async (trx) => {
    await startSheaf(trx, sheafId, numbers.length * 2)
    for (const [k, number] of numbers.entries())
      for (const page of [1, 2]) {
        const guesses = [{ paperPage: page, rotation: 0, homography: straight, confidence: 0.9 }] as const
        const shown = page === 1 ? { boxes, shares: [...number].map((digit) => (digit === '.' ? null : sure(digit))) } : null
        await addLeafReading(trx, sheafId, { index: 2 * k + page - 1, image, empty: false, clear: true, ink: null, guesses, number: shown })
      }
    await placeSheaf(trx, (await getSheaf(trx, sheafId))!, 2)
  })
}
const table = () => readSortingTable(teacher, paperId)
const certain = async () =>
  (await table()).scripts.filter(({ studentId, suggestionCertainty }) => studentId === null && (suggestionCertainty ?? 0) >= certainName)
    .map(({ id, classSetId: own, suggestedStudentId }) => ({ scriptId: id, classSetId: own, studentId: suggestedStudentId! }))

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId, students } = await aClassSetPaper(teacher.userId, 'everyday'))
})
afterEach(closeSchool)

describe('names that the number boxes say', () => {
  it('are certain where the number is plainly read, and only then', async () => {
    const numbers = Object.keys(students)
    await read(numbers[3]!, numbers[0]!, `${numbers[7]!.slice(0, 3)}.`, '9999')
    const { scripts } = await table()
    expect(scripts.map(({ suggestedStudentId }) => suggestedStudentId).slice(0, 2)).toEqual([students[numbers[3]!], students[numbers[0]!]])
    expect(await certain()).toHaveLength(2)
    expect(scripts[2]).toMatchObject({ numberRead: `${numbers[7]!.slice(0, 3)}` })
    expect(scripts[3]).toMatchObject({ suggestedStudentId: null, suggestionCertainty: null, numberRead: '9999' })
  })

  it('are confirmed together, and taken back together', async () => {
    const numbers = Object.keys(students)
    await read(numbers[3]!, numbers[0]!, numbers[5]!)
    const before = (await table()).scripts
    await confirmCertainNames(teacher, paperId, await certain())
    expect((await table()).scripts.map(({ studentId }) => studentId)).toEqual([3, 0, 5].map((k) => students[numbers[k]!]))
    expect((await table()).lastAct).toBe('script.certain-named')
    await undoSorting(teacher, paperId)
    expect((await table()).scripts).toEqual(before)
  })

  it('none is confirmed when one is no longer what was shown, or was never certain', async () => {
    const numbers = Object.keys(students)
    await read(numbers[3]!, numbers[0]!, `..${numbers[7]!.slice(2)}`)
    const shown = await certain()
    await confirmName(teacher, { ...shown[1]! })
    await expect(confirmCertainNames(teacher, paperId, shown)).rejects.toMatchObject({ code: 'out_of_date' })
    const third = (await table()).scripts[2]!
    await expect(confirmCertainNames(teacher, paperId, [{ scriptId: third.id, classSetId, studentId: students[numbers[7]!]! }])).rejects.toMatchObject({ code: 'out_of_date' })
    expect((await table()).scripts.map(({ studentId }) => studentId)).toEqual([null, students[numbers[0]!], null])
  })

  it('are not certain any more once the boxes are moved: nobody has read the new ones', async () => {
    await read(Object.keys(students)[3]!)
    expect(await certain()).toHaveLength(1)
    const paper = (await getPaper(db(), paperId))!
    const setting = settingOf(paper)
    const boxes = setting.boxes.map((box) => (box.kind === 'number' ? { ...box, rect: { ...box.rect, y: box.rect.y + 20 } } : box))
    await saveSetting(teacher, { paperId, version: paper.schemeVersion, setting: { ...setting, boxes } })
    expect(await certain()).toEqual([])
  })

  it('are no business of somebody else, nor of another paper', async () => {
    const numbers = Object.keys(students)
    await read(numbers[3]!)
    await expect(confirmCertainNames(await anActor('teacher'), paperId, await certain())).rejects.toMatchObject({ code: 'not_found' })
    const other = await aClassSetPaper(teacher.userId, 'one-page')
    await expect(confirmCertainNames(teacher, other.paperId, await certain())).rejects.toMatchObject({ code: 'not_found' })
  })
})

import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addLeafReading } from '@/db/leaves'
import { getSheaf, startSheaf } from '@/db/sheaves'
import type { Actor } from '@/lib/core/actor'
import type { LeafReading } from '@/lib/core/leaf'
import { newId } from '@/lib/core/ids'
import { addExtraPage } from '@/lib/tasks/add-extra-page'
import { confirmName, takeNameAway } from '@/lib/tasks/confirm-name'
import { layLeaf, turnLeaf } from '@/lib/tasks/lay-leaf'
import { noteAttendance } from '@/lib/tasks/note-attendance'
import { placeLeaf } from '@/lib/tasks/place-leaf'
import { placeSheaf } from '@/lib/tasks/place-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { undoSorting } from '@/lib/tasks/undo-sorting'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let classSetId: string
let students: Readonly<Record<string, string>>

const image = { encoding: 'jpeg', width: 1654, height: 2339, dpiX: 200, dpiY: 200, shownTurn: 0 } as const
const straight = [[2.7778, 0, 0], [0, 2.7778, 0], [0, 0, 1]] as const
/** A leaf that is clearly a page of the paper; 0 is an empty one, null one that nobody can tell. */
const leaf = (index: number, page: number | null): LeafReading => page
  ? { index, image, empty: false, clear: true, ink: null, guesses: [{ paperPage: page, rotation: 0, homography: straight, confidence: 0.9 }] }
  : { index, image, empty: page === 0, clear: false, ink: null, guesses: [] }

/** A sheaf whose leaves show these pages, read and placed by the engine's own rule. */
async function placed(...pages: (number | null)[]): Promise<void> {
  const sheafId = await aWaitingSheaf(paperId, classSetId, classSetFile('everyday', 'scan.pdf'), pages.length)
  await db().transaction(async (trx) => {
    await startSheaf(trx, sheafId, pages.length)
    for (const [index, page] of pages.entries()) await addLeafReading(trx, sheafId, leaf(index, page))
    await placeSheaf(trx, (await getSheaf(trx, sheafId))!, 2)
  })
}
const table = () => readSortingTable(teacher, paperId)
const everything = async () => ({
  leaves: await db()('leaves').orderBy('position').select('id', 'state', 'turn', 'homography', 'paper_page', 'script_page_id'),
  pages: await db()('script_pages').orderBy('id'), scripts: await db()('scripts').orderBy('position').select('id', 'student_id', 'position'),
  attendance: await db()('class_set_students').orderBy('candidate_number').pluck('attendance'),
})

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId, students } = await aClassSetPaper(teacher.userId, 'everyday'))
})
afterEach(closeSchool)

describe('a sheaf that is read', () => {
  it('becomes scripts, loose sheets and blank ones, with a response for every question', async () => {
    await placed(1, 2, 1, 2, 0, null, 1, 2)
    const { scripts, loose, blank } = await table()
    expect(scripts.map(({ pages }) => pages.map(({ paperPage }) => paperPage))).toEqual([[1, 2], [1, 2], [1, 2]])
    expect(loose.map(({ number }) => number)).toEqual([6])
    expect(blank.map(({ number }) => number)).toEqual([5])
    expect(await db()('responses').count({ n: '*' }).first()).toEqual({ n: 33 })
  })

  it('suggests names in the order of the list and confirms none', async () => {
    await placed(...Array.from({ length: 20 }, () => [1, 2]).flat())
    const { scripts } = await table()
    expect(scripts.every(({ studentId }) => studentId === null)).toBe(true)
    expect(scripts[1]).toMatchObject({ suggestedStudentId: students['8102'], suggestionReason: 'list_order' })
  })
})

describe('placing a loose sheet', () => {
  beforeEach(() => placed(1, 2, 1, null, 1, 2))

  it('is offered the places near it and goes where the person says', async () => {
    const { loose, scripts } = await table()
    const lone = loose.find(({ number }) => number === 4)!
    const scriptId = scripts[0]!.id
    await layLeaf(teacher, { leafId: scripts[0]!.pages[1]!.leafId!, to: 'loose' })
    const corners = [{ x: 0, y: 0 }, { x: 1654, y: 0 }, { x: 1654, y: 2339 }, { x: 0, y: 2339 }]
    await placeLeaf(teacher, { leafId: lone.id, target: { scriptId }, paperPage: 2, corners })
    const now = (await table()).scripts.find(({ id }) => id === scriptId)!
    expect(now.pages.map(({ leafId, paperPage }) => [paperPage, leafId])).toContainEqual([2, lone.id])
    const row = await db()('leaves').where({ id: lone.id }).first<{ homography: string }>('homography')
    expect((JSON.parse(row.homography) as number[][])[0]![0]).toBeCloseTo(1654 / 595.28, 4)
  })

  it('refuses a place where a page lies, and takes it as a re-scan when told to', async () => {
    const { scripts } = await table()
    const [first] = scripts
    const taken = first!.pages[1]!
    const spare = scripts.at(-1)!.pages[1]!.leafId!
    const place = { leafId: spare, target: { scriptId: first!.id }, paperPage: 2 }
    await expect(placeLeaf(teacher, place)).rejects.toMatchObject({ code: 'place_taken' })
    await placeLeaf(teacher, { ...place, instead: true })
    const page = (await table()).scripts[0]!.pages[1]!
    expect(page).toEqual({ ...taken, leafId: spare, older: 1 })
    expect(await db()('leaves').where({ id: taken.leafId! }).first('state', 'script_page_id')).toEqual({ state: 'placed', script_page_id: taken.id })
    // taken out again, the older scan holds as before
    await layLeaf(teacher, { leafId: spare, to: 'loose' })
    expect((await table()).scripts[0]!.pages[1]).toEqual(taken)
  })

  it('asks for the corners when the print of that page is not on it', async () => {
    const blank = (await table()).loose.find(({ number }) => number === 4)!
    await db()('leaves').where({ id: blank.id }).update({ position: 10 })
    await expect(placeLeaf(teacher, { leafId: blank.id, target: { classSetId, studentId: students['8132']! }, paperPage: 1 })).rejects.toMatchObject({ code: 'no_registration' })
    const crossed = [{ x: 0, y: 0 }, { x: 1654, y: 2339 }, { x: 1654, y: 0 }, { x: 0, y: 2339 }]
    await expect(placeLeaf(teacher, { leafId: blank.id, target: { classSetId, studentId: students['8132']! }, paperPage: 1, corners: crossed })).rejects.toMatchObject({ code: 'bad_input' })
  }, 60_000)

  it('starts a named script for a student who has none, who then was not absent', async () => {
    await noteAttendance(teacher, { classSetId, studentId: students['8132']!, attendance: 'absent' })
    const { loose } = await table()
    await addExtraPage(teacher, { leafId: loose[0]!.id, target: { classSetId, studentId: students['8132']! } })
    const { scripts, students: listed } = await table()
    const script = scripts.find(({ studentId }) => studentId === students['8132'])!
    expect(script.pages).toMatchObject([{ paperPage: null, leafId: loose[0]!.id }])
    expect(listed.find(({ studentId }) => studentId === students['8132'])).toMatchObject({ attendance: 'expected', scriptId: script.id })
  })
})

describe('undo', () => {
  beforeEach(() => placed(1, 2, 1, null, 1, 2, 0))

  it('takes back every decision, the last one first, to the very rows of before', async () => {
    const { loose, blank, scripts } = await table()
    const states = [await everything()]
    const step = async (act: Promise<unknown>) => { await act; states.push(await everything()) }
    await step(confirmName(teacher, { scriptId: scripts[0]!.id, classSetId, studentId: students['8102']! }))
    await step(layLeaf(teacher, { leafId: blank[0]!.id, to: 'loose' }))
    await step(turnLeaf(teacher, { leafId: loose[0]!.id, turn: 180 }))
    await step(addExtraPage(teacher, { leafId: loose[0]!.id, target: { classSetId, studentId: students['8132']! } }))
    await step(placeLeaf(teacher, { leafId: scripts[1]!.pages[1]!.leafId!, target: { scriptId: scripts[0]!.id }, paperPage: 2, instead: true }))
    await step(layLeaf(teacher, { leafId: scripts[1]!.pages[0]!.leafId!, to: 'set_aside' }))
    await step(noteAttendance(teacher, { classSetId, studentId: students['8144']!, attendance: 'excused' }))
    await step(takeNameAway(teacher, { scriptId: scripts[0]!.id }))
    while (states.length > 1) {
      states.pop()
      await undoSorting(teacher, paperId)
      expect(await everything()).toEqual(states.at(-1))
    }
    await expect(undoSorting(teacher, paperId)).rejects.toMatchObject({ code: 'not_found' })
    expect(await db()('audit_lines').where({ act: 'sorting.undone' }).count({ n: '*' }).first()).toEqual({ n: 8 })
  })

  it('does not undo what someone else changed since', async () => {
    const { loose } = await table()
    const other = await anActor('teacher')
    await db()('paper_owners').insert({ paper_id: paperId, user_id: other.userId })
    await layLeaf(teacher, { leafId: loose[0]!.id, to: 'set_aside' })
    await layLeaf(other, { leafId: loose[0]!.id, to: 'loose' })
    await expect(undoSorting(teacher, paperId)).rejects.toMatchObject({ code: 'out_of_date' })
  })

  it('never takes away a page that was marked since', async () => {
    const { loose } = await table()
    await addExtraPage(teacher, { leafId: loose[0]!.id, target: { classSetId, studentId: students['8132']! } })
    const script = (await table()).scripts.find(({ studentId }) => studentId === students['8132'])!
    const response = await db()('responses').where({ script_id: script.id }).first<{ id: string }>('id')
    await db()('markings').insert({ id: newId(), response_id: response.id, round: 'first', marker_id: teacher.userId, created_at: 1 })
    await expect(undoSorting(teacher, paperId)).rejects.toMatchObject({ code: 'has_stamps' })
    expect((await table()).scripts.some(({ id }) => id === script.id)).toBe(true)
  })
})

describe('names', () => {
  beforeEach(() => placed(...Array.from({ length: 20 }, () => [1, 2]).flat()))

  it('shift what is suggested after a name that is not next on the list', async () => {
    const { scripts } = await table()
    await confirmName(teacher, { scriptId: scripts[1]!.id, classSetId, studentId: students['8103']! })
    const after = (await table()).scripts
    expect(after[0]!.suggestedStudentId).toBe(students['8101'])
    expect(after[2]!.suggestedStudentId).toBe(students['8105'])
  })

  it('are given to one script only', async () => {
    const { scripts } = await table()
    await confirmName(teacher, { scriptId: scripts[0]!.id, classSetId, studentId: students['8101']! })
    await expect(confirmName(teacher, { scriptId: scripts[1]!.id, classSetId, studentId: students['8101']! })).rejects.toMatchObject({ code: 'name_taken', detail: { script: 1 } })
  })

  it('are not for a student of another paper', async () => {
    const { scripts } = await table()
    const other = await aClassSetPaper(teacher.userId, 'one-page')
    await expect(confirmName(teacher, { scriptId: scripts[0]!.id, classSetId: other.classSetId, studentId: Object.values(other.students)[0]! })).rejects.toMatchObject({ code: 'not_found' })
  })
})

describe('who may sort', () => {
  beforeEach(() => placed(1, 2, null))

  it('is the owner alone: a marker of the paper may not, another teacher finds nothing', async () => {
    const { loose, scripts } = await table()
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId, question_id: null })
    const stranger = await anActor('teacher')
    const student = await anActor('student')
    const acts = (actor: Actor) => [
      readSortingTable(actor, paperId), undoSorting(actor, paperId), layLeaf(actor, { leafId: loose[0]!.id, to: 'set_aside' }), turnLeaf(actor, { leafId: loose[0]!.id, turn: 90 }),
      placeLeaf(actor, { leafId: loose[0]!.id, target: { scriptId: scripts[0]!.id }, paperPage: 1 }), addExtraPage(actor, { leafId: loose[0]!.id, target: { scriptId: scripts[0]!.id } }),
      confirmName(actor, { scriptId: scripts[0]!.id, classSetId, studentId: students['8101']! }), takeNameAway(actor, { scriptId: scripts[0]!.id }),
      noteAttendance(actor, { classSetId, studentId: students['8101']!, attendance: 'absent' }),
    ]
    const before = await everything()
    for (const [actor, code] of [[marker, 'not_allowed'], [stranger, 'not_found'], [student, 'not_found']] as const) {
      for (const act of await Promise.allSettled(acts(actor))) expect(act).toMatchObject({ status: 'rejected', reason: { code } })
    }
    expect(await everything()).toEqual(before)
  })
})

import fc from 'fast-check'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { listMarkingsOfResponse } from '@/db/markings'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { markOf } from '@/lib/core/marking'
import type { PressedStamp } from '@/lib/core/stamp'
import { listRuns } from '@/lib/tasks/list-runs'
import { openRun } from '@/lib/tasks/open-run'
import { pressStamp } from '@/lib/tasks/press-stamp'
import { raiseFlag } from '@/lib/tasks/raise-flag'
import { reopenMarking } from '@/lib/tasks/reopen-marking'
import { settleMarking } from '@/lib/tasks/settle-marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aStamp } from '@/tests/make/stamp'

let teacher: Actor
let paper: Awaited<ReturnType<typeof aPaper>>
let responseId: string
let scriptPageId: string

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  paper = await aPaper({ owner: teacher.userId, questions: [{ label: '1', worths: [2, 1] }, { label: '2', worths: [4] }], students: 4 })
  ;({ responseId, scriptPageId } = await responseOf(paper.scriptIds[0]!, paper.questionIds[0]!))
})
afterEach(closeSchool)

const points = async (k = 0) => (await db()('mark_points').where({ question_id: paper.questionIds[k] }).orderBy('position').pluck('id')) as string[]
const linesOf = async () => (await db()('audit_lines').orderBy('id').select('act', 'from_value', 'to_value', 'actor_id')) as { act: string; from_value: string | null; to_value: string | null; actor_id: string }[]
const markNow = async () => markOf((await listMarkingsOfResponse(db(), responseId, 'first'))[0]?.stamps ?? [])
const aMarker = async (questionId: string | null = null) => {
  const marker = await anActor('marker')
  await db()('paper_markers').insert({ id: newId(), paper_id: paper.paperId, user_id: marker.userId, question_id: questionId })
  return marker
}

describe('pressing a stamp', () => {
  it('begins the marking with its first stamp and says the mark', async () => {
    expect(await db()('markings').select()).toEqual([])
    const [first, second] = await points()
    expect(await pressStamp(teacher, aStamp({ responseId, markPointId: first, scriptPageId }))).toEqual({ mark: 2, kept: true })
    expect(await pressStamp(teacher, aStamp({ responseId, markPointId: second, worth: 1 }))).toEqual({ mark: 3, kept: true })
    expect(await db()('markings').select()).toHaveLength(1)
  })

  it('stores what is sent twice once, and leaves an older version out', async () => {
    const stamp = aStamp({ responseId })
    await pressStamp(teacher, stamp)
    expect(await pressStamp(teacher, stamp)).toEqual({ mark: 2, kept: false })
    await pressStamp(teacher, { ...stamp, version: 3, x: 340 })
    expect(await pressStamp(teacher, { ...stamp, version: 2, x: 320 })).toEqual({ mark: 2, kept: false })
    const rows = (await db()('stamps').select('id', 'version', 'x')) as unknown[]
    expect(rows).toEqual([{ id: stamp.id, version: 3, x: 340 }])
    expect((await linesOf()).map((line) => line.act)).toEqual(['stamp.pressed'])
  })

  it('does not bring back what was taken back when the first sending comes late', async () => {
    const stamp = aStamp({ responseId })
    await pressStamp(teacher, { ...stamp, version: 2, removed: true })
    expect(await pressStamp(teacher, stamp)).toEqual({ mark: 0, kept: false })
    expect(await markNow()).toBe(0)
  })

  it('writes nothing above the maximum, above a point or off the step', async () => {
    const [first] = await points()
    await pressStamp(teacher, aStamp({ responseId, markPointId: first }))
    await expect(pressStamp(teacher, aStamp({ responseId, markPointId: first, worth: 1 }))).rejects.toMatchObject({ code: 'over_maximum', detail: { point: 'Point 1' } })
    await expect(pressStamp(teacher, aStamp({ responseId }))).rejects.toMatchObject({ code: 'over_maximum' })
    await db()('papers').update({ marking_step: 2 })
    await expect(pressStamp(teacher, aStamp({ responseId, worth: 1 }))).rejects.toMatchObject({ code: 'off_step' })
    expect(await db()('stamps').select()).toHaveLength(1)
    expect(await db()('audit_lines').select()).toHaveLength(1)
  })

  it('takes nothing for a point of another question, a page of another script, or an id of another marking', async () => {
    const [elsewhere] = await points(1)
    const other = await responseOf(paper.scriptIds[1]!, paper.questionIds[0]!)
    await expect(pressStamp(teacher, aStamp({ responseId, markPointId: elsewhere }))).rejects.toMatchObject({ code: 'bad_input' })
    await expect(pressStamp(teacher, aStamp({ responseId, scriptPageId: other.scriptPageId }))).rejects.toMatchObject({ code: 'bad_input' })
    const stamp = aStamp({ responseId })
    await pressStamp(teacher, stamp)
    await expect(pressStamp(teacher, { ...stamp, responseId: other.responseId, version: 9 })).rejects.toMatchObject({ code: 'bad_input' })
  })

  it('is for those who mark the question', async () => {
    const stranger = await anActor('marker')
    const other = await aMarker(paper.questionIds[1]!)
    const colleague = await anActor('teacher')
    await expect(pressStamp(stranger, aStamp({ responseId }))).rejects.toMatchObject({ code: 'not_found' })
    await expect(pressStamp(colleague, aStamp({ responseId }))).rejects.toMatchObject({ code: 'not_found' })
    await expect(pressStamp(other, aStamp({ responseId }))).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(pressStamp(teacher, aStamp({ responseId: newId() }))).rejects.toMatchObject({ code: 'not_found' })
    await expect(pressStamp(teacher, aStamp({ responseId, round: 'review' }))).rejects.toMatchObject({ code: 'bad_input' })
    expect(await db()('markings').select()).toEqual([])
  })

  it('leaves a response that another marker has begun to that marker, until all is taken back', async () => {
    const marker = await aMarker()
    const stamp = aStamp({ responseId })
    await pressStamp(marker, stamp)
    await expect(pressStamp(teacher, aStamp({ responseId }))).rejects.toMatchObject({ code: 'begun_by_other' })
    await pressStamp(marker, { ...stamp, version: 2, removed: true })
    expect(await pressStamp(teacher, aStamp({ responseId }))).toEqual({ mark: 2, kept: true })
    await expect(pressStamp(marker, aStamp({ responseId }))).rejects.toMatchObject({ code: 'begun_by_other' })
  })

  it('is refused while the marking is settled or the question withdrawn', async () => {
    const stamp = aStamp({ responseId })
    await pressStamp(teacher, stamp)
    await settleMarking(teacher, { responseId, round: 'first' })
    await expect(pressStamp(teacher, aStamp({ responseId, worth: 1 }))).rejects.toMatchObject({ code: 'marking_settled' })
    expect(await pressStamp(teacher, stamp), 'a late repeat is no change').toEqual({ mark: 2, kept: false })
    await reopenMarking(teacher, { responseId, round: 'first' })
    await db()('questions').where({ id: paper.questionIds[0] }).update({ withdrawn_as: 'out', withdrawn_at: 1 })
    await expect(pressStamp(teacher, aStamp({ responseId, worth: 1 }))).rejects.toMatchObject({ code: 'question_withdrawn' })
  })

  it('leaves a line for every change of a mark: who, from, to', async () => {
    const stamp = aStamp({ responseId })
    await pressStamp(teacher, stamp)
    await pressStamp(teacher, { ...stamp, version: 2, worth: aStamp({ responseId, worth: 1 }).worth, kind: 'half' })
    await pressStamp(teacher, { ...stamp, version: 3, x: 310, worth: aStamp({ responseId, worth: 1 }).worth, kind: 'half' })
    await pressStamp(teacher, { ...stamp, version: 4, removed: true })
    expect(await linesOf()).toEqual([
      { act: 'stamp.pressed', from_value: '0', to_value: '2', actor_id: teacher.userId },
      { act: 'stamp.changed', from_value: '2', to_value: '1', actor_id: teacher.userId },
      { act: 'stamp.taken-back', from_value: '1', to_value: '0', actor_id: teacher.userId },
    ])
  })

  it('ends in one state and one mark whatever order two windows’ versions arrive in', async () => {
    const ids = [newId(), newId()]
    const version = fc.record({ id: fc.constantFrom(...ids), x: fc.integer({ min: 50, max: 500 }), removed: fc.boolean() })
    await fc.assert(fc.asyncProperty(fc.array(version, { minLength: 1, maxLength: 8 }), fc.func(fc.integer()), async (list, key) => {
      await db()('stamps').delete()
      await db()('markings').delete()
      const sent: PressedStamp[] = list.map((one, k) => ({ ...aStamp({ responseId, worth: 1 }), ...one, version: k + 1 }))
      const arriving = [...sent, ...sent.slice(0, 3)].sort((a, b) => key(a.version, a.id) - key(b.version, b.id))
      for (const stamp of arriving) await pressStamp(teacher, stamp)
      const last = ids.flatMap((id) => sent.findLast((stamp) => stamp.id === id) ?? [])
      const [marking] = await listMarkingsOfResponse(db(), responseId, 'first')
      const stored = Object.fromEntries(marking!.stamps.map(({ id, x, removed }) => [id, { x, removed }]))
      expect(stored).toEqual(Object.fromEntries(last.map(({ id, x, removed }) => [id, { x, removed }])))
      expect(markOf(marking!.stamps)).toBe(last.filter((stamp) => !stamp.removed).length)
    }), { numRuns: 25 })
  })
})

describe('settling', () => {
  const counting = async () => (await db()('counting_decisions').select('marking_id', 'reason', 'superseded_at')) as { marking_id: string; reason: string; superseded_at: number | null }[]

  it('lets a first marking count, once however often it is settled, and again after it was opened', async () => {
    await expect(settleMarking(teacher, { responseId, round: 'first' })).rejects.toMatchObject({ code: 'nothing_stamped' })
    await pressStamp(teacher, aStamp({ responseId }))
    expect(await settleMarking(teacher, { responseId, round: 'first' })).toEqual({ mark: 2 })
    await settleMarking(teacher, { responseId, round: 'first' })
    await reopenMarking(teacher, { responseId, round: 'first' })
    await reopenMarking(teacher, { responseId, round: 'first' })
    await settleMarking(teacher, { responseId, round: 'first' })
    const [marking] = await listMarkingsOfResponse(db(), responseId, 'first')
    expect(await counting()).toEqual([{ marking_id: marking!.id, reason: 'first_mark', superseded_at: null }])
    expect((await linesOf()).map((line) => line.act)).toEqual(['stamp.pressed', 'marking.settled', 'marking.reopened', 'marking.settled'])
  })

  it('asks for the method mark of an answer mark', async () => {
    const [method, answer] = await points()
    await db()('mark_points').where({ id: answer }).update({ kind: 'A', depends_on: method })
    await pressStamp(teacher, aStamp({ responseId, markPointId: answer, worth: 1 }))
    await expect(settleMarking(teacher, { responseId, round: 'first' })).rejects.toMatchObject({ code: 'base_missing', detail: { point: 'Point 2', base: 'Point 1' } })
    await pressStamp(teacher, aStamp({ responseId, markPointId: method }))
    expect(await settleMarking(teacher, { responseId, round: 'first' })).toEqual({ mark: 3 })
  })

  it('keeps a nought and nothing written apart from no mark', async () => {
    await pressStamp(teacher, aStamp({ responseId, worth: 0, kind: 'nothing-written' }))
    expect(await settleMarking(teacher, { responseId, round: 'first' })).toEqual({ mark: 0 })
    const run = await openRun(teacher, { paperId: paper.paperId, questionId: paper.questionIds[0]!, round: 'first' })
    expect(run.strips.filter((strip) => strip.marking?.state === 'settled')).toHaveLength(1)
    expect(run.strips.filter((strip) => strip.marking === null)).toHaveLength(3)
  })
})

describe('a run', () => {
  const run = (actor: Actor) => openRun(actor, { paperId: paper.paperId, questionId: paper.questionIds[0]!, round: 'first' })

  it('holds every response once, in an order that stays, and makes no marking', async () => {
    const opened = await run(teacher)
    expect(opened.strips.map((strip) => strip.number)).toEqual([1, 2, 3, 4])
    expect((await run(teacher)).strips.map((strip) => strip.responseId)).toEqual(opened.strips.map((strip) => strip.responseId))
    expect(await db()('markings').select()).toEqual([])
    expect(opened.strips[0]!.pictures[0]).toMatchObject({ rect: { x: 48, w: 499 }, src: null })
  })

  it('says no name while names are hidden, and says them when the teacher shows them', async () => {
    expect(JSON.stringify(await run(teacher))).not.toMatch(/Given\d|Family\d/)
    await db()('papers').update({ names_hidden: 0 })
    expect((await run(teacher)).strips.map((strip) => strip.name).sort()).toEqual(['Given0 Family0', 'Given1 Family1', 'Given2 Family2', 'Given3 Family3'])
  })

  it('shows a marker what another has begun without their stamps, and the owner with them', async () => {
    const [one, two] = [await aMarker(), await aMarker()]
    await pressStamp(one, aStamp({ responseId, text: 'only for one' }))
    const forTwo = (await run(two)).strips.find((strip) => strip.responseId === responseId)!
    expect(forTwo).toMatchObject({ bar: 'begun-by-other', marking: null })
    expect(JSON.stringify(await run(two))).not.toContain('only for one')
    const forOwner = (await run(teacher)).strips.find((strip) => strip.responseId === responseId)!
    expect(forOwner.bar).toBe('begun-by-other')
    expect(forOwner.marking?.stamps).toHaveLength(1)
  })

  it('is listed with what is settled and begun, for the questions a person marks', async () => {
    const mine = await aMarker(paper.questionIds[0])
    const other = await responseOf(paper.scriptIds[1]!, paper.questionIds[0]!)
    await pressStamp(mine, aStamp({ responseId }))
    await settleMarking(mine, { responseId, round: 'first' })
    await db()('script_pages').where({ id: other.scriptPageId }).update({ paper_page: null, extra: 1 })
    await pressStamp(mine, aStamp({ responseId: other.responseId }))
    expect(await listRuns(mine, paper.paperId), 'no page was scanned: only what was settled can be counted').toMatchObject([{ label: '1', answers: 1, settled: 1, open: 1 }])
    await db()('answer_spaces').delete()
    expect(await listRuns(teacher, paper.paperId)).toMatchObject([{ label: '1', answers: 4, settled: 1, open: 1 }, { label: '2', answers: 4, settled: 0, open: 0 }])
    await expect(listRuns(await anActor('teacher'), paper.paperId)).rejects.toMatchObject({ code: 'not_found' })
  })

  it('is opened by those who mark the question only', async () => {
    const other = await aMarker(paper.questionIds[1]!)
    await expect(run(other)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(run(await anActor('student'))).rejects.toMatchObject({ code: 'not_found' })
    await expect(run(await anActor('admin'))).rejects.toMatchObject({ code: 'not_found' })
  })

  it('shows a flag and its answer on the strip', async () => {
    await raiseFlag(teacher, { responseId, round: 'first', note: 'Is this a 5?' })
    await db()('flags').update({ answer: 'Yes' })
    const strip = (await run(teacher)).strips.find((candidate) => candidate.responseId === responseId)!
    expect(strip.flag).toMatchObject({ note: 'Is this a 5?', answer: 'Yes' })
    expect(JSON.stringify(await linesOf())).not.toContain('Is this')
  })
})

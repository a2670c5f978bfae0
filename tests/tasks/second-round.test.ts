import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { listMarkingsOfResponse } from '@/db/markings'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { markOf } from '@/lib/core/marking'
import { beginAgreedMarking } from '@/lib/tasks/begin-agreed-marking'
import { openRun } from '@/lib/tasks/open-run'
import { pressStamp } from '@/lib/tasks/press-stamp'
import { reopenMarking } from '@/lib/tasks/reopen-marking'
import { settleMarking } from '@/lib/tasks/settle-marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aStamp } from '@/tests/make/stamp'

let teacher: Actor
let moderator: Actor
let paper: Awaited<ReturnType<typeof aPaper>>
let responseId: string
let questionId: string

/** Scripts 0 and 1 are in the sample; script 0 has a settled first mark with a comment, script 1 the moderator's own. */
beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  moderator = await anActor('moderator', 'marker')
  paper = await aPaper({ owner: teacher.userId, questions: [{ label: '1', worths: [2, 1] }], students: 3 })
  questionId = paper.questionIds[0]!
  ;({ responseId } = await responseOf(paper.scriptIds[0]!, questionId))
  await pressStamp(teacher, aStamp({ responseId, worth: 1, text: 'a first comment' }))
  await settleMarking(teacher, { responseId, round: 'first' })
  const sampleId = newId()
  await db()('samples').insert({ id: sampleId, class_set_id: paper.classSetId, moderator_id: moderator.userId, seed: 's', size: 2, default_size: 15, tolerance: 1, drawn_by: teacher.userId, drawn_at: 1 })
  for (const [position, script_id] of paper.scriptIds.slice(0, 2).entries()) await db()('sample_scripts').insert({ sample_id: sampleId, script_id, position, drawn_as: 'spread' })
})
afterEach(closeSchool)

const run = (actor: Actor, round: 'second' | 'agreed' = 'second') => openRun(actor, { paperId: paper.paperId, questionId, round })

describe('second marking', () => {
  it('shows the moderator the sample and nothing of the first marking', async () => {
    await db()('papers').update({ names_hidden: 0 })
    const opened = await run(moderator)
    expect(opened.strips.map((strip) => strip.responseId)).toContain(responseId)
    expect(opened.strips).toHaveLength(2)
    const [first] = await listMarkingsOfResponse(db(), responseId, 'first')
    const said = JSON.stringify(opened)
    for (const secret of ['a first comment', first!.id, first!.stamps[0]!.id, teacher.userId, teacher.familyName, 'Given0', 'Family0']) expect(said).not.toContain(secret)
    expect(opened.strips.every((strip) => strip.marking === null && strip.bar === null)).toBe(true)
    expect(opened.namesHidden).toBe(true)
  })

  it('is only for the moderator, only on the sample, and never on one’s own first marking', async () => {
    await expect(run(teacher)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(pressStamp(teacher, aStamp({ responseId, round: 'second' }))).rejects.toMatchObject({ code: 'not_allowed' })
    const outside = await responseOf(paper.scriptIds[2]!, questionId)
    await expect(pressStamp(moderator, aStamp({ responseId: outside.responseId, round: 'second' }))).rejects.toMatchObject({ code: 'not_allowed' })
    const own = await responseOf(paper.scriptIds[1]!, questionId)
    await db()('paper_markers').insert({ id: newId(), paper_id: paper.paperId, user_id: moderator.userId, question_id: null })
    await pressStamp(moderator, aStamp({ responseId: own.responseId }))
    await expect(pressStamp(moderator, aStamp({ responseId: own.responseId, round: 'second' }))).rejects.toMatchObject({ code: 'own_first_marking' })
    expect((await run(moderator)).strips.map((strip) => strip.responseId)).toEqual([responseId])
  })

  it('does not show a moderator the first stamps through a first run either', async () => {
    await db()('paper_markers').insert({ id: newId(), paper_id: paper.paperId, user_id: moderator.userId, question_id: null })
    const first = await openRun(moderator, { paperId: paper.paperId, questionId, round: 'first' })
    expect(JSON.stringify(first)).not.toContain('a first comment')
    await db()('paper_owners').insert({ paper_id: paper.paperId, user_id: moderator.userId })
    const alsoOwner = { ...moderator, roles: [...moderator.roles, 'teacher' as const] }
    expect(JSON.stringify(await openRun(alsoOwner, { paperId: paper.paperId, questionId, round: 'first' }))).not.toContain('a first comment')
  })

  it('is not opened again or changed once it is settled, for the first marking may have been seen then', async () => {
    await pressStamp(moderator, aStamp({ responseId, round: 'second' }))
    await reopenMarking(moderator, { responseId, round: 'second' })
    await settleMarking(moderator, { responseId, round: 'second' })
    await expect(reopenMarking(moderator, { responseId, round: 'second' })).rejects.toMatchObject({ code: 'marking_settled' })
    await expect(pressStamp(moderator, aStamp({ responseId, round: 'second', worth: 1 }))).rejects.toMatchObject({ code: 'marking_settled' })
    const [second] = await listMarkingsOfResponse(db(), responseId, 'second')
    expect([second!.state, markOf(second!.stamps)]).toEqual(['settled', 2])
  })

  it('leaves the first mark counting', async () => {
    await pressStamp(moderator, aStamp({ responseId, round: 'second' }))
    expect(await settleMarking(moderator, { responseId, round: 'second' })).toEqual({ mark: 2 })
    const decisions = (await db()('counting_decisions').join('markings', 'markings.id', 'counting_decisions.marking_id').select('round')) as unknown[]
    expect(decisions).toEqual([{ round: 'first' }])
  })
})

describe('agreeing', () => {
  const secondMark = async () => {
    await pressStamp(moderator, aStamp({ responseId, round: 'second' }))
    await settleMarking(moderator, { responseId, round: 'second' })
    return (await listMarkingsOfResponse(db(), responseId, 'second'))[0]!
  }

  it('is not open to a moderator who has still to mark blind', async () => {
    const [first] = await listMarkingsOfResponse(db(), responseId, 'first')
    await expect(beginAgreedMarking(moderator, { responseId, copyOf: first!.id })).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(pressStamp(moderator, aStamp({ responseId, round: 'agreed' }))).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('begins as a copy, is one for both, and counts once it is settled', async () => {
    const second = await secondMark()
    const { markingId } = await beginAgreedMarking(teacher, { responseId, copyOf: second.id })
    expect(await beginAgreedMarking(moderator, { responseId, copyOf: second.id })).toEqual({ markingId })
    expect(await pressStamp(moderator, aStamp({ responseId, round: 'agreed', worth: 1 }))).toEqual({ mark: 3, kept: true })
    await settleMarking(teacher, { responseId, round: 'agreed' })
    const standing = (await db()('counting_decisions').whereNull('superseded_at').select('marking_id', 'reason')) as unknown[]
    expect(standing).toEqual([{ marking_id: markingId, reason: 'agreed' }])
    expect(markOf((await listMarkingsOfResponse(db(), responseId, 'second'))[0]!.stamps), 'the second marking stays as it was').toBe(2)
    expect((await run(teacher, 'agreed')).strips.map((strip) => strip.responseId)).toEqual([responseId])
  })

  it('shows a moderator only what was agreed in their own sample', async () => {
    const outside = await responseOf(paper.scriptIds[2]!, questionId)
    await db()('markings').insert({ id: newId(), response_id: outside.responseId, round: 'agreed', marker_id: teacher.userId, state: 'settled', created_at: 1, settled_at: 1 })
    const second = await secondMark()
    await beginAgreedMarking(teacher, { responseId, copyOf: second.id })
    expect((await run(moderator, 'agreed')).strips.map((strip) => strip.responseId)).toEqual([responseId])
    expect((await run(teacher, 'agreed')).strips.map((strip) => strip.responseId)).toContain(outside.responseId)
  })

  it('is not open to an owner who is no teacher any more', async () => {
    await secondMark()
    await db()('paper_owners').insert({ paper_id: paper.paperId, user_id: moderator.userId })
    const outside = await responseOf(paper.scriptIds[2]!, questionId)
    await expect(pressStamp(moderator, aStamp({ responseId: outside.responseId, round: 'agreed' })), 'outside the sample').rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('is not taken over by a first marking settled again later', async () => {
    const second = await secondMark()
    const { markingId } = await beginAgreedMarking(teacher, { responseId, copyOf: second.id })
    await settleMarking(teacher, { responseId, round: 'agreed' })
    await db()('markings').where({ round: 'first' }).update({ state: 'open', settled_at: null })
    await settleMarking(teacher, { responseId, round: 'first' })
    const standing = (await db()('counting_decisions').whereNull('superseded_at').pluck('marking_id')) as string[]
    expect(standing).toEqual([markingId])
  })
})

import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { sampleResponseIds } from '@/db/samples'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { halves, type HalfMarks } from '@/lib/core/marks'
import { drawSample as draw } from '@/lib/second-marking/draw-sample'
import { addToSample } from '@/lib/tasks/add-to-sample'
import { closeSample } from '@/lib/tasks/close-sample'
import { compareMarkings } from '@/lib/tasks/compare-markings'
import { decideMarking } from '@/lib/tasks/decide-marking'
import { drawSample } from '@/lib/tasks/draw-sample'
import { readMarkBook } from '@/lib/tasks/read-mark-book'
import { readSecondMarking } from '@/lib/tasks/read-second-marking'
import { readStages } from '@/lib/tasks/read-stages'
import { readSetting } from '@/lib/tasks/read-setting'
import { saveSetting } from '@/lib/tasks/save-setting'
import { sharePaper } from '@/lib/tasks/share-paper'
import { sampleCandidates } from '@/lib/tasks/sample-candidates'
import { placeLeaves } from '@/tests/make/leaves'
import { aMarking } from '@/tests/make/marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('second marking', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  async function aMarkedSet(students = 20) {
    const teacher = await anActor('teacher', 'marker')
    const moderator = await anActor('moderator')
    const made = await aPaper({ owner: teacher.userId, students })
    await placeLeaves(made.paperId)
    for (const [k, script] of made.scriptIds.entries()) {
      await aMarking({ script, question: made.questionIds[0]!, by: teacher.userId, worth: k % 3 })
      await aMarking({ script, question: made.questionIds[1]!, by: teacher.userId, worth: k % 5 })
    }
    return { teacher, moderator, q1: made.questionIds[0]!, q2: made.questionIds[1]!, ...made }
  }
  async function aSample(students = 20) {
    const made = await aMarkedSet(students)
    const { sampleId } = await drawSample(made.teacher, { classSetId: made.classSetId, moderatorId: made.moderator.userId })
    const [sample] = (await readSecondMarking(made.teacher, made.paperId)).samples
    return { ...made, sampleId, sample: sample! }
  }
  const sampledScripts = async (sampleId: string) => (await db()('sample_scripts').where({ sample_id: sampleId }).orderBy('position').pluck('script_id')) as string[]
  const seenBy = async (actor: Actor, paperId: string) => JSON.stringify(await readSecondMarking(actor, paperId))

  it('draws the default size by a seed that gives the same scripts again', async () => {
    const { paperId, classSetId, sampleId } = await aSample()
    const stored = await db()('samples').where({ id: sampleId }).first<{ seed: string; size: number; default_size: number; tolerance: number }>()
    expect(stored).toMatchObject({ size: 15, default_size: 15, tolerance: 1 })
    const again = draw((await sampleCandidates(db(), paperId, classSetId)).candidates, stored.size, stored.seed)
    expect(await sampledScripts(sampleId)).toEqual(again.map(({ scriptId }) => scriptId))
    expect(await db()('audit_lines').where({ act: 'sample.drawn' }).first()).toMatchObject({ object_id: sampleId, from_value: stored.seed })
  })

  it('names only a moderator who could not know the marks', async () => {
    const { teacher, paperId, classSetId, scriptIds, q1 } = await aMarkedSet(4)
    const plain = await anActor('marker')
    const first = await anActor('marker', 'moderator')
    const owner = await anActor('teacher', 'moderator')
    await aMarking({ script: scriptIds[0]!, question: q1, by: first.userId, worth: 1, round: 'first', counts: false, settled: false })
    await db()('paper_owners').insert({ paper_id: paperId, user_id: owner.userId })
    const asked = (moderatorId: string) => drawSample(teacher, { classSetId, moderatorId })
    await expect(asked(plain.userId)).rejects.toMatchObject({ code: 'not_found' })
    await expect(asked(first.userId)).rejects.toMatchObject({ code: 'moderator_not_blind' })
    await expect(asked(owner.userId)).rejects.toMatchObject({ code: 'moderator_not_blind' })
    expect(await db()('samples').first()).toBeUndefined()
    expect((await readSecondMarking(teacher, paperId)).offers[0]!.moderators).toHaveLength(1)
  })

  it('keeps its moderator from becoming an owner of the paper', async () => {
    const { teacher, paperId, classSetId } = await aMarkedSet(4)
    const both = await anActor('teacher', 'moderator')
    await drawSample(teacher, { classSetId, moderatorId: both.userId })
    await expect(sharePaper(teacher, { paperId, userId: both.userId })).rejects.toMatchObject({ code: 'moderator_not_blind', detail: { moderates: true } })
    expect(await db()('paper_owners').where({ paper_id: paperId }).pluck('user_id')).toEqual([teacher.userId])
  })

  it('is drawn once for a moderator, by an owner, and not before every answer has a first mark', async () => {
    const { teacher, moderator, classSetId, scriptIds, q1 } = await aMarkedSet(4)
    const asked = { classSetId, moderatorId: moderator.userId }
    const { responseId } = await responseOf(scriptIds[0]!, q1)
    await db()('markings').where({ response_id: responseId }).update({ state: 'open', settled_at: null })
    await expect(drawSample(teacher, asked)).rejects.toMatchObject({ code: 'not_marked_yet', detail: { answers: 1 } })
    await db()('markings').where({ response_id: responseId }).update({ state: 'settled', settled_at: 1 })
    await expect(drawSample(moderator, asked)).rejects.toMatchObject({ code: 'not_found' })
    await drawSample(teacher, asked)
    await expect(drawSample(teacher, asked)).rejects.toMatchObject({ code: 'already_there' })
    await expect(drawSample(moderator, asked)).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('leaves out who was absent', async () => {
    const { teacher, moderator, classSetId, studentIds, scriptIds } = await aMarkedSet(4)
    await db()('class_set_students').where({ class_set_id: classSetId, student_id: studentIds[1] }).update({ attendance: 'absent' })
    const { sampleId } = await drawSample(teacher, { classSetId, moderatorId: moderator.userId })
    expect((await sampledScripts(sampleId)).sort()).toEqual([scriptIds[0], scriptIds[2], scriptIds[3]].sort())
  })

  it('keeps the tolerances as they were set from the draw on, whatever else of the scheme changes', async () => {
    const { teacher, moderator, paperId, classSetId } = await aMarkedSet(4)
    const save = async (patch: { tolerance?: HalfMarks; own?: HalfMarks | null; text?: string }) => {
      const { setting, version } = await readSetting(teacher, paperId)
      const questions = setting.questions.map((question, k) => (k > 0 ? question : { ...question, text: patch.text ?? question.text, tolerance: patch.own === undefined ? question.tolerance : patch.own }))
      return saveSetting(teacher, { paperId, version, setting: { ...setting, tolerance: patch.tolerance ?? setting.tolerance, questions } })
    }
    await save({ tolerance: halves(2), own: halves(0) })
    await drawSample(teacher, { classSetId, moderatorId: moderator.userId })
    expect((await readSetting(teacher, paperId)).sampled).toBe(true)
    await expect(save({ tolerance: halves(4) })).rejects.toMatchObject({ code: 'tolerance_fixed', detail: { lines: [{ path: 'Paper', says: 'its tolerance stays at 1' }] } })
    await expect(save({ own: halves(4) })).rejects.toMatchObject({ code: 'tolerance_fixed' })
    await save({ text: 'Why is the sky blue?' })
    expect((await readSetting(teacher, paperId)).setting).toMatchObject({ tolerance: 2, questions: [{ tolerance: 0, text: 'Why is the sky blue?' }, { tolerance: null }] })
    expect((await readSecondMarking(teacher, paperId)).samples[0]!.questions.map(({ tolerance }) => tolerance)).toEqual([0, 2])
  })

  it('takes the number the paper sets, else the one asked for, never more scripts than sat', async () => {
    const { teacher, paperId, classSetId } = await aMarkedSet(8)
    await db()('papers').where({ id: paperId }).update({ sample_size: 5 })
    const drawn = async (size?: number) => {
      const { sampleId } = await drawSample(teacher, { classSetId, moderatorId: (await anActor('moderator')).userId, ...(size === undefined ? {} : { size }) })
      return [(await sampledScripts(sampleId)).length, await db()('samples').where({ id: sampleId }).first<object>('size', 'default_size')]
    }
    expect(await drawn()).toEqual([5, { size: 5, default_size: 8 }])
    expect(await drawn(3)).toEqual([3, { size: 3, default_size: 8 }])
    expect((await drawn(50))[0]).toBe(8)
  })

  it('shows every marker of every question, on top of the number asked for where it must', async () => {
    const { teacher, moderator, classSetId, scriptIds, q1 } = await aMarkedSet(20)
    const once = [await anActor('marker'), await anActor('marker')]
    for (const [k, { userId }] of once.entries()) {
      const { responseId } = await responseOf(scriptIds[7 + k]!, q1)
      await db()('markings').where({ response_id: responseId }).update({ marker_id: userId })
    }
    const { sampleId } = await drawSample(teacher, { classSetId, moderatorId: moderator.userId, size: 2 })
    expect(await sampledScripts(sampleId)).toEqual(expect.arrayContaining([scriptIds[7], scriptIds[8]]))
  })

  it('shows the moderator nothing of the first marking before their own mark is settled', async () => {
    const { moderator, paperId, sampleId, q1 } = await aSample()
    const [script] = await sampledScripts(sampleId)
    const { responseId } = await responseOf(script!, q1)
    const before = await seenBy(moderator, paperId)
    for (const telling of ['"first"', '"highest"', '"lowest"', 'Family', 'Given', '"within":true']) expect(before).not.toContain(telling)
    await aMarking({ script: script!, question: q1, by: moderator.userId, worth: 1, round: 'second', settled: false })
    await expect(compareMarkings(moderator, responseId)).rejects.toMatchObject({ code: 'not_allowed' })
    expect(await seenBy(moderator, paperId)).toEqual(before)
    await db()('markings').where({ response_id: responseId, round: 'second' }).update({ state: 'settled', settled_at: 2 })
    const compared = await compareMarkings(moderator, responseId)
    expect([compared.second.mark, compared.figures.n]).toEqual([1, 1])
    await expect(readMarkBook(moderator, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
  })

  it('does not let the owner compare before either, and no marker or other moderator ever', async () => {
    const { teacher, moderator, paperId, sampleId, q1 } = await aSample()
    const [script] = await sampledScripts(sampleId)
    const { responseId } = await responseOf(script!, q1)
    await expect(compareMarkings(teacher, responseId)).rejects.toMatchObject({ code: 'marking_unsettled' })
    await aMarking({ script: script!, question: q1, by: moderator.userId, worth: 1, round: 'second' })
    expect((await compareMarkings(teacher, responseId)).second.mark).toBe(1)
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId })
    await expect(compareMarkings(marker, responseId)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(readSecondMarking(marker, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(compareMarkings(await anActor('moderator'), responseId)).rejects.toMatchObject({ code: 'not_found' })
  })

  it('never gives a person their own first marking to second-mark', async () => {
    const { moderator, sampleId, q1 } = await aSample()
    const [script] = await sampledScripts(sampleId)
    const { responseId } = await responseOf(script!, q1)
    expect(await sampleResponseIds(db(), moderator.userId, q1)).toContain(responseId)
    await aMarking({ script: script!, question: q1, by: moderator.userId, worth: 1, round: 'first', counts: false })
    expect(await sampleResponseIds(db(), moderator.userId, q1)).not.toContain(responseId)
  })

  it('lets a script be added, by the moderator too, and none be taken out', async () => {
    const { teacher, moderator, paperId, sampleId, sample, scriptIds } = await aSample()
    const extra = sample.addable[0]!.scriptId
    expect(sample.addable).toHaveLength(scriptIds.length - sample.scripts.length)
    await addToSample(moderator, { sampleId, scriptId: extra })
    await expect(addToSample(teacher, { sampleId, scriptId: extra })).rejects.toMatchObject({ code: 'already_there' })
    await expect(addToSample(moderator, { sampleId, scriptId: newId() })).rejects.toMatchObject({ code: 'not_found' })
    await expect(addToSample(await anActor('moderator'), { sampleId, scriptId: extra })).rejects.toMatchObject({ code: 'not_found' })
    expect((await readSecondMarking(teacher, paperId)).samples[0]!.scripts.at(-1)).toMatchObject({ scriptId: extra, drawnAs: 'added' })
  })

  it('keeps every decision on record, changes what counts and no stamp', async () => {
    const { teacher, moderator, paperId, sampleId, q2, scriptIds } = await aSample()
    const [script] = await sampledScripts(sampleId)
    const { responseId } = await responseOf(script!, q2)
    await aMarking({ script: script!, question: q2, by: moderator.userId, worth: 1, round: 'second' })
    const stamps = await db()('stamps').orderBy('id')
    const inBook = async () => (await readMarkBook(teacher, paperId)).rows.find((row) => row.scriptId === script)!.cells[1]!
    const firstMark = (await inBook()).mark
    await decideMarking(moderator, { responseId, stands: 'second', reason: 'scheme_misapplied' })
    expect(await inBook()).toMatchObject({ mark: 1, secondMarked: true, agreed: false })
    await decideMarking(teacher, { responseId, stands: 'first', reason: 'judgement' })
    expect((await inBook()).mark).toBe(firstMark)
    const decisions = await db()('counting_decisions').where({ response_id: responseId }).orderBy('decided_at').select('reason', 'superseded_at', 'decided_by')
    expect(decisions.map(({ reason }) => reason)).toEqual(['first_mark', 'scheme_misapplied', 'judgement'])
    expect(decisions.map(({ superseded_at: at }) => at === null)).toEqual([false, false, true])
    expect(await db()('stamps').orderBy('id')).toEqual(stamps)
    expect((await compareMarkings(moderator, responseId)).decided).toMatchObject({ stands: 'first', reason: 'judgement' })
    expect(scriptIds).toHaveLength(20)
  })

  it('agrees on another mark only once that marking is settled', async () => {
    const { teacher, moderator, paperId, sampleId, q2 } = await aSample()
    const [script] = await sampledScripts(sampleId)
    const { responseId } = await responseOf(script!, q2)
    await aMarking({ script: script!, question: q2, by: moderator.userId, worth: 0, round: 'second', kind: 'nought' })
    const agreed = await aMarking({ script: script!, question: q2, by: moderator.userId, worth: 3, round: 'agreed', settled: false })
    const asked = { responseId, stands: 'agreed', reason: 'judgement' } as const
    await expect(decideMarking(moderator, asked)).rejects.toMatchObject({ code: 'marking_unsettled' })
    await db()('markings').where({ id: agreed }).update({ state: 'settled', settled_at: 3 })
    await decideMarking(moderator, asked)
    expect((await readMarkBook(teacher, paperId)).rows.find((row) => row.scriptId === script)!.cells[1]).toMatchObject({ mark: 3, agreed: true })
  })

  it('is closed by an owner once nothing outside the tolerance is undecided, and stands from then on', async () => {
    const { teacher, moderator, paperId, sampleId, q1, q2 } = await aSample(3)
    const scripts = await sampledScripts(sampleId)
    for (const script of scripts) {
      for (const question of [q1, q2]) {
        const first = await db()('responses').join('markings', 'markings.response_id', 'responses.id').join('stamps', 'stamps.marking_id', 'markings.id').where({ script_id: script, question_id: question }).first<{ worth: number }>('worth')
        await aMarking({ script, question, by: moderator.userId, worth: question === q2 ? 4 - first.worth : first.worth, round: 'second' })
      }
    }
    expect((await readStages(teacher, paperId)).counts).toMatchObject({ sampled: 3, sampleRead: 3 })
    const [view] = (await readSecondMarking(teacher, paperId)).samples
    const open = view!.questions.flatMap(({ compared }) => compared).filter(({ within }) => !within)
    expect([view!.figures.n, view!.undecided, open.length > 0]).toEqual([6, open.length, true])
    await expect(closeSample(teacher, sampleId)).rejects.toMatchObject({ code: 'moderation_open' })
    for (const { responseId } of open) await decideMarking(moderator, { responseId, stands: 'first', reason: 'judgement' })
    await expect(closeSample(moderator, sampleId)).rejects.toMatchObject({ code: 'not_allowed' })
    await closeSample(teacher, sampleId)
    await expect(decideMarking(teacher, { responseId: open[0]!.responseId, stands: 'second', reason: 'other' })).rejects.toMatchObject({ code: 'sample_closed' })
    await expect(addToSample(teacher, { sampleId, scriptId: scripts[0]! })).rejects.toMatchObject({ code: 'sample_closed' })
  })
})

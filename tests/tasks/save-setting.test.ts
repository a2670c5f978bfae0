import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { getPaper } from '@/db/papers'
import type { Actor } from '@/lib/core/actor'
import { newId } from '@/lib/core/ids'
import { halves } from '@/lib/core/marks'
import type { Setting, SettingQuestion } from '@/lib/core/setting'
import { bringBackMarkPoint } from '@/lib/tasks/bring-back-mark-point'
import { bringBackQuestion } from '@/lib/tasks/bring-back-question'
import { readSetting } from '@/lib/tasks/read-setting'
import { saveSetting } from '@/lib/tasks/save-setting'
import { withdrawMarkPoint } from '@/lib/tasks/withdraw-mark-point'
import { withdrawQuestion } from '@/lib/tasks/withdraw-question'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aStamp } from '@/tests/make/setting'

describe('saving what is set on a paper', () => {
  let teacher: Actor
  let made: Awaited<ReturnType<typeof aPaper>>
  beforeEach(async () => {
    await openSchool()
    teacher = await anActor('teacher')
    made = await aPaper({ owner: teacher.userId })
  })
  afterEach(closeSchool)

  const opened = async () => readSetting(teacher, made.paperId)
  const change = (setting: Setting, at: number, more: Partial<SettingQuestion>): Setting => ({ ...setting, questions: setting.questions.map((question, k) => (k === at ? { ...question, ...more } : question)) })
  const save = async (setting: Setting, version: number, actor = teacher) => saveSetting(actor, { paperId: made.paperId, version, setting })
  const auditActs = async () => db()('audit_lines').where({ paper_id: made.paperId }).pluck('act')
  const aQuestion = (label: string): SettingQuestion => ({
    id: newId(), label, maximum: halves(2), text: '', answer: '', modelSolution: '', schemeNote: '', tolerance: null,
    spaces: [{ id: newId(), page: 1, rect: { x: 48, y: 500, w: 400, h: 90 } }], points: [],
  })

  it('keeps a new version with a snapshot and an audit line, and gives every script a response to a new question', async () => {
    const { setting, version } = await opened()
    const next = await save({ ...setting, questions: [...setting.questions, aQuestion('3')] }, version)
    expect(next).toBe(version + 1)
    const responses = await db()('responses').count({ n: '*' }).first<{ n: number }>()
    expect(responses.n).toBe(made.scriptIds.length * 3)
    const kept = await db()('scheme_versions').where({ paper_id: made.paperId }).first<{ version: number; scheme: string }>()
    expect(kept.version).toBe(next)
    expect((JSON.parse(kept.scheme) as Setting).questions.map(({ label }) => label)).toEqual(['1', '2', '3'])
    expect(await auditActs()).toEqual(['scheme.saved'])
  })

  it('sent twice is saved once', async () => {
    const { setting, version } = await opened()
    const changed = change(setting, 0, { text: 'Why is the sky blue?' })
    const first = await save(changed, version)
    expect(await save(changed, version)).toBe(first)
    expect(await auditActs()).toHaveLength(1)
  })

  it('refuses a change made on an older version and keeps the newer one', async () => {
    const { setting, version } = await opened()
    await save(change(setting, 0, { text: 'newer' }), version)
    await expect(save(change(setting, 0, { text: 'older' }), version)).rejects.toMatchObject({ code: 'out_of_date' })
    expect((await opened()).setting.questions[0]!.text).toBe('newer')
  })

  it('is for owners who teach: not for a marker, not for another teacher', async () => {
    const { setting, version } = await opened()
    const marker = await anActor('marker')
    await db()('paper_markers').insert({ id: newId(), paper_id: made.paperId, user_id: marker.userId })
    const changed = change(setting, 0, { text: 'x' })
    await expect(save(changed, version, marker)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(save(changed, version, await anActor('teacher'))).rejects.toMatchObject({ code: 'not_found' })
    await expect(readSetting(marker, made.paperId)).rejects.toMatchObject({ code: 'not_allowed' })
    expect((await opened()).version).toBe(version)
  })

  it('swaps two labels in one save and takes an unmarked question away with its empty responses', async () => {
    const { setting, version } = await opened()
    const [one, two] = setting.questions as [SettingQuestion, SettingQuestion]
    const next = await save({ ...setting, questions: [{ ...two, label: '1' }, { ...one, label: '2' }] }, version)
    expect((await getPaper(db(), made.paperId))!.questions.map(({ id, label }) => [id, label])).toEqual([[two.id, '1'], [one.id, '2']])
    await save({ ...setting, questions: [{ ...two, label: '1' }] }, next)
    expect((await getPaper(db(), made.paperId))!.questions).toHaveLength(1)
    expect(await db()('responses').where({ question_id: one.id })).toHaveLength(0)
  })

  it('never deletes what has stamps: question, point, and not what was given', async () => {
    const { setting, version } = await opened()
    const question = setting.questions[1]!
    await aStamp(made.scriptIds[0]!, question.id, teacher.userId, 2, question.points[0]!.id)
    await aStamp(made.scriptIds[1]!, question.id, teacher.userId, 4)
    expect((await opened()).stamped).toEqual(expect.arrayContaining([question.id, question.points[0]!.id]))
    await expect(save({ ...setting, questions: [setting.questions[0]!] }, version)).rejects.toMatchObject({ code: 'has_stamps' })
    await expect(save(change(setting, 1, { points: question.points.slice(1), maximum: halves(2) }), version)).rejects.toMatchObject({ code: 'has_stamps' })
    const lower = question.points.map((point) => ({ ...point, worth: halves(1) }))
    await expect(save(change(setting, 1, { points: lower, maximum: halves(2) }), version)).rejects.toMatchObject({ code: 'has_stamps' })
    expect(await save({ ...setting, questions: [question] }, version)).toBe(version + 1)
  })

  it('keeps the worth of a stamp when the worth of its point changes', async () => {
    const { setting, version } = await opened()
    const question = setting.questions[0]!
    const [first, second] = question.points as [SettingQuestion['points'][number], SettingQuestion['points'][number]]
    await aStamp(made.scriptIds[0]!, question.id, teacher.userId, 1, first.id)
    await save(change(setting, 0, { points: [{ ...first, worth: halves(2) }, second], maximum: halves(3) }), version)
    expect(await db()('stamps').pluck('worth')).toEqual([1])
  })

  it('refuses what does not add up or lies off the page, and writes nothing', async () => {
    const { setting, version } = await opened()
    await expect(save(change(setting, 0, { maximum: halves(5) }), version)).rejects.toMatchObject({ code: 'paper_invalid', detail: { lines: [{ path: 'Question 1' }] } })
    await expect(save(change(setting, 0, { label: '2' }), version)).rejects.toMatchObject({ code: 'paper_invalid' })
    expect((await opened()).version).toBe(version)
  })

  it('cannot reach over to a question of another paper', async () => {
    const other = await aPaper({ owner: (await anActor('teacher')).userId })
    const { setting, version } = await opened()
    const stolen = { ...aQuestion('9'), id: other.questionIds[0]! }
    await expect(save({ ...setting, questions: [...setting.questions, stolen] }, version)).rejects.toMatchObject({ code: 'bad_input' })
    expect((await getPaper(db(), other.paperId))!.questions).toHaveLength(2)
  })

  it('lets a whole-mark step in only while no half was given', async () => {
    const { setting, version } = await opened()
    const whole: Setting = { ...setting, step: 2, questions: [setting.questions[1]!] }
    await expect(save({ ...setting, step: 2 }, version)).rejects.toMatchObject({ code: 'paper_invalid' })
    await aStamp(made.scriptIds[0]!, made.questionIds[1]!, teacher.userId, 1)
    await expect(save(whole, version)).rejects.toMatchObject({ code: 'has_stamps' })
  })

  it('withdraws and brings back a question and a point, once however often it is sent, with versions and audit lines', async () => {
    const questionId = made.questionIds[0]!
    const pointId = (await opened()).setting.questions[0]!.points[0]!.id
    await aStamp(made.scriptIds[0]!, questionId, teacher.userId, 1, pointId)
    const out = { questionId, as: 'out' as const, reason: 'misprint' }
    await withdrawQuestion(teacher, out)
    await withdrawQuestion(teacher, out)
    await withdrawMarkPoint(teacher, { questionId, pointId, reason: 'not taught' })
    await withdrawMarkPoint(teacher, { questionId, pointId, reason: 'not taught' })
    const view = await opened()
    expect(view.withdrawnQuestions).toEqual({ [questionId]: { as: 'out', reason: 'misprint' } })
    expect(view.withdrawnPoints).toEqual([pointId])
    await bringBackQuestion(teacher, { questionId })
    await bringBackMarkPoint(teacher, { questionId, pointId })
    await bringBackMarkPoint(teacher, { questionId, pointId })
    expect((await opened()).withdrawnQuestions).toEqual({})
    expect(await auditActs()).toEqual(['question.withdrawn-out', 'mark-point.withdrawn', 'question.brought-back', 'mark-point.brought-back'])
    expect(await db()('stamps')).toHaveLength(1)
    await expect(withdrawQuestion(await anActor('teacher'), out)).rejects.toMatchObject({ code: 'not_found' })
    await expect(withdrawMarkPoint(teacher, { questionId, pointId: newId(), reason: 'x' })).rejects.toMatchObject({ code: 'not_found' })
  })
})

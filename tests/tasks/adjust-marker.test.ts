import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { listAdjustments } from '@/db/scripts-to-return'
import { scriptResult } from '@/lib/handing-back/script-result'
import { adjustMarker } from '@/lib/tasks/adjust-marker'
import { closeSample } from '@/lib/tasks/close-sample'
import { decideMarking } from '@/lib/tasks/decide-marking'
import { drawSample } from '@/lib/tasks/draw-sample'
import { gatheredScript, gatherClassSet } from '@/lib/tasks/gather-class-set'
import { readAdjustment } from '@/lib/tasks/read-adjustment'
import { readMarkBook } from '@/lib/tasks/read-mark-book'
import { readSecondMarking } from '@/lib/tasks/read-second-marking'
import { undoAdjustment } from '@/lib/tasks/undo-adjustment'
import { placeLeaves } from '@/tests/make/leaves'
import { aMarking } from '@/tests/make/marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('one adjustment for a marker', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  /** Twenty scripts, question 2 out of 10 marked by turns: `severe` gives one mark less than the moderator, `fair` the same. The last of severe's lies half a mark under the most. */
  async function aSevereMarker() {
    const [teacher, severe, fair, moderator] = [await anActor('teacher', 'marker'), await anActor('marker'), await anActor('marker'), await anActor('moderator')]
    const made = await aPaper({ owner: teacher.userId, students: 20, questions: [{ label: '1', worths: [2] }, { label: '2', worths: [10, 10] }] })
    await placeLeaves(made.paperId)
    const [q1, q2] = made.questionIds as [string, string]
    const first = (k: number) => (k === 18 ? 19 : 4 + (k % 12))
    for (const [k, script] of made.scriptIds.entries()) {
      await aMarking({ script, question: q1, by: teacher.userId, worth: 2 })
      await aMarking({ script, question: q2, by: k % 2 === 0 ? severe.userId : fair.userId, worth: first(k) })
    }
    const { sampleId } = await drawSample(teacher, { classSetId: made.classSetId, moderatorId: moderator.userId, size: 20 })
    const read = async (k: number) => {
      await aMarking({ script: made.scriptIds[k]!, question: q1, by: moderator.userId, worth: 2, round: 'second' })
      await aMarking({ script: made.scriptIds[k]!, question: q2, by: moderator.userId, worth: Math.min(20, first(k) + (k % 2 === 0 ? 2 : 0)), round: 'second' })
    }
    const marks = async () => new Map((await readMarkBook(teacher, made.paperId)).rows.map((row) => [row.scriptId, [row.cells[1]!.mark, row.total!.final, row.total!.raw]]))
    return { ...made, teacher, severe, fair, moderator, q2, sampleId, first, read, marks, asked: { sampleId, questionId: q2, markerId: severe.userId } }
  }
  async function aReadSample() {
    const made = await aSevereMarker()
    for (const k of made.scriptIds.keys()) await made.read(k)
    return made
  }
  const adjusted = async (made: Awaited<ReturnType<typeof aReadSample>>) => adjustMarker(made.teacher, { ...made.asked, key: (await readAdjustment(made.teacher, made.asked)).key })

  it('is offered once everything is read and only for the marker whose marks lean one way', async () => {
    const made = await aSevereMarker()
    const patterns = async () => new Map((await readSecondMarking(made.teacher, made.paperId)).samples[0]!.patterns.map(({ label, markerId, n, pattern }) => [`${label} ${markerId}`, [n, pattern.shift ?? pattern.why]]))
    for (const k of [...made.scriptIds.keys()].slice(0, 19)) await made.read(k)
    expect((await patterns()).get(`2 ${made.fair.userId}`)).toEqual([9, 'unread'])
    await made.read(19)
    expect(await patterns()).toEqual(new Map([[`1 ${made.teacher.userId}`, [20, 'all_inside']], [`2 ${made.severe.userId}`, [10, 2]], [`2 ${made.fair.userId}`, [10, 'all_inside']]]))
    await expect(readAdjustment(made.teacher, { ...made.asked, markerId: made.fair.userId })).rejects.toMatchObject({ code: 'no_pattern', detail: { why: 'all_inside' } })
  })

  it('shows its effect on every script first and changes nothing by that', async () => {
    const made = await aReadSample()
    const before = await made.marks()
    const { lines, pattern } = await readAdjustment(made.teacher, made.asked)
    expect([lines.length, pattern.n, pattern.few, pattern.mean]).toEqual([20, 10, true, -1.9])
    expect(lines.filter(({ kind }) => kind === 'other').map(({ scriptId }) => scriptId)).toEqual(made.scriptIds.filter((_, k) => k % 2 === 1))
    expect(lines[0]).toMatchObject({ number: 1, name: 'Family0, Given0', kind: 'moves', mark: { before: 4, after: 6 }, total: { before: 6, after: 8 } })
    expect(lines[18]).toMatchObject({ kind: 'bound', mark: { before: 19, after: 20 } })
    expect(await made.marks()).toEqual(before)
    expect(await db()('adjustments').first()).toBeUndefined()
  })

  it('moves every answer of the marker within the maximum, leaves raw marks and stamps, is printed and dated, and can be undone', async () => {
    const made = await aReadSample()
    const [before, stamps] = [await made.marks(), await db()('stamps').orderBy('id')]
    const { lines } = await readAdjustment(made.teacher, made.asked)
    const { adjustmentId } = await adjusted(made)
    const after = await made.marks()
    for (const { scriptId, mark, total } of lines) expect(after.get(scriptId)).toEqual([mark!.after, total.after, before.get(scriptId)![2]])
    expect(await db()('stamps').orderBy('id')).toEqual(stamps)
    const printed = await listAdjustments(db(), made.classSetId)
    expect(printed).toHaveLength(10)
    expect(printed[0]!.reason).toMatch(/^raised by 1 mark after second marking, \d+ \w+ \d{4}$/)
    const script = gatheredScript(await gatherClassSet(db(), made.classSetId), made.scriptIds[18]!)!
    expect(scriptResult(script).detail.adjustments).toEqual([{ says: `Question 2: ${printed[0]!.reason}`, by: 1 }])
    expect((await readSecondMarking(made.teacher, made.paperId)).samples[0]!.undecided).toBe(0)
    const [kept] = (await readSecondMarking(made.teacher, made.paperId)).samples[0]!.adjustments
    expect(kept).toMatchObject({ id: adjustmentId, halves: 2, answers: 10, pairs: 10, markerId: made.severe.userId, undone: null })
    expect(kept!.by).toContain(made.teacher.familyName)
    await undoAdjustment(made.teacher, adjustmentId)
    await undoAdjustment(made.teacher, adjustmentId)
    expect(await made.marks()).toEqual(before)
    expect(await listAdjustments(db(), made.classSetId)).toEqual([])
    expect((await readSecondMarking(made.teacher, made.paperId)).samples[0]!.undecided).toBe(9)
    expect((await readSecondMarking(made.teacher, made.paperId)).samples[0]!.adjustments[0]!.undone).not.toBeNull()
    expect(await db()('audit_lines').whereIn('act', ['marker.adjusted', 'marker.adjustment-undone']).orderBy('id').select('act', 'from_value', 'to_value')).toEqual([
      { act: 'marker.adjusted', from_value: made.severe.userId, to_value: '2' }, { act: 'marker.adjustment-undone', from_value: '2', to_value: '0' },
    ])
    await adjusted(made)
    expect(await made.marks()).toEqual(after)
  })

  it('is decided once, on the effect that was shown, by an owner, while the sample is open', async () => {
    const made = await aReadSample()
    const { key } = await readAdjustment(made.teacher, made.asked)
    for (const actor of [made.moderator, made.severe]) {
      await expect(readAdjustment(actor, made.asked)).rejects.toThrow(/^not_/)
      await expect(adjustMarker(actor, { ...made.asked, key })).rejects.toThrow(/^not_/)
    }
    await expect(adjustMarker(await anActor('teacher'), { ...made.asked, key })).rejects.toMatchObject({ code: 'not_found' })
    await decideMarking(made.teacher, { responseId: (await responseOf(made.scriptIds[0]!, made.q2)).responseId, stands: 'second', reason: 'judgement' })
    await expect(adjustMarker(made.teacher, { ...made.asked, key })).rejects.toMatchObject({ code: 'out_of_date' })
    const { adjustmentId } = await adjusted(made)
    await expect(adjusted(made)).rejects.toMatchObject({ code: 'already_there' })
    for (const actor of [made.moderator, made.severe]) await expect(undoAdjustment(actor, adjustmentId)).rejects.toThrow(/^not_/)
    for (const script of made.scriptIds) await decideMarking(made.teacher, { responseId: (await responseOf(script, made.q2)).responseId, stands: 'first', reason: 'judgement' })
    await closeSample(made.teacher, made.sampleId)
    await expect(readAdjustment(made.teacher, made.asked)).rejects.toMatchObject({ code: 'sample_closed' })
    await undoAdjustment(made.teacher, adjustmentId)
  })

  it('leaves what was decided on by name, and holds only for the marking it was laid on', async () => {
    const made = await aReadSample()
    const [decided, later] = [made.scriptIds[0]!, made.scriptIds[2]!]
    const decide = async (script: string, stands: 'first' | 'second') => decideMarking(made.moderator, { responseId: (await responseOf(script, made.q2)).responseId, stands, reason: 'judgement' })
    await decide(decided, 'second')
    expect((await readAdjustment(made.teacher, made.asked)).lines[0]).toMatchObject({ kind: 'own', mark: { before: 6, after: 6 } })
    await adjusted(made)
    expect((await made.marks()).get(decided)![0]).toBe(6)
    expect((await made.marks()).get(later)![0]).toBe(made.first(2) + 2)
    await decide(later, 'second')
    expect((await made.marks()).get(later)![0]).toBe(made.first(2) + 2)
    expect((await listAdjustments(db(), made.classSetId)).filter(({ scriptId }) => scriptId === later)).toEqual([])
    await decide(later, 'first')
    expect((await made.marks()).get(later)![0]).toBe(made.first(2) + 2)
  })
})

import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { drawSample } from '@/lib/tasks/draw-sample'
import { readSecondMarking } from '@/lib/tasks/read-second-marking'
import { placeLeaves } from '@/tests/make/leaves'
import { aMarking } from '@/tests/make/marking'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the figures of a sample', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  /** Six scripts; question 1 marked by the teacher, question 2 by turns with another marker, who gives one half more than the moderator will. */
  async function aRead() {
    const [teacher, marker, moderator] = [await anActor('teacher', 'marker'), await anActor('marker'), await anActor('moderator')]
    const made = await aPaper({ owner: teacher.userId, students: 6 })
    await placeLeaves(made.paperId)
    const [q1, q2] = made.questionIds as [string, string]
    for (const [k, script] of made.scriptIds.entries()) {
      await aMarking({ script, question: q1, by: teacher.userId, worth: k % 3 })
      await aMarking({ script, question: q2, by: k % 2 === 0 ? teacher.userId : marker.userId, worth: 1 + (k % 4) })
    }
    await drawSample(teacher, { classSetId: made.classSetId, moderatorId: moderator.userId })
    const settle = async (script: string, k: number) => {
      await aMarking({ script, question: q1, by: moderator.userId, worth: k % 3, round: 'second' })
      await aMarking({ script, question: q2, by: moderator.userId, worth: 1 + (k % 4) - (k % 2 === 0 ? 0 : 1), round: 'second' })
    }
    return { ...made, teacher, marker, moderator, q1, q2, settle, read: async (actor = teacher) => (await readSecondMarking(actor, made.paperId)).samples[0]! }
  }

  it('are by question, by who gave the first mark, and for the paper, with n in each', async () => {
    const { teacher, marker, scriptIds, settle, read, q1, q2 } = await aRead()
    for (const [k, script] of scriptIds.entries()) await settle(script, k)
    const { moderation, questions } = await read()
    expect(moderation.questions.map(({ key, tolerance, figures: { n, exact, within, meanDifference } }) => [key, tolerance, n, exact, within, meanDifference])).toEqual([[q1, 1, 6, 6, 6, 0], [q2, 1, 6, 3, 6, 0.5]])
    const byMarker = new Map(moderation.markers.map(({ key, figures }) => [key, figures]))
    expect([byMarker.get(teacher.userId)!.n, byMarker.get(teacher.userId)!.meanDifference]).toEqual([9, 0])
    expect([byMarker.get(marker.userId)!.n, byMarker.get(marker.userId)!.meanDifference, byMarker.get(marker.userId)!.sd]).toEqual([3, 1, { value: 0, why: null }])
    expect(moderation.totals).toMatchObject({ maximum: 6, figures: { n: 6, meanDifference: 0.5, within: null, few: true } })
    expect(moderation.heat.find(({ markerId, questionId }) => markerId === marker.userId && questionId === q2)).toMatchObject({ n: 3, mean: 1, within: 3 })
    expect(questions[1]!.compared.filter(({ markerId }) => markerId === marker.userId)).toHaveLength(3)
  })

  it('tell a moderator, and an owner, only of answers whose second mark is settled', async () => {
    const { teacher, marker, moderator, scriptIds, settle, read, q2 } = await aRead()
    const before = await read(moderator)
    expect(before.moderation).toMatchObject({ markers: [], comparedTotals: [], heat: [], totals: { figures: { n: 0 } } })
    expect(JSON.stringify(before)).not.toContain(teacher.userId)
    expect(JSON.stringify(before)).not.toContain(marker.userId)
    await settle(scriptIds[0]!, 0)
    for (const actor of [moderator, teacher]) {
      const { moderation } = await read(actor)
      expect(moderation.markers.map(({ key, figures: { n } }) => [key, n])).toEqual([[teacher.userId, 2]])
      expect(moderation.answers.figures.n).toBe(2)
      expect(moderation.comparedTotals).toHaveLength(1)
    }
    await aMarking({ script: scriptIds[1]!, question: q2, by: moderator.userId, worth: 1, round: 'second', settled: false })
    expect((await read(moderator)).moderation.answers.figures.n).toBe(2)
  })

  it('never count a mark given in another round than the blind second one', async () => {
    const { moderator, scriptIds, settle, read, q2 } = await aRead()
    await settle(scriptIds[0]!, 0)
    for (const round of ['third', 're-mark', 'agreed', 'review'] as const) await aMarking({ script: scriptIds[1]!, question: q2, by: moderator.userId, worth: 0, kind: 'nought', round, counts: false })
    expect((await read()).moderation.answers.figures.n).toBe(2)
  })

  it('leave out a question that was withdrawn', async () => {
    const { teacher, scriptIds, settle, read, q1, q2 } = await aRead()
    for (const [k, script] of scriptIds.entries()) await settle(script, k)
    await db()('questions').where({ id: q2 }).update({ withdrawn_at: 1, withdrawn_by: teacher.userId, withdrawn_reason: 'not taught', withdrawn_as: 'out' })
    const { moderation } = await read()
    expect(moderation.questions.map(({ key }) => key)).toEqual([q1])
    expect(moderation.totals).toMatchObject({ maximum: 2, figures: { n: 6, meanDifference: 0 } })
  })
})

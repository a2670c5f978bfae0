import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { closeSample } from '@/lib/tasks/close-sample'
import { decideMarking } from '@/lib/tasks/decide-marking'
import { drawSample } from '@/lib/tasks/draw-sample'
import { printModerationRecord } from '@/lib/tasks/print-moderation-record'
import { readModerationRecord } from '@/lib/tasks/read-moderation-record'
import { placeLeaves } from '@/tests/make/leaves'
import { aMarking } from '@/tests/make/marking'
import { aPaper, responseOf } from '@/tests/make/paper'
import { asFile, assertClean, pageCountOf, wordsOf } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the moderation record', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  /** A read sample of `students` with one answer outside the tolerance, decided on twice. */
  async function aDecidedSample(students: number) {
    const [teacher, moderator] = [await anActor('teacher', 'marker'), await anActor('moderator')]
    const made = await aPaper({ owner: teacher.userId, students })
    await placeLeaves(made.paperId)
    const [q1, q2] = made.questionIds as [string, string]
    for (const script of made.scriptIds) for (const question of [q1, q2]) await aMarking({ script, question, by: teacher.userId, worth: 1 })
    const { sampleId } = await drawSample(teacher, { classSetId: made.classSetId, moderatorId: moderator.userId, size: students })
    for (const [k, script] of made.scriptIds.entries()) for (const question of [q1, q2]) await aMarking({ script, question, by: moderator.userId, worth: question === q2 && k === 0 ? 4 : 1, round: 'second' })
    const { responseId } = await responseOf(made.scriptIds[0]!, q2)
    await decideMarking(moderator, { responseId, stands: 'second', reason: 'scheme_misapplied' })
    await decideMarking(teacher, { responseId, stands: 'first', reason: 'judgement' })
    await closeSample(teacher, sampleId)
    return { ...made, teacher, moderator, sampleId }
  }

  it('says the sample and its seed, the figures, every decision with who and when, and who closed it', async () => {
    const { teacher, moderator, sampleId } = await aDecidedSample(5)
    const { seed } = await db()('samples').where({ id: sampleId }).first<{ seed: string }>('seed')
    const { record } = await readModerationRecord(teacher, sampleId)
    const [sample, figures, decisions, adjustments, closing] = record.sections
    expect(sample!.lines.join(' ')).toContain(seed)
    expect(sample!.table!.rows).toHaveLength(5)
    expect(figures!.table!.rows.map(([label, n, same]) => [label, n, same]).at(-2)).toEqual(['All answers', '10', '9'])
    const short = ({ givenName, familyName }: typeof teacher) => `${givenName.charAt(0)}. ${familyName}`
    expect(decisions!.table!.rows.map(([answer, first, second, apart, decided, mark, reason, by]) => [answer, first, second, apart, decided, mark, reason, by])).toEqual([
      ['2, script 1', '½', '2', '−1½', 'Second mark stands (later decided anew)', '2', 'Scheme misapplied', short(moderator)],
      ['2, script 1', '½', '2', '−1½', 'First mark stands', '½', 'Difference of judgement', short(teacher)],
    ])
    expect(adjustments!.lines.at(-1)).toBe('No adjustment was made.')
    expect(closing!.lines[1]).toMatch(/^Closed by .+ on \d+ \w+ \d{4}\.$/)
  })

  it('is for owners alone, and of a sample that is there', async () => {
    const { moderator, sampleId } = await aDecidedSample(3)
    await expect(readModerationRecord(moderator, sampleId)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(printModerationRecord(await anActor('teacher'), sampleId)).rejects.toMatchObject({ code: 'not_found' })
    await expect(readModerationRecord(moderator, 'none')).rejects.toMatchObject({ code: 'not_found' })
  })

  it('is printed with the words of the page, over as many sheets as it needs', async () => {
    const { teacher, sampleId } = await aDecidedSample(48)
    const { record } = await readModerationRecord(teacher, sampleId)
    const { bytes, name } = await printModerationRecord(teacher, sampleId)
    expect(name).toBe('Moderation record Light and shadow.pdf')
    const file = asFile(bytes)
    assertClean(file)
    expect(pageCountOf(file)).toBeGreaterThan(1)
    const words = Array.from({ length: pageCountOf(file) }, (_, k) => wordsOf(file, k + 1)).join(' ').replace(/\s+/g, ' ')
    for (const { heading, table } of record.sections) {
      expect(words).toContain(heading)
      for (const row of table?.rows ?? []) expect(words).toContain(row[0]!)
    }
  })
})

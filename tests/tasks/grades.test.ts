import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import { halves } from '@/lib/core/marks'
import { readGrades } from '@/lib/tasks/read-grades'
import { saveGrades } from '@/lib/tasks/save-grades'
import { aMarking } from '@/tests/make/marking'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the grade scale of a paper', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)
  const scale = { oddHalf: 'up' as const, boundaries: [{ grade: ' A ', lowest: halves(4) }, { grade: 'B', lowest: halves(0) }] }

  it('is stored with its rule, and tried on whole scripts only', async () => {
    const teacher = await anActor('teacher')
    const { paperId, questionIds, scriptIds } = await aPaper({ owner: teacher.userId })
    for (const question of questionIds) await aMarking({ script: scriptIds[0]!, question, by: teacher.userId, worth: 2 })
    await saveGrades(teacher, paperId, scale)
    await saveGrades(teacher, paperId, scale)
    expect(await readGrades(teacher, paperId)).toEqual({ paperId, maximum: 6, totals: [4], notWhole: 2, scale: { oddHalf: 'up', boundaries: [{ grade: 'A', lowest: 4 }, { grade: 'B', lowest: 0 }] } })
    expect(await db()('audit_lines').where({ act: 'grade-scale.changed' }).orderBy('id').first()).toMatchObject({ object_id: paperId, from_value: 'kept', to_value: 'up, A 4, B 0' })
  })

  it('is the owner’s alone, and nothing is stored of a faulty one', async () => {
    const teacher = await anActor('teacher')
    const marker = await anActor('marker')
    const { paperId } = await aPaper({ owner: teacher.userId })
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId })
    await expect(saveGrades(marker, paperId, scale)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(readGrades(marker, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
    await expect(saveGrades(await anActor('teacher'), paperId, scale)).rejects.toMatchObject({ code: 'not_found' })
    await expect(saveGrades(teacher, paperId, { ...scale, boundaries: [{ grade: 'A', lowest: halves(7) }] })).rejects.toMatchObject({ code: 'bad_input' })
    expect((await readGrades(teacher, paperId)).scale).toEqual({ oddHalf: 'kept', boundaries: [] })
  })
})

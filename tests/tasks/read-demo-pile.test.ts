import { readFileSync } from 'node:fs'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import { readDemoPile } from '@/lib/tasks/read-demo-pile'
import { readSheaves } from '@/lib/tasks/read-sheaves'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { aPaper } from '@/tests/make/paper'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

describe('the scanned pile of the demo school', () => {
  beforeEach(openSchool)
  afterEach(closeSchool)

  it('is that of the very paper, whichever invented class sits it', async () => {
    const teacher = await anActor('teacher')
    for (const set of ['bitonal', 'one-page'] as const) {
      const { paperId } = await aClassSetPaper(teacher.userId, set)
      expect((await readSheaves(teacher, paperId)).demoPile).toBe(true)
      expect((await readDemoPile(teacher, paperId)).equals(readFileSync(classSetFile(set, 'scan.pdf')))).toBe(true)
    }
  })

  it('is not there for a paper of one’s own', async () => {
    const teacher = await anActor('teacher')
    const { paperId } = await aPaper({ owner: teacher.userId })
    expect((await readSheaves(teacher, paperId)).demoPile).toBe(false)
    await expect(readDemoPile(teacher, paperId)).rejects.toMatchObject({ code: 'not_found' })
  })

  it('is for who may change the paper alone', async () => {
    const teacher = await anActor('teacher')
    const marker = await anActor('marker')
    const { paperId } = await aClassSetPaper(teacher.userId, 'bitonal')
    await expect(readDemoPile(marker, paperId)).rejects.toMatchObject({ code: 'not_found' })
    await db()('paper_markers').insert({ id: newId(), paper_id: paperId, user_id: marker.userId })
    await expect(readDemoPile(marker, paperId)).rejects.toMatchObject({ code: 'not_allowed' })
  })
})

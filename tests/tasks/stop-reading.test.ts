import { existsSync, readdirSync } from 'node:fs'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { addLeafReading } from '@/db/leaves'
import { getSheaf, startSheaf } from '@/db/sheaves'
import type { Actor } from '@/lib/core/actor'
import type { LeafReading } from '@/lib/core/leaf'
import { env } from '@/lib/infra/env'
import { keptPath } from '@/lib/infra/file-store'
import { confirmName } from '@/lib/tasks/confirm-name'
import { layLeaf } from '@/lib/tasks/lay-leaf'
import { placeFirst, placeSheaf } from '@/lib/tasks/place-sheaf'
import { placeLeaf } from '@/lib/tasks/place-leaf'
import { readLeafPicture } from '@/lib/tasks/read-leaf-picture'
import { readSheaf } from '@/lib/tasks/read-sheaf'
import { readSortingTable } from '@/lib/tasks/read-sorting-table'
import { stopReading } from '@/lib/tasks/stop-reading'
import { placeLeaves } from '@/lib/placing/place-leaves'
import { aClassSetPaper, classSetFile } from '@/tests/make/class-set'
import { aClearLeaf } from '@/tests/make/leaf-reading'
import { aMarking } from '@/tests/make/marking'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'
import { aWaitingSheaf } from '@/tests/make/sheaf'

let teacher: Actor
let paperId: string
let classSetId: string
let students: Readonly<Record<string, string>>

beforeEach(async () => {
  await openSchool()
  teacher = await anActor('teacher')
  ;({ paperId, classSetId, students } = await aClassSetPaper(teacher.userId, 'everyday'))
})
afterEach(closeSchool)

/** Every row of every table that is not kept for good. */
async function rows(): Promise<Record<string, unknown[]>> {
  const tables = (await db()('sqlite_master').where({ type: 'table' }).whereNot('name', 'like', 'sqlite_%').whereNotIn('name', ['audit_lines', 'knex_migrations', 'knex_migrations_lock']).orderBy('name').pluck('name')) as string[]
  return Object.fromEntries(await Promise.all(tables.map(async (table) => [table, await db()(table)] as const)))
}

/** A sheaf in the middle of being read: these pages known, the whole scripts of its start in place. */
async function halfRead(file: string, ...pages: (number | null)[]): Promise<string> {
  const sheafId = await aWaitingSheaf(paperId, classSetId, classSetFile(file === 'scan' ? 'everyday' : 'bitonal', 'scan.pdf'), 40)
  const readings = pages.map((page, index): LeafReading => aClearLeaf(index, page))
  await db().transaction(async (trx) => {
    await startSheaf(trx, sheafId, 40)
    for (const reading of readings) await addLeafReading(trx, sheafId, reading)
    await placeFirst(trx, (await getSheaf(trx, sheafId))!, readings, placeLeaves(readings, 2).filter(({ kind }) => kind === 'script'))
  })
  return sheafId
}

describe('stopping the reading of a sheaf', () => {
  it('leaves nothing behind: no row, no file, no picture, no job', async () => {
    const before = await rows()
    const sheafId = await halfRead('scan', 1, 2, 1, 2, 1, 2, null)
    const { sha256 } = (await getSheaf(db(), sheafId))!
    const table = await readSortingTable(teacher, paperId)
    expect(table.scripts).toHaveLength(3)
    // a name given, a page taken out and a picture looked at while it was read
    await confirmName(teacher, { scriptId: table.scripts[0]!.id, classSetId, studentId: students['8101']! })
    const leafId = table.scripts[1]!.pages[1]!.leafId!
    await layLeaf(teacher, { leafId, to: 'loose' })
    await readLeafPicture(teacher, { leafId, width: 80 })
    expect(readdirSync(path.join(env.dataFolder, 'cuts'))).toEqual([leafId])

    await stopReading(teacher, sheafId)
    expect(await rows()).toEqual(before)
    expect(existsSync(keptPath(sha256))).toBe(false)
    expect(readdirSync(path.join(env.dataFolder, 'cuts'))).toEqual([])
    expect(await db()('audit_lines').where({ act: 'sheaf.stopped', object_id: sheafId, actor_id: teacher.userId }).count({ n: '*' }).first()).toEqual({ n: 1 })
    await expect(stopReading(teacher, sheafId)).rejects.toMatchObject({ code: 'not_found' })
  })

  it('keeps the bytes that another paper holds too, and lets the same file be sent again', async () => {
    const other = await aClassSetPaper(teacher.userId, 'everyday')
    await aWaitingSheaf(other.paperId, other.classSetId, classSetFile('everyday', 'scan.pdf'), 59)
    const sheafId = await halfRead('scan', 1, 2)
    await stopReading(teacher, sheafId)
    expect(existsSync(keptPath((await getSheaf(db(), await halfRead('scan', 1, 2)))!.sha256))).toBe(true)
  })

  it('gives an earlier scan of a page its place back', async () => {
    const first = await halfRead('scan', 1, 2, 1, 2)
    await db().transaction(async (trx) => placeSheaf(trx, (await getSheaf(trx, first))!, 2))
    const before = await rows()
    const second = await halfRead('bitonal', 1, 2, null)
    const { scripts } = await readSortingTable(teacher, paperId)
    await placeLeaf(teacher, { leafId: scripts.at(-1)!.pages[1]!.leafId!, target: { scriptId: scripts[0]!.id }, paperPage: 2, instead: true })
    await stopReading(teacher, second)
    expect(await rows()).toEqual(before)
  })

  it('is refused once an answer of it is marked, and once the sheaf is read', async () => {
    const sheafId = await halfRead('scan', 1, 2, 1, 2)
    const { scripts } = await readSortingTable(teacher, paperId)
    const question = await db()('questions').where({ paper_id: paperId }).first<{ id: string }>('id')
    await aMarking({ script: scripts[0]!.id, question: question.id, by: teacher.userId, worth: 2 })
    const before = await rows()
    await expect(stopReading(teacher, sheafId)).rejects.toMatchObject({ code: 'reading_marked', detail: { scripts: 1 } })
    expect(await rows()).toEqual(before)
    await db().transaction(async (trx) => placeSheaf(trx, (await getSheaf(trx, sheafId))!, 2))
    await expect(stopReading(teacher, sheafId)).rejects.toMatchObject({ code: 'out_of_date' })
  })

  it('ends the work of the reader: what it still brings is not written', async () => {
    const sheafId = await aWaitingSheaf(paperId, classSetId, classSetFile('everyday', 'scan.pdf'), 59)
    let asked = 0
    const reading = readSheaf(sheafId, () => {
      // stopped by a person in the middle of it
      if (++asked === 3) void stopReading(teacher, sheafId)
      return true
    })
    await reading
    expect(await db()('leaves').count({ n: '*' }).first()).toEqual({ n: 0 })
    expect(await db()('sheaves').count({ n: '*' }).first()).toEqual({ n: 0 })
    expect(await db()('audit_lines').whereIn('act', ['sheaf.placed', 'sheaf.failed']).count({ n: '*' }).first()).toEqual({ n: 0 })
  }, 120_000)

  it('is for owners alone', async () => {
    const sheafId = await halfRead('scan', 1, 2)
    const stranger = await anActor('teacher')
    await expect(stopReading(stranger, sheafId)).rejects.toMatchObject({ code: 'not_found' })
    expect(await getSheaf(db(), sheafId)).not.toBeNull()
  })
})

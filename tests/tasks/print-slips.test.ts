import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { newId } from '@/lib/core/ids'
import { printSlips } from '@/lib/tasks/print-slips'
import { asFile, assertClean, fontLines, pageCountOf, pageSizeOf, wordsOf } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

beforeEach(openSchool)
afterEach(closeSchool)

async function aClass(): Promise<string> {
  const id = newId()
  await db()('classes').insert({ id, name: '8K', created_at: 1 })
  return id
}
const slips = Array.from({ length: 9 }, (_, k) => ({ name: k === 0 ? 'Zoë Łukaş-Şen Παπαδοπούλου' : `Student ${k}`, userName: `81${40 + k}`, code: `KMRT-${1000 + k}` }))

describe('sign-in slips', () => {
  it.each([['a4', 2, '595 x 842'], ['letter', 2, '612 x 792']] as const)('are strips on %s with name, user name and code, in fonts of the file', async (sheet, sheets, size) => {
    const file = asFile((await printSlips(await anActor('admin'), await aClass(), { sheet, slips })).bytes)
    assertClean(file)
    expect(pageCountOf(file)).toBe(sheets)
    expect(pageSizeOf(file)).toBe(size)
    const words = Array.from({ length: sheets }, (_, k) => wordsOf(file, k + 1)).join('\n')
    for (const { name, userName, code } of slips) for (const part of [name, userName, code]) expect(words).toContain(part)
    expect(words.match(/new-password/g)).toHaveLength(slips.length)
    expect(fontLines(file).every((line) => /yes yes yes/.test(line))).toBe(true)
  })

  it('are only for who may give the accounts', async () => {
    const id = await aClass()
    for (const role of ['teacher', 'marker', 'moderator', 'student'] as const) await expect(printSlips(await anActor(role), id, { sheet: 'a4', slips })).rejects.toThrow()
    await expect(printSlips(await anActor('admin'), newId(), { sheet: 'a4', slips })).rejects.toMatchObject({ code: 'not_found' })
  })
})

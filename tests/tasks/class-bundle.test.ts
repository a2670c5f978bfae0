import { execFileSync } from 'node:child_process'
import { readFileSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { buffer } from 'node:stream/consumers'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import { readKept } from '@/lib/infra/file-store'
import { buildRelease } from '@/lib/tasks/build-release'
import { openClassPdf, openClassZip, type Bundle } from '@/lib/tasks/open-class-bundle'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { startRelease } from '@/lib/tasks/start-release'
import { withdrawRelease } from '@/lib/tasks/withdraw-release'
import { aMarkedClassSet, anAccountOf } from '@/tests/make/marked-class-set'
import { asFile, assertClean, bookmarksOf, codedImages, fontLines, imageCount, pageCountOf, wordsOf } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

beforeEach(openSchool)
afterEach(closeSchool)

const work = async () => { while (await runNextJob('test', () => false)); }
const bytesOf = async ({ stream }: Bundle): Promise<Buffer> => buffer(stream)
async function aReturnedClass(most = 3) {
  const teacher = await anActor('teacher')
  const made = await aMarkedClassSet(teacher, most)
  await startRelease(teacher, made.classSetId)
  await work()
  const names = (await db()('class_set_students').where({ class_set_id: made.classSetId, attendance: 'expected' }).orderBy(['family_name', 'given_name']).select('student_id', 'given_name', 'family_name', 'candidate_number')) as { student_id: string; given_name: string; family_name: string; candidate_number: string }[]
  return { teacher, ...made, register: names.map((one) => ({ ...one, script: made.scripts.find(({ studentId }) => studentId === one.student_id)! })) }
}
function unpacked(zip: Buffer): { name: string; bytes: Buffer }[] {
  const path = asFile(zip)
  const folder = join(path, '../unpacked')
  execFileSync('unzip', ['-q', path, '-d', folder])
  return readdirSync(folder).sort().map((name) => ({ name, bytes: readFileSync(join(folder, name)) }))
}
const frozen = async (scriptId: string) => readKept((await db()('returned_scripts').join('stored_files', 'stored_files.id', 'returned_scripts.file_id').where({ script_id: scriptId }).orderBy('revision', 'desc').first<{ sha256: string }>('sha256')).sha256)

describe('a class as one ZIP', () => {
  it('holds the very files students have, by name in the order of the register', async () => {
    const { teacher, classSetId, register } = await aReturnedClass()
    const files = unpacked(await bytesOf(await openClassZip(teacher, classSetId)))
    expect(files.map(({ name }) => name)).toEqual(register.map(({ family_name, given_name, candidate_number }, k) => `${k + 1} ${family_name}, ${given_name}, ${candidate_number}.pdf`))
    for (const [k, { bytes }] of files.entries()) expect(bytes.equals(await frozen(register[k]!.script.scriptId))).toBe(true)
  })

  it('goes out while it is being built, each script as soon as it is there', async () => {
    const teacher = await anActor('teacher')
    const { classSetId } = await aMarkedClassSet(teacher, 3)
    const releaseId = await startRelease(teacher, classSetId)
    let asked = 0
    await buildRelease(releaseId, () => asked++ < 1)
    const { stream } = await openClassZip(teacher, classSetId)
    const whole = buffer(stream)
    await work()
    expect(unpacked(await whole)).toHaveLength(3)
  })
})

describe('a class as one PDF', () => {
  it('has each script on a right-hand page with its images byte for byte, and each font once', async () => {
    const { teacher, classSetId, register, scan } = await aReturnedClass()
    const file = asFile(await bytesOf(await openClassPdf(teacher, classSetId)))
    assertClean(file)
    // A summary and two pages each, and an empty page so that the next begins on the right.
    expect(pageCountOf(file)).toBe(4 * register.length)
    register.forEach(({ family_name, given_name }, k) => expect(wordsOf(file, 4 * k + 1)).toContain(`${given_name} ${family_name}`))
    expect(wordsOf(file, 4).trim()).toBe('')
    expect(codedImages(file)).toEqual(register.flatMap(({ script }) => script.leaves.flatMap((index) => codedImages(scan, index + 1, index + 1))))
    expect(imageCount(file)).toBe(2 * register.length)
    const fonts = fontLines(file).map((line) => line.split(/\s+/)[0]!.replace(/^.*\+/, ''))
    expect(new Set(fonts).size).toBe(fonts.length)
    expect(bookmarksOf(file)).toEqual(register.map(({ family_name, given_name }) => `${family_name}, ${given_name}`))
  })

  it('has a script that has changed since as it was handed back', async () => {
    const { teacher, classSetId, register } = await aReturnedClass(2)
    const { script } = register[0]!
    const before = wordsOf(asFile(await frozen(script.scriptId)), 1)
    await db()('stamps').whereIn('marking_id', db()('markings').join('responses', 'responses.id', 'markings.response_id').where({ script_id: script.scriptId }).limit(1).select('markings.id')).update({ worth: 0, kind: 'cross' })
    const file = asFile(await bytesOf(await openClassPdf(teacher, classSetId)))
    assertClean(file)
    expect(wordsOf(file, 1)).toBe(before)
    expect(pageCountOf(file)).toBe(8)
  })
})

describe('a class bundle', () => {
  it('is only for owners, and only of what stands handed back', async () => {
    const { teacher, classSetId, scripts } = await aReturnedClass(1)
    const student = await anAccountOf(scripts[0]!.studentId)
    for (const open of [openClassZip, openClassPdf]) {
      for (const stranger of [student, await anActor('teacher'), await anActor('admin'), await anActor('marker')]) await expect(open(stranger, classSetId)).rejects.toMatchObject({ code: 'not_found' })
    }
    await withdrawRelease(teacher, classSetId)
    for (const open of [openClassZip, openClassPdf]) await expect(open(teacher, classSetId)).rejects.toMatchObject({ code: 'not_released' })
  })
})

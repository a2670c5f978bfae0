import { execFileSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { PDFDocument } from 'pdf-lib'
import sharp from 'sharp'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { db } from '@/db/knex'
import type { Actor } from '@/lib/core/actor'
import { compose, type Homography } from '@/lib/core/paper-space'
import { keepBytes, readKept } from '@/lib/infra/file-store'
import { runNextJob } from '@/lib/tasks/run-next-job'
import { startRelease } from '@/lib/tasks/start-release'
import { aMarkedClassSet } from '@/tests/make/marked-class-set'
import { asFile, assertClean, imageCount, picturesOf, wordsOf } from '@/tests/make/pdf-tools'
import { anActor, closeSchool, openSchool } from '@/tests/make/school'

beforeEach(openSchool)
afterEach(closeSchool)

async function handBack(teacher: Actor, classSetId: string): Promise<void> {
  await startRelease(teacher, classSetId)
  while (await runNextJob('test', () => false));
}
async function fileOf(scriptId: string): Promise<string> {
  const row = await db()('returned_scripts').join('stored_files', 'stored_files.id', 'returned_scripts.file_id').where({ script_id: scriptId }).first<{ sha256: string } | undefined>('sha256')
  return asFile(await readKept(row!.sha256))
}
async function putSheaf(bytes: Uint8Array): Promise<void> {
  await db()('stored_files').where({ original_name: '8K.pdf' }).update({ sha256: (await keepBytes(bytes)).sha256 })
}
/** Every pixel of a picture file. */
const pixels = async (picture: Buffer, part?: { left: number; top: number; width: number; height: number }): Promise<Buffer> => (part ? sharp(picture).extract(part) : sharp(picture)).toColourspace('b-w').raw().toBuffer()

describe('a script that cannot be taken over as it is', () => {
  it('comes from a copy without loss where the sheaf is enciphered, and its summary says so', async () => {
    const teacher = await anActor('teacher')
    const { classSetId, scripts, scan } = await aMarkedClassSet(teacher, 1)
    const enciphered = asFile(Buffer.alloc(0))
    execFileSync('qpdf', ['--encrypt', '', 'owner', '256', '--', scan, enciphered])
    await putSheaf(readFileSync(enciphered))
    await handBack(teacher, classSetId)
    const file = await fileOf(scripts[0]!.scriptId)
    assertClean(file)
    expect(wordsOf(file, 1)).toContain('Pages 1 and 2 are decoded from the scan without loss. The marking is drawn over them.')
    const originals = scripts[0]!.leaves.flatMap((index) => picturesOf(scan, index + 1, index + 1))
    const copies = picturesOf(file)
    expect(copies).toHaveLength(2)
    for (const [k, copy] of copies.entries()) expect((await pixels(copy)).equals(await pixels(originals[k]!))).toBe(true)
  })

  it('is cut out of an image of two students’ work, and nothing of the other goes along', async () => {
    const teacher = await anActor('teacher')
    const { classSetId, scripts, scan } = await aMarkedClassSet(teacher, 2)
    const [left, right] = scripts.map(({ leaves }) => leaves[0]!) as [number, number]
    const sides = [left, right].map((index) => picturesOf(scan, index + 1, index + 1)[0]!)
    const width = Math.min(...(await Promise.all(sides.map(async (side) => (await sharp(side).metadata()).width))))
    const height = Math.min(...(await Promise.all(sides.map(async (side) => (await sharp(side).metadata()).height))))
    const wide = await sharp({ create: { width: 2 * width, height, channels: 3, background: 'white' } })
      .composite(await Promise.all(sides.map(async (side, k) => ({ input: await sharp(side).extract({ left: 0, top: 0, width, height }).png().toBuffer(), left: k * width, top: 0 })))).toColourspace('b-w').jpeg({ quality: 90 }).toBuffer()
    await putSheaf(await withWidePage(readFileSync(scan), left, wide, { width: (width * 2 * 72) / 200, height: (height * 72) / 200 }))
    for (const [half, index] of [left, right].entries()) {
      const row = await db()('leaves').where({ position: index }).first<{ id: string; homography: string }>('id', 'homography')
      const part = { x: half * width, y: 0, w: width, h: height }
      const homography = compose([[1, 0, part.x], [0, 1, 0], [0, 0, 1]], JSON.parse(row.homography) as Homography)
      await db()('leaves').where({ id: row.id }).update({ position: left, half, width: 2 * width, height, homography: JSON.stringify(homography), finding: JSON.stringify({ reading: { index: left, half, part, image: null, empty: false, guesses: [], clear: true, ink: null }, placed: null }) })
    }
    await handBack(teacher, classSetId)
    for (const [k, { scriptId }] of scripts.entries()) {
      const file = await fileOf(scriptId)
      assertClean(file)
      expect(wordsOf(file, 1)).toContain('Page 1 is cut out of a scan of two pages; the others are unchanged.')
      expect(imageCount(file)).toBe(2)
      const [own] = picturesOf(file)
      expect((await pixels(own!)).equals(await pixels(wide, { left: k * width, top: 0, width, height }))).toBe(true)
    }
  })
})

/** The sheaf with one page in place of another that shows a picture of two. */
async function withWidePage(scan: Buffer, index: number, picture: Buffer, size: { width: number; height: number }): Promise<Uint8Array> {
  const pdf = await PDFDocument.load(scan, { updateMetadata: false })
  pdf.removePage(index)
  const page = pdf.insertPage(index, [size.width, size.height])
  page.drawImage(await pdf.embedJpg(picture), { x: 0, y: 0, ...size })
  return pdf.save()
}

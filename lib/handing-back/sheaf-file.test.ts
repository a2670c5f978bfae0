import { createHash } from 'node:crypto'
import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument, PDFName, PDFRawStream } from 'pdf-lib'
import { describe, expect, it } from 'vitest'
import { everyday } from '@/tests/make/a-script-to-return'
import { loadSheafFile, type PiecewiseFile } from './sheaf-file'

/** A file in memory that counts what is read of it. */
function counting(bytes: Buffer): PiecewiseFile & { total: () => number } {
  let total = 0
  return { size: bytes.length, total: () => total, read: (offset, length) => { total += length; return bytes.subarray(offset, offset + length) } }
}
const pictures = (pdf: PDFDocument): string[] => pdf.context.enumerateIndirectObjects().flatMap(([, object]) =>
  object instanceof PDFRawStream && object.dict.lookup(PDFName.of('Subtype')) === PDFName.of('Image') ? [createHash('sha256').update(object.contents).digest('hex')] : [])
const scan = readFileSync(join(everyday, 'scan.pdf'))

describe('a sheaf loaded without its pictures', () => {
  it('reads little of the file, and each picture whole when it is asked for', async () => {
    const file = counting(scan)
    const pdf = await loadSheafFile(file)
    expect(file.total()).toBeLessThan(scan.length / 2)
    const whole = pictures(await PDFDocument.load(scan, { updateMetadata: false }))
    expect(whole).toHaveLength(pdf.getPageCount())
    expect(pictures(pdf)).toEqual(whole)
  })

  it.each([
    ['with objects packed in streams', ['--object-streams=generate']],
    ['laid out for the web', ['--linearize']],
    ['written out in full', ['--object-streams=disable', '--qdf']],
  ])('is the same %s', async (_, options) => {
    const path = join(mkdtempSync(join(tmpdir(), 'sheafmark-sheaf-')), 'scan.pdf')
    execFileSync('qpdf', [...options, join(everyday, 'scan.pdf'), '--pages', '.', '1-4', '--', path])
    const bytes = readFileSync(path)
    const whole = pictures(await PDFDocument.load(bytes, { updateMetadata: false }))
    expect(pictures(await loadSheafFile(counting(bytes)))).toEqual(whole)
  })

  it('is the same when it is damaged: a wrong length, a broken end', async () => {
    const wrong = Buffer.from(scan.toString('latin1').replace(/\/Length (\d+)(?=[^>]*>>\s*stream)/, (_, n: string) => `/Length ${String(Number(n) + 7).slice(0, n.length)}`), 'latin1')
    for (const bytes of [wrong, scan.subarray(0, scan.length - 300)]) {
      const whole = await PDFDocument.load(bytes, { updateMetadata: false }).then(pictures, () => 'refused')
      expect(await loadSheafFile(counting(bytes)).then(pictures, () => 'refused')).toEqual(whole)
    }
  })
})

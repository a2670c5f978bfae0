import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { greyDifference } from '@/tests/make/compare-pages'
import { pageKinds, pagePictures } from '@/tests/make/page-kinds'

let folder = ''
let kinds: Readonly<Record<string, Buffer>> = {}
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'kinds-'))
  kinds = await pageKinds(await pagePictures())
})
afterAll(() => rmSync(folder, { recursive: true }))

/** Mean grey levels between ours and pdftoppm's picture. A page the wrong way up differs by 14 and more, a negative by far more. */
const bar = 3.5
function file(name: string, bytes: Buffer): string {
  const path = join(folder, `${name.replaceAll(/[^a-z0-9]/gi, '-')}.pdf`)
  writeFileSync(path, bytes)
  return path
}
/** What is lifted untouched, and what has to be drawn. */
const lifted: Readonly<Record<string, readonly string[]>> = {
  jpeg: ['jpeg grey', 'jpeg rgb', 'jpeg progressive', 'jpeg inside flate', 'jpeg inside hex', 'jpeg inverted', 'turned by /Rotate', 'turned by /Rotate -90', 'turned by its matrix', 'box off the origin', 'crop box', 'user unit', 'a name with signs', 'content in parts', 'text behind'],
  g4: ['ccitt g4', 'ccitt g4 stencil', 'ccitt g4 inverted twice', 'jbig2 mmr'],
  rendered: ['jpeg cmyk', 'ccitt g3', 'jbig2', 'jpeg 2000', 'flate grey', 'flate rgb', 'flate 1 bit', 'flate palette', 'flate predictor', 'lzw', 'run length', 'not coded', 'strips', 'background and mask', 'inline image', 'form object', 'half of a picture'],
}

describe('a page, whatever it is made of,', () => {
  it.each(Object.entries(lifted).flatMap(([encoding, names]) => names.map((name) => [name, encoding] as const)))('is read as pdftoppm draws it: %s (%s)', async (name, encoding) => {
    const seen = await greyDifference(file(name, kinds[name]!))
    expect(seen.encoding).toBe(encoding)
    expect(seen.off).toBeLessThan(bar)
    expect(seen.turned).toBeGreaterThan(3 * bar)
  })

  it('is on the list above for every kind that is made', () => {
    expect(Object.values(lifted).flat().sort()).toEqual(Object.keys(kinds).sort())
  })

  it('has its density in real points where the file counts in another unit', async () => {
    expect((await greyDifference(file('unit', kinds['user unit']!))).dpi).toBeCloseTo(100, 0)
  })
})

describe('a file, however it is laid out,', () => {
  const qpdf = (name: string, kind: string, ...options: string[]): string => {
    const out = join(folder, `${name}.pdf`)
    execFileSync('qpdf', ['--allow-weak-crypto', ...options, file(`from-${name}`, kinds[kind]!), out])
    return out
  }
  const open = ['--encrypt', '', 'owner']
  it.each([
    ['object-streams', ['--object-streams=generate']],
    ['linearised', ['--linearize']],
    ['rc4-40', [...open, '40', '--']],
    ['rc4-128', [...open, '128', '--']],
    ['aes-128', [...open, '128', '--use-aes=y', '--']],
    ['aes-256-r5', [...open, '256', '--force-R5', '--']],
    ['aes-256', [...open, '256', '--', '--object-streams=generate']],
  ])('is read: %s', async (name, options) => {
    // a palette is a string of the file, which is enciphered too
    for (const kind of ['jpeg grey', 'flate palette']) {
      const seen = await greyDifference(qpdf(name, kind, ...options))
      expect(seen.off).toBeLessThan(bar)
      expect(seen.encoding).toBe(kind === 'jpeg grey' ? 'jpeg' : 'rendered')
    }
  })

  it('is read when its newest part names an older table, or bytes stand before its header', async () => {
    const bytes = kinds['jpeg grey']!
    const start = Number(/startxref\s+(\d+)/.exec(bytes.subarray(-60).toString('latin1'))![1])
    const turned = `3 0 obj\n<</Type/Page/Parent 2 0 R/Rotate 180/Contents 4 0 R/MediaBox[0 0 595 842]/Resources<</XObject<</I 5 0 R>>>>>>\nendobj\n`
    const tail = `${turned}xref\n3 1\n${String(bytes.length).padStart(10, '0')} 00000 n \ntrailer\n<</Root 1 0 R/Size 6/Prev ${start}>>\nstartxref\n${bytes.length + turned.length}\n%%EOF\n`
    const seen = await greyDifference(file('updated', Buffer.concat([bytes, Buffer.from(tail)])))
    expect(seen.off).toBeLessThan(bar)
    expect(seen.encoding).toBe('jpeg')
    expect((await greyDifference(file('shifted', Buffer.concat([Buffer.from('a line of the mailer before the file\n'), bytes])))).off).toBeLessThan(bar)
  })
})

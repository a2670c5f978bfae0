import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { deflateSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AppError } from '@/lib/core/errors'
import { bombs, plainSheaf, smallJpeg } from '@/tests/make/bad-pages'
import { jbig2 } from '@/tests/make/jbig2'
import { onePage } from '@/tests/make/raw-pdf'
import { decodePage } from './decode-page'
import { openSheaf } from './open-sheaf'

let folder = ''
let jpeg: Buffer = Buffer.alloc(0)
let made: Readonly<Record<string, Buffer>> = {}
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'damaged-'))
  jpeg = await smallJpeg()
  made = await bombs()
})
afterAll(() => rmSync(folder, { recursive: true }))

/** What each page of a file comes to: `read`, or the code of what is wrong with it; or the code that the file itself is turned down with. */
async function readAll(bytes: Buffer, most = 20): Promise<string[]> {
  const path = join(folder, 'file.pdf')
  writeFileSync(path, bytes)
  let sheaf
  try {
    sheaf = openSheaf(path)
  } catch (error) {
    return [`file: ${(error as AppError).code}`]
  }
  const found: string[] = []
  for (let index = 0; index < Math.min(most, sheaf.pageCount); index++) {
    found.push(await decodePage(sheaf, index).then(({ picture }) => (picture.width > 1 ? 'read' : 'tiny'), (error: AppError) => {
      expect(error).toMatchObject({ name: 'AppError', detail: { page: index + 1 } })
      return error.code
    }))
  }
  sheaf.close()
  return found
}
const replaced = (bytes: Buffer, from: string, to: string) => Buffer.from(bytes.toString('latin1').replace(from, to), 'latin1')

describe('a damaged sheaf keeps its good pages', () => {
  it('when it breaks off: what lies before is read, and the page that is cut in two is named', async () => {
    const whole = plainSheaf(jpeg, 6)
    const [first, second] = [whole.indexOf('\n8 0 obj'), whole.indexOf('\n11 0 obj')]
    // inside the third page's picture: that of the second is whole, the third page's lies open
    expect(first).toBeGreaterThan(0)
    expect(await readAll(whole.subarray(0, second + 2000))).toEqual(['read', 'read', 'page_incomplete', 'page_unreadable', 'page_unreadable', 'page_unreadable'])
    // the tree lies at the end and is lost; and of the last page only a part of its picture is left
    const objects = whole.toString('latin1').split('endobj\n').slice(0, -1)
    const treeLast = Buffer.from(`%PDF-1.4\n${objects.slice(2, 4).join('endobj\n')}endobj\n${objects[4]}endobj\n${objects[7]}endobj\n`, 'latin1')
    expect(await readAll(treeLast.subarray(0, treeLast.length - 3000))).toEqual(['read', 'page_unreadable'])
    expect(await readAll(whole.subarray(0, whole.length - 300))).toEqual(Array(6).fill('read'))
  })
  it('when its tables are wrong', async () => {
    const whole = plainSheaf(jpeg, 3)
    expect(await readAll(replaced(whole, 'startxref\n', 'startxref\n9'))).toEqual(Array(3).fill('read'))
    expect(await readAll(replaced(whole, 'xref\n0', 'xerf\n0'))).toEqual(Array(3).fill('read'))
    expect(await readAll(replaced(whole, '/Root 1 0 R', '/Rood 1 0 R'))).toEqual(Array(3).fill('read'))
    expect(await readAll(replaced(whole, '<</Type/Pages', '<</Type/Pagse/'))).toEqual(Array(3).fill('read'))
    const table = whole.indexOf('xref\n0')
    const shifted = Buffer.from(whole)
    for (let k = table; k < whole.length - 20; k++) if (/\d{10} 00000 n/.test(whole.toString('latin1', k, k + 18))) shifted[k + 9] = 48 + ((shifted[k + 9]! - 48 + 3) % 10)
    expect(await readAll(shifted)).toEqual(Array(3).fill('read'))
  })
  it('when one page of it is lost, or its picture broken, and never takes that page for an empty one', async () => {
    const whole = plainSheaf(jpeg, 3)
    expect(await readAll(replaced(whole, '6 0 obj', '6 0 jbo'))).toEqual(['read', 'page_unreadable', 'read'])
    const holed = Buffer.from(whole)
    holed.fill(0, whole.indexOf('8 0 obj') + 200, whole.indexOf('8 0 obj') + 9000)
    expect(await readAll(holed)).toEqual(['read', 'page_unreadable', 'read'])
    const scan = jpeg.indexOf(Buffer.from([0xff, 0xda]))
    const short = Buffer.concat([jpeg.subarray(0, scan + 4000), Buffer.from([0xff, 0xd9])])
    expect(await readAll(plainSheaf(short, 1))).toEqual(['page_incomplete'])
  })
  it('reads a page that is white all over, and tells it from one whose picture is lost', async () => {
    const page = (dict: string, data: Uint8Array) => onePage('/MediaBox[0 0 300 420]/Resources<</XObject<</I 5 0 R>>>>', 'q 300 0 0 420 0 0 cm /I Do Q', [{ dict: `/Type/XObject/Subtype/Image/Width 400/Height 560/ColorSpace/DeviceGray/BitsPerComponent 1 ${dict}`, data }])
    const white = jbig2({ width: 400, height: 560, black: () => false })
    expect(await readAll(page('/Filter/JBIG2Decode', white))).toEqual(['read'])
    expect(await readAll(page('/Filter/FlateDecode', deflateSync(Buffer.alloc(50 * 560, 255))))).toEqual(['read'])
    expect(await readAll(page('/Filter/JBIG2Decode', Buffer.from('no picture at all')))).toEqual(['page_unreadable'])
    expect(await readAll(page('/Filter/FlateDecode', Buffer.from('no picture')))).toEqual(['page_unreadable'])
  })
})

describe('pages made to exhaust their reader', () => {
  const expected: Readonly<Record<string, readonly string[]>> = {
    'g4 of ten thousand million pixels': ['page_too_large'], 'bitmap of thousands of million pixels': ['page_too_large'], 'jpeg larger than it says': ['page_too_large'],
    'jpeg 2000 larger than it says': ['page_too_large'], 'content that swells': ['page_too_large'], 'content that swells twice': ['page_too_large'], 'picture that swells twice': ['page_too_large'],
    'forms in forms in forms': ['page_too_large'], 'a form inside itself': ['read'], 'a mask that is its own mask': ['read'], 'a page as large as a field': ['page_too_large'], 'tiles without end': ['page_too_large'], 'tiles without a step': ['page_too_large'],
    'resources in a circle': ['read'], 'a length that is itself': ['read'], 'a tree in a circle': ['read'], 'a tree that doubles': ['read', 'read'], 'a million brackets': ['page_unreadable'], 'a string without end': ['page_unreadable'],
    'a million saved states': ['read'], 'a function in a circle': ['read'], 'one dot for a page': ['page_unreadable'], 'a picture of one line': ['page_unreadable'], 'jbig2 of noise': ['page_unreadable'], 'a script, a file and a note': ['read'],
  }
  it('come to a clear end each, with the page named', async () => {
    const found: Record<string, string[]> = {}
    for (const [name, bytes] of Object.entries(made)) found[name] = await readAll(bytes)
    expect(found).toEqual(expected)
  })
})

import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { PDFDocument, PDFName, concatTransformationMatrix, degrees, drawObject, popGraphicsState, pushGraphicsState } from 'pdf-lib'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AppError } from '@/lib/core/errors'
import { decodePage } from './decode-page'
import { openSheaf } from './open-sheaf'

const [width, height] = [400, 560]
let folder = ''
let jpeg = Buffer.alloc(0)
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'sheaf-'))
  // black in the top left corner, grey at the top right: no turn looks like another
  const square = (w: number, h: number, v: number) => sharp({ create: { width: w, height: h, channels: 3, background: { r: v, g: v, b: v } } }).png().toBuffer()
  jpeg = await sharp({ create: { width, height, channels: 3, background: 'white' } })
    .composite([{ input: await square(100, 100, 0), left: 0, top: 0 }, { input: await square(100, 100, 128), left: 300, top: 0 }])
    .toColourspace('b-w').jpeg({ quality: 95 }).toBuffer()
})
afterAll(() => rmSync(folder, { recursive: true }))

type Shape = Readonly<{ turn?: number; draw?: 'plain' | 'strips' | 'form' | 'inverted'; pages?: number; broken?: number; compact?: boolean }>
async function aSheaf({ turn = 0, draw = 'plain', pages = 1, broken = -1, compact = false }: Shape = {}): Promise<Uint8Array> {
  const pdf = await PDFDocument.create()
  for (let k = 0; k < pages; k++) {
    const page = pdf.addPage([200, 280])
    page.setRotation(degrees(turn))
    const image = (bytes: Uint8Array, w: number, h: number) =>
      pdf.context.register(pdf.context.stream(bytes, { Type: 'XObject', Subtype: 'Image', Width: w, Height: h, ColorSpace: 'DeviceGray', BitsPerComponent: 8, Filter: 'DCTDecode', ...(draw === 'inverted' ? { Decode: [1, 0] } : {}) }))
    const lay = (name: string, x: number, y: number, w: number, h: number) => [pushGraphicsState(), concatTransformationMatrix(w, 0, 0, h, x, y), drawObject(name), popGraphicsState()]
    if (draw === 'strips') {
      for (const [part, top] of [0, 280].entries()) {
        const strip = await sharp(jpeg).extract({ left: 0, top, width, height: 280 }).toColourspace('b-w').jpeg().toBuffer()
        page.node.setXObject(PDFName.of(`S${part}`), image(strip, width, 280))
        page.pushOperators(...lay(`S${part}`, 0, part === 0 ? 140 : 0, 200, 140))
      }
    } else if (draw === 'form') {
      const content = '200 0 0 280 0 0 cm /I Do'
      const form = pdf.context.stream(content, { Type: 'XObject', Subtype: 'Form', BBox: [0, 0, 200, 280], Resources: { XObject: { I: image(jpeg, width, height) } } })
      page.node.setXObject(PDFName.of('F'), pdf.context.register(form))
      page.pushOperators(drawObject('F'))
    } else {
      page.node.setXObject(PDFName.of('I'), image(k === broken ? Buffer.from('no picture at all') : jpeg, width, height))
      page.pushOperators(...lay('I', 0, 0, 200, 280))
    }
  }
  return pdf.save({ useObjectStreams: compact })
}
function opened(bytes: Uint8Array) {
  const path = join(folder, 'sheaf.pdf')
  writeFileSync(path, bytes)
  return openSheaf(path)
}
async function decoded(bytes: Uint8Array, index = 0) {
  const sheaf = opened(bytes)
  try {
    return { page: sheaf.page(index), ...(await decodePage(sheaf, index)) }
  } finally {
    sheaf.close()
  }
}
/** Grey values at the middle of the four corner squares: top left, top right, bottom left, bottom right. */
function cornerValues({ width: w, height: h, data }: { width: number; height: number; data: Uint8Array }): number[] {
  return [[50, 50], [w - 50, 50], [50, h - 50], [w - 50, h - 50]].map(([x, y]) => Math.round(data[y! * w + x!]! / 16) * 16)
}
const upright = [0, 128, 256, 256]
function codeOf(bytes: Uint8Array): string {
  try {
    opened(bytes).close()
    return 'opened'
  } catch (error) {
    return (error as AppError).code
  }
}
function qpdf(bytes: Uint8Array, ...options: string[]): Uint8Array {
  writeFileSync(join(folder, 'in.pdf'), bytes)
  execFileSync('qpdf', [...options, join(folder, 'in.pdf'), join(folder, 'out.pdf')])
  return readFileSync(join(folder, 'out.pdf'))
}

describe('taking pages out of a sheaf', () => {
  it('hands a page image out byte for byte, with its own pixels and density', async () => {
    const { page, image, picture } = await decoded(await aSheaf())
    expect(page.image !== null && Buffer.from(page.bytes).equals(jpeg)).toBe(true)
    expect(image).toMatchObject({ encoding: 'jpeg', width, height, dpiX: 144, dpiY: 144, shownTurn: 0 })
    expect(cornerValues(picture)).toEqual(upright)
  })
  it.each([90, 180, 270])('leaves the stored image as it is on a page with /Rotate %i, and says how it is shown', async (turn) => {
    const { image, picture } = await decoded(await aSheaf({ turn }))
    expect(image).toMatchObject({ width, height, shownTurn: turn })
    expect(cornerValues(picture)).toEqual(upright)
  })
  it('reads object streams, an inverted image, and a file with its end cut off', async () => {
    expect(cornerValues((await decoded(await aSheaf({ compact: true }))).picture)).toEqual(upright)
    expect(cornerValues((await decoded(await aSheaf({ draw: 'inverted' }))).picture)).toEqual([256, 128, 0, 0])
    const whole = Buffer.from(await aSheaf())
    expect(cornerValues((await decoded(whole.subarray(0, whole.lastIndexOf('\nxref') + 40))).picture)).toEqual(upright)
  })
  it.each(['strips', 'form'] as const)('draws a page made of %s in the frame of its image, before its /Rotate', async (draw) => {
    const { image, picture } = await decoded(await aSheaf({ draw, turn: 90 }))
    expect(image).toMatchObject({ encoding: 'rendered', width, height, shownTurn: 90 })
    expect(cornerValues(picture)).toEqual(upright)
  })
  it('reads a sheaf enciphered with an empty password', async () => {
    const { image, picture } = await decoded(qpdf(await aSheaf({ turn: 180 }), '--encrypt', '', 'owner', '256', '--'))
    expect(image).toMatchObject({ encoding: 'jpeg', width, height, shownTurn: 180 })
    expect(cornerValues(picture)).toEqual(upright)
  })
  it('keeps the good pages when one page image is broken, and never takes that one for empty', async () => {
    const bytes = await aSheaf({ pages: 3, broken: 1 })
    expect(cornerValues((await decoded(bytes, 2)).picture)).toEqual(upright)
    await expect(decoded(bytes, 1)).rejects.toMatchObject({ code: 'page_unreadable', detail: { page: 2 } })
  })
})

describe('files that are no sheaf', () => {
  it('says what is wrong with each', async () => {
    const none = await PDFDocument.create()
    none.addPage()
    none.removePage(0)
    const noPages = await none.save({ addDefaultPage: false })
    expect(codeOf(new Uint8Array())).toBe('file_empty')
    expect(codeOf(Buffer.from('PK\u0003\u0004 a spreadsheet'))).toBe('file_not_pdf')
    expect(codeOf(Buffer.from('%PDF-1.7\nnothing of a document follows'))).toBe('file_damaged')
    expect(codeOf(noPages)).toBe('file_no_pages')
    expect(codeOf(qpdf(await aSheaf(), '--encrypt', 'secret', 'owner', '256', '--'))).toBe('file_encrypted')
    expect(codeOf(await aSheaf())).toBe('opened')
  })
  it('refuses more pages than a sheaf may have', async () => {
    const pdf = await PDFDocument.create()
    pdf.addPage([10, 10])
    for (let k = 0; k < 2000; k++) pdf.addPage([10, 10])
    const bytes = await pdf.save()
    expect(() => opened(bytes)).toThrow(expect.objectContaining({ code: 'too_many_pages', detail: { pages: 2001, most: 2000 } }))
  })
})

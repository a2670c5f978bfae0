import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { decodePage } from '@/lib/reading/decode-page'
import { openSheaf } from '@/lib/reading/open-sheaf'
import { greyDifference } from '@/tests/make/compare-pages'
import { pagePictures, type PagePictures } from '@/tests/make/page-kinds'
import { tiffOf } from '@/tests/make/tiff'
import { oneFile } from '@/components/scan/one-file'
import { wrapScan } from './wrap-scan'

let folder = ''
let pictures: PagePictures
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'pictures-'))
  pictures = await pagePictures()
})
afterAll(() => rmSync(folder, { recursive: true }))

const grey = () => sharp(pictures.grey, { raw: { width: pictures.width, height: pictures.height, channels: 1 } }).toColourspace('b-w')
const rgb = () => sharp(pictures.rgb, { raw: { width: pictures.width, height: pictures.height, channels: 3 } })
let count = 0
async function wrapped(...files: Uint8Array[]): Promise<string> {
  const to = join(folder, `${count++}.pdf`)
  const paths = files.map((bytes, k) => join(folder, `${count}-${k}.bin`))
  files.forEach((bytes, k) => writeFileSync(paths[k]!, bytes))
  await wrapScan(paths, to)
  return to
}
const sheetOf = async (file: string, index = 0) => {
  const sheaf = openSheaf(file)
  try {
    const { image, picture } = await decodePage(sheaf, index)
    return { pages: sheaf.pageCount, image, inches: picture.width / image.dpiX }
  } finally {
    sheaf.close()
  }
}
/** The mean difference to the grey page everything here is made of, or to another picture. */
async function offPage(file: string, index = 0, expected: { data: Uint8Array; width: number; height: number } = { ...pictures, data: pictures.grey }): Promise<number> {
  const sheaf = openSheaf(file)
  try {
    const { image, picture } = await decodePage(sheaf, index)
    const small = async (data: Uint8Array, width: number, height: number, turn: number) => {
      const upright = await sharp(data, { raw: { width, height, channels: 1 } }).rotate(turn).toColourspace('b-w').raw().toBuffer({ resolveWithObject: true })
      return sharp(upright.data, { raw: { width: upright.info.width, height: upright.info.height, channels: 1 } }).resize(200, 283, { fit: 'fill' }).toColourspace('b-w').raw().toBuffer()
    }
    const [ours, theirs] = [await small(picture.data, picture.width, picture.height, image.shownTurn), await small(expected.data, expected.width, expected.height, 0)]
    return ours.reduce((sum, v, k) => sum + Math.abs(v - theirs[k]!), 0) / ours.length
  } finally {
    sheaf.close()
  }
}

describe('a picture sent as a scan', () => {
  it('keeps its own coded bytes as a JPEG page, without what a camera noted', async () => {
    const jpeg = await grey().withMetadata({ density: 100 }).withExif({ IFD0: { Copyright: 'a note of the camera' } }).jpeg().toBuffer()
    const file = await wrapped(jpeg)
    const scan = jpeg.subarray(jpeg.lastIndexOf(Buffer.from([0xff, 0xda])))
    expect(readFileSync(file).includes(scan)).toBe(true)
    expect(readFileSync(file).includes('a note of the camera')).toBe(false)
    expect(await sheetOf(file)).toMatchObject({ pages: 1, image: { encoding: 'jpeg', width: 827, height: 1169 } })
    expect(await offPage(file)).toBeLessThan(2)
  })

  it.each([1, 2, 3, 4, 5, 6, 7, 8])('is shown as its EXIF orientation %i says', async (orientation) => {
    const file = await wrapped(await grey().withMetadata({ orientation }).jpeg().toBuffer())
    const shown = await sharp(readFileSync(join(folder, `${count}-0.bin`))).autoOrient().toColourspace('b-w').raw().toBuffer({ resolveWithObject: true })
    expect(await offPage(file, 0, { data: shown.data, width: shown.info.width, height: shown.info.height })).toBeLessThan(2.5)
    expect((await greyDifference(file)).off).toBeLessThan(2.5)
  })

  it.each([
    ['grey', () => grey().png().toBuffer()],
    ['colour', () => rgb().png().toBuffer()],
    ['with a palette', () => rgb().png({ palette: true, colours: 32 }).toBuffer()],
    ['woven', () => grey().png({ progressive: true }).toBuffer()],
    ['see-through', () => rgb().ensureAlpha(1).png().toBuffer()],
    ['with 16 bits', () => grey().toColourspace('grey16').png().toBuffer()],
  ])('is read as a PNG that is %s', async (_, make) => {
    expect(await offPage(await wrapped(await make()))).toBeLessThan(4)
  })

  it('has its size on paper by what it says, and is a whole sheet where that cannot be', async () => {
    const at = async (density: number | undefined, w = 827, h = 1169) => (await sheetOf(await wrapped(await sharp({ create: { width: w, height: h, channels: 3, background: 'white' } }).withMetadata(density ? { density } : {}).jpeg().toBuffer()))).inches
    expect(await at(100)).toBeCloseTo(8.27, 2)
    expect(await at(150)).toBeCloseTo(827 / 150, 2)
    expect(await at(undefined)).toBeCloseTo(8.27, 1)
    expect(await at(20)).toBeCloseTo(8.27, 1)
    expect(await at(undefined, 850, 1100)).toBeCloseTo(8.5, 2)
    expect(await at(undefined, 1654, 1169)).toBeCloseTo(11.69, 1)
  })
})

describe('a TIFF', () => {
  it.each(['none', 'lzw', 'deflate', 'packbits', 'jpeg'] as const)('is read in coding %s', async (compression) => {
    expect(await offPage(await wrapped(await grey().tiff({ compression, xres: 3.937, yres: 3.937 }).toBuffer()))).toBeLessThan(2.5)
  })

  it('of G4 pages keeps their coded strips, black and white as they are, however the bits lie', async () => {
    const { data, width, height } = pictures.g4
    const page = { width, height, strips: [data] }
    const file = await wrapped(tiffOf([{ ...page, blackIsZero: true }, { ...page, blackIsZero: true, backwards: true }, { ...page, blackIsZero: false }]))
    expect(readFileSync(file).includes(Buffer.from(data))).toBe(true)
    expect(await sheetOf(file, 2)).toMatchObject({ pages: 3, image: { encoding: 'g4', width, height, dpiX: expect.closeTo(300, 1) as number } })
    for (const index of [0, 1]) {
      const seen = await greyDifference(file, index)
      expect(seen).toMatchObject({ encoding: 'g4' })
      expect(seen.off).toBeLessThan(3.5)
      expect(seen.turned).toBeGreaterThan(20)
    }
    expect((await greyDifference(file, 2)).off).toBeLessThan(3.5)
  })

  it('keeps its other pages when one is broken, which is reported in its place', async () => {
    const { data, width, height } = pictures.g4
    const page = { width, height, strips: [data], blackIsZero: true }
    const file = await wrapped(tiffOf([page, { ...page, width: 400_000, height: 400_000 }, page]))
    await expect(sheetOf(file, 1)).rejects.toMatchObject({ code: 'page_too_large', detail: { page: 2 } })
    expect((await sheetOf(file, 2)).pages).toBe(3)
  })
})

describe('files that are no scan', () => {
  it('are told apart by their content, each with what to do', async () => {
    const heic = Buffer.concat([Buffer.from([0, 0, 0, 24]), Buffer.from('ftypheic'), Buffer.alloc(100)])
    const png = await grey().png().toBuffer()
    const faults: [Uint8Array, string][] = [[Buffer.alloc(0), 'file_empty'], [heic, 'file_heic'], [Buffer.from('PK a document'), 'file_kind_unknown'], [png.subarray(0, 3000), 'file_damaged'], [Buffer.from('II*\0'), 'file_damaged'], [Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 4, 0, 0]), 'file_damaged']]
    for (const [bytes, code] of faults) await expect(wrapped(bytes)).rejects.toMatchObject({ code })
  })

  it('several pictures are one sheaf in the order given, and the same ones give the same bytes', async () => {
    const [one, two] = [await grey().jpeg().toBuffer(), await grey().png().toBuffer()]
    const file = await wrapped(one, two)
    expect(await sheetOf(file)).toMatchObject({ pages: 2, image: { encoding: 'jpeg' } })
    expect(readFileSync(file).equals(readFileSync(await wrapped(one, two)))).toBe(true)
  })

  it('several pictures chosen at once come as one file, and are the same sheaf', async () => {
    const files = [['page 10.png', await grey().png().toBuffer()], ['page 9.jpg', await grey().jpeg().toBuffer()], ['page 11.tif', await grey().tiff({ compression: 'lzw' }).toBuffer()]] as const
    const sent = await oneFile(files.map(([name, bytes]) => new File([new Uint8Array(bytes)], name)))
    expect(sent!.name).toBe('page 9.jpg and 2 more')
    const pack = Buffer.from(await sent!.arrayBuffer())
    const file = await wrapped(pack)
    expect(readFileSync(file).equals(readFileSync(await wrapped(files[1][1], files[0][1], files[2][1])))).toBe(true)
    expect(await offPage(file, 2)).toBeLessThan(2.5)
    await expect(wrapped(pack.subarray(0, pack.length - 10))).rejects.toMatchObject({ code: 'file_damaged' })
    expect(await oneFile([new File(['%PDF-1.4'], 'a.pdf'), new File([new Uint8Array(files[0][1])], 'b.png')])).toBeNull()
  })
})

import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { openSheaf } from '@/lib/reading/open-sheaf'
import { jbig2, jbig2Mmr } from './jbig2'
import { onePage, rawPdf, type RawObject } from './raw-pdf'

const sets = join(process.cwd(), 'seeds/class-sets')
/** A4 in points. */
const [w, h] = [595, 842]
const whole = `q ${w} 0 0 ${h} 0 0 cm /I Do Q`

/** Pictures of real test pages to make sheaves of: in grey, and in black and white with the stream that codes it. */
export type PagePictures = Readonly<{ width: number; height: number; grey: Buffer; rgb: Buffer; bits: Buffer; g4: { data: Uint8Array; width: number; height: number }; jp2: Buffer }>

function stored(set: string): { bytes: Uint8Array; width: number; height: number } {
  const sheaf = openSheaf(join(sets, set, 'scan.pdf'))
  try {
    const page = sheaf.page(0)
    if (page.image === null) throw new Error('no image')
    return { bytes: page.bytes, width: page.image.width, height: page.image.height }
  } finally {
    sheaf.close()
  }
}

/** The first pages of two class sets, the grey one at 100 dpi. */
export async function pagePictures(): Promise<PagePictures> {
  const [width, height] = [827, 1169]
  const page = sharp(stored('one-page').bytes).resize(width, height, { fit: 'fill' })
  const grey = await page.clone().toColourspace('b-w').raw().toBuffer()
  const rgb = await page.clone().toColourspace('srgb').raw().toBuffer()
  const row = Math.ceil(width / 8)
  const bits = Buffer.alloc(row * height)
  for (let y = 0; y < height; y++) for (let x = 0; x < width; x++) if (grey[y * width + x]! > 160) bits[y * row + (x >> 3)]! |= 0x80 >> (x & 7)
  const { bytes: data, ...size } = stored('bitonal')
  return { width, height, grey, rgb, bits, g4: { data, ...size }, jp2: await readFile(join(process.cwd(), 'tests/fixtures/page.jp2')) }
}

type Made = Readonly<Record<string, Buffer>>
const pictureDict = (width: number, height: number, rest: string) => `/Type/XObject/Subtype/Image/Width ${width}/Height ${height} ${rest}`
const usual = `/MediaBox[0 0 ${w} ${h}]/Resources<</XObject<</I 5 0 R>>>>`

/** One page of each kind that copiers and programs make; all show the same page, the JPEG 2000 one smaller. */
export async function pageKinds(pictures: PagePictures): Promise<Made> {
  const { width, height, grey, rgb, bits, g4, jp2 } = pictures
  const raw = (channels: 1 | 3) => sharp(channels === 1 ? grey : rgb, { raw: { width, height, channels } })
  const jpeg = await raw(1).toColourspace('b-w').jpeg({ quality: 85 }).toBuffer()
  const one = (rest: string, data: Uint8Array, size = { width, height }, page = usual, content = whole) => onePage(page, content, [{ dict: pictureDict(size.width, size.height, rest), data }])
  const grey8 = '/ColorSpace/DeviceGray/BitsPerComponent 8'
  const dct = `${grey8}/Filter/DCTDecode`
  const fax = `/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/CCITTFaxDecode/DecodeParms<</K -1/Columns ${g4.width}/Rows ${g4.height}/BlackIs1 true>>`
  const backwards = `<${Buffer.from(Array.from({ length: 256 }, (_, k) => [255 - k, 255 - k, 255 - k]).flat()).toString('hex')}>`
  return {
    'jpeg grey': one(dct, jpeg),
    'jpeg rgb': one('/ColorSpace/DeviceRGB/BitsPerComponent 8/Filter/DCTDecode', await raw(3).jpeg({ quality: 85 }).toBuffer()),
    'jpeg cmyk': one('/ColorSpace/DeviceCMYK/BitsPerComponent 8/Filter/DCTDecode/Decode[1 0 1 0 1 0 1 0]', await raw(3).toColourspace('cmyk').jpeg({ quality: 85 }).toBuffer()),
    'jpeg progressive': one(dct, await raw(1).toColourspace('b-w').jpeg({ quality: 85, progressive: true }).toBuffer()),
    'jpeg inside flate': one(`${grey8}/Filter[/FlateDecode/DCTDecode]`, deflateSync(jpeg)),
    'jpeg inside hex': one(`${grey8}/Filter[/ASCIIHexDecode/DCTDecode]`, Buffer.from(`${jpeg.toString('hex')}>`)),
    'jpeg inverted': one(`${dct}/Decode[1 0]`, await sharp(grey.map((v) => 255 - v), { raw: { width, height, channels: 1 } }).toColourspace('b-w').jpeg({ quality: 85 }).toBuffer()),
    'ccitt g4': one(fax, g4.data, g4),
    'ccitt g4 stencil': one(fax.replace('/ColorSpace/DeviceGray', '/ImageMask true/Decode[1 0]'), g4.data, g4),
    'ccitt g4 inverted twice': one(fax.replace('/BlackIs1 true', '/BlackIs1 false').replace('/Filter', '/Decode[1 0]/Filter'), g4.data, g4),
    'ccitt g3': onePage(usual, whole, [{ dict: pictureDict(640, 905, '/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/CCITTFaxDecode/DecodeParms<</K 0/Columns 640/Rows 905/EndOfBlock false>>'), data: checksG3(640, 905) }]),
    jbig2: one('/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/JBIG2Decode', jbig2({ width, height, black: (x, y) => grey[y * width + x]! <= 160 })),
    'jbig2 mmr': one('/ColorSpace/DeviceGray/BitsPerComponent 1/Decode[1 0]/Filter/JBIG2Decode', jbig2Mmr(g4.width, g4.height, g4.data), g4),
    'jpeg 2000': one('/Filter/JPXDecode', jp2, { width: 207, height: 292 }),
    'flate grey': one(`${grey8}/Filter/FlateDecode`, deflateSync(grey)),
    'flate rgb': one('/ColorSpace/DeviceRGB/BitsPerComponent 8/Filter/FlateDecode', deflateSync(rgb)),
    'flate 1 bit': one('/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/FlateDecode', deflateSync(bits)),
    'flate palette': onePage(usual, whole, [{ dict: pictureDict(width, height, '/ColorSpace[/Indexed/DeviceRGB 255 6 0 R]/BitsPerComponent 8/Filter/FlateDecode'), data: deflateSync(grey.map((v) => 255 - v)) }, backwards]),
    'flate predictor': one(`${grey8}/Filter/FlateDecode/DecodeParms<</Predictor 15/Colors 1/BitsPerComponent 8/Columns ${width}>>`, deflateSync(upRows(grey, width))),
    lzw: one(`${grey8}/Filter/LZWDecode`, lzw(grey)),
    'run length': one(`${grey8}/Filter/RunLengthDecode`, runLength(grey)),
    'not coded': one(grey8, grey),
    strips: await stripsOf(pictures),
    'background and mask': layered(pictures),
    'inline image': inlined(pictures),
    'form object': onePage(`/MediaBox[0 0 ${w} ${h}]/Resources<</XObject<</F 5 0 R>>>>`, '/F Do', [{ dict: `/Type/XObject/Subtype/Form/BBox[0 0 ${h} ${w}]/Matrix[0 1 -1 0 ${w} 0]/Resources<</XObject<</I 6 0 R>>>>`, data: Buffer.from(`q 0 ${-w} ${h} 0 0 ${w} cm /I Do Q`) }, { dict: pictureDict(width, height, dct), data: jpeg }]),
    'turned by /Rotate': one(dct, jpeg, undefined, `${usual}/Rotate 90`),
    'turned by /Rotate -90': one(dct, jpeg, undefined, `${usual}/Rotate -90`),
    'turned by its matrix': one(dct, jpeg, undefined, `/MediaBox[0 0 ${h} ${w}]/Resources<</XObject<</I 5 0 R>>>>`, `q 0 ${-w} ${h} 0 0 ${w} cm /I Do Q`),
    'box off the origin': one(dct, jpeg, undefined, `/MediaBox[${w + 100} ${h - 50} 100 -50]/Resources<</XObject<</I 5 0 R>>>>`, `1 0 0 1 100 -50 cm ${whole}`),
    'crop box': one(dct, jpeg, undefined, `/MediaBox[-200 -200 900 1100]/CropBox[0 0 ${w} ${h}]/Resources<</XObject<</I 5 0 R>>>>`),
    'half of a picture': one(dct, jpeg, undefined, `/MediaBox[0 0 ${w} ${h}]/CropBox[0 ${h / 2} ${w} ${h}]/Resources<</XObject<</I 5 0 R>>>>`),
    'user unit': one(dct, jpeg, undefined, `/UserUnit 2/MediaBox[0 0 ${w / 2} ${h / 2}]/Resources<</XObject<</I 5 0 R>>>>`, `q ${w / 2} 0 0 ${h / 2} 0 0 cm /I Do Q`),
    'a name with signs': one(dct, jpeg, undefined, `/MediaBox[0 0 ${w} ${h}]/Resources<</XObject<</Im#20#31 5 0 R>>>>`, `q ${w} 0 0 ${h} 0 0 cm /Im#20#31 Do Q`),
    'content in parts': rawPdf(['<</Type/Catalog/Pages 2 0 R>>', `<</Type/Pages/Count 1/Kids[3 0 R]/MediaBox[0 0 ${w} ${h}]/Resources 7 0 R>>`, '<</Type/Page/Parent 2 0 R/Contents[4 0 R 6 0 R]>>', { dict: '', data: Buffer.from('q 595 0 0 842') }, { dict: pictureDict(width, height, dct), data: jpeg }, { dict: '', data: Buffer.from('0 0 cm /I Do Q') }, '<</XObject<</I 5 0 R>>>>']),
    'text behind': one(dct, jpeg, undefined, usual, `${whole} BT 3 Tr /F1 12 Tf (what was read) Tj ET`),
  }
}

async function stripsOf({ width, height, grey }: PagePictures): Promise<Buffer> {
  const rows = 200
  const strips: RawObject[] = []
  const draws: string[] = []
  for (let top = 0; top < height; top += rows) {
    const high = Math.min(rows, height - top)
    const data = await sharp(grey.subarray(top * width, (top + high) * width), { raw: { width, height: high, channels: 1 } }).toColourspace('b-w').jpeg({ quality: 85 }).toBuffer()
    draws.push(`q ${w} 0 0 ${(h * high) / height} 0 ${h * (1 - (top + high) / height)} cm /S${strips.length} Do Q`)
    strips.push({ dict: pictureDict(width, high, '/ColorSpace/DeviceGray/BitsPerComponent 8/Filter/DCTDecode'), data })
  }
  const names = strips.map((_, k) => `/S${k} ${k + 5} 0 R`).join('')
  return onePage(`/MediaBox[0 0 ${w} ${h}]/Resources<</XObject<<${names}>>>>`, draws.join('\n'), strips)
}

/** A coarse light background, and the print as a stencil over it. */
function layered({ width, height, bits }: PagePictures): Buffer {
  const background: RawObject = { dict: pictureDict(2, 2, '/ColorSpace/DeviceRGB/BitsPerComponent 8'), data: Buffer.alloc(12, 250) }
  const stencil: RawObject = { dict: pictureDict(width, height, '/ImageMask true/BitsPerComponent 1/Filter/FlateDecode'), data: deflateSync(bits) }
  return onePage(`/MediaBox[0 0 ${w} ${h}]/Resources<</XObject<</B 5 0 R/M 6 0 R>>>>`, `q ${w} 0 0 ${h} 0 0 cm /B Do 0.1 g /M Do Q`, [background, stencil])
}

function inlined({ width, height, bits }: PagePictures): Buffer {
  const head = `q ${w} 0 0 ${h} 0 0 cm BI /W ${width} /H ${height} /CS /G /BPC 1 /F /AHx ID `
  return onePage(`/MediaBox[0 0 ${w} ${h}]/Resources<<>>`, `${head}${bits.toString('hex')}>\nEI Q`)
}

function upRows(grey: Buffer, width: number): Buffer {
  const out: Buffer[] = []
  for (let at = 0; at < grey.length; at += width) out.push(Buffer.from([2]), Buffer.from(grey.subarray(at, at + width).map((v, k) => v - (at > 0 ? grey[at - width + k]! : 0))))
  return Buffer.concat(out)
}

/** A board of 64 pixel squares, in one-dimensional fax coding: T.4's codes for runs of 64 and of none are all that it takes. */
function checksG3(width: number, height: number): Buffer {
  const [white, black, noWhite] = ['11011' + '00110101', '0000001111' + '0000110111', '00110101']
  let bits = ''
  for (let y = 0; y < height; y++) {
    const second = (y >> 6) % 2 === 1
    bits += (second ? noWhite : '') + Array.from({ length: width / 64 }, (_, k) => ((k % 2 === 1) !== second ? black : white)).join('')
  }
  return Buffer.from((bits.padEnd(Math.ceil(bits.length / 8) * 8, '0').match(/.{8}/g) ?? []).map((byte) => Number.parseInt(byte, 2)))
}

/** LZW without a dictionary: cleared before its codes would grow wider than nine bits. */
function lzw(bytes: Buffer): Buffer {
  const out: number[] = []
  let [bits, have] = [0, 0]
  const put = (code: number) => {
    bits = ((bits << 9) | code) & 0xfffff
    for (have += 9; have >= 8; have -= 8) out.push((bits >> (have - 8)) & 255)
  }
  bytes.forEach((byte, k) => {
    if (k % 200 === 0) put(256)
    put(byte)
  })
  put(257)
  put(0)
  return Buffer.from(out)
}

function runLength(bytes: Buffer): Buffer {
  const out: Buffer[] = []
  for (let at = 0; at < bytes.length; at += 128) {
    const part = bytes.subarray(at, at + 128)
    out.push(Buffer.from([part.length - 1]), part)
  }
  return Buffer.concat([...out, Buffer.from([128])])
}

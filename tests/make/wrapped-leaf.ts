import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { decodePage } from '@/lib/reading/decode-page'
import type { OpenSheaf } from '@/lib/reading/open-sheaf'
import { jbig2, jbig2Mmr } from './jbig2'
import { rawPdf, type RawObject } from './raw-pdf'

/** A page of a class set wrapped anew: the rest of its page dictionary, its content, and objects that `/I0`, `/I1` and so on name. */
type Wrapped = Readonly<{ page: string; content: string; images: readonly RawObject[] }>
type Leaf = Readonly<{ width: number; height: number; w: number; h: number; grey: Buffer; g4: Uint8Array | null }>
type Wrapping = (leaf: Leaf) => Promise<Wrapped> | Wrapped

const imageOf = ({ width, height }: { width: number; height: number }, dict: string, data: Uint8Array): RawObject => ({ dict: `/Type/XObject/Subtype/Image/Width ${width}/Height ${height} ${dict}`, data })
const jpegOf = ({ grey, width, height }: Leaf) => sharp(grey, { raw: { width, height, channels: 1 } }).toColourspace('b-w').jpeg({ quality: 80 }).toBuffer()
const media = ({ w, h }: Leaf) => `/MediaBox[0 0 ${w} ${h}]`
const draw = ({ w, h }: Leaf, name = 'I0') => `q ${w} 0 0 ${h} 0 0 cm /${name} Do Q`
const grey8 = '/ColorSpace/DeviceGray/BitsPerComponent 8'
const one = (leaf: Leaf, dict: string, data: Uint8Array): Wrapped => ({ page: media(leaf), content: draw(leaf), images: [imageOf(leaf, dict, data)] })
const packed = ({ grey, width, height }: Leaf): Buffer => {
  const row = Math.ceil(width / 8)
  const bits = Buffer.alloc(row * height)
  for (let y = 0; y < height; y++) for (let x = 0; x < width; x++) if (grey[y * width + x]! > 150) bits[y * row + (x >> 3)]! |= 0x80 >> (x & 7)
  return bits
}

/** Ways to wrap one and the same picture; each keeps its pixels, so that truth about them holds. */
export const wrappings: Readonly<Record<string, Wrapping>> = {
  'flate grey': (leaf) => one(leaf, `${grey8}/Filter/FlateDecode`, deflateSync(leaf.grey, { level: 1 })),
  'print colours': async (leaf) => one(leaf, '/ColorSpace/DeviceCMYK/BitsPerComponent 8/Filter/DCTDecode/Decode[1 0 1 0 1 0 1 0]', await sharp(leaf.grey, { raw: { width: leaf.width, height: leaf.height, channels: 1 } }).toColourspace('cmyk').jpeg({ quality: 85 }).toBuffer()),
  'jbig2': (leaf) => one(leaf, '/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/JBIG2Decode', jbig2({ ...leaf, black: (x, y) => leaf.grey[y * leaf.width + x]! <= 150 })),
  'jbig2 mmr': (leaf) => one(leaf, `/ColorSpace/DeviceGray/BitsPerComponent 1/Decode[1 0]/Filter/JBIG2Decode`, jbig2Mmr(leaf.width, leaf.height, leaf.g4!)),
  'strips': async (leaf) => {
    const rows = 256
    const images: RawObject[] = []
    const content: string[] = []
    for (let top = 0; top < leaf.height; top += rows) {
      const height = Math.min(rows, leaf.height - top)
      const part = { ...leaf, height, grey: leaf.grey.subarray(top * leaf.width, (top + height) * leaf.width) }
      content.push(`q ${leaf.w} 0 0 ${(leaf.h * height) / leaf.height} 0 ${leaf.h * (1 - (top + height) / leaf.height)} cm /I${images.length} Do Q`)
      images.push(imageOf(part, `${grey8}/Filter/DCTDecode`, await jpegOf(part)))
    }
    return { page: media(leaf), content: content.join('\n'), images }
  },
  'background and mask': (leaf) => ({ page: media(leaf), content: `q ${leaf.w} 0 0 ${leaf.h} 0 0 cm /I0 Do 0.1 g /I1 Do Q`, images: [imageOf({ width: 2, height: 2 }, '/ColorSpace/DeviceRGB/BitsPerComponent 8', Buffer.alloc(12, 245)), imageOf(leaf, '/ImageMask true/BitsPerComponent 1/Filter/FlateDecode', deflateSync(packed(leaf)))] }),
  'inline image': (leaf) => ({ page: media(leaf), content: `q ${leaf.w} 0 0 ${leaf.h} 0 0 cm BI /W ${leaf.width} /H ${leaf.height} /CS /G /BPC 1 /F /AHx ID ${packed(leaf).toString('hex')}> EI Q`, images: [] }),
  'turned by its matrix, off the origin, in another unit': async (leaf) => ({ page: `/UserUnit 2/MediaBox[50 -20 ${50 + leaf.h / 2} ${-20 + leaf.w / 2}]`, content: `q 0 ${-leaf.w / 2} ${leaf.h / 2} 0 50 ${-20 + leaf.w / 2} cm /I0 Do Q`, images: [imageOf(leaf, `${grey8}/Filter/DCTDecode`, await jpegOf(leaf))] }),
  'cropped and turned by /Rotate': async (leaf) => ({ page: `/Rotate 270/MediaBox[-99 -99 2000 2000]/CropBox[0 0 ${leaf.w} ${leaf.h}]`, content: draw(leaf), images: [imageOf(leaf, `${grey8}/Filter/FlateDecode`, deflateSync(leaf.grey, { level: 1 }))] }),
}

/** A sheaf in which page `index` of `source` is wrapped as `wrappings` names it. */
export async function wrappedSheaf(source: OpenSheaf, pages: readonly Readonly<{ index: number; as: string }>[]): Promise<Buffer> {
  const objects: RawObject[] = ['<</Type/Catalog/Pages 2 0 R>>', '']
  const kids: number[] = []
  for (const { index, as } of pages) {
    const { page, content, images } = await wrappings[as]!(await leafOf(source, index))
    const first = objects.length + 1
    const names = images.map((_, k) => `/I${k} ${first + k} 0 R`).join('')
    objects.push(...images, { dict: '', data: Buffer.from(content) }, `<</Type/Page/Parent 2 0 R ${page}/Contents ${first + images.length} 0 R/Resources<</XObject<<${names}>>>>>>`)
    kids.push(objects.length)
  }
  objects[1] = `<</Type/Pages/Count ${kids.length}/Kids[${kids.map((kid) => `${kid} 0 R`).join(' ')}]>>`
  return rawPdf(objects)
}

async function leafOf(source: OpenSheaf, index: number): Promise<Leaf> {
  const stored = source.page(index)
  const { image, picture } = await decodePage(source, index)
  const { width, height, data } = picture
  return { width, height, w: (72 * width) / image.dpiX, h: (72 * height) / image.dpiY, grey: Buffer.from(data), g4: stored.image !== null && stored.image.encoding === 'g4' ? stored.bytes : null }
}

import { deflateSync } from 'node:zlib'
import sharp from 'sharp'
import { mostPixels } from '@/lib/reading/sheaf-page'
import { brokenPicture, type PagePicture, type PicturePart } from './page-picture'

/** What is known of a picture before it is decoded. */
export type PictureFacts = Pick<PagePicture, 'width' | 'height' | 'dpiX' | 'dpiY' | 'orientation'> & Readonly<{ oneBit: boolean }>

/**
 * A picture decoded and put down as plain rows, for codings that a PDF has not. Transparent places are white. One that is damaged or
 * of absurd size becomes a page that is reported when its turn comes.
 * @param source a file's path or bytes; `page` of it, from 0
 */
export async function decodedPicture(source: string | Uint8Array, page: number, facts: PictureFacts): Promise<PagePicture> {
  const { width, height } = facts
  if (width * height > mostPixels) return brokenPicture(width, height)
  try {
    const picture = sharp(source, { page, limitInputPixels: mostPixels, failOn: 'truncated' }).flatten({ background: 'white' })
    const colour = !facts.oneBit && (await isColoured(source, page))
    const { data, info } = await picture.toColourspace(colour ? 'srgb' : 'b-w').raw().toBuffer({ resolveWithObject: true })
    const part = facts.oneBit ? oneBitPart(data, info.width, info.height) : plainPart(data, info.width, info.height, colour)
    return { width: info.width, height: info.height, dpiX: facts.dpiX, dpiY: facts.dpiY, orientation: facts.orientation, parts: [part] }
  } catch {
    return brokenPicture(width, height)
  }
}

async function isColoured(source: string | Uint8Array, page: number): Promise<boolean> {
  const { space } = await sharp(source, { page, limitInputPixels: mostPixels }).metadata()
  return space !== 'b-w' && space !== 'grey16'
}

function plainPart(data: Buffer, width: number, height: number, colour: boolean): PicturePart {
  const space = colour ? 'DeviceRGB' : 'DeviceGray'
  return { dict: `/Width ${width}/Height ${height}/ColorSpace/${space}/BitsPerComponent 8/Filter/FlateDecode`, data: deflateSync(data, { level: 4 }), from: 0, to: 1 }
}

function oneBitPart(grey: Buffer, width: number, height: number): PicturePart {
  const row = Math.ceil(width / 8)
  const bits = Buffer.alloc(row * height)
  for (let y = 0; y < height; y++) for (let x = 0; x < width; x++) if (grey[y * width + x]! > 127) bits[y * row + (x >> 3)]! |= 0x80 >> (x & 7)
  return { dict: `/Width ${width}/Height ${height}/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/FlateDecode`, data: deflateSync(bits, { level: 6 }), from: 0, to: 1 }
}

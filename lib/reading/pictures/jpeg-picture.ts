import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import { jpegHead } from '@/lib/reading/jpeg-head'
import { decodedPicture } from './decoded-picture'
import type { PagePicture } from './page-picture'

/** A JPEG as a page: its coded picture untouched, without what cameras note beside it (place, time, owner). Throws file_damaged. */
export async function jpegPicture(bytes: Buffer): Promise<PagePicture> {
  const head = jpegHead(bytes)
  if (!head) throw new AppError('file_damaged')
  const { density = 0, orientation = 1 } = await sharp(bytes, { limitInputPixels: false }).metadata().catch(() => ({ density: 0, orientation: 1 }))
  const facts = { width: head.width, height: head.height, dpiX: density, dpiY: density, orientation }
  // print colours mean different things to different readers
  if (head.components !== 1 && head.components !== 3) return decodedPicture(bytes, 0, { ...facts, oneBit: false })
  const space = head.components === 1 ? 'DeviceGray' : 'DeviceRGB'
  return { ...facts, parts: [{ dict: `/Width ${head.width}/Height ${head.height}/ColorSpace/${space}/BitsPerComponent 8/Filter/DCTDecode`, data: withoutNotes(bytes), from: 0, to: 1 }] }
}

/** EXIF and XMP (1), Photoshop (13) and comments go; what is needed for decoding stays. */
const notes = new Set([0xe1, 0xed, 0xfe])

function withoutNotes(bytes: Buffer): Buffer {
  const kept: Buffer[] = [bytes.subarray(0, 2)]
  let at = 2
  while (at + 4 <= bytes.length && bytes[at] === 0xff) {
    const marker = bytes[at + 1]!
    if (marker === 0xff) {
      at++
      continue
    }
    if (marker === 0xda) break
    const end = at + 2 + bytes.readUInt16BE(at + 2)
    if (!notes.has(marker)) kept.push(bytes.subarray(at, end))
    at = end
  }
  return Buffer.concat([...kept, bytes.subarray(at)])
}

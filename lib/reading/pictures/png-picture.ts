import sharp from 'sharp'
import { AppError } from '@/lib/core/errors'
import { decodedPicture } from './decoded-picture'
import type { PagePicture } from './page-picture'

const [grey, rgb, palette] = [0, 2, 3]
type Chunks = Readonly<{ header: Buffer; colours: Buffer | null; clear: boolean; data: Buffer; whole: boolean }>

/** A PNG as a page: its packed rows untouched where a PDF can hold them, decoded otherwise. Throws file_damaged. */
export async function pngPicture(bytes: Buffer): Promise<PagePicture> {
  const { header, colours, clear, data, whole } = chunksOf(bytes)
  if (header.length < 13 || data.length === 0 || !whole) throw new AppError('file_damaged')
  const [width, height] = [header.readUInt32BE(0), header.readUInt32BE(4)]
  const [depth, kind, interlaced] = [header[8]!, header[9]!, header[12] !== 0]
  const { density = 0 } = await sharp(bytes, { limitInputPixels: false }).metadata().catch(() => ({ density: 0 }))
  const facts = { width, height, dpiX: density, dpiY: density, orientation: 1 }
  const plain = !interlaced && !clear && depth <= 8 && (kind === grey || kind === rgb || (kind === palette && colours !== null))
  if (!plain) return decodedPicture(bytes, 0, { ...facts, oneBit: false })
  const space = kind === palette ? `[/Indexed/DeviceRGB ${Math.max(0, Math.floor(colours!.length / 3) - 1)}<${colours!.toString('hex')}>]` : kind === rgb ? '/DeviceRGB' : '/DeviceGray'
  const parms = `<</Predictor 15/Colors ${kind === rgb ? 3 : 1}/BitsPerComponent ${depth}/Columns ${width}>>`
  return { ...facts, parts: [{ dict: `/Width ${width}/Height ${height}/ColorSpace${space}/BitsPerComponent ${depth}/Filter/FlateDecode/DecodeParms${parms}`, data, from: 0, to: 1 }] }
}

function chunksOf(bytes: Buffer): Chunks {
  const data: Buffer[] = []
  let header: Buffer = Buffer.alloc(0)
  let colours: Buffer | null = null
  let [clear, whole] = [false, false]
  for (let at = 8; at + 12 <= bytes.length; ) {
    const length = bytes.readUInt32BE(at)
    const name = bytes.toString('latin1', at + 4, at + 8)
    const body = bytes.subarray(at + 8, at + 8 + length)
    if (name === 'IHDR') header = body
    else if (name === 'PLTE') colours = body
    else if (name === 'tRNS') clear = true
    else if (name === 'IDAT') data.push(body)
    else if (name === 'IEND') whole = true
    at += 12 + length
  }
  return { header, colours, clear, data: Buffer.concat(data), whole }
}

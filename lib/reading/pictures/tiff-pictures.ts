import { AppError } from '@/lib/core/errors'
import type { FileWindow } from '@/lib/reading/pdf/file-window'
import { mostPixels } from '@/lib/reading/sheaf-page'
import { decodedPicture } from './decoded-picture'
import { brokenPicture, type PagePicture, type PicturePart } from './page-picture'
import { openTiff, readDirectory, type TiffDirectory } from './tiff-directory'

const [g4, centimetre, smallPreview] = [4, 3, 1]
const mostStrips = 20_000
const mostStripBytes = 64 << 20
const reversed = Uint8Array.from({ length: 256 }, (_, byte) => { let out = 0; for (let k = 0; k < 8; k++) if (byte & (1 << k)) out |= 128 >> k; return out })

/**
 * The pages of a TIFF one after the other. Strips in G4 coding go into the page as they are, all else is decoded. A page that cannot be
 * read is given as a broken one, to be reported in its place. Throws file_damaged when not even the first page's head can be read.
 */
export async function* tiffPictures(file: FileWindow, source: string | Uint8Array): AsyncGenerator<PagePicture> {
  const { form, first } = openTiff(file)
  const seen = new Set<number>()
  for (let at = first, page = 0; at !== 0 && !seen.has(at); page++) {
    seen.add(at)
    let directory: TiffDirectory
    try {
      directory = readDirectory(file, form, at)
    } catch (error) {
      if (page === 0) throw error
      // the chain of pages breaks off here; what follows is lost, and one page says so
      yield brokenPicture(1, 1)
      return
    }
    if (!isPreview(directory)) yield await pictureOf(file, source, directory, page)
    at = directory.next
  }
  if (seen.size === 0) throw new AppError('file_no_pages')
}

function number(directory: TiffDirectory, tag: number, otherwise: number): number {
  return directory.fields.get(tag)?.[0] ?? otherwise
}
function isPreview(directory: TiffDirectory): boolean {
  return (number(directory, 254, 0) & smallPreview) === 1
}

async function pictureOf(file: FileWindow, source: string | Uint8Array, directory: TiffDirectory, page: number): Promise<PagePicture> {
  const [width, height] = [number(directory, 256, 0), number(directory, 257, 0)]
  const perInch = number(directory, 296, 2) === centimetre ? 2.54 : 1
  const facts = { width, height, dpiX: number(directory, 282, 0) * perInch, dpiY: number(directory, 283, 0) * perInch, orientation: number(directory, 274, 1) }
  if (!(width >= 1 && height >= 1) || width * height > mostPixels) return brokenPicture(width, height)
  const oneBit = number(directory, 258, 1) === 1 && number(directory, 277, 1) === 1
  const parts = oneBit && number(directory, 259, 1) === g4 ? faxStrips(file, directory, width, height) : null
  return parts ? { ...facts, parts } : decodedPicture(source, page, { ...facts, oneBit })
}

/** A page's strips as they are coded; null when they are not to be had. */
function faxStrips(file: FileWindow, directory: TiffDirectory, width: number, height: number): PicturePart[] | null {
  const starts = directory.fields.get(273) ?? []
  const lengths = directory.fields.get(279) ?? []
  const rows = Math.min(height, number(directory, 278, height))
  const count = Math.ceil(height / rows)
  if (!(rows >= 1) || starts.length < count || lengths.length < count || count > mostStrips) return null
  const blackIs1 = number(directory, 262, 0) === 1
  const backwards = number(directory, 266, 1) === 2
  const parts: PicturePart[] = []
  for (let k = 0; k < count; k++) {
    const high = Math.min(rows, height - k * rows)
    const data = file.read(starts[k]!, Math.min(lengths[k]!, mostStripBytes))
    if (data.length < lengths[k]!) return null
    parts.push({
      dict: `/Width ${width}/Height ${high}/ColorSpace/DeviceGray/BitsPerComponent 1/Filter/CCITTFaxDecode/DecodeParms<</K -1/Columns ${width}/Rows ${high}/BlackIs1 ${blackIs1}>>`,
      data: backwards ? data.map((byte) => reversed[byte]!) : data, from: (k * rows) / height, to: (k * rows + high) / height,
    })
  }
  return parts
}

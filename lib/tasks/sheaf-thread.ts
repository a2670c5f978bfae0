import sharp from 'sharp'
import { AppError, type ErrorCode, type ErrorDetail } from '@/lib/core/errors'
import { drawStoredPage, sharpOf } from '@/lib/reading/decode-page'
import { pageError } from '@/lib/reading/sheaf-page'
import { openSheaf, type OpenSheaf } from '@/lib/reading/open-sheaf'
import { wrapScan } from '@/lib/reading/pictures/wrap-scan'

/** What the thread is asked: how many pages a file has, or the picture of one page (from 0). `wrap`: pictures that are to become the file first. */
export type SheafJob = Readonly<{ file: string; picture?: number; wrap?: readonly string[] }>
/** Expected trouble comes back as values: an error does not keep its class on the way between threads. */
export type SheafAnswer = Readonly<{ pageCount: number; picture: Uint8Array | null }> | Readonly<{ fault: ErrorCode; detail: ErrorDetail }>

sharp.concurrency(1)
sharp.cache(false)

/** Opens a sheaf and answers one question about it. */
export default async function askSheaf({ file, picture, wrap }: SheafJob): Promise<SheafAnswer> {
  try {
    if (wrap) await wrapScan(wrap, file)
    const sheaf = openSheaf(file)
    try {
      return { pageCount: sheaf.pageCount, picture: picture === undefined ? null : await pictureOf(sheaf, picture) }
    } finally {
      sheaf.close()
    }
  } catch (error) {
    if (error instanceof AppError) return { fault: error.code, detail: error.detail }
    throw error
  }
}

/** A page's stored image as a file a picture program reads: a JPEG page's own bytes, any other page as PNG. */
async function pictureOf(sheaf: OpenSheaf, index: number): Promise<Uint8Array> {
  const page = sheaf.page(index)
  if (page.image !== null && page.image.encoding === 'jpeg' && !page.inverted) return page.bytes
  if (page.image) return sharpOf(page).png({ compressionLevel: 3 }).toBuffer()
  if (page.problem !== 'must_render') throw pageError(page.problem, index)
  const { picture } = await drawStoredPage(sheaf, index, 3)
  return sharp(picture.data, { raw: { width: picture.width, height: picture.height, channels: 3 } }).png({ compressionLevel: 3 }).toBuffer()
}

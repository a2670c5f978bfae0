import { AppError } from '@/lib/core/errors'
import { fileKind, kindBytes } from '@/lib/core/file-kind'
import { FileWindow } from '@/lib/reading/pdf/file-window'
import { mostPages } from '@/lib/reading/sheaf-page'
import { jpegPicture } from './jpeg-picture'
import type { PagePicture } from './page-picture'
import { pngPicture } from './png-picture'
import { tiffPictures } from './tiff-pictures'
import { wrapPictures } from './wrap-pictures'

/** One picture is read whole; the largest that may be decoded is smaller coded. */
const mostBytes = 256 << 20

/**
 * Makes a sheaf of pictures: JPEG, PNG and TIFF files become one PDF at `to`, a page for each picture in the order given. Coded pictures
 * go in as they are where a PDF can hold them. Throws file_empty, file_kind_unknown, file_heic, file_damaged, file_no_pages, file_too_large or too_many_pages.
 */
export async function wrapScan(files: readonly string[], to: string): Promise<void> {
  const pages = await wrapPictures(allPictures(files), to, mostPages)
  if (pages === 0) throw new AppError('file_no_pages')
  if (pages > mostPages) throw new AppError('too_many_pages', { pages, most: mostPages })
}

async function* allPictures(files: readonly string[]): AsyncGenerator<PagePicture> {
  for (const path of files) {
    const file = new FileWindow(path)
    try {
      yield* picturesOf(file, path)
    } finally {
      file.close()
    }
  }
}

async function* picturesOf(file: FileWindow, path: string): AsyncGenerator<PagePicture> {
  if (file.size === 0) throw new AppError('file_empty')
  const kind = fileKind(file.read(0, kindBytes))
  if (kind === 'tiff') return yield* tiffPictures(file, path)
  if (kind === 'heic') throw new AppError('file_heic')
  if (kind !== 'jpeg' && kind !== 'png') throw new AppError('file_kind_unknown')
  if (file.size > mostBytes) throw new AppError('file_too_large', { limitMb: mostBytes >> 20 })
  const bytes = file.read(0, file.size)
  yield kind === 'jpeg' ? await jpegPicture(bytes) : await pngPicture(bytes)
}

import { AppError } from '@/lib/core/errors'
import { fileKind, kindBytes } from '@/lib/core/file-kind'
import { packHeadBytes, packedPlaces } from '@/lib/core/picture-pack'
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
  for (const path of files) yield* withFile(path, undefined, (file) => scanOf(file, path))
}

type Part = Readonly<{ at: number; size: number }>
async function* withFile(path: string, part: Part | undefined, work: (file: FileWindow) => AsyncGenerator<PagePicture>): AsyncGenerator<PagePicture> {
  const file = new FileWindow(path, part)
  try {
    yield* work(file)
  } finally {
    file.close()
  }
}

async function* scanOf(file: FileWindow, path: string): AsyncGenerator<PagePicture> {
  if (fileKind(file.read(0, kindBytes)) !== 'pack') return yield* picturesOf(file, path)
  const places = packedPlaces(file.read(0, packHeadBytes))
  if (!places || places.some(({ at, size }) => at + size > file.size)) throw new AppError('file_damaged')
  // a picture within another file is read whole
  for (const place of places) yield* withFile(path, place, (picture) => picturesOf(picture, null))
}

/** @param path the file that is nothing but this scan; null for one that lies within another file */
async function* picturesOf(file: FileWindow, path: string | null): AsyncGenerator<PagePicture> {
  if (file.size === 0) throw new AppError('file_empty')
  const kind = fileKind(file.read(0, kindBytes))
  if (kind === 'heic') throw new AppError('file_heic')
  if (kind !== 'jpeg' && kind !== 'png' && kind !== 'tiff') throw new AppError('file_kind_unknown')
  if (kind === 'tiff' && path !== null) return yield* tiffPictures(file, path)
  if (file.size > mostBytes) throw new AppError('file_too_large', { limitMb: mostBytes >> 20 })
  const bytes = file.read(0, file.size)
  if (kind === 'tiff') yield* tiffPictures(file, bytes)
  else yield kind === 'jpeg' ? await jpegPicture(bytes) : await pngPicture(bytes)
}

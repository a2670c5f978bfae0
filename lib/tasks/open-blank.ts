import { PDFDocument, EncryptedPDFError } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import type { PaperPage } from '@/lib/core/paper'
import { assertPaperSizes } from '@/lib/setting/paper-size'

const mostPages = 40

/** The pages of a blank paper as they are shown. Throws a file error, or paper_invalid for a sheet that is none of ours. */
export async function openBlank(bytes: Uint8Array): Promise<PaperPage[]> {
  if (bytes.length === 0) throw new AppError('file_empty')
  if (!Buffer.from(bytes.subarray(0, 1024)).includes('%PDF-')) throw new AppError('file_not_pdf')
  const shown = await PDFDocument.load(bytes, { updateMetadata: false }).then((document) => document.getPages()).catch((error: unknown) => {
    throw new AppError(error instanceof EncryptedPDFError ? 'file_encrypted' : 'file_damaged')
  })
  if (shown.length === 0) throw new AppError('file_no_pages')
  if (shown.length > mostPages) throw new AppError('too_many_pages', { pages: shown.length, most: mostPages })
  const pages = shown.map((page, k) => {
    const { width, height } = page.getCropBox()
    const sideways = page.getRotation().angle % 180 !== 0
    return { page: k + 1, width: sideways ? height : width, height: sideways ? width : height }
  })
  assertPaperSizes(pages)
  return pages
}

import { EncryptedPDFError, PDFDocument } from 'pdf-lib'
import { AppError } from '@/lib/core/errors'
import { liftImage } from './lift-image'
import { openDocument } from './pdfium'
import type { SheafPage } from './sheaf-page'

const mostPages = 2000

/** A sheaf whose pages can be taken out one after the other. `index` counts from 0. */
export type OpenSheaf = Readonly<{ pageCount: number; page: (index: number) => SheafPage }>

/**
 * Opens a sheaf from its bytes, judging by content alone.
 * Throws file_empty, file_not_pdf, file_encrypted (asks for a password), file_damaged, file_no_pages or too_many_pages.
 * A single bad page is not an error: `page` marks it and it becomes a loose sheet.
 */
export async function openSheaf(bytes: Uint8Array): Promise<OpenSheaf> {
  if (bytes.length === 0) throw new AppError('file_empty')
  if (!hasHeader(bytes)) throw new AppError('file_not_pdf')
  const sheaf = (await walkable(bytes)) ?? (await withoutEnd(bytes)) ?? (await drawable(bytes))
  if (sheaf.pageCount === 0) throw new AppError('file_no_pages')
  if (sheaf.pageCount > mostPages) throw new AppError('too_many_pages', { pages: sheaf.pageCount, most: mostPages })
  return sheaf
}

/** %PDF- within the first kilobyte, as readers agree to accept it. */
function hasHeader(bytes: Uint8Array): boolean {
  return Buffer.from(bytes.buffer, bytes.byteOffset, Math.min(1024, bytes.length)).includes('%PDF-')
}

/** The sheaf by its object tree; null when that cannot be walked (enciphered, or too damaged). */
async function walkable(bytes: Uint8Array): Promise<OpenSheaf | null> {
  let pages
  try {
    pages = (await PDFDocument.load(bytes, { updateMetadata: false })).getPages()
  } catch (error) {
    if (error instanceof AppError) throw error
    if (!(error instanceof EncryptedPDFError) && !(error instanceof Error)) throw error
    return null
  }
  const page = (index: number): SheafPage => {
    try {
      return liftImage(pages[index]!, index) ?? mustRender(index)
    } catch {
      return mustRender(index)
    }
  }
  return { pageCount: pages.length, page }
}

/** A file that broke off: its whole objects alone, up to the last one, when they still hold pages. */
async function withoutEnd(bytes: Uint8Array): Promise<OpenSheaf | null> {
  const view = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.length)
  if (view.includes('/Encrypt')) return null
  const end = view.lastIndexOf('endobj')
  const sheaf = end < 0 ? null : await walkable(bytes.subarray(0, end + 'endobj'.length + 1))
  return sheaf && sheaf.pageCount > 0 ? sheaf : null
}

/** The sheaf as the PDF engine sees it: every page is drawn. */
async function drawable(bytes: Uint8Array): Promise<OpenSheaf> {
  const { engine, document, close } = await openDocument(bytes)
  const pageCount = engine._FPDF_GetPageCount(document)
  close()
  return { pageCount, page: mustRender }
}

function mustRender(index: number): SheafPage {
  return { index, image: null, bytes: null, problem: 'must_render' }
}

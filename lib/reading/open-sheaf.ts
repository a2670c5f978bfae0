import { AppError } from '@/lib/core/errors'
import { fileKind, kindBytes } from '@/lib/core/file-kind'
import { liftImage } from './lift-image'
import { pageAlone } from './page-alone'
import { pageSource, type PageSource } from './page-source'
import { listPages, type PageEntry } from './page-tree'
import { FileWindow } from './pdf/file-window'
import { PdfFile, isFault } from './pdf/pdf-file'
import { Incomplete, TooLarge } from './pdf/value'
import { mostPages, pageError, type SheafPage } from './sheaf-page'

/** A sheaf whose pages can be taken out one after the other, read from its file as they are asked for. `index` counts from 0. Close it after use. */
export type OpenSheaf = Readonly<{
  pageCount: number
  /** Never throws for what is wrong with a page. */
  page: (index: number) => SheafPage
  /** The page as a PDF of its own, in pieces, for drawing, and the points of its unit. Throws page_unreadable, page_too_large, page_incomplete. */
  alone: (index: number) => Readonly<{ parts: readonly Uint8Array[]; unit: number }>
  close: () => void
}>

/**
 * Opens a sheaf, judging by content alone. Only what is asked for is read, whatever the file's size.
 * Throws file_empty, file_not_pdf, file_encrypted (asks for a password), file_damaged, file_no_pages or too_many_pages.
 * A single bad page is not an error: `page` marks it and it becomes a loose sheet.
 */
export function openSheaf(path: string): OpenSheaf {
  const file = new FileWindow(path)
  try {
    if (file.size === 0) throw new AppError('file_empty')
    if (fileKind(file.read(0, kindBytes)) !== 'pdf') throw new AppError('file_not_pdf')
    const pdf = new PdfFile(file)
    const pages = pagesOf(pdf)
    const source = (index: number): PageSource | null => pageSource(pdf, pages[index]!)
    return { pageCount: pages.length, page: (index) => pageOf(source, index), alone: (index) => aloneOf(source, index), close: () => file.close() }
  } catch (error) {
    file.close()
    throw error instanceof AppError || !isFault(error) ? error : new AppError('file_damaged')
  }
}

function pagesOf(pdf: PdfFile): PageEntry[] {
  const pages = listPages(pdf)
  if (!pages) throw new AppError('file_damaged')
  if (pages.length === 0) throw new AppError('file_no_pages')
  if (pages.length > mostPages) throw new AppError('too_many_pages', { pages: pages.length, most: mostPages })
  return pages
}

function pageOf(source: (index: number) => PageSource | null, index: number): SheafPage {
  try {
    const found = source(index)
    if (!found) return { index, image: null, problem: 'page_unreadable' }
    const lifted = liftImage(found)
    if (lifted === 'too_large') return { index, image: null, problem: 'page_too_large' }
    return lifted ? { index, ...lifted } : { index, image: null, problem: 'must_render' }
  } catch (error) {
    if (!isFault(error)) throw error
    return { index, image: null, problem: error instanceof TooLarge ? 'page_too_large' : 'must_render' }
  }
}

function aloneOf(source: (index: number) => PageSource | null, index: number): ReturnType<OpenSheaf['alone']> {
  try {
    const found = source(index)
    if (found) return { parts: pageAlone(found), unit: found.box.unit ?? 1 }
  } catch (error) {
    if (!isFault(error)) throw error
    throw pageError(error instanceof TooLarge ? 'page_too_large' : error instanceof Incomplete ? 'page_incomplete' : 'page_unreadable', index)
  }
  throw pageError('page_unreadable', index)
}
